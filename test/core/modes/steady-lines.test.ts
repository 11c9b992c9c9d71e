import { describe, expect, it } from 'vitest';
import { bandEnvelope, bandSource } from '../../../src/core/modes/narrow-band.ts';
import { fitSteadyLines } from '../../../src/core/modes/steady-lines.ts';
import { conditioned } from '../../support/conditioned.ts';
import { steadyRecording, tone } from '../../support/steady-recording.ts';

const envelopeOf = (motion: Parameters<typeof steadyRecording>[0], centreHz: number) =>
  bandEnvelope(
    bandSource(conditioned(steadyRecording(motion, { durationS: 60, noiseMps2: 0.005 })).grid),
    centreHz,
    1,
  );

describe('fitSteadyLines', () => {
  it('finds one line to a thousandth of the resolution, and nothing left', () => {
    const envelope = envelopeOf(tone(12.3456, 0.5, [0.6, 0, 0.8]), 12.3);
    const fit = fitSteadyLines(envelope, 1);
    // Resolution 1/55 Hz; the bound at this noise is 1e-5 Hz.
    expect(envelope.centreHz + fit.offsetsHz[0]!).toBeCloseTo(12.3456, 4);
    expect(Math.sqrt(fit.powers[0]!)).toBeCloseTo(0.5, 2);
    expect(fit.directions[0]).toEqual([expect.closeTo(0.6, 2), expect.closeTo(0, 2), expect.closeTo(0.8, 2)]);
    expect(fit.leftPower / fit.totalPower).toBeLessThan(1e-3);
  });

  it('separates two lines of different directions 0.1 Hz apart', () => {
    const envelope = envelopeOf((t) => {
      const a = tone(12.3, 0.5, [1, 0, 0])(t);
      const b = tone(12.4, 0.3)(t);
      return [a[0], 0, b[2]];
    }, 12.3);
    expect(fitSteadyLines(envelope, 1).leftPower).toBeGreaterThan(0.05);
    const fit = fitSteadyLines(envelope, 2);
    expect(fit.offsetsHz.map((f) => f + envelope.centreHz)).toEqual([
      expect.closeTo(12.3, 3),
      expect.closeTo(12.4, 3),
    ]);
    expect(fit.powers.map(Math.sqrt)).toEqual([expect.closeTo(0.5, 2), expect.closeTo(0.3, 2)]);
    expect(Math.abs(fit.directions[1]![2]!)).toBeCloseTo(1, 2);
  });
});
