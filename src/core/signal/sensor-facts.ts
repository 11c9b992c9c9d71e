/** What the samples tell about the sensor: rounding step, clipping, gravity, noise. */

/** Finest step looked for, m/s²; single-precision samples near 10 m/s² are themselves 1e-6 apart. */
const FINEST_STEP_MPS2 = 5e-5;
/** Share of neighbouring distinct values that must sit on the grid. */
const ON_GRID_SHARE = 0.97;
/** Full scales of common sensors, g; a rail is taken as such within 1.5 % (sensor scale error, our choice). */
const FULL_SCALES_G = [2, 4, 8, 16, 32];
const FULL_SCALE_TOLERANCE = 0.015;
const STANDARD_GRAVITY_MPS2 = 9.80665;
/** Values this close to the extreme sit on the rail with it; one alone may be chance. */
const RAIL_WIDTH_RATIO = 5e-4;
const RAIL_SAMPLES = 2;
/** Equal extremes in a row that make a flat top. */
const FLAT_TOP_SAMPLES = 3;
/** A mean this large holds gravity, m/s²; phones read 9.2 to 10.2 at rest. */
const GRAVITY_PRESENT_MPS2 = 5;

/**
 * Rounding step of one axis: the grid on which all values sit, m/s²; 0 where none was found.
 * Misleads when fewer than three different values occur (a phone at rest within one step).
 */
export function roundingStep(values: Float32Array): number {
  const distinct = distinctSorted(values);
  if (distinct.length < 2) return 0;
  const gaps: number[] = [];
  const slack =
    4 * 6e-8 * Math.max(Math.abs(distinct[0] as number), Math.abs(distinct[distinct.length - 1] as number));
  for (let i = 1; i < distinct.length; i++) {
    const gap = (distinct[i] as number) - (distinct[i - 1] as number);
    if (gap > slack) gaps.push(gap);
  }
  if (!gaps.length) return 0;
  let step = gaps.reduce((least, gap) => Math.min(least, gap), Infinity);
  if (step < FINEST_STEP_MPS2) return 0;
  for (let pass = 0; pass < 2; pass++) {
    const multiples = gaps.map((gap) => Math.max(1, Math.round(gap / step)));
    step = gaps.reduce((s, g) => s + g, 0) / multiples.reduce((s, m) => s + m, 0);
  }
  const tolerance = Math.max(slack, 0.06 * step);
  const onGrid = gaps.filter((gap) => Math.abs(gap - step * Math.round(gap / step)) < tolerance).length;
  return onGrid >= ON_GRID_SHARE * gaps.length ? step : 0;
}

function distinctSorted(values: Float32Array): Float64Array {
  const stride = Math.max(1, Math.floor(values.length / 20000));
  const seen = new Set<number>();
  for (let i = 0; i < values.length; i += stride) seen.add(values[i] as number);
  return Float64Array.from(seen).sort();
}

/** Samples at a rail: at a known full scale, or three and more equal extremes in a row standing well out of the rest. */
export function clippedCount(axes: readonly Float32Array[], stepMps2: readonly number[]): number {
  const n = axes[0]?.length ?? 0;
  const clipped = new Uint8Array(n);
  axes.forEach((axis, a) => {
    markRail(axis, 1, stepMps2[a] ?? 0, clipped);
    markRail(axis, -1, stepMps2[a] ?? 0, clipped);
  });
  return clipped.reduce((sum, v) => sum + v, 0);
}

function markRail(axis: Float32Array, sign: 1 | -1, stepMps2: number, clipped: Uint8Array): void {
  let extreme = -Infinity;
  let mean = 0;
  let square = 0;
  let lowest = Infinity;
  for (let i = 0; i < axis.length; i++) {
    const v = sign * (axis[i] as number);
    if (v > extreme) extreme = v;
    if (v < lowest) lowest = v;
    mean += v / axis.length;
    square += (v * v) / axis.length;
  }
  // An axis that never moves (a made-up record) is at no rail.
  if (extreme - lowest <= stepMps2 || extreme === lowest) return;
  const isFullScale = FULL_SCALES_G.some(
    (g) => Math.abs(extreme / (g * STANDARD_GRAVITY_MPS2) - 1) < FULL_SCALE_TOLERANCE,
  );
  const deviation = Math.sqrt(Math.max(0, square - mean * mean));
  const standsOut = extreme - mean > Math.max(4 * deviation, 20 * stepMps2);
  const least = extreme - Math.max(stepMps2 / 2, RAIL_WIDTH_RATIO * Math.abs(extreme));
  let atRail = 0;
  for (let i = 0; i < axis.length; i++) if (sign * axis[i]! >= least) atRail++;
  if (atRail < RAIL_SAMPLES) return;
  for (let i = 0; i < axis.length;) {
    let end = i;
    while (end < axis.length && sign * (axis[end] as number) >= least) end++;
    if ((end > i && isFullScale) || (end - i >= FLAT_TOP_SAMPLES && standsOut)) clipped.fill(1, i, end);
    i = Math.max(end, i + 1);
  }
}

/** Mean acceleration as the sensor at rest reads it ("up"); undefined where gravity was removed or fewer than 3 axes are there. */
export function gravityOf(
  axes: readonly Float32Array[],
): { readonly gravityMps2: number; readonly up: readonly number[] } | undefined {
  if (axes.length < 3) return undefined;
  const means = axes.map((axis) => {
    let sum = 0;
    for (let i = 0; i < axis.length; i++) sum += axis[i] as number;
    return sum / Math.max(1, axis.length);
  });
  const norm = Math.hypot(...means);
  return norm > GRAVITY_PRESENT_MPS2 ? { gravityMps2: norm, up: means.map((m) => m / norm) } : undefined;
}
