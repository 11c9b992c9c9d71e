import type { DecaySignal, Segment } from './decay-model.ts';
import type { FreeDecay } from './find-taps.ts';

/** Records longer than this are first searched in one part of them alone, s: one part of it tells the modes. */
const LONG_RECORD_S = 180;
const STRETCH_S = 120;
/** Blocks whose root mean squares are added: a single bang counts little, ringing throughout counts much; s. */
const BLOCK_S = 1;

/** The part of a long record with the most motion throughout; undefined for a record short enough to be searched whole. */
export function busiestStretch({ timeS, y }: DecaySignal): Segment | undefined {
  const n = timeS.length;
  const durationS = timeS[n - 1]! - timeS[0]!;
  if (durationS < LONG_RECORD_S) return undefined;
  const block = Math.max(2, Math.round((BLOCK_S * n) / durationS));
  const count = Math.floor(n / block);
  const strengths = Array.from({ length: count }, (_, b) =>
    y.reduce((sum, values) => sum + spread(values.subarray(b * block, (b + 1) * block)), 0),
  );
  const width = Math.min(Math.round(STRETCH_S / BLOCK_S), count);
  let sum = strengths.slice(0, width).reduce((a, b) => a + b, 0);
  let best = 0;
  let most = sum;
  for (let b = width; b < count; b++) {
    sum += strengths[b]! - strengths[b - width]!;
    if (sum > most) [most, best] = [sum, b - width + 1];
  }
  return { start: best * block, end: Math.min((best + width) * block, n) };
}

/** Standard deviation. */
function spread(values: Float64Array): number {
  const mean = values.reduce((a, b) => a + b, 0) / values.length;
  return Math.sqrt(values.reduce((sum, v) => sum + (v - mean) ** 2, 0) / values.length);
}

export const wholeOf = ({ timeS }: DecaySignal): FreeDecay => ({
  start: 0,
  end: timeS.length,
  onset: undefined,
});

/** Those samples alone. */
export const stretchOf = ({ timeS, phaseTimeS, y }: DecaySignal, { start, end }: Segment): DecaySignal => ({
  timeS: timeS.subarray(start, end),
  y: y.map((values) => values.subarray(start, end)),
  ...(phaseTimeS === undefined ? {} : { phaseTimeS: phaseTimeS.subarray(start, end) }),
});
