import type { Interval } from '../model/interval.ts';

/** A vertical logarithmic axis: low frequencies at the bottom. */
export interface LogAxis {
  readonly rangeHz: Interval;
  readonly topPx: number;
  readonly bottomPx: number;
}

/** Narrowest view, as a ratio of its ends: 2 % is finer than any mode's uncertainty needs on a phone's height. */
export const NARROWEST_VIEW_RATIO = 1.02;

const isRange = ([low, high]: Interval): boolean => low > 0 && high > low && Number.isFinite(high);

/** @throws RangeError when the range is not 0 < low < high. */
export const logAxis = (rangeHz: Interval, topPx: number, bottomPx: number): LogAxis => {
  if (!isRange(rangeHz))
    throw new RangeError(`logAxis: rangeHz must be 0 < low < high, got ${rangeHz[0]} to ${rangeHz[1]}`);
  if (!(bottomPx > topPx))
    throw new RangeError(`logAxis: bottomPx ${bottomPx} must lie below topPx ${topPx}`);
  return { rangeHz, topPx, bottomPx };
};

export const hzToY = ({ rangeHz: [low, high], topPx, bottomPx }: LogAxis, frequencyHz: number): number =>
  bottomPx - (Math.log(frequencyHz / low) / Math.log(high / low)) * (bottomPx - topPx);

export const yToHz = ({ rangeHz: [low, high], topPx, bottomPx }: LogAxis, yPx: number): number =>
  low * (high / low) ** ((bottomPx - yPx) / (bottomPx - topPx));

/** Slides a range back inside the bounds without changing its ratio (both ratios as they are when it is too wide). */
const inside = ([low, high]: Interval, [lowest, highest]: Interval): Interval => {
  if (high / low >= highest / lowest) return [lowest, highest];
  if (low < lowest) return [lowest, (lowest * high) / low];
  if (high > highest) return [(highest * low) / high, highest];
  return [low, high];
};

/** The range zoomed by `factor` (> 1: closer) about a frequency that stays where it is, kept inside the bounds. */
export const zoomedRange = (
  rangeHz: Interval,
  boundsHz: Interval,
  factor: number,
  aboutHz: number,
): Interval => {
  if (!(factor > 0)) throw new RangeError(`zoomedRange: factor must be > 0, got ${factor}`);
  const [low, high] = rangeHz;
  const closest = Math.log(high / low) / Math.log(NARROWEST_VIEW_RATIO);
  const scale = 1 / Math.min(factor, closest);
  return inside([aboutHz * (low / aboutHz) ** scale, aboutHz * (high / aboutHz) ** scale], boundsHz);
};

/** The range moved by a ratio (> 1: towards higher frequencies), kept inside the bounds. */
export const pannedRange = ([low, high]: Interval, boundsHz: Interval, byRatio: number): Interval =>
  inside([low * byRatio, high * byRatio], boundsHz);
