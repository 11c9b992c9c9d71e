import { describe, expect, it } from 'vitest';
import type { Outcome } from '../../../../src/core/model/outcome.ts';
import type { Recording } from '../../../../src/core/model/recording.ts';
import { coastdownProcedure } from '../../../../src/core/modes/coastdown.ts';
import type { ProcedureAnswer } from '../../../../src/core/modes/procedure-answer.ts';
import { conditionRecording } from '../../../../src/core/signal/condition-recording.ts';
import { coastdownCase } from '../../../support/cases/coastdown-case.ts';
import { generateCase } from '../../../support/cases/generate-case.ts';
import { seededRandom } from '../../../support/cases/random.ts';
import { integratedSweep } from '../../../support/integrated-sweep.ts';
import { simpleRecording } from '../../../support/simple-recording.ts';

function answer(recording: Recording): Outcome<ProcedureAnswer> {
  const conditioned = conditionRecording(recording, 'auto');
  if (!conditioned.ok) throw new Error(conditioned.problem.code);
  return coastdownProcedure(conditioned.value, { procedure: 'coastdown', timing: 'auto' });
}
const codeOf = (recording: Recording): string => {
  const outcome = answer(recording);
  return outcome.ok ? 'answered' : outcome.problem.code;
};
function answered(recording: Recording): ProcedureAnswer {
  const outcome = answer(recording);
  if (!outcome.ok) throw new Error(outcome.problem.code);
  return outcome.value;
}

/** A run-down from 16 to 4.4 Hz in 20 s through the given modes, integrated by odex; 60 Hz. */
function integrated(modes: readonly [number, number][], noiseMps2: number): Recording {
  const rateHz = 60;
  const timeS = Float64Array.from({ length: 20 * rateHz }, (_, k) => k / rateHz);
  const parts = modes.map(([frequencyHz, dampingRatio]) =>
    integratedSweep({ frequencyHz, dampingRatio, start: 16, rate: 0.7, curve: 0.006 }, timeS),
  );
  return simpleRecording(seededRandom(3), {
    durationS: 20,
    rateHz,
    noiseMps2,
    motion: (t) => {
      const k = Math.round(t * rateHz);
      return [2e-4 * (parts[0]?.[k] as number), parts[1] ? 2e-4 * (parts[1][k] as number) : 0, 0];
    },
  });
}

describe('coastdownProcedure', () => {
  it('finds frequency and damping of a mode integrated independently, nearly free of noise', () => {
    const { modes, coastdown } = answered(integrated([[9, 0.02]], 1e-5));
    expect(modes).toHaveLength(1);
    expect((modes[0]?.frequencyHz as number) / 9).toBeCloseTo(1, 4);
    expect((modes[0]?.dampingRatio as number) / 0.02).toBeCloseTo(1, 2);
    expect(Math.abs(modes[0]?.direction[0] as number)).toBeCloseTo(1, 3);
    // Speed 16 - 0.7 t + 0.006 t² passes 9 Hz at t = 11.0 s, falling at 0.568 Hz/s.
    expect(coastdown?.sweepRateHzPerS).toBeCloseTo(0.568, 2);
    expect(coastdown?.sweepSeverityRatio).toBeCloseTo(0.568 / (2 * 0.02 * 9) ** 2, 1);
    expect(coastdown?.startHz).toBeCloseTo(16, 1);
  });

  it('stays within its own intervals on seeded records, slow and fast sweeps', () => {
    let within = 0;
    for (let index = 0; index < 3; index++) {
      const { recording, truth } = generateCase('D', 77, index);
      const mode = answered(recording).modes[0];
      const real = truth.modes?.[0];
      if (!mode || !real) throw new Error('no mode');
      if (Math.abs(mode.frequencyHz - real.f_hz) < 2.6 * mode.frequencySdHz) within++;
      if (Math.abs(mode.dampingRatio - real.zeta) < 2.6 * mode.dampingRatioSd) within++;
    }
    // 99 % intervals, 6 of them.
    expect(within).toBeGreaterThanOrEqual(5);
  });

  it('draws amplitude against speed, measured over fitted, rising in frequency', () => {
    const { pass } = answered(integrated([[9, 0.02]], 1e-3));
    if (!pass) throw new Error('no picture');
    const top = pass.measuredMps2.indexOf(Math.max(...pass.measuredMps2));
    expect(pass.frequencyHz[top]).toBeGreaterThan(8);
    expect(pass.frequencyHz[top]).toBeLessThan(9.5);
    expect([...pass.frequencyHz].every((f, i, all) => i === 0 || f >= (all[i - 1] as number))).toBe(true);
    expect((pass.fittedMps2[top] as number) / (pass.measuredMps2[top] as number)).toBeCloseTo(1, 1);
  });

  it('says that half-power points on a sweep mean nothing', () => {
    const mode = answered(integrated([[9, 0.02]], 1e-3)).modes[0];
    expect(mode?.halfPower).toEqual({ refusal: 'window-dominates' });
    expect(mode?.doubts).toContain('half-power-refused');
  });

  it('doubts a fast sweep (sweep-fast) and motion that one mode does not explain (poor-fit)', () => {
    const fast = answered(integrated([[9, 0.006]], 1e-3));
    expect(fast.doubts.map((d) => d.code)).toContain('sweep-fast');
    expect(fast.modes[0]?.doubts).toContain('sweep-fast');
    const two = answer(
      integrated(
        [
          [9, 0.02],
          [10.5, 0.02],
        ],
        1e-4,
      ),
    );
    // Either said to be poor, or refused: never a clean answer.
    expect(two.ok ? two.value.modes[0]?.doubts : ['poor-fit']).toContain('poor-fit');
  });

  it('refuses a pass that does not cover 0.65 to 1.4 of the mode', () => {
    const late = coastdownCase(seededRandom(1, 0), 1, 0, {
      frequencyHz: 12,
      start: 13,
      dampingRatio: 0.02,
      durationS: 30,
      rate: 0.3,
      curve: 0,
    });
    const early = coastdownCase(seededRandom(1, 1), 1, 1, {
      frequencyHz: 9,
      start: 20,
      dampingRatio: 0.02,
      durationS: 30,
      rate: 0.36,
      curve: 0,
    });
    expect(['pass-incomplete', 'no-pass']).toContain(codeOf(late.recording));
    const outcome = answer(early.recording);
    expect(outcome.ok ? 'answered' : outcome.problem.code).toBe('pass-incomplete');
    if (!outcome.ok) expect(outcome.problem.facts.endHz).toBeGreaterThan(8);
  });

  it('refuses a line that only rises: a sweep folded at half the rate, or a run-up', () => {
    const folded = coastdownCase(seededRandom(1, 0), 1, 0, {
      frequencyHz: 38,
      start: 58,
      dampingRatio: 0.02,
      durationS: 40,
      rate: 0.7,
      curve: 0,
    });
    expect(codeOf(folded.recording)).toBe('folded-sweep');
  });

  it('refuses noise, a steady machine, taps and five short seconds', () => {
    const noise = simpleRecording(seededRandom(5), { durationS: 40, rateHz: 60, noiseMps2: 0.02 });
    expect(codeOf(noise)).toBe('no-pass');
    expect(codeOf(generateCase('TWIN', 5, 0).recording)).toBe('no-pass');
    expect(codeOf(generateCase('A1', 5, 1).recording)).toBe('no-pass');
    const short = simpleRecording(seededRandom(6), { durationS: 4, rateHz: 60, noiseMps2: 0.02 });
    expect(codeOf(short)).toBe('too-short');
  });
});
