import type { Interval } from '../model/interval.ts';

/**
 * A lane for each span so that spans in one lane do not touch: greedy interval colouring, which needs as few lanes as
 * possible. Spans beyond `laneCount` share the last lane. Returns lane indexes in the order given.
 */
export const lanesOf = (spansPx: readonly Interval[], laneCount: number, gapPx: number): number[] => {
  if (!(laneCount >= 1)) throw new RangeError(`lanesOf: laneCount must be >= 1, got ${laneCount}`);
  const endsPx: number[] = [];
  const lanes = spansPx.map(() => 0);
  const order = spansPx.map((_, i) => i).sort((a, b) => spansPx[a]![0] - spansPx[b]![0] || a - b);
  for (const index of order) {
    const [startPx, endPx] = spansPx[index]!;
    const free = endsPx.findIndex((lastPx) => lastPx + gapPx <= startPx);
    const lane = free === -1 ? Math.min(endsPx.length, laneCount - 1) : free;
    endsPx[lane] = Math.max(endPx, endsPx[lane] ?? -Infinity);
    lanes[index] = lane;
  }
  return lanes;
};
