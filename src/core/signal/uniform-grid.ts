/** Samples moved to the steady clock's grid, so that transforms may be used on them. */

export interface UniformSignal {
  readonly periodS: number;
  /** Time of the first grid point, s. */
  readonly startS: number;
  /** One array per axis on the grid; lost samples are bridged by a straight line. */
  readonly accelerationMps2: readonly Float64Array[];
  /** 1 where a sample was there, 0 where it was bridged. */
  readonly present: Uint8Array;
}

/** What is needed of a conditioned signal (see `condition-recording`). */
export interface GriddableSignal {
  readonly timeS: Float64Array;
  readonly clockS: Float64Array;
  readonly count: Int32Array;
  readonly periodS: number;
  readonly accelerationMps2: readonly Float64Array[];
}

/** Half length of the differentiator, samples: exact to 0.5 % up to 0.46 of the rate. */
const DIFFERENTIATOR_HALF = 24;
/** Samples further off the grid than this on average (rms, periods): the expansion would not converge, interpolation does the work. */
const EXPANSION_LIMIT_PERIODS = 0.3;
/** Corrections; each leaves about (2π·f·scatter) of the error before. */
const CORRECTIONS = 3;

/**
 * Values on the grid of the steady clock. A sample taken d off its grid point differs from the value there by about
 * d·dx/dt; that is taken off and refined (Picard iteration on the first-order expansion). Fits on the raw times are
 * better still; this is for spectra and searches. Misleads above 0.42 of the rate and for content folded from above half of it.
 */
export function uniformSignal(signal: GriddableSignal): UniformSignal {
  const { count, periodS, clockS, timeS } = signal;
  const n = count.length;
  const size = (count[n - 1] as number) + 1;
  const present = new Uint8Array(size);
  const offsetS = new Float64Array(size);
  let square = 0;
  for (let i = 0; i < n; i++) {
    const k = count[i] as number;
    present[k] = 1;
    offsetS[k] = (timeS[i] as number) - (clockS[i] as number);
    square += (offsetS[k] as number) ** 2;
  }
  const offsetRmsS = Math.sqrt(square / n);
  const startS = clockS[0] as number;
  const accelerationMps2 = signal.accelerationMps2.map((axis) => {
    if (offsetRmsS > EXPANSION_LIMIT_PERIODS * periodS)
      return interpolateOnto(timeS, axis, startS, periodS, size);
    const grid = new Float64Array(size);
    for (let i = 0; i < n; i++) grid[count[i] as number] = axis[i] as number;
    bridge(grid, present);
    return offsetRmsS > 1e-5 ? moveToGrid(grid, offsetS, present, periodS) : grid;
  });
  return { periodS, startS, accelerationMps2, present };
}

/** Piecewise cubic through irregular samples, slopes from the neighbours' chord (cubic Hermite); constant beyond the ends. */
function interpolateOnto(
  timeS: Float64Array,
  samples: Float64Array,
  startS: number,
  periodS: number,
  size: number,
): Float64Array {
  const n = timeS.length;
  const chord = (a: number, b: number): number =>
    ((samples[b] as number) - (samples[a] as number)) /
    Math.max((timeS[b] as number) - (timeS[a] as number), 1e-6);
  const out = new Float64Array(size);
  let i = 0;
  for (let k = 0; k < size; k++) {
    const t = startS + k * periodS;
    while (i < n - 2 && (timeS[i + 1] as number) <= t) i++;
    const span = (timeS[i + 1] as number) - (timeS[i] as number);
    const s = span > 1e-6 ? Math.max(0, Math.min(1, (t - (timeS[i] as number)) / span)) : 0;
    const m0 = span * chord(Math.max(0, i - 1), i + 1);
    const m1 = span * chord(i, Math.min(n - 1, i + 2));
    const a = samples[i] as number;
    const b = samples[i + 1] as number;
    const bend = 2 * (a - b) + m0 + m1;
    out[k] = a + s * (m0 + s * (b - a - m0 - bend + s * bend));
  }
  return out;
}

function bridge(grid: Float64Array, present: Uint8Array): void {
  let before = 0;
  for (let k = 1; k < grid.length; k++) {
    if (!present[k]) continue;
    for (let j = before + 1; j < k; j++) {
      const share = (j - before) / (k - before);
      grid[j] = (1 - share) * (grid[before] as number) + share * (grid[k] as number);
    }
    before = k;
  }
}

function moveToGrid(
  measured: Float64Array,
  offsetS: Float64Array,
  present: Uint8Array,
  periodS: number,
): Float64Array {
  let moved = measured;
  for (let pass = 0; pass < CORRECTIONS; pass++) {
    const slope = derivative(moved, periodS);
    const next = new Float64Array(measured.length);
    for (let k = 0; k < next.length; k++)
      next[k] = (measured[k] as number) - (offsetS[k] as number) * (slope[k] as number);
    bridge(next, present);
    moved = next;
  }
  return moved;
}

/** Band-limited differentiator, windowed by a raised cosine; zero beyond the ends. Unit of the samples per second. */
export function derivative(samples: Float64Array, periodS: number): Float64Array {
  const n = samples.length;
  const half = DIFFERENTIATOR_HALF;
  const weights = Float64Array.from({ length: half }, (_, j) => {
    const m = j + 1;
    return ((m % 2 ? 1 : -1) * (0.5 + 0.5 * Math.cos((Math.PI * m) / (half + 1)))) / (m * periodS);
  });
  const out = new Float64Array(n);
  for (let i = 0; i < n; i++) {
    let sum = 0;
    for (let j = 0; j < half; j++) {
      const ahead = i + j + 1 < n ? (samples[i + j + 1] as number) : (samples[n - 1] as number);
      const behind = i - j - 1 >= 0 ? (samples[i - j - 1] as number) : (samples[0] as number);
      sum += (weights[j] as number) * (ahead - behind);
    }
    out[i] = sum;
  }
  return out;
}
