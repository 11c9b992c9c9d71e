import { openDB, type IDBPTransaction, type StoreNames } from 'idb';
import { DATABASE_VERSION, migrate, type Database, type ThrumbookSchema } from './schema.ts';
import { asStoreError, nameOf } from './store-error.ts';

type Names = StoreNames<ThrumbookSchema>;
export type Change = IDBPTransaction<ThrumbookSchema, Names[], 'readwrite'>;

export interface ConnectionEvents {
  /** This tab waits for another one that still has the older database open. */
  onBlocked?(): void;
  /** A newer version in another tab waits for this one. */
  onBlocking?(): void;
  onClosed?(): void;
}

/** The open database: gives way to newer tabs, comes back once after the browser dropped it, names its failures. */
export interface Connection {
  /** Run `work`; when the connection turns out to be gone, open again and run it once more. */
  run<T>(work: (database: Database) => Promise<T>): Promise<T>;
  /** A read-write transaction that is whole or absent. `work` awaits nothing but the database. */
  change<T>(
    names: readonly Names[],
    durability: 'strict' | 'relaxed',
    work: (change: Change) => Promise<T>,
  ): Promise<T>;
  /** While held (a recording runs) a newer tab has to wait. */
  hold(): () => void;
  close(): void;
}

export async function connect(name: string, events: ConnectionEvents = {}): Promise<Connection> {
  let database: Database | undefined;
  let opening: Promise<Database> | undefined;
  let holdCount = 0;
  let isWanted = false;
  let isGivenUp = false;

  const giveWay = (): void => {
    isGivenUp = true;
    database?.close();
    database = undefined;
    events.onClosed?.();
  };

  const openAgain = async (): Promise<Database> => {
    const opened = await openDB<ThrumbookSchema>(name, DATABASE_VERSION, {
      upgrade: (db, oldVersion) => migrate(db, oldVersion),
      blocked: () => events.onBlocked?.(),
      blocking: () => {
        isWanted = true;
        events.onBlocking?.();
        if (holdCount === 0) giveWay();
      },
      terminated: () => {
        if (database === opened) database = undefined;
      },
    });
    return opened;
  };

  const opened = async (): Promise<Database> => {
    if (isGivenUp)
      throw asStoreError(new DOMException('the database was left to a newer tab', 'InvalidStateError'));
    if (database !== undefined) return database;
    opening ??= openAgain().finally(() => {
      opening = undefined;
    });
    database = await opening;
    return database;
  };

  const run = async <T>(work: (db: Database) => Promise<T>): Promise<T> => {
    try {
      return await work(await opened());
    } catch (error) {
      if (!isLost(error) || isGivenUp) throw asStoreError(error);
    }
    try {
      database?.close();
      database = undefined;
      return await work(await opened());
    } catch (error) {
      throw asStoreError(error);
    }
  };

  try {
    await opened();
  } catch (error) {
    throw asStoreError(error);
  }
  return {
    run,
    change: (names, durability, work) => run((db) => inTransaction(db, names, durability, work)),
    hold() {
      holdCount += 1;
      let isHeld = true;
      return () => {
        if (!isHeld) return;
        isHeld = false;
        holdCount -= 1;
        if (holdCount === 0 && isWanted) giveWay();
      };
    },
    close() {
      isGivenUp = true;
      database?.close();
      database = undefined;
    },
  };
}

/** Signs of a connection that the browser closed behind our back (seen when a page was long in the background). */
function isLost(error: unknown): boolean {
  return ['InvalidStateError', 'UnknownError'].includes(nameOf(error));
}

async function inTransaction<T>(
  database: Database,
  names: readonly Names[],
  durability: 'strict' | 'relaxed',
  work: (change: Change) => Promise<T>,
): Promise<T> {
  const change = database.transaction([...names], 'readwrite', { durability });
  // The transaction's own error is the true one: a failed quota shows only there. Listened to from the start.
  const ended = change.done.then(
    () => undefined,
    (error: unknown) => ({ error: change.error ?? error }),
  );
  let result: T;
  try {
    result = await work(change);
  } catch (error) {
    abort(change);
    const failed = await ended;
    const isPlainAbort = failed === undefined || nameOf(failed.error) === 'AbortError';
    throw isPlainAbort ? error : failed.error;
  }
  const failed = await ended;
  if (failed !== undefined) throw failed.error;
  return result;
}

function abort(change: Change): void {
  try {
    change.abort();
  } catch {
    // Already aborted by the failure itself.
  }
}
