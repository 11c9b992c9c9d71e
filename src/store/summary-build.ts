import type { EditFact } from '../core/model/fact.ts';
import type { Change, Connection } from './connection.ts';
import { knownFact } from './fact-row.ts';
import { summaryOf } from './reading-summary.ts';

/** Raised whenever a summary could come out otherwise: then all are made anew from the facts. */
export const SUMMARY_VERSION = 1;
const KEY = 'summaryVersion';
/** Readings in memory at a time. */
const PAGE_COUNT = 500;

/**
 * See to it that every reading has a summary of the present form. One transaction: after a kill all are old or all are
 * new. Quick when nothing is to be done.
 */
export async function buildSummaries(connection: Connection): Promise<void> {
  const known = await connection.run((database) => database.get('settings', KEY));
  if (known === SUMMARY_VERSION) return;
  await connection.change(['facts', 'summaries', 'settings'], 'strict', async (change) => {
    const edits = await editsByReading(change);
    for (let after = 'reading:'; ;) {
      const range = IDBKeyRange.bound(after, 'reading;', true, true);
      const rows = await change.objectStore('facts').getAll(range, PAGE_COUNT);
      const readings = rows
        .map((row) => knownFact(row, 'reading'))
        .filter((reading) => reading !== undefined);
      const summaries = change.objectStore('summaries');
      await Promise.all(
        readings.map((reading) => summaries.put(summaryOf(reading, edits.get(reading._id) ?? []))),
      );
      if (rows.length < PAGE_COUNT) break;
      after = rows.at(-1)!.id;
    }
    await change.objectStore('settings').put(SUMMARY_VERSION, KEY);
  });
}

async function editsByReading(change: Change): Promise<ReadonlyMap<string, readonly EditFact[]>> {
  const about = IDBKeyRange.bound('reading:', 'reading;', false, true);
  const rows = await change.objectStore('facts').index('about').getAll(about);
  const edits = new Map<string, EditFact[]>();
  for (const row of rows) {
    const edit = knownFact(row, 'edit');
    if (edit !== undefined) edits.set(edit.entity, [...(edits.get(edit.entity) ?? []), edit]);
  }
  return edits;
}
