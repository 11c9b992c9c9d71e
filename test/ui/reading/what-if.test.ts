import { describe, expect, it } from 'vitest';
import {
  isNothingTried,
  nothingTried,
  presentSpeedRpm,
  triedAnalysis,
  triedSources,
} from '../../../src/ui/screens/reading/what-if.ts';
import { READING_EXAMPLES } from '../../support/reading-examples.ts';

const { analysis } = READING_EXAMPLES[0]!.reading;

describe('triedAnalysis', () => {
  it('raises the frequency with the root of stiffness and leaves the other modes alone', () => {
    const tried = triedAnalysis(analysis, { ...nothingTried(0), stiffnessRatio: 4 });
    expect(tried.modes[0]!.frequencyHz).toBeCloseTo(2 * analysis.modes[0]!.frequencyHz, 9);
    expect(tried.modes[1]).toEqual(analysis.modes[1]);
  });

  it('lowers frequency and damping ratio with the root of mass', () => {
    const [mode] = triedAnalysis(analysis, { ...nothingTried(0), massRatio: 4 }).modes;
    expect(mode!.frequencyHz).toBeCloseTo(analysis.modes[0]!.frequencyHz / 2, 9);
    expect(mode!.dampingRatio).toBeCloseTo(analysis.modes[0]!.dampingRatio / 2, 9);
  });

  it('takes damping outright where it was set', () => {
    const [mode] = triedAnalysis(analysis, { ...nothingTried(0), massRatio: 2, dampingRatio: 0.05 }).modes;
    expect(mode!.dampingRatio).toBe(0.05);
  });

  it('changes nothing when nothing is tried', () => {
    expect(isNothingTried(nothingTried(1))).toBe(true);
    expect(triedAnalysis(analysis, nothingTried(0)).modes[0]!.frequencyHz).toBe(
      analysis.modes[0]!.frequencyHz,
    );
  });
});

describe('triedSources', () => {
  const sources = [
    { name: 'Visitors', kind: 'footfall', activity: 'walking' },
    { name: 'Pump', kind: 'machine', speedRpm: [900, 1600] },
  ] as const;

  it('sets one speed where one was tried and leaves people alone', () => {
    const tried = triedSources(sources, { ...nothingTried(0), speedsRpm: { 0: 100, 1: 1100 } });
    expect(tried[0]).toBe(sources[0]);
    expect(tried[1]).toMatchObject({ speedRpm: 1100 });
  });

  it('starts from the middle of a range, and has no speed for people', () => {
    expect(presentSpeedRpm(sources[1])).toBeCloseTo(1200, 9);
    expect(presentSpeedRpm(sources[0])).toBeUndefined();
  });
});
