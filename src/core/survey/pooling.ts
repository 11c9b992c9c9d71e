import type { Interval } from '../model/interval.ts';
import { studentQuantile95 } from './student.ts';

export interface Estimate {
  readonly value: number;
  readonly sd: number;
}

export interface Pooled {
  readonly value: number;
  /** Standard deviation of the pooled value. */
  readonly sd: number;
  /** Scatter between the readings beyond their own uncertainties, standard deviation; 0 where none shows. */
  readonly betweenSd: number;
  readonly readingCount: number;
  /** 95 % interval with Student's t. */
  readonly interval: Interval;
}

const weightedMean = (values: readonly Estimate[], extra: number): { mean: number; weight: number } => {
  let weight = 0;
  let sum = 0;
  for (const { value, sd } of values) {
    const w = 1 / (sd ** 2 + extra);
    weight += w;
    sum += w * value;
  }
  return { mean: sum / weight, weight };
};

/** Variance between readings by DerSimonian & Laird, Controlled Clinical Trials 7 (1986) 177. */
function betweenVariance(values: readonly Estimate[]): number {
  const { mean, weight } = weightedMean(values, 0);
  let squares = 0;
  let weightSquares = 0;
  for (const { value, sd } of values) {
    squares += (value - mean) ** 2 / sd ** 2;
    weightSquares += 1 / sd ** 4;
  }
  const degrees = values.length - 1;
  return Math.max(0, (squares - degrees) / (weight - weightSquares / weight));
}

/**
 * Repeat readings of one quantity pooled with the scatter between them: random-effects mean, standard error by Hartung & Knapp,
 * Statistics in Medicine 20 (2001) 3875, never below that of the readings alone.
 * @throws RangeError without readings or with a standard deviation that is not positive
 */
export function pooled(values: readonly Estimate[]): Pooled {
  const first = values[0];
  if (!first) throw new RangeError('pooled needs at least one value');
  if (values.some(({ sd }) => !(sd > 0))) throw new RangeError('every sd must be > 0');
  if (values.length === 1) return single(first);
  const between = betweenVariance(values);
  const { mean, weight } = weightedMean(values, between);
  const degrees = values.length - 1;
  const scatter = values.reduce((sum, { value, sd }) => sum + (value - mean) ** 2 / (sd ** 2 + between), 0);
  const sd = Math.sqrt(Math.max(1, scatter / degrees) / weight);
  const reach = studentQuantile95(degrees) * sd;
  return {
    value: mean,
    sd,
    betweenSd: Math.sqrt(between),
    readingCount: values.length,
    interval: [mean - reach, mean + reach],
  };
}

const single = ({ value, sd }: Estimate): Pooled => ({
  value,
  sd,
  betweenSd: 0,
  readingCount: 1,
  interval: [value - 1.96 * sd, value + 1.96 * sd],
});
