import { chiSquaredQuantile, studentQuantile95 } from './quantiles.ts';

/** One tap's own value and its variance, any unit. */
export interface TapValue {
  readonly value: number;
  readonly variance: number;
}

export interface Combination {
  readonly value: number;
  readonly sd: number;
  /** Standard deviation between taps beyond each tap's own, same unit. */
  readonly betweenSd: number;
}

/** Taps that know this many times less than the best one say nothing about scatter. */
const LEAST_INFORMATION_SHARE = 0.03;
/** Standard normal quantile of the scatter test: one honest record in two hundred is widened for nothing. */
const SCATTER_TEST_Z = 2.576;
const Z95 = 1.959964;

/**
 * Tap-to-tap combination: random effects (DerSimonian & Laird 1986) with the interval of Hartung & Knapp (2001),
 * given back as the standard deviation whose 1.96-fold is that interval's half-width.
 * @returns undefined when the taps agree within their own variances (Cochran's Q, 1954): then the joint fit stands
 */
export function tapScatter(taps: readonly TapValue[]): Combination | undefined {
  const least = Math.min(...taps.map((t) => t.variance));
  const kept = taps.filter((t) => t.variance * LEAST_INFORMATION_SHARE <= least && Number.isFinite(t.value));
  const k = kept.length;
  if (k < 2) return undefined;
  const weights = kept.map((t) => 1 / t.variance);
  const fixed = weightedMean(kept, weights);
  const q = kept.reduce((sum, t, i) => sum + weights[i]! * (t.value - fixed) ** 2, 0);
  if (q <= chiSquaredQuantile(k - 1, SCATTER_TEST_Z)) return undefined;
  const total = sumOf(weights);
  const between = (q - (k - 1)) / (total - sumOf(weights.map((w) => w * w)) / total);
  const widened = kept.map((t) => 1 / (t.variance + between));
  const value = weightedMean(kept, widened);
  const spread = kept.reduce((sum, t, i) => sum + widened[i]! * (t.value - value) ** 2, 0);
  const standardError = Math.sqrt(spread / ((k - 1) * sumOf(widened)));
  return { value, sd: (studentQuantile95(k - 1) / Z95) * standardError, betweenSd: Math.sqrt(between) };
}

const sumOf = (values: readonly number[]): number => values.reduce((a, b) => a + b, 0);

const weightedMean = (taps: readonly TapValue[], weights: readonly number[]): number =>
  taps.reduce((sum, t, i) => sum + weights[i]! * t.value, 0) / sumOf(weights);
