import { describe, expect, it } from 'vitest';
import type { RandomMode } from '../../../../src/core/modes/ambient/find-random-modes.ts';
import { sortPeaks } from '../../../../src/core/modes/ambient/sort-peaks.ts';

const peak = (frequencyHz: number, more: Partial<RandomMode> = {}): RandomMode => ({
  frequencyHz,
  dampingRatio: 0.02,
  peakPerHz: 1e-3,
  frequencySdHz: 0.01,
  dampingLogSd: 0.1,
  direction: [1, 0, 0],
  floorPerHz: 1e-6,
  gain: 100,
  bandwidthTimesDuration: 20,
  envelopeVariation: 0.5,
  ...more,
});
const hz = (peaks: readonly RandomMode[]): number[] => peaks.map((p) => p.frequencyHz);

describe('sortPeaks', () => {
  it('takes a steady envelope for a line and its multiples with it', () => {
    const { modes, lines } = sortPeaks([peak(10, { envelopeVariation: 0.05 }), peak(20.02), peak(13)]);
    expect(hz(lines)).toEqual([10, 20.02]);
    expect(hz(modes)).toEqual([13]);
  });

  it('drops the skirt of a drifting line', () => {
    const { modes, lines, unresolved } = sortPeaks([peak(10, { envelopeVariation: 0.05 }), peak(10.15)]);
    expect([modes.length, lines.length, unresolved.length]).toEqual([0, 1, 0]);
  });

  it('takes three consecutive multiples for steps, not for modes', () => {
    const { modes, lines } = sortPeaks([peak(2), peak(4.01), peak(6.02), peak(9.3)]);
    expect(hz(lines)).toEqual([2, 4.01, 6.02]);
    expect(hz(modes)).toEqual([9.3]);
  });

  it('takes a broadened multiple beside a series of steps for a step, but not a narrow peak between them', () => {
    const steps = [peak(1.85), peak(3.7), peak(5.55)];
    const { modes } = sortPeaks([
      ...steps,
      peak(8.44, { dampingRatio: 0.025 }),
      peak(10.6, { dampingRatio: 0.01 }),
    ]);
    expect(hz(modes)).toEqual([10.6]);
  });

  it('leaves two modes an octave apart alone', () => {
    expect(hz(sortPeaks([peak(4), peak(8)]).modes)).toEqual([4, 8]);
  });

  it('gives no damping where the record holds too few bandwidths', () => {
    const { modes, unresolved } = sortPeaks([
      peak(4, { bandwidthTimesDuration: 1 }),
      peak(7, { dampingLogSd: 0.9 }),
    ]);
    expect(modes).toHaveLength(0);
    expect(hz(unresolved)).toEqual([4, 7]);
  });
});
