import { describe, expect, it } from 'vitest';
import { analyse } from '../../../../src/core/analyse.ts';
import { PROCEDURES } from '../../../../src/core/model/analysis.ts';
import type { Procedure } from '../../../../src/core/model/analysis.ts';
import type { Recording } from '../../../../src/core/model/recording.ts';
import { recogniseProcedure } from '../../../../src/core/modes/recognise-procedure.ts';
import { withoutSteadyLines } from '../../../../src/core/modes/recognise/without-steady-lines.ts';
import { conditionRecording } from '../../../../src/core/signal/condition-recording.ts';
import { problemSentence } from '../../../../src/text/problems.ts';
import { generateCase } from '../../../support/cases/generate-case.ts';
import { seededRandom } from '../../../support/cases/random.ts';
import { steadyRecording, still } from '../../../support/steady-recording.ts';
import { simpleRecording } from '../../../support/simple-recording.ts';

function recognised(recording: Recording): string {
  const conditioned = conditionRecording(recording, 'auto');
  if (!conditioned.ok) throw new Error(conditioned.problem.code);
  return recogniseProcedure(conditioned.value);
}

describe('recogniseProcedure', () => {
  it.each([
    ['A1', 'tap'],
    ['A2', 'tap'],
    ['A3', 'tap'],
    ['A1F', 'tap'],
    ['B', 'ambient'],
    ['D', 'coastdown'],
    ['ALIAS', 'running'],
    ['TWIN', 'running'],
  ] as const)('tells kind %s as %s (2 seeded records)', (kind, procedure) => {
    const said = [0, 1].map((index) => recognised(generateCase(kind, 19, index).recording));
    expect(said).toEqual([procedure, procedure]);
  });

  it('takes a record that begins loud and dies away for one decay', () => {
    const decay = simpleRecording(seededRandom(2), {
      durationS: 12,
      rateHz: 60,
      noiseMps2: 0.01,
      motion: (t) => [0, 0, Math.exp(-0.5 * t) * Math.sin(2 * Math.PI * 5 * t)],
    });
    expect(recognised(decay)).toBe('tap');
  });

  it('is said to come from the data, and is overruled by the person', () => {
    const { recording } = generateCase('B', 19, 1);
    const auto = analyse(recording, { procedure: 'auto', timing: 'auto' });
    const named = analyse(recording, { procedure: 'ambient', timing: 'auto' });
    if (!auto.ok || !named.ok) throw new Error('refused');
    expect([auto.value.analysis.procedure, auto.value.analysis.procedureFrom]).toEqual(['ambient', 'data']);
    expect([named.value.analysis.procedure, named.value.analysis.procedureFrom]).toEqual([
      'ambient',
      'person',
    ]);
    expect(auto.value.analysis.modes).toEqual(named.value.analysis.modes);
  });
});

const doubtOf = (recording: Recording, procedure: Procedure): unknown => {
  const outcome = analyse(recording, { procedure, timing: 'auto' });
  return outcome.ok
    ? outcome.value.analysis.doubts.find((doubt) => doubt.code === 'other-procedure')?.facts
    : outcome.problem.code;
};

describe('a procedure that does not fit', () => {
  it.each([
    ['A2', 'running', 'tap'],
    ['A2', 'ambient', 'tap'],
    ['D', 'running', 'coastdown'],
    ['D', 'ambient', 'coastdown'],
  ] as const)('is said with the one that does: %s taken as %s', (kind, chosen, fitting) => {
    const said = doubtOf(generateCase(kind, 23, 0).recording, chosen);
    expect(said).toEqual({ procedure: fitting });
  });

  it('is refused where it finds nothing of its own: run-down in a steady record', () => {
    const { recording } = generateCase('TWIN', 23, 1);
    const outcome = analyse(recording, { procedure: 'coastdown', timing: 'auto' });
    expect(outcome).toMatchObject({ problem: { code: 'no-pass', facts: { fitting: 'running' } } });
    expect(!outcome.ok && problemSentence(outcome.problem)).toMatch(/looks like a running machine/);
  });

  it.each([
    ['A2', 'tap'],
    ['C', 'running'],
    ['B', 'ambient'],
    ['D', 'coastdown'],
  ] as const)('is not said of %s taken as %s', (kind, chosen) => {
    expect(doubtOf(generateCase(kind, 23, 1).recording, chosen)).toBeUndefined();
  });
});

describe('a phone at rest', () => {
  it.each([
    [0.01, 0],
    [0.02, 0.1],
    [0.004, 0.1],
    [0.03, 0.01],
  ])('is answered by one refusal and no mode (noise %d, step %d)', (noiseMps2, stepMps2) => {
    const recording = steadyRecording(still, { noiseMps2, stepMps2, jitterS: 0.001 });
    expect(analyse(recording, { procedure: 'auto', timing: 'auto' })).toMatchObject({
      problem: { code: 'no-motion' },
    });
    const codes = PROCEDURES.map((procedure) => doubtOf(recording, procedure));
    expect(codes).toEqual(['no-taps', 'no-tone', 'no-mode', 'no-pass']);
  });
});

describe('withoutSteadyLines', () => {
  it('takes a steady line off to under 2 % and leaves the taps', () => {
    const periodS = 1 / 60;
    const ring = (t: number): number =>
      [5, 12, 20].reduce(
        (s, tap) => (t < tap ? s : s + Math.exp(-2 * (t - tap)) * Math.sin(50 * (t - tap))),
        0,
      );
    const clean = Float64Array.from({ length: 1800 }, (_, k) => ring(k * periodS));
    const mixed = clean.map((v, k) => v + 0.4 * Math.sin(2 * Math.PI * 11.37 * k * periodS + 1));
    const left = withoutSteadyLines([mixed], periodS)[0] as Float64Array;
    const error = Math.sqrt(left.reduce((s, v, k) => s + (v - (clean[k] as number)) ** 2, 0) / 1800);
    expect(error).toBeLessThan(0.02);
  });
});
