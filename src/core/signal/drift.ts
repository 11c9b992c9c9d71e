/**
 * Gravity, tilt and slow drift: what a structure does not do. A moving mean applied twice is taken as the slow part.
 */

/** Width of each moving mean, s. Passes 95 % at 0.25 Hz and 99 % above 0.5 Hz (sinc² response); our own choice. */
export const DRIFT_WINDOW_S = 6;

/**
 * Slow part of a sampled signal: moving mean of width `DRIFT_WINDOW_S`, twice, with the ends continued by point reflection.
 * A record shorter than three windows gets its straight line instead.
 * @param samples length n, uniform to within the stamp scatter
 * @param rateHz sampling rate
 * @returns length n, same unit
 */
export function slowPart(samples: ArrayLike<number>, rateHz: number): Float64Array {
  if (!(rateHz > 0)) throw new RangeError(`rateHz must be > 0, got ${rateHz}`);
  const half = Math.round((DRIFT_WINDOW_S * rateHz) / 2);
  if (samples.length < 6 * half) return straightLine(samples);
  return movingMean(movingMean(samples, half), half);
}

/** Least-squares straight line through samples at equal steps, evaluated at each. */
export function straightLine(samples: ArrayLike<number>): Float64Array {
  const n = samples.length;
  let mean = 0;
  let slope = 0;
  for (let i = 0; i < n; i++) mean += samples[i] as number;
  mean /= Math.max(1, n);
  const centre = (n - 1) / 2;
  for (let i = 0; i < n; i++) slope += (i - centre) * ((samples[i] as number) - mean);
  slope /= Math.max(1, (n * (n * n - 1)) / 12);
  return Float64Array.from({ length: n }, (_, i) => mean + slope * (i - centre));
}

/** Mean over 2·half + 1 samples; beyond the ends the signal is continued by point reflection about its end. */
function movingMean(samples: ArrayLike<number>, half: number): Float64Array {
  const n = samples.length;
  const edge = Math.min(n, Math.max(2, half));
  // Value at the very end by a straight line through the last samples: a ramp then stays a ramp.
  const head = straightLine(Array.from({ length: edge }, (_, i) => samples[i]!));
  const tail = straightLine(Array.from({ length: edge }, (_, i) => samples[n - edge + i]!));
  const first = head[0]!;
  const last = tail[edge - 1]!;
  const at = (i: number): number => {
    if (i < 0) return 2 * first - (samples[Math.min(n - 1, -i)] as number);
    if (i >= n) return 2 * last - (samples[Math.max(0, 2 * n - 2 - i)] as number);
    return samples[i] as number;
  };
  const out = new Float64Array(n);
  let sum = 0;
  for (let i = -half; i <= half; i++) sum += at(i);
  const width = 2 * half + 1;
  for (let i = 0; i < n; i++) {
    out[i] = sum / width;
    sum += at(i + half + 1) - at(i - half);
  }
  return out;
}
