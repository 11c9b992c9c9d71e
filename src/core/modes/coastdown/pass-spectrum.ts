import { nextPowerOfTwo, realTransform } from '../../signal/fft.ts';
import { principalDirection } from '../../signal/linear-algebra.ts';
import type { UniformSignal } from '../../signal/uniform-grid.ts';

/** First guess of a resonance passed by a sweep. */
export interface PassGuess {
  readonly frequencyHz: number;
  readonly dampingRatio: number;
  readonly direction: readonly number[];
  /** Height of the peak over the median of the band (power). */
  readonly contrast: number;
}

/** Smoothing of the power before its peak is read, relative half width. */
const SMOOTHING_SHARE = 0.004;

/**
 * The transform of the whole pass is the response times the smooth spectrum of the sweep: over f⁴ (unbalance and
 * acceleration) its magnitude peaks at the mode and is as wide as the mode, whatever the sweep rate.
 */
export function guessFromWholePass(
  grid: UniformSignal,
  bandHz: readonly [number, number],
): PassGuess | undefined {
  const n = grid.present.length;
  const size = 2 * nextPowerOfTwo(n);
  const stepHz = 1 / (size * grid.periodS);
  const spectra = grid.accelerationMps2.map((axis) => realTransform(axis, size));
  const first = Math.max(2, Math.ceil(bandHz[0] / stepHz));
  const last = Math.floor(bandHz[1] / stepHz);
  if (last - first < 16) return undefined;
  const power = new Float64Array(last + 1);
  for (const { re, im } of spectra)
    for (let k = first; k <= last; k++)
      power[k] = (power[k] as number) + (re[k] as number) ** 2 + (im[k] as number) ** 2;
  const sorted = power.slice(first).sort();
  const floor = sorted[sorted.length >> 3] as number;
  const shaped = power.map((p, k) => (k < first ? 0 : Math.max(0, p - floor) / k ** 4));
  const smooth = smoothed(shaped, first, last);
  // Read in the band where the line has power: far below, f⁴ would raise the noise.
  const raw = smoothed(power, first, last);
  const top = indexOfMost(raw, first, last);
  const low = Math.max(first, Math.floor(0.75 * top));
  const high = Math.min(last, Math.ceil(1.25 * top));
  const peak = indexOfMost(smooth, low, high);
  const half = (smooth[peak] as number) / 2;
  let lower = peak;
  while (lower > low && (smooth[lower] as number) > half) lower--;
  let upper = peak;
  while (upper < high && (smooth[upper] as number) > half) upper++;
  const dampingRatio = Math.min(0.15, Math.max(0.002, (upper - lower) / (2 * peak)));
  const reach = Math.max(2, upper - lower);
  const matrix = spectra.map((a) =>
    spectra.map((b) => {
      let sum = 0;
      for (let k = Math.max(first, peak - reach); k <= Math.min(last, peak + reach); k++)
        sum += (a.re[k] as number) * (b.re[k] as number) + (a.im[k] as number) * (b.im[k] as number);
      return sum;
    }),
  );
  return {
    frequencyHz: peak * stepHz,
    dampingRatio,
    direction: principalDirection(matrix),
    contrast: (raw[top] as number) / Math.max(sorted[sorted.length >> 1] as number, 1e-30),
  };
}

function smoothed(values: Float64Array, first: number, last: number): Float64Array {
  const sums = new Float64Array(last + 2);
  for (let k = first; k <= last; k++) sums[k + 1] = (sums[k] as number) + (values[k] as number);
  const out = new Float64Array(last + 1);
  for (let k = first; k <= last; k++) {
    const half = Math.max(1, Math.round(SMOOTHING_SHARE * k));
    const from = Math.max(first, k - half);
    const to = Math.min(last, k + half);
    out[k] = ((sums[to + 1] as number) - (sums[from] as number)) / (to - from + 1);
  }
  return out;
}

function indexOfMost(values: Float64Array, first: number, last: number): number {
  let best = first;
  for (let k = first; k <= last; k++) if ((values[k] as number) > (values[best] as number)) best = k;
  return best;
}
