import { describe, expect, it } from 'vitest';
import type { Tone } from '../../../src/core/model/analysis.ts';
import { levelsOf } from '../../../src/core/modes/levels.ts';
import { weightingMagnitude } from '../../../src/core/signal/weighting.ts';
import { conditioned } from '../../support/conditioned.ts';
import { steadyRecording, still, tone } from '../../support/steady-recording.ts';

const OPTIONS = { durationS: 60, noiseMps2: 0.005, gravityMps2: [0, 0, 9.81] as const };
const toneAt = (frequencyHz: number, verdict: Tone['fold']['verdict']): Tone => ({
  frequencyHz,
  frequencySdHz: 0.001,
  amplitudeMps2: 1,
  amplitudeSdMps2: 0.01,
  direction: [0, 0, 1],
  nature: 'forced',
  fold: { verdict, candidatesHz: [frequencyHz] },
});
const ratio = (a: number | undefined, b: number): number => Math.abs((a ?? 0) / b - 1);

describe('levelsOf', () => {
  it('reads a vertical sine: acceleration, velocity, displacement, weighted by Wk', () => {
    const levels = levelsOf(conditioned(steadyRecording(tone(8, 1), OPTIONS)), []);
    const w = 2 * Math.PI * 8;
    // 2 %: the record's ends, and noise.
    expect(ratio(levels.rmsMps2, Math.SQRT1_2)).toBeLessThan(0.02);
    expect(ratio(levels.verticalPeakMps2, 1)).toBeLessThan(0.04);
    expect(ratio(levels.velocityRmsMps, Math.SQRT1_2 / w)).toBeLessThan(0.02);
    expect(ratio(levels.displacementRmsM, Math.SQRT1_2 / w ** 2)).toBeLessThan(0.02);
    expect(ratio(levels.weightedVerticalRmsMps2, weightingMagnitude('Wk', 8) * Math.SQRT1_2)).toBeLessThan(
      0.02,
    );
    expect(ratio(levels.runningRmsMaxMps2, Math.SQRT1_2)).toBeLessThan(0.02);
    expect(ratio(levels.equivalentSinePeakMps2, 1)).toBeLessThan(0.02);
    expect(ratio(levels.crestFactorRatio, Math.SQRT2)).toBeLessThan(0.06);
    expect(levels.weightedHorizontalRmsMps2).toBeLessThan(0.01);
  });

  it('weights horizontal motion by Wd and gives its peaks to the horizontal', () => {
    const levels = levelsOf(conditioned(steadyRecording(tone(4, 1, [0.6, 0.8, 0]), OPTIONS)), []);
    expect(ratio(levels.weightedHorizontalRmsMps2, weightingMagnitude('Wd', 4) * Math.SQRT1_2)).toBeLessThan(
      0.02,
    );
    expect(ratio(levels.horizontalPeakMps2, 1)).toBeLessThan(0.04);
    expect(levels.verticalPeakMps2).toBeLessThan(0.05);
    expect(levels.horizontalVelocityPeakMps).toBeGreaterThan(0.02);
  });

  it('does not depend on how the phone lies', () => {
    const lying = levelsOf(conditioned(steadyRecording(tone(8, 1), OPTIONS)), []);
    const standing = steadyRecording(tone(8, 1, [0, 1, 0]), { ...OPTIONS, gravityMps2: [0, 9.81, 0] });
    const upright = levelsOf(conditioned(standing), []);
    expect(ratio(upright.weightedVerticalRmsMps2, lying.weightedVerticalRmsMps2!)).toBeLessThan(0.01);
    expect(ratio(upright.velocityRmsMps, lying.velocityRmsMps!)).toBeLessThan(0.01);
  });

  it('leaves a folded tone out of velocity, and says so', () => {
    const both = (t: number): [number, number, number] => [0, 0, tone(8, 1)(t)[2] + tone(20, 0.5)(t)[2]];
    const signal = conditioned(steadyRecording(both, OPTIONS));
    const levels = levelsOf(signal, [toneAt(8, 'direct'), toneAt(20, 'folded')]);
    expect(levels.leftOutTones).toBe(true);
    expect(ratio(levels.velocityRmsMps, Math.SQRT1_2 / (2 * Math.PI * 8))).toBeLessThan(0.02);
    expect(ratio(levels.rmsMps2, Math.sqrt((1 + 0.25) / 2))).toBeLessThan(0.02);
  });

  it('takes machine velocity from 10 Hz up only (ISO 20816-3)', () => {
    const both = (t: number): [number, number, number] => [0, 0, tone(3, 0.5)(t)[2] + tone(20, 0.5)(t)[2]];
    const levels = levelsOf(conditioned(steadyRecording(both, OPTIONS)), []);
    expect(ratio(levels.velocityRmsFrom10HzMps, (0.5 * Math.SQRT1_2) / (2 * Math.PI * 20))).toBeLessThan(
      0.02,
    );
    expect(levels.velocityRmsMps).toBeGreaterThan(5 * levels.velocityRmsFrom10HzMps!);
    expect(
      ratio(levels.displacementRmsFrom10HzM, (0.5 * Math.SQRT1_2) / (2 * Math.PI * 20) ** 2),
    ).toBeLessThan(0.02);
  });

  it('gives no velocity when what is left is little, or nothing but noise', () => {
    const signal = conditioned(steadyRecording(tone(20, 1), OPTIONS));
    expect(levelsOf(signal, [toneAt(20, 'undecided')]).velocityRmsMps).toBeUndefined();
    expect(levelsOf(conditioned(steadyRecording(still, OPTIONS)), []).velocityRmsMps ?? 0).toBeLessThan(1e-4);
  });

  it('knows no vertical where gravity was taken out before', () => {
    const signal = conditioned(steadyRecording(tone(8, 1), { ...OPTIONS, gravityMps2: [0, 0, 0] }));
    const levels = levelsOf(signal, []);
    expect(levels.weightedVerticalRmsMps2).toBeUndefined();
    expect(ratio(levels.velocityRmsMps, Math.SQRT1_2 / (2 * Math.PI * 8))).toBeLessThan(0.02);
  });
});
