/** Data windows in their periodic form, and the constants that read a windowed spectrum (Harris, Proc. IEEE 66, 1978). */
export type WindowKind = 'rectangular' | 'hann' | 'hamming' | 'blackman' | 'blackman-harris' | 'flat-top';

/** Cosine-sum coefficients a0, a1...: w = a0 - a1 cos(2πn/N) + a2 cos(4πn/N) - ... (Harris 1978; flat-top: D'Antona & Ferrero 2006). */
const COEFFICIENTS: Readonly<Record<WindowKind, readonly number[]>> = {
  rectangular: [1],
  hann: [0.5, 0.5],
  hamming: [0.54, 0.46],
  blackman: [0.42, 0.5, 0.08],
  'blackman-harris': [0.35875, 0.48829, 0.14128, 0.01168],
  'flat-top': [0.21557895, 0.41663158, 0.277263158, 0.083578947, 0.006947368],
};

/**
 * Periodic window of n samples.
 * @param n length, >= 1
 */
export function windowSamples(kind: WindowKind, n: number): Float64Array {
  if (!Number.isInteger(n) || n < 1) throw new RangeError(`window length must be an integer >= 1, got ${n}`);
  const terms = COEFFICIENTS[kind];
  const out = new Float64Array(n);
  for (let i = 0; i < n; i++) {
    let sum = 0;
    for (let m = 0; m < terms.length; m++)
      sum += (m % 2 ? -1 : 1) * (terms[m] as number) * Math.cos((2 * Math.PI * m * i) / n);
    out[i] = sum;
  }
  return out;
}

/** Mean of the window: amplitude of a line on a bin is divided by it. */
export const coherentGain = (kind: WindowKind): number => COEFFICIENTS[kind][0] as number;

/** Equivalent noise bandwidth in bins (Harris 1978, eq. 11): N·sum(w²)/sum(w)². */
export function noiseBandwidthBins(kind: WindowKind): number {
  const [a0, ...rest] = COEFFICIENTS[kind] as [number, ...number[]];
  return 1 + rest.reduce((sum, a) => sum + a * a, 0) / (2 * a0 * a0);
}
