import { describe, expect, it } from 'vitest';
import { largestRunningRms, peak, rms } from '../../../src/core/signal/running-rms.ts';

describe('largestRunningRms', () => {
  it('finds the loudest second of a burst', () => {
    const samples = Float64Array.from({ length: 1000 }, (_, i) => (i >= 300 && i < 400 ? 2 : 0.1));
    expect(largestRunningRms(samples, 100)).toBeCloseTo(2, 9);
    expect(largestRunningRms(samples, 200)).toBeCloseTo(Math.sqrt((4 + 0.01) / 2), 9);
  });

  it('is the rms where the record is shorter than the window, and 0 of nothing', () => {
    expect(largestRunningRms([3, 4], 10)).toBeCloseTo(rms([3, 4]), 12);
    expect(largestRunningRms([], 10)).toBe(0);
    expect(rms([])).toBe(0);
    expect(peak([1, -3, 2])).toBe(3);
  });
});
