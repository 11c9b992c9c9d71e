import { describe, expect, it } from 'vitest';
import { conditionRecording } from '../../../src/core/signal/condition-recording.ts';
import { steadyRecording, tone } from '../../support/steady-recording.ts';

const conditioned = (...args: Parameters<typeof conditionRecording>) => {
  const outcome = conditionRecording(...args);
  if (!outcome.ok) throw new Error(outcome.problem.code);
  return outcome.value;
};

describe('conditionRecording', () => {
  it('splits gravity from motion; both together are what the sensor gave', () => {
    const recording = steadyRecording(tone(5, 0.5), { noiseMps2: 0.01 });
    const signal = conditioned(recording);
    expect(signal.facts.gravityMps2).toBeCloseTo(Math.hypot(0.3, 0.2, 9.8), 2);
    for (const i of [0, 100, 1700]) {
      const sum = signal.accelerationMps2[2]![i]! + signal.slowMps2[2]![i]!;
      expect(sum).toBeCloseTo(recording.accelerationMps2[2]![signal.rows[i]!]!, 6);
    }
  });

  it('reads the floor of the sensor under a tone', () => {
    const signal = conditioned(steadyRecording(tone(5, 0.5), { noiseMps2: 0.03, durationS: 60 }));
    // One-sided density of white noise: sigma·sqrt(2/rate).
    const expected = 0.03 * Math.sqrt(2 / 60);
    for (const floor of signal.facts.noiseMps2PerRootHz)
      expect(Math.abs(floor / expected - 1)).toBeLessThan(0.25);
  });

  it('cuts gap-free stretches where samples are missing', () => {
    const signal = conditioned(steadyRecording(tone(5, 0.5), { lost: [400, 401, 900] }));
    expect(signal.segments).toEqual([
      [0, 400],
      [400, 898],
      [898, 1797],
    ]);
    expect(signal.facts.timing.gapCount).toBe(2);
    expect(signal.lostCount).toBe(3);
  });

  it('states a band from three periods of the record to 0.42 of the rate', () => {
    const signal = conditioned(steadyRecording(tone(5, 0.5), { durationS: 6 }));
    expect(signal.facts.usableBandHz[0]).toBeCloseTo(0.5, 2);
    expect(signal.facts.usableBandHz[1]).toBeCloseTo(25.2, 1);
  });

  it('refuses nothing, too little, and stamps that stand still', () => {
    const recording = steadyRecording(tone(5, 0.5), { durationS: 1 });
    expect(conditionRecording({ ...recording, axes: [], accelerationMps2: [] })).toMatchObject({
      problem: { code: 'no-samples' },
    });
    expect(conditionRecording(steadyRecording(tone(5, 1), { durationS: 0.2 }))).toMatchObject({
      problem: { code: 'too-short' },
    });
    const standing = { ...recording, timeS: new Float64Array(recording.timeS.length) };
    expect(conditionRecording(standing)).toMatchObject({ problem: { code: 'too-short' } });
  });
});
