import { describe, it, expect } from 'vitest';
import fc from 'fast-check';
import type { ReadingFact } from '../../../src/core/model/fact.ts';
import { parseFact } from '../../../src/core/packet/parse-fact.ts';
import { parseJson, parseJsonBytes, utf8Text } from '../../../src/core/packet/parse-json.ts';
import { revisionOf } from '../../../src/core/packet/revision.ts';
import { readingDraft, sampleAnalysis } from '../../support/reading-draft.ts';

const ID = '01J00000000000000000000000';
const reading: ReadingFact = {
  ...readingDraft(),
  _id: `reading:${ID}`,
  v: 1,
  kind: 'reading',
  rawSha256: 'a'.repeat(64),
  rawBytes: 100,
};
const at = '2026-03-01T10:00:00.000Z';
const facts = [
  reading,
  {
    _id: `result:${ID}`,
    v: 1,
    kind: 'result',
    reading: `reading:${ID}`,
    analysisVersion: 1,
    settings: { procedure: 'tap', timing: 'auto' },
    analysis: sampleAnalysis(),
    at,
  },
  {
    _id: `edit:${ID}`,
    v: 1,
    kind: 'edit',
    entity: `spot:${ID}`,
    set: { name: 'a' },
    over: { name: [] },
    device: 'd',
    at,
  },
  { _id: `erase:reading:${ID}`, v: 1, kind: 'erase', target: `reading:${ID}`, device: 'd', at },
  {
    _id: `photo:${ID}`,
    v: 1,
    kind: 'photo',
    entity: `spot:${ID}`,
    type: 'image/jpeg',
    widthCount: 4,
    heightCount: 3,
    rawSha256: 'b'.repeat(64),
    rawBytes: 9,
    at,
  },
];

describe('parseFact', () => {
  it.each(facts.map((fact) => [fact.kind, fact] as const))(
    'understands a %s and leaves it as it came',
    (_kind, fact) => {
      const parsed = parseFact(fact);
      expect(parsed).toMatchObject({ ok: true, value: { known: true } });
      expect(parsed.ok && parsed.value.fact).toBe(fact);
    },
  );

  it('keeps members it does not know: the revision covers them', () => {
    const extended = { ...reading, weather: 'fog' };
    const parsed = parseFact(extended);
    expect(parsed.ok && revisionOf(parsed.value.fact)).toBe(revisionOf(extended));
    expect(revisionOf(extended)).not.toBe(revisionOf(reading));
  });

  it('keeps unknown kinds, newer versions and readings of a newer analysis without understanding them', () => {
    const strange = { ...sampleAnalysis(), version: 99, trust: 'superb' };
    const unknown = [
      { _id: 'drawing:1', v: 1, kind: 'drawing' },
      { ...reading, v: 2 },
      { ...reading, analysis: strange },
    ];
    for (const fact of unknown) expect(parseFact(fact)).toEqual({ ok: true, value: { known: false, fact } });
  });

  it('names the first wrong member', () => {
    const wrong: [unknown, string][] = [
      [{ ...reading, rawSha256: 'xyz' }, 'rawSha256'],
      [{ ...reading, analysis: { ...reading.analysis, trust: 'superb' } }, 'analysis.trust'],
      [{ ...reading, analysis: { ...reading.analysis, modes: [{}] } }, 'analysis.modes.0.frequencyHz'],
      [{ ...reading, _id: `edit:${ID}` }, '_id'],
      [{ ...facts[3], target: `reading:${ID.replace('J', 'K')}` }, 'target'],
      [{ ...facts[2], set: { '1x': 1 } }, 'set.1x'],
    ];
    for (const [fact, path] of wrong) {
      expect(parseFact(fact)).toEqual({ ok: false, problem: { code: 'damaged', facts: { path } } });
    }
  });

  it('refuses what could reach a prototype, is no number, or is half a character', () => {
    const text = JSON.stringify(facts[2]).replace('"name":"a"', '"__proto__":{"trashed":true}');
    expect(parseJson(text)).toBeUndefined();
    expect(parseFact(JSON.parse(text))).toMatchObject({ ok: false });
    expect(parseFact({ ...reading, rawBytes: Number.NaN })).toMatchObject({ ok: false });
    expect(parseFact({ ...facts[2], set: { name: '\ud800' } })).toMatchObject({ ok: false });
    expect(({} as Record<string, unknown>)['trashed']).toBeUndefined();
  });

  it('refuses or understands any value and any change of a fact, and never throws (fuzz)', () => {
    fc.assert(
      fc.property(
        fc.constantFrom(...facts),
        fc.array(fc.tuple(fc.nat(60), fc.jsonValue()), { maxLength: 3 }),
        (fact, hits) => {
          const parsed = parseFact(
            hits.reduce<unknown>((value, [at_, item]) => replacedAt(value, at_, item), fact),
          );
          if (parsed.ok) revisionOf(parsed.value.fact);
        },
      ),
      { numRuns: 500 },
    );
    fc.assert(
      fc.property(fc.anything(), (value) => {
        parseFact(value);
      }),
      { numRuns: 300 },
    );
  });
});

describe('parseJsonBytes', () => {
  it('decodes UTF-8 as strictly as the platform (fuzz)', () => {
    const strict = new TextDecoder('utf-8', { fatal: true, ignoreBOM: true });
    fc.assert(
      fc.property(
        fc.oneof(
          fc.uint8Array({ maxLength: 40 }),
          fc.string({ unit: 'binary' }).map((text) => new TextEncoder().encode(text)),
        ),
        (bytes) => {
          let expected: string | undefined;
          try {
            expected = strict.decode(bytes);
          } catch {
            expected = undefined;
          }
          expect(utf8Text(bytes)).toBe(expected);
          parseJsonBytes(bytes);
        },
      ),
      { numRuns: 1000 },
    );
  });
});

/** The value with its n-th member (counted through the whole tree) replaced. */
function replacedAt(value: unknown, index: number, item: unknown): unknown {
  let left = index;
  const walk = (node: unknown): unknown => {
    if (left === 0) {
      left -= 1;
      return item;
    }
    left -= 1;
    if (Array.isArray(node)) return node.map(walk);
    if (typeof node !== 'object' || node === null) return node;
    return Object.fromEntries(Object.entries(node).map(([key, member]) => [key, walk(member)]));
  };
  return walk(value);
}
