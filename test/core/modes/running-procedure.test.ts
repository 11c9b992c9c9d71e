import { describe, expect, it } from 'vitest';
import { runningProcedure } from '../../../src/core/modes/running-procedure.ts';
import type { ProcedureAnswer } from '../../../src/core/modes/procedure-answer.ts';
import { generateCase } from '../../support/cases/generate-case.ts';
import { scoreRecord } from '../../support/cases/score-case.ts';
import type { CaseKind } from '../../support/cases/truth.ts';
import { conditioned, RUNNING } from '../../support/conditioned.ts';
import { steadyRecording, still, tone, type SteadyOptions } from '../../support/steady-recording.ts';

function answerOf(
  motion: Parameters<typeof steadyRecording>[0],
  options: SteadyOptions = {},
): ProcedureAnswer {
  const outcome = runningProcedure(
    conditioned(steadyRecording(motion, { durationS: 60, ...options })),
    RUNNING,
  );
  if (!outcome.ok) throw new Error(outcome.problem.code);
  return outcome.value;
}
const sum =
  (...motions: readonly ReturnType<typeof tone>[]): ReturnType<typeof tone> =>
  (t) =>
    motions.map((m) => m(t)).reduce((a, b) => [a[0] + b[0], a[1] + b[1], a[2] + b[2]]);

describe('runningProcedure: one line', () => {
  it.each([
    [2.3, 'true', { jitterS: 0.002 }],
    [12.7, 'true', { jitterS: 0.002 }],
    [23.9, 'true', { jitterS: 0.002 }],
    [23.9, 'late', { latenessS: 0.002 }],
    [48.3, 'true and above half the rate', { jitterS: 0.002 }],
    [48.3, 'late and above half the rate', { latenessS: 0.002 }],
  ] as const)('gives the amplitude of %d Hz without bias, stamps %s', (f, _, options) => {
    const { tones, modes } = answerOf(tone(f, 0.25, [0.6, 0, 0.8]), { ...options, noiseMps2: 0.02 });
    expect(modes).toEqual([]);
    expect(tones).toHaveLength(1);
    const [found] = tones;
    // Five standard deviations of the noise, and 0.5 % for the grid.
    expect(Math.abs(found!.amplitudeMps2 - 0.25)).toBeLessThan(5 * found!.amplitudeSdMps2 + 0.00125);
    const apparent = f > 30 ? 60 - f : f;
    expect(Math.abs(found!.frequencyHz - apparent)).toBeLessThan(5 * found!.frequencySdHz);
    expect(Math.abs(found!.direction[0]!)).toBeCloseTo(0.6, 1);
    expect(found!.nature).toBe('forced');
  });

  it('follows a speed that wanders by 1 %, and says by how much', () => {
    const wander = (t: number): [number, number, number] => {
      const phase = 2 * Math.PI * 20 * (t + (0.01 * 60 * Math.sin((2 * Math.PI * t) / 60)) / (2 * Math.PI));
      return [0, 0, 0.2 * Math.cos(phase)];
    };
    const { tones } = answerOf(wander, { jitterS: 0.001 });
    expect(tones[0]!.nature).toBe('forced');
    expect(tones[0]!.frequencyHz).toBeCloseTo(20, 0);
    // 1 % of 20 Hz over a sine: 0.2/sqrt(2).
    expect(tones[0]!.frequencyDeviationHz).toBeCloseTo(0.141, 2);
    expect(tones[0]!.amplitudeMps2).toBeCloseTo(0.2, 2);
  });

  it('names the family and orders of a machine', () => {
    const { tones } = answerOf(sum(tone(6.2, 0.3), tone(12.4, 0.1), tone(18.6, 0.05), tone(9.13, 0.07)), {
      jitterS: 0.001,
    });
    expect(tones.map((t) => [Math.round(10 * t.frequencyHz) / 10, t.familyOrder])).toEqual([
      [6.2, 1],
      [12.4, 2],
      [9.1, undefined],
      [18.6, 3],
    ]);
  });

  it('tells twin pumps at 1485 and 1479 r/min apart', () => {
    const { tones, modes, doubts } = answerOf(sum(tone(1485 / 60, 0.3, [1, 0, 0]), tone(1479 / 60, 0.2)), {
      jitterS: 0.002,
    });
    expect(modes).toEqual([]);
    expect(tones.map((t) => t.frequencyHz)).toEqual([expect.closeTo(24.75, 2), expect.closeTo(24.65, 2)]);
    expect(tones.map((t) => t.amplitudeMps2)).toEqual([expect.closeTo(0.3, 1), expect.closeTo(0.2, 1)]);
    expect(doubts[0]).toMatchObject({ code: 'beating' });
  });

  it('is scale free: twice the motion gives twice the amplitude and the same frequency', () => {
    const options = { jitterS: 0.001, noiseMps2: 0 };
    const one = answerOf(tone(9, 0.2), options).tones[0]!;
    const two = answerOf(tone(9, 0.4), options).tones[0]!;
    expect(two.amplitudeMps2 / one.amplitudeMps2).toBeCloseTo(2, 4);
    expect(two.frequencyHz).toBeCloseTo(one.frequencyHz, 5);
  });
});

describe('runningProcedure: doubts', () => {
  it('short: fifteen seconds', () => {
    expect(answerOf(tone(9, 0.2), { durationS: 15 }).doubts.map((d) => d.code)).toEqual(['short']);
    expect(answerOf(tone(9, 0.2)).doubts).toEqual([]);
  });

  it('low-signal: a tone of a third of the noise', () => {
    const { tones, doubts } = answerOf(tone(17.3, 0.0075), { noiseMps2: 0.025 });
    expect(tones[0]!.frequencyHz).toBeCloseTo(17.3, 1);
    expect(doubts.map((d) => d.code)).toEqual(['low-signal']);
  });

  it('answers a record without any noise: one tone, nothing beside it', () => {
    const { tones, modes } = answerOf(tone(9.3, 0.4), { noiseMps2: 0 });
    expect(tones.map((t) => Math.round(100 * t.frequencyHz) / 100)).toEqual([9.3]);
    expect(modes).toEqual([]);
  });
});

describe('runningProcedure: refusals', () => {
  it('finds no tone and no mode in a phone at rest', () => {
    for (const seed of [1, 2, 3, 4]) {
      const signal = conditioned(
        steadyRecording(still, { durationS: 60, seed, jitterS: 0.002, stepMps2: seed % 2 ? 0.1 : 0 }),
      );
      expect(runningProcedure(signal, RUNNING)).toMatchObject({ ok: false, problem: { code: 'no-tone' } });
    }
  });

  it('refuses a record too short to tell lines from random motion', () => {
    const signal = conditioned(steadyRecording(tone(9, 0.2), { durationS: 3 }));
    expect(runningProcedure(signal, RUNNING)).toMatchObject({ problem: { code: 'too-short' } });
  });
});

/** Share of records that must be right here; the bench scores hundreds against the targets (97 %, 95 %, 98 %). */
const KINDS: readonly (readonly [CaseKind, number, number])[] = [
  ['C', 16, 15],
  ['TWIN', 10, 10],
  ['ALIAS', 10, 9],
];

describe('runningProcedure: generated records (seed 502)', () => {
  it.each(KINDS)('%s: of %i records, at least %i right', (kind, count, least) => {
    const scores = Array.from({ length: count }, (_, index) => {
      const { name, truth, recording } = generateCase(kind, 502, index);
      const outcome = runningProcedure(conditioned(recording), RUNNING);
      return scoreRecord(name, truth, outcome.ok ? { ...outcome.value } : { problem: outcome.problem.code });
    });
    expect(scores.filter((s) => s.right === true || s.fold === 'right').length).toBeGreaterThanOrEqual(least);
    expect(scores.filter((s) => s.fold === 'wrong')).toEqual([]);
  });

  it('ALIASL: never decides on late stamps', () => {
    for (let index = 0; index < 8; index++) {
      const outcome = runningProcedure(conditioned(generateCase('ALIASL', 502, index).recording), RUNNING);
      if (!outcome.ok) throw new Error(outcome.problem.code);
      expect(outcome.value.tones[0]!.fold.verdict).toBe('undecided');
    }
  });
});
