import type { Connection } from './connection.ts';
import { refreshSummary } from './fact-store.ts';

/** Raised whenever a summary could come out otherwise: then all are made anew from the facts. */
export const SUMMARY_VERSION = 1;
const KEY = 'summaryVersion';

/**
 * See to it that every reading has a summary of the present form. One transaction: after a kill all are old or all are
 * new. Quick when nothing is to be done.
 */
export async function buildSummaries(connection: Connection): Promise<void> {
  const known = await connection.run((database) => database.get('settings', KEY));
  if (known === SUMMARY_VERSION) return;
  await connection.change(['facts', 'summaries', 'settings'], 'strict', async (change) => {
    const ids = await change.objectStore('facts').index('kind').getAllKeys('reading');
    for (const id of ids) await refreshSummary(change, id);
    await change.objectStore('settings').put(SUMMARY_VERSION, KEY);
  });
}
