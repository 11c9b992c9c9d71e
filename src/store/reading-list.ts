import type { ReadingFilter, ReadingSummary } from '../app/ports.ts';
import type { Entity, EntityKind } from '../core/model/fact.ts';
import type { Connection } from './connection.ts';
import { isSummary, passesFilter } from './summary-filter.ts';

/** All summaries in memory (10,000 are about 3 MB), newest first, so that a filter answers at once. */
export function createReadingList(
  connection: Connection,
  entities: (kind: EntityKind) => Promise<readonly Entity[]>,
) {
  let summaries: Promise<readonly ReadingSummary[]> | undefined;
  let names: Promise<ReadonlyMap<string, string>> | undefined;

  const load = async (): Promise<readonly ReadingSummary[]> => {
    const rows: unknown[] = await connection.run((database) => database.getAll('summaries'));
    return rows.filter(isSummary).sort(newestFirst);
  };

  const loadNames = async (): Promise<ReadonlyMap<string, string>> => {
    const kinds = ['site', 'asset', 'spot', 'round'] as const;
    const all = (await Promise.all(kinds.map(entities))).flat();
    return new Map(all.map(({ id, fields }) => [id, String(fields['name'] ?? '')]));
  };

  return {
    async listReadings(filter: ReadingFilter = {}): Promise<readonly ReadingSummary[]> {
      summaries ??= load().catch((error: unknown) => {
        summaries = undefined;
        throw error;
      });
      const known = filter.text ? await (names ??= loadNames()) : undefined;
      return (await summaries).filter((summary) => passesFilter(summary, filter, (id) => known?.get(id)));
    },
    /** Something changed: read again at the next question. */
    forget(): void {
      summaries = undefined;
      names = undefined;
    },
  };
}

function newestFirst(a: ReadingSummary, b: ReadingSummary): number {
  if (a.recordedAt !== b.recordedAt) return a.recordedAt < b.recordedAt ? 1 : -1;
  return a.id < b.id ? 1 : -1;
}
