import 'fake-indexeddb/auto';
import fc from 'fast-check';
import { openDB } from 'idb';
import { openStore } from '../../src/store/open-store.ts';
import { readingDraft, sampleRecording } from './reading-draft.ts';

let serial = 0;

/**
 * Puts junk where the store keeps facts, raw samples, summaries and journals, then reads all of it. Throws with the
 * counterexample when anything but a `damaged` comes out.
 */
export async function fuzzReadBack(numRuns: number): Promise<void> {
  const name = `read-back-${(serial += 1)}`;
  const store = await openStore({ name });
  const { _id } = await store.saveReading(readingDraft(), sampleRecording(60), { label: 'x' });
  const journal = await store.begin({ ...sampleRecording(0) });
  const one = Float32Array.of(1);
  await store.append(journal, 0, Float64Array.of(0), [one, one, one]);
  store.close();
  const probe = await openDB(name);
  const row = (await probe.get('facts', _id)) as Record<string, unknown>;
  probe.close();
  const junk = fc.oneof(
    fc.jsonValue(),
    fc.constant(undefined),
    fc.uint8Array().map((bytes) => bytes.slice().buffer),
  );
  const place = fc.constantFrom('facts', 'raw', 'summaries', 'journals', 'chunks');
  await fc.assert(
    fc.asyncProperty(place, junk, async (where, item) => {
      const rows = {
        facts: { ...row, fact: item },
        raw: { id: _id, bytes: item },
        summaries: { id: _id, recordedAt: item },
        journals: { id: journal, axes: item, sensor: item, flags: item },
        chunks: { journal, sequence: 0, timeS: item, accelerationMps2: item },
      };
      const database = await openDB(name);
      await database.put(where, rows[where]);
      database.close();
      await readAll(name, _id);
    }),
    { numRuns },
  );
}

async function readAll(name: string, reading: string): Promise<void> {
  const store = await openStore({ name });
  const damagedOnly = (error: { code?: string }): void => {
    if (error.code !== 'damaged') throw error;
  };
  await store.openReading(reading).catch(damagedOnly);
  await store.listReadings({ text: 'rail' });
  await store.entities('reading');
  for (const { journalId } of await store.recoverable()) await store.recover(journalId).catch(damagedOnly);
  store.close();
}
