import 'fake-indexeddb/auto';
import { describe, it, expect } from 'vitest';
import { openDB, type IDBPDatabase } from 'idb';
import type { ReadingFact } from '../../src/core/model/fact.ts';
import { rowOf } from '../../src/store/fact-row.ts';
import { openStore } from '../../src/store/open-store.ts';
import { DATABASE_VERSION, migrate, MIGRATIONS } from '../../src/store/schema.ts';
import { readingDraft } from '../support/reading-draft.ts';

const ID = (i: number) => `01J${String(i).padStart(23, '0')}`;
let serial = 0;

/** The database as version `version` of the program left it, with readings and a label. */
async function oldDatabase(version: number, readingCount: number): Promise<string> {
  const name = `schema-${(serial += 1)}`;
  const database: IDBPDatabase = await openDB(name, version, {
    upgrade: (db, old) =>
      migrate(
        db as never,
        old,
        MIGRATIONS.filter(({ to }) => to <= version),
      ),
  });
  for (let i = 0; i < readingCount; i += 1) {
    const fact: ReadingFact = {
      ...readingDraft(),
      _id: `reading:${ID(i)}`,
      v: 1,
      kind: 'reading',
      rawSha256: 'a'.repeat(64),
      rawBytes: 1,
    };
    await database.put('facts', rowOf(fact));
  }
  const label = {
    _id: `edit:${ID(0)}`,
    v: 1 as const,
    kind: 'edit' as const,
    entity: `reading:${ID(0)}`,
    set: { label: 'rail' },
    over: { label: [] },
    device: 'device:A',
    at: '2026-03-01T10:00:00.000Z',
  };
  await database.put('facts', rowOf(label));
  await database.put('facts', rowOf({ _id: 'drawing:1', v: 1, kind: 'drawing' }));
  await database.put('settings', 'device:old', 'device');
  database.close();
  return name;
}

describe('migrations', () => {
  it('are numbered from 1 without a hole', () => {
    expect(MIGRATIONS.map(({ to }) => to)).toEqual(MIGRATIONS.map((_, i) => i + 1));
    expect(DATABASE_VERSION).toBe(MIGRATIONS.length);
  });

  it.each(MIGRATIONS.map(({ to }) => to).filter((to) => to < DATABASE_VERSION))(
    'bring a database of version %i up, with all that was in it',
    async (version) => {
      const store = await openStore({ name: await oldDatabase(version, 3) });
      const listed = await store.listReadings();
      expect(listed).toHaveLength(3);
      expect(listed.find(({ id }) => id === `reading:${ID(0)}`)?.label).toBe('rail');
      expect(store.device).toBe('device:old');
      expect(await store.fact('drawing:1')).toBeDefined();
      store.noteError('works');
      await store.newEntity('site', { name: 'works' });
    },
  );

  it('gives an old database and a new one the same stores and indexes', async () => {
    const shapes = [];
    for (const name of [await oldDatabase(1, 1), `schema-${(serial += 1)}`]) {
      (await openStore({ name })).close();
      const database = await openDB(name);
      const names = [...database.objectStoreNames];
      const change = database.transaction(names);
      shapes.push(
        names.map((one) => {
          const store = change.objectStore(one);
          return [one, store.keyPath, store.autoIncrement, [...store.indexNames]];
        }),
      );
      database.close();
    }
    expect(shapes[0]).toEqual(shapes[1]);
  });

  it('refuse a database newer than the program', async () => {
    const name = `schema-${(serial += 1)}`;
    (await openDB(name, DATABASE_VERSION + 1)).close();
    await expect(openStore({ name })).rejects.toMatchObject({ name: 'StoreError', code: 'newer-database' });
  });
});
