import type { JournalPort, RecoveredJournal } from '../app/ports.ts';
import type { Recording } from '../core/model/recording.ts';
import { ulid } from '../core/packet/ulid.ts';
import type { Change, Connection } from './connection.ts';
import type { ChunkRow, JournalRow } from './rows.ts';
import { StoreError } from './store-error.ts';
import type { StoreEnvironment } from './store-environment.ts';

const AXES: readonly unknown[] = ['x', 'y', 'z'];
/** A Web Lock per journal: held while its tab lives, so that a start elsewhere does not take it for a crash. */
const LOCK_PREFIX = 'thrumbook-journal:';

export interface Journal extends JournalPort {
  recoverable(): Promise<readonly RecoveredJournal[]>;
  recover(journalId: string): Promise<Recording>;
  dropJournal(journalId: string): Promise<void>;
  /** Let go of a journal that the given change has removed. */
  released(journalId: string): void;
}

export function createJournal(connection: Connection, environment: StoreEnvironment): Journal {
  const held = new Map<string, () => void>();

  const released = (journalId: string): void => {
    held.get(journalId)?.();
    held.delete(journalId);
  };

  return {
    async begin(meta) {
      const id = ulid(environment.nowMs(), environment.randomBytes(10));
      const letTabsWait = connection.hold();
      const unlock = holdLock(LOCK_PREFIX + id);
      held.set(id, () => {
        letTabsWait();
        unlock();
      });
      const { sensor, axes } = meta;
      const row: JournalRow = {
        id,
        startedAt: meta.startedAt ?? environment.nowIso(),
        sensor,
        axes,
        flags: [],
      };
      try {
        await connection.change(['journals'], 'relaxed', async (change) => {
          await change.objectStore('journals').put(row);
        });
      } catch (error) {
        released(id);
        throw error;
      }
      return id;
    },

    append(journal, sequence, timeS, accelerationMps2) {
      const row: ChunkRow = { journal, sequence, timeS, accelerationMps2 };
      return connection.change(['chunks'], 'relaxed', async (change) => {
        await change.objectStore('chunks').put(row);
      });
    },

    flag(journalId, code) {
      return connection.change(['journals'], 'relaxed', async (change) => {
        const journals = change.objectStore('journals');
        const row = await journals.get(journalId);
        if (row !== undefined && !row.flags.includes(code)) {
          await journals.put({ ...row, flags: [...row.flags, code] });
        }
      });
    },

    async recoverable() {
      const inUse = await locksInUse();
      return connection.run(async (database) => {
        const rows = (await database.getAll('journals')).filter(({ id }) => !held.has(id) && !inUse.has(id));
        return Promise.all(rows.map(async (row) => described(row, await chunksOf(database, row.id))));
      });
    },

    recover(journalId) {
      return connection.run(async (database) => {
        const row = await database.get('journals', journalId);
        if (row === undefined || !isSoundRow(row)) throw new StoreError('damaged');
        return recordingOf(row, await chunksOf(database, journalId));
      });
    },

    async dropJournal(journalId) {
      await connection.change(['journals', 'chunks'], 'relaxed', (change) =>
        removeJournal(change, journalId),
      );
      released(journalId);
    },

    released,
  };
}

/** Take a journal out, as part of a change that saved its reading. */
export async function removeJournal(change: Change, journalId: string): Promise<void> {
  await change.objectStore('journals').delete(journalId);
  await change.objectStore('chunks').delete(IDBKeyRange.bound([journalId, 0], [journalId, Infinity]));
}

async function chunksOf(
  database: { getAll(store: 'chunks', range: IDBKeyRange): Promise<ChunkRow[]> },
  journalId: string,
): Promise<readonly ChunkRow[]> {
  const rows = await database.getAll('chunks', IDBKeyRange.bound([journalId, 0], [journalId, Infinity]));
  return rows.filter(isSound);
}

/** A journal row as it was written: what is read back is not trusted. */
function isSoundRow(row: JournalRow): boolean {
  const { startedAt, sensor, axes, flags } = row as Partial<JournalRow>;
  return (
    typeof startedAt === 'string' &&
    typeof sensor?.source === 'string' &&
    typeof sensor.practice === 'boolean' &&
    Array.isArray(axes) &&
    axes.length > 0 &&
    new Set(axes).size === axes.length &&
    axes.every((axis) => AXES.includes(axis)) &&
    Array.isArray(flags)
  );
}

/** A chunk as it was written: equal lengths, typed arrays. Anything else is left out. */
function isSound(row: ChunkRow): boolean {
  const { timeS, accelerationMps2 } = row as Partial<ChunkRow>;
  return (
    timeS instanceof Float64Array &&
    Array.isArray(accelerationMps2) &&
    accelerationMps2.every((axis) => axis instanceof Float32Array && axis.length === timeS.length)
  );
}

function described(row: JournalRow, chunks: readonly ChunkRow[]): RecoveredJournal {
  const sampleCount = chunks.reduce((sum, { timeS }) => sum + timeS.length, 0);
  const firstS = chunks[0]?.timeS[0] ?? 0;
  const lastS = chunks.at(-1)?.timeS.at(-1) ?? firstS;
  return { journalId: row.id, startedAt: String(row.startedAt), sampleCount, durationS: lastS - firstS };
}

function recordingOf(row: JournalRow, chunks: readonly ChunkRow[]): Recording {
  const usable = chunks.filter(({ accelerationMps2 }) => accelerationMps2.length === row.axes.length);
  const count = usable.reduce((sum, { timeS }) => sum + timeS.length, 0);
  const timeS = new Float64Array(count);
  const accelerationMps2 = row.axes.map(() => new Float32Array(count));
  let at = 0;
  for (const chunk of usable) {
    timeS.set(chunk.timeS, at);
    accelerationMps2.forEach((axis, k) => axis.set(chunk.accelerationMps2[k]!, at));
    at += chunk.timeS.length;
  }
  const interruption = row.flags[0] ?? 'recovered-after-crash';
  return {
    startedAt: row.startedAt,
    sensor: { ...row.sensor, interruption },
    axes: row.axes,
    timeS,
    accelerationMps2,
  };
}

function holdLock(name: string): () => void {
  const locks = globalThis.navigator?.locks;
  if (locks === undefined) return () => {};
  let unlock = (): void => {};
  const isOver = new Promise<void>((resolve) => {
    unlock = resolve;
  });
  void locks.request(name, () => isOver).catch(() => {});
  return unlock;
}

async function locksInUse(): Promise<ReadonlySet<string>> {
  const snapshot = await globalThis.navigator?.locks?.query();
  const names = (snapshot?.held ?? []).map(({ name }) => name ?? '');
  const ours = names.filter((name) => name.startsWith(LOCK_PREFIX));
  return new Set(ours.map((name) => name.slice(LOCK_PREFIX.length)));
}
