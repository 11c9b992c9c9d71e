import { describe, expect, it } from 'vitest';
import { foldOfMode, foldOfTone, signedCandidatesHz, verdictOf } from '../../../src/core/modes/fold.ts';
import { generateCase } from '../../support/cases/generate-case.ts';
import { conditioned } from '../../support/conditioned.ts';
import { steadyRecording, tone, type SteadyOptions } from '../../support/steady-recording.ts';

const foldAt = (trueHz: number, apparentHz: number, options: SteadyOptions) =>
  foldOfTone(conditioned(steadyRecording(tone(trueHz, 0.3), { durationS: 60, ...options })), {
    frequencyHz: apparentHz,
    direction: [0, 0, 1],
  });

describe('foldOfTone', () => {
  it('tells a line from its image by true scatter', () => {
    expect(foldAt(11.3, 11.3, { jitterS: 0.002 })).toEqual({ verdict: 'direct', candidatesHz: [11.3] });
    const image = foldAt(48.7, 11.3, { jitterS: 0.002 });
    expect(image.verdict).toBe('folded');
    expect(image.candidatesHz[0]).toBeCloseTo(48.7, 1);
  });

  it('tells the image of the mains hum of 100 Hz at 60 samples a second', () => {
    const image = foldAt(100, 20, { jitterS: 0.002 });
    expect(image.verdict).toBe('folded');
    expect(image.candidatesHz[0]).toBeCloseTo(100, 1);
  });

  it('decides when half of the scatter is true, and not when a fifth is', () => {
    expect(foldAt(48.7, 11.3, { jitterS: 0.001, latenessS: 0.001 }).verdict).toBe('folded');
    expect(foldAt(48.7, 11.3, { jitterS: 0.0005, latenessS: 0.002 }).verdict).toBe('undecided');
  });

  it.each([0.001, 0.002, 0.003])('never decides on late stamps alone (%d s)', (latenessS) => {
    for (const [trueHz, apparentHz] of [
      [11.3, 11.3],
      [48.7, 11.3],
      [35, 25],
    ] as const)
      for (const seed of [1, 2])
        expect(foldAt(trueHz, apparentHz, { latenessS, seed }).verdict).toBe('undecided');
  });

  it('is undecided without any scatter, with all four candidates, the apparent one included', () => {
    const fold = foldAt(11.3, 11.3, {});
    expect(fold.verdict).toBe('undecided');
    expect(fold.candidatesHz.map((f) => Math.round(10 * f) / 10)).toEqual([11.3, 48.7, 71.3, 108.7]);
    expect(signedCandidatesHz(11.3, 60)).toEqual([11.3, 11.3 - 60, 71.3, 11.3 - 120]);
  });

  it('is undecided when nothing fits', () => {
    const slopesHz = Float64Array.from({ length: 401 }, (_, i) => i - 200);
    const logLikelihood = slopesHz.map((s) => -50 * Math.min(4, (s - 33) ** 2));
    const profile = { slopesHz, logLikelihood, bestHz: 33, sdHz: 0.1, scatterS: 0.002 };
    // A slope of 33 Hz fits neither 11.3 Hz nor any image at a share between 0.3 and 1 except 71.3 and its share 0.46.
    expect(verdictOf(profile, [11.3, -48.7])).toBeUndefined();
  });
});

describe('foldOfMode', () => {
  it.each([0, 1, 2, 3, 4, 5, 6, 7, 8, 9])(
    'decides a tapped mode from its ring-downs (generated record %i)',
    (index) => {
      const { recording, truth } = generateCase('A1F', 501, index);
      const signal = conditioned(recording);
      const mode = truth.modes![0]!;
      const rate = signal.facts.rateHz;
      const wrapped = mode.f_hz % rate;
      const apparentHz = Math.min(wrapped, rate - wrapped);
      const strengths = signal.accelerationMps2.map((axis) => axis.reduce((sum, v) => sum + v * v, 0));
      const direction = strengths.map((s) => (s === Math.max(...strengths) ? 1 : 0));
      const dampingRatio = (mode.zeta * mode.f_hz) / apparentHz;
      const fold = foldOfMode(signal, { frequencyHz: apparentHz, dampingRatio, direction }, truth.taps_s!);
      expect(fold.verdict).toBe(mode.f_hz < rate / 2 ? 'direct' : 'folded');
      expect(Math.abs(fold.candidatesHz[0]! / mode.f_hz - 1)).toBeLessThan(0.02);
    },
  );
});
