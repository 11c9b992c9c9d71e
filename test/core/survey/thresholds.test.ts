import { describe, expect, it } from 'vitest';
import {
  DEFAULT_THRESHOLDS,
  sensibleThresholds,
  THRESHOLD_BOUNDS,
  THRESHOLD_KEYS,
  thresholdsWith,
} from '../../../src/core/survey/thresholds.ts';
import { thresholdText } from '../../../src/text/thresholds.ts';

describe('thresholds that the person set', () => {
  it('are kept where they make sense, and left out one by one where they do not', () => {
    expect(sensibleThresholds({ coincidentRatio: 0.08, stoppedRunningRatio: 7, elsewhere: 1 })).toEqual({
      coincidentRatio: 0.08,
    });
    expect(sensibleThresholds({ coincidentRatio: Number.NaN, apartBelowRatio: '0.7' })).toEqual({});
  });

  it('are left out together when coincident would reach into apart', () => {
    expect(sensibleThresholds({ coincidentRatio: 0.12, apartAboveRatio: 1.06 })).toEqual({});
  });

  it('never make judging throw: what is left can always be used', () => {
    for (const key of THRESHOLD_KEYS)
      for (const value of [...THRESHOLD_BOUNDS[key], -1, 0, Infinity])
        expect(() => thresholdsWith(sensibleThresholds({ [key]: value }))).not.toThrow();
  });

  it('each have a usual value inside their bounds, a name and an origin', () => {
    for (const key of THRESHOLD_KEYS) {
      const [low, high] = THRESHOLD_BOUNDS[key];
      expect(DEFAULT_THRESHOLDS[key]).toBeGreaterThanOrEqual(low);
      expect(DEFAULT_THRESHOLDS[key]).toBeLessThanOrEqual(high);
      expect(thresholdText(key).origin).toMatch(/no source|check against the standard|derived/);
    }
    expect(new Set(THRESHOLD_KEYS.map((key) => thresholdText(key).name)).size).toBe(THRESHOLD_KEYS.length);
  });
});
