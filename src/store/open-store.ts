import type { JournalPort, StorePort } from '../app/ports.ts';
import { ulid } from '../core/packet/ulid.ts';
import { connect, type Connection } from './connection.ts';
import { createErrorLog } from './error-log.ts';
import { createFactStore } from './fact-store.ts';
import { createJournal } from './journal.ts';
import { createMergeStore } from './merge-store.ts';
import { askPersistence, persistence, usageBytes } from './persistence.ts';
import { preparePhoto } from './photo.ts';
import { createReadingList } from './reading-list.ts';
import { browserEnvironment, type StoreEnvironment } from './store-environment.ts';

/*
 * The readings of this phone, in IndexedDB. Facts are immutable; all that changes is derived (summaries) or passing
 * (journal, settings, errors). Every change is one transaction, whole or absent; failures carry a `code` (StoreError).
 */

export type Store = StorePort & JournalPort & { close(): void };

export interface StoreOptions {
  readonly name?: string;
  readonly environment?: StoreEnvironment;
  /** Called while the opening waits for another tab that has an older version open. */
  readonly onBlocked?: () => void;
}

type What = 'facts' | 'blocking' | 'closed';

/** Open the store, bring it up to date. @throws StoreError `newer-database`, `unavailable`. */
export async function openStore(options: StoreOptions = {}): Promise<Store> {
  const { name = 'thrumbook', environment = browserEnvironment, onBlocked } = options;
  const listeners = new Set<(what: What) => void>();
  const tell = (what: What): void => listeners.forEach((listener) => listener(what));
  const connection = await connect(name, {
    ...(onBlocked === undefined ? {} : { onBlocked }),
    onBlocking: () => tell('blocking'),
    onClosed: () => tell('closed'),
  });
  const device = await deviceOf(connection, environment);
  const journal = createJournal(connection, environment);
  const facts = createFactStore(connection, environment, device);
  const merge = createMergeStore(connection);
  const list = createReadingList(connection, (kind) => facts.entities(kind));
  const otherTabs = tabChannel(name, () => {
    list.forget();
    tell('facts');
  });

  /** What follows every change of facts, here and in the other tabs. */
  const changed = async <T>(change: Promise<T>): Promise<T> => {
    const result = await change;
    list.forget();
    otherTabs.announce();
    tell('facts');
    return result;
  };

  return {
    ...facts,
    ...merge,
    ...createErrorLog(connection, environment),
    begin: (meta) => journal.begin(meta),
    append: (id, sequence, timeS, accelerationMps2) => journal.append(id, sequence, timeS, accelerationMps2),
    flag: (id, code) => journal.flag(id, code),
    recoverable: () => journal.recoverable(),
    recover: (id) => journal.recover(id),
    dropJournal: (id) => journal.dropJournal(id),
    listReadings: (filter) => list.listReadings(filter),
    async saveReading(draft, recording, saving = {}) {
      const reading = await changed(facts.saveReading(draft, recording, saving));
      if (saving.journalId !== undefined) journal.released(saving.journalId);
      return reading;
    },
    saveResult: (draft) => changed(facts.saveResult(draft)),
    edit: (entity, set) => changed(facts.edit(entity, set)),
    newEntity: (kind, fields) => changed(facts.newEntity(kind, fields)),
    erase: (id) => changed(facts.erase(id)),
    preparePhoto,
    savePhoto: (entity, jpeg, widthPx, heightPx) => changed(facts.savePhoto(entity, jpeg, widthPx, heightPx)),
    putFacts: (incoming) => changed(merge.putFacts(incoming)),
    getSetting: (key) => connection.run((database) => database.get('settings', key)),
    putSetting: (key, value) =>
      connection.change(['settings'], 'relaxed', async (change) => {
        await change.objectStore('settings').put(value, key);
      }),
    persistence,
    askPersistence,
    usageBytes,
    device,
    onChange(listener) {
      listeners.add(listener);
      return () => listeners.delete(listener);
    },
    close() {
      otherTabs.close();
      connection.close();
    },
  };
}

/** A name for this phone in edits, made once; says nothing about its owner. */
async function deviceOf(connection: Connection, environment: StoreEnvironment): Promise<string> {
  return connection.change(['settings'], 'strict', async (change) => {
    const settings = change.objectStore('settings');
    const known = await settings.get('device');
    if (typeof known === 'string') return known;
    const device = `device:${ulid(environment.nowMs(), environment.randomBytes(10))}`;
    await settings.put(device, 'device');
    return device;
  });
}

function tabChannel(name: string, onChanged: () => void): { announce(): void; close(): void } {
  if (typeof BroadcastChannel === 'undefined') return { announce: () => {}, close: () => {} };
  const channel = new BroadcastChannel(`${name}-changes`);
  channel.addEventListener('message', onChanged);
  return {
    announce: () => channel.postMessage('facts'),
    close: () => channel.close(),
  };
}
