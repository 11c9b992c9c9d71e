import type { AnalysisPictures } from '../model/pictures.ts';

/** Points kept at most: two per column of a wide screen. */
export const TRACE_POINTS = 4000;

/**
 * Thins a record for drawing: each bucket leaves its least and its largest value, in the order they came.
 * @param timeS length n, not decreasing
 * @param axes arrays of length n
 */
export function thinnedTrace(timeS: Float64Array, axes: readonly Float64Array[]): AnalysisPictures['trace'] {
  const n = timeS.length;
  if (n <= TRACE_POINTS) return { timeS, accelerationMps2: axes };
  const buckets = TRACE_POINTS / 2;
  const edge = (b: number): number => Math.floor((b * n) / buckets);
  const times = new Float64Array(TRACE_POINTS);
  for (let b = 0; b < buckets; b++) {
    times[2 * b] = timeS[edge(b)]!;
    times[2 * b + 1] = timeS[Math.floor((edge(b) + edge(b + 1)) / 2)]!;
  }
  const accelerationMps2 = axes.map((axis) => {
    const out = new Float64Array(TRACE_POINTS);
    for (let b = 0; b < buckets; b++) {
      let low = edge(b);
      let high = low;
      for (let i = low; i < edge(b + 1); i++) {
        if (axis[i]! < axis[low]!) low = i;
        if (axis[i]! > axis[high]!) high = i;
      }
      out[2 * b] = axis[Math.min(low, high)]!;
      out[2 * b + 1] = axis[Math.max(low, high)]!;
    }
    return out;
  });
  return { timeS: times, accelerationMps2 };
}
