import { describe, expect, it } from 'vitest';
import { runningProcedure } from '../../../src/core/modes/running-procedure.ts';
import type { ProcedureAnswer } from '../../../src/core/modes/procedure-answer.ts';
import type { Recording } from '../../../src/core/model/recording.ts';
import { conditioned, RUNNING } from '../../support/conditioned.ts';
import { polledRecording } from '../../support/polled-recording.ts';
import { steadyRecording, tone } from '../../support/steady-recording.ts';

function running(recording: Recording): ProcedureAnswer {
  const outcome = runningProcedure(conditioned(recording), RUNNING);
  if (!outcome.ok) throw new Error(outcome.problem.code);
  return outcome.value;
}

const sensorRateOf = ({ doubts }: ProcedureAnswer): unknown =>
  doubts.find((doubt) => doubt.code === 'polled')?.facts?.['sensorRateHz'];

describe('a line of a sensor polled 60 times a second', () => {
  it.each([
    [61, 8],
    [61, 14],
    [66, 14],
    [66, 20],
    [100, 8],
    [100, 14],
    [200, 14],
  ])(
    'sensor at %d Hz, %d Hz: one tone at its own strength, the sensor’s rate known, no fold decided',
    (sensorHz, hz) => {
      const answer = running(polledRecording(tone(hz, 1), { sensorHz, durationS: 60 }));
      expect(answer.tones).toHaveLength(1);
      expect(answer.tones[0]!.frequencyHz).toBeCloseTo(hz, 2);
      expect(Math.abs(answer.tones[0]!.amplitudeMps2 - 1)).toBeLessThan(0.04);
      expect(answer.tones[0]!.fold.verdict).toBe('undecided');
      expect(sensorRateOf(answer)).toBeCloseTo(sensorHz, 1);
    },
  );

  it('sensor at 50 Hz: held readings are dropped, the clock is the sensor’s', () => {
    const signal = conditioned(polledRecording(tone(8, 1), { sensorHz: 50, durationS: 60 }));
    expect(signal.facts.rateHz).toBeCloseTo(50, 2);
    const { tones } = running(polledRecording(tone(8, 1), { sensorHz: 50, durationS: 60 }));
    expect(tones).toHaveLength(1);
    expect(tones[0]!.fold.verdict).toBe('undecided');
    expect(Math.abs(tones[0]!.amplitudeMps2 - 1)).toBeLessThan(0.02);
  });

  it('keeps a second line of the machine and drops the images of both', () => {
    const both = (t: number): [number, number, number] => [
      0.4 * Math.cos(2 * Math.PI * 19 * t),
      0,
      Math.cos(2 * Math.PI * 8 * t),
    ];
    const { tones } = running(polledRecording(both, { sensorHz: 66, durationS: 60 }));
    expect(tones.map((t) => Math.round(100 * t.frequencyHz) / 100)).toEqual([8, 19]);
  });

  it('leaves a machine’s own lines alone: harmonics, and side lines of other strength than a hold makes', () => {
    const lines = (t: number): [number, number, number] => [
      0,
      0,
      [8, 16, 24, 14, 2].reduce(
        (sum, f, i) => sum + [1, 0.4, 0.2, 0.3, 0.3][i]! * Math.cos(2 * Math.PI * f * t + i),
        0,
      ),
    ];
    const answer = running(steadyRecording(lines, { durationS: 60, jitterS: 0.001 }));
    expect(answer.tones).toHaveLength(5);
    expect(sensorRateOf(answer)).toBeUndefined();
  });
});
