import fc from 'fast-check';
import { canonicalJson } from '../../src/core/packet/canonical-json.ts';
import { parseFact } from '../../src/core/packet/parse-fact.ts';
import { isHarmless, parseJsonBytes } from '../../src/core/packet/parse-json.ts';
import { decodeRaw, encodeRaw } from '../../src/core/packet/raw-recording.ts';
import { revisionOf } from '../../src/core/packet/revision.ts';
import { parseRigParameters } from '../../src/capture/rig-parameters.ts';
import { readingDraft, sampleRecording } from '../support/reading-draft.ts';

/** Every parser of capture, store and facts against `numRuns` damaged inputs; throws with the counterexample. */
export function* fuzzParsers(numRuns: number): Generator<readonly [string, number]> {
  const reading = {
    ...readingDraft(),
    _id: 'reading:01J00000000000000000000000',
    v: 1,
    kind: 'reading',
    rawSha256: 'a'.repeat(64),
    rawBytes: 10,
  };
  const text = JSON.stringify(reading);
  const damagedText = fc
    .array(fc.tuple(fc.nat(text.length - 1), fc.string({ maxLength: 3 })), { maxLength: 4 })
    .map((hits) => hits.reduce((value, [at, part]) => value.slice(0, at) + part + value.slice(at + 1), text));
  fc.assert(
    fc.property(fc.oneof(damagedText, fc.json()), (json) => {
      const value = parseJsonBytes(new TextEncoder().encode(json));
      const parsed = parseFact(value);
      if (parsed.ok) revisionOf(parsed.value.fact);
      if (value !== undefined && isHarmless(value)) tryCanonical(value);
    }),
    { numRuns },
  );
  yield ['fuzz facts', numRuns];

  fc.assert(
    fc.property(
      fc.anything({ withBigInt: true, withDate: true, withMap: true, withTypedArray: true }),
      (value) => {
        parseFact(value);
      },
    ),
    { numRuns },
  );
  yield ['fuzz anything', numRuns];

  const raw = encodeRaw(sampleRecording(8));
  fc.assert(
    fc.property(
      fc.array(fc.tuple(fc.nat(raw.length - 1), fc.nat(255)), { maxLength: 12 }),
      fc.nat(raw.length),
      (hits, length) => {
        const hurt = raw.slice(0, length);
        for (const [at, byte] of hits) if (at < length) hurt[at] = byte;
        decodeRaw(hurt);
      },
    ),
    { numRuns },
  );
  fc.assert(
    fc.property(fc.uint8Array({ maxLength: 300 }), (bytes) => {
      decodeRaw(bytes);
    }),
    { numRuns },
  );
  yield ['fuzz raw samples', 2 * numRuns];

  fc.assert(
    fc.property(fc.oneof(fc.webQueryParameters(), fc.string()), (query) => {
      const parameters = parseRigParameters(query);
      for (const value of Object.values(parameters).flat()) {
        if (typeof value === 'number' && !Number.isFinite(value)) throw new Error(`not finite: ${query}`);
      }
    }),
    { numRuns },
  );
  yield ['fuzz rig queries', numRuns];
}

/** Only lone surrogates may be refused in harmless JSON. */
function tryCanonical(value: unknown): void {
  try {
    canonicalJson(value);
  } catch (error) {
    if (!(error instanceof TypeError)) throw error;
  }
}
