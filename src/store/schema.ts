import type { DBSchema, IDBPDatabase, StoreNames } from 'idb';
import type { ReadingSummary } from '../app/ports.ts';
import type { FieldValue } from '../core/model/fact.ts';
import type { ChunkRow, ErrorRow, FactRow, JournalRow, RawRow } from './rows.ts';

/*
 * The database and its history. A migration is data: what it creates. A published one never changes; a new one is added
 * at the end (recipe in DEVELOPERS.md). All run in one version-change transaction: after a kill the old state or the new
 * one is there, nothing between. What is derived from facts (summaries) is made anew by its own version, summary-build.ts.
 */

export interface ThrumbookSchema extends DBSchema {
  facts: { key: string; value: FactRow; indexes: { kind: string; about: string } };
  raw: { key: string; value: RawRow };
  /** Arrival order of facts: key is the sequence number. */
  log: { key: number; value: { readonly id: string } };
  journals: { key: string; value: JournalRow };
  chunks: { key: [string, number]; value: ChunkRow };
  settings: { key: string; value: FieldValue };
  summaries: { key: string; value: ReadingSummary };
  errors: { key: number; value: ErrorRow };
}

export type Database = IDBPDatabase<ThrumbookSchema>;

interface NewStore {
  readonly name: StoreNames<ThrumbookSchema>;
  readonly keyPath?: string | string[];
  readonly autoIncrement?: true;
  readonly indexes?: Readonly<Record<string, string>>;
}

export interface Migration {
  readonly to: number;
  readonly why: string;
  readonly create: readonly NewStore[];
}

export const MIGRATIONS: readonly Migration[] = [
  {
    to: 1,
    why: 'facts with their raw bytes, arrival order, journal of a recording, settings',
    create: [
      { name: 'facts', keyPath: 'id', indexes: { kind: 'kind', about: 'about' } },
      { name: 'raw', keyPath: 'id' },
      { name: 'log', autoIncrement: true },
      { name: 'journals', keyPath: 'id' },
      { name: 'chunks', keyPath: ['journal', 'sequence'] },
      { name: 'settings' },
    ],
  },
  {
    to: 2,
    why: 'summaries, so that 10,000 readings list without opening them; a log of errors',
    create: [
      { name: 'summaries', keyPath: 'id' },
      { name: 'errors', autoIncrement: true },
    ],
  },
];

export const DATABASE_VERSION = MIGRATIONS.at(-1)!.to;

/** Bring a database from `oldVersion` to the newest. */
export function migrate(
  database: Database,
  oldVersion: number,
  migrations: readonly Migration[] = MIGRATIONS,
): void {
  for (const { create } of migrations.filter(({ to }) => to > oldVersion)) {
    for (const store of create) createStore(database, store);
  }
}

function createStore(database: Database, { name, keyPath, autoIncrement, indexes = {} }: NewStore): void {
  const store = database.createObjectStore(name, {
    ...(keyPath === undefined ? {} : { keyPath }),
    ...(autoIncrement === undefined ? {} : { autoIncrement }),
  });
  for (const [index, path] of Object.entries(indexes)) store.createIndex(index as never, path);
}
