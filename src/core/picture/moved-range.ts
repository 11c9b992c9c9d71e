import type { Interval } from '../model/interval.ts';

/** Closest view, as a share of the whole. */
export const CLOSEST_SHARE = 0.004;

export interface RangeChange {
  /** Above 1: closer. */
  readonly factor?: number;
  /** What stays where it is; the middle when absent. */
  readonly about?: number;
  /** Movement as a share of the view. */
  readonly shift?: number;
}

/** Share of the whole that a view shows. */
export const rangeShare = (range: Interval, whole: Interval): number =>
  (range[1] - range[0]) / (whole[1] - whole[0]);

/** The view scaled about a value and moved, never closer than `CLOSEST_SHARE`, never outside of the whole. */
export function movedRange(range: Interval, whole: Interval, change: RangeChange): Interval {
  const [low, high] = range;
  const [lowest, highest] = whole;
  const about = change.about ?? (low + high) / 2;
  const smallest = (highest - lowest) * CLOSEST_SHARE;
  const width = Math.min(highest - lowest, Math.max(smallest, (high - low) / (change.factor ?? 1)));
  const share = (about - low) / (high - low);
  const wanted = about - share * width + (change.shift ?? 0) * width;
  const start = Math.min(highest - width, Math.max(lowest, wanted));
  return [start, start + width];
}
