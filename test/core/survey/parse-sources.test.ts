import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { forcingsOf } from '../../../src/core/survey/forcings.ts';
import { parseSource, parseSources } from '../../../src/core/survey/parse-sources.ts';
import { problemSentence } from '../../../src/text/problems.ts';
import { valueOf } from '../../support/survey-analysis.ts';

const refusal = (value: unknown) => {
  const outcome = parseSources(value);
  return outcome.ok ? undefined : outcome.problem.facts;
};
const one = (source: object) => refusal([{ name: 'x', ...source }]);

describe('sources file', () => {
  it('is read as it is written in the design', () => {
    const sources = [
      { name: 'Fan', kind: 'machine', speedRpm: [600, 1500], variableSpeed: true, knownBy: 'drive-display' },
      { name: 'Belt', kind: 'belt', speedRpm: 980, pulleyDiameterM: 0.2, beltLengthM: 1.6 },
      { name: 'Motor', kind: 'mains', supplyHz: 50, poles: 4 },
      { name: 'Visitors', kind: 'footfall', activity: 'walking' },
      { name: 'Wind', kind: 'wind', widthM: 0.3, speedMps: [2, 12], shape: 'circle' },
      { name: 'Street', kind: 'traffic', traffic: 'road' },
      { name: 'Press', kind: 'band', frequencyHz: 4.5, harmonics: 3, toleranceRatio: 0.01 },
    ];
    expect(valueOf(parseSources(sources))).toEqual(sources);
    expect(valueOf(parseSources([]))).toEqual([]);
  });

  it('is refused with row, field and reason', () => {
    expect(refusal({})).toMatchObject({ reason: 'not-a-list' });
    expect(refusal([{ name: 'a', kind: 'traffic' }, 7])).toMatchObject({ row: 2, reason: 'not-an-object' });
    expect(one({})).toMatchObject({ field: 'kind', reason: 'missing' });
    expect(one({ kind: 'volcano' })).toMatchObject({
      field: 'kind',
      reason: 'unknown-word',
      found: 'volcano',
    });
    expect(one({ kind: 'machine' })).toMatchObject({ field: 'speedRpm', reason: 'missing' });
    expect(one({ kind: 'machine', speedRpm: '1450' })).toMatchObject({ reason: 'not-a-number-or-range' });
    expect(one({ kind: 'machine', speedRpm: 900, sped: 1 })).toMatchObject({
      field: 'sped',
      reason: 'unknown-field',
    });
    expect(one({ kind: 'machine', speedRpm: 900, orders: [] })).toMatchObject({
      reason: 'not-a-list-of-numbers',
    });
    expect(one({ kind: 'machine', speedRpm: 900, twoStroke: 1 })).toMatchObject({ reason: 'not-yes-or-no' });
    expect(one({ kind: 'band', frequencyHz: 9, name: ' ' })).toMatchObject({
      field: 'name',
      reason: 'not-text',
    });
    expect(one({ kind: 'machine', speedRpm: 900, bearing: { ballCount: 9 } })).toMatchObject({
      reason: 'not-a-number',
    });
    expect(refusal(Array.from({ length: 501 }, () => ({ name: 'a', kind: 'traffic' })))).toMatchObject({
      reason: 'too-many',
    });
  });

  it('is refused when a source is impossible', () => {
    expect(one({ kind: 'machine', speedRpm: 0 })).toMatchObject({
      field: 'speedRpm',
      reason: 'not-positive',
    });
    expect(one({ kind: 'machine', speedRpm: 2e5 })).toMatchObject({ reason: 'too-large', bound: 100_000 });
    expect(one({ kind: 'machine', speedRpm: [1500, 600] })).toMatchObject({ reason: 'range-reversed' });
    expect(one({ kind: 'machine', speedRpm: 900, bladeCount: 6.5 })).toMatchObject({
      field: 'bladeCount',
      reason: 'not-whole',
    });
    expect(one({ kind: 'machine', speedRpm: 900, toleranceRatio: 0.9 })).toMatchObject({
      reason: 'tolerance-out-of-range',
    });
    expect(
      one({ kind: 'machine', speedRpm: 900, bearing: { ballCount: 9, diameterRatio: 1.2 } }),
    ).toMatchObject({
      reason: 'ratio-out-of-range',
    });
    expect(one({ kind: 'belt', speedRpm: 900, pulleyDiameterM: 1, beltLengthM: 2 })).toMatchObject({
      reason: 'belt-shorter-than-pulley',
    });
    expect(one({ kind: 'mains', supplyHz: 50, poles: 4, speedRpm: 1600 })).toMatchObject({
      reason: 'above-synchronous',
      bound: 1500,
    });
    expect(one({ kind: 'footfall', activity: 'walking', paceHz: 9 })).toMatchObject({
      reason: 'pace-impossible',
    });
    expect(one({ kind: 'wind', widthM: 0.3, speedMps: 10, shape: 'custom' })).toMatchObject({
      reason: 'strouhal-needed',
    });
    expect(one({ kind: 'wind', widthM: -1, speedMps: 10 })).toMatchObject({
      field: 'widthM',
      reason: 'not-positive',
    });
    expect(one({ kind: 'band', frequencyHz: 1e5 })).toMatchObject({ reason: 'too-large' });
  });

  it('says the reason in a sentence', () => {
    const outcome = parseSources([{ name: 'Pump A', kind: 'mains', supplyHz: 50, poles: 4, speedRpm: 1600 }]);
    expect(outcome.ok ? '' : problemSentence(outcome.problem)).toBe(
      'Source 1: Pump A: the speed is above the synchronous speed of this motor: check poles and supply (limit 1500).',
    );
  });

  it('understands or refuses anything, and what it takes has forcings', () => {
    const field = fc.oneof(
      fc.anything(),
      fc.double(),
      fc.constantFrom('machine', 'wind', 50, [1, 2], [900, 1200]),
    );
    const sourceLike = fc.dictionary(
      fc.constantFrom(
        'name',
        'kind',
        'speedRpm',
        'frequencyHz',
        'supplyHz',
        'activity',
        'widthM',
        'speedMps',
        '__proto__',
        'orders',
      ),
      field,
    );
    fc.assert(
      fc.property(fc.oneof(fc.anything(), fc.array(sourceLike), fc.array(fc.anything())), (value) => {
        const outcome = parseSources(value);
        if (outcome.ok) expect(forcingsOf(outcome.value).ok).toBe(true);
        else expect(problemSentence(outcome.problem)).toMatch(/\.$/);
      }),
      { numRuns: 500 },
    );
  });

  it('keeps nothing it does not know', () => {
    expect(parseSource(JSON.parse('{"name":"a","kind":"traffic","__proto__":{"x":1}}')).ok).toBe(false);
  });
});
