import type { JournalPort, StorePort } from '../app/ports.ts';
import { ulid } from '../core/packet/ulid.ts';
import { connect, type Connection } from './connection.ts';
import { createErrorLog } from './error-log.ts';
import type { FactPart } from './fact-part.ts';
import { createJournal } from './journal.ts';
import { askPersistence, persistence, usageBytes } from './persistence.ts';
import { createReadingList } from './reading-list.ts';
import { browserEnvironment, type StoreEnvironment } from './store-environment.ts';

/*
 * The readings of this phone, in IndexedDB. Facts are immutable; all that changes is derived (summaries) or passing
 * (journal, settings, errors). Every change is one transaction, whole or absent; failures carry a `code` (StoreError).
 */

export type Store = StorePort & JournalPort & { close(): void };

/** The first screen is drawn meanwhile: working out the facts' schemas takes a slow phone 0.1 s, ms. */
const FACTS_WAIT_MS = 400;

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
  const part = loadedOnce(async () =>
    (await import('./fact-part.ts')).createFactPart(connection, environment, device),
  );
  const withFacts = async <T>(work: (facts: FactPart) => Promise<T>): Promise<T> => work(await part());
  const list = createReadingList(connection, (kind) => withFacts((facts) => facts.entities(kind)));
  const otherTabs = tabChannel(name, () => {
    list.forget();
    tell('facts');
  });

  // Soon, not at the first save: an update of the app may take the old files away in between.
  setTimeout(() => void part().catch(() => {}), FACTS_WAIT_MS);

  /** What follows every change of facts, here and in the other tabs. */
  const changed = async <T>(work: (facts: FactPart) => Promise<T>): Promise<T> => {
    const result = await withFacts(work);
    list.forget();
    otherTabs.announce();
    tell('facts');
    return result;
  };

  return {
    ...createErrorLog(connection, environment),
    begin: (meta) => journal.begin(meta),
    append: (id, sequence, timeS, accelerationMps2) => journal.append(id, sequence, timeS, accelerationMps2),
    flag: (id, code) => journal.flag(id, code),
    recoverable: () => journal.recoverable(),
    recover: (id) => journal.recover(id),
    dropJournal: (id) => journal.dropJournal(id),
    // The summaries are seen to before the first list: see createFactPart.
    listReadings: async (filter) => (await part(), list.listReadings(filter)),
    async saveReading(draft, recording, saving = {}) {
      const reading = await changed((facts) => facts.saveReading(draft, recording, saving));
      if (saving.journalId !== undefined) journal.released(saving.journalId);
      return reading;
    },
    saveResult: (draft) => changed((facts) => facts.saveResult(draft)),
    openReading: (id) => withFacts((facts) => facts.openReading(id)),
    newerReadings: () => withFacts((facts) => facts.newerReadings()),
    edit: (entity, set) => changed((facts) => facts.edit(entity, set)),
    newEntity: (kind, fields) => changed((facts) => facts.newEntity(kind, fields)),
    entity: (id) => withFacts((facts) => facts.entity(id)),
    entities: (kind) => withFacts((facts) => facts.entities(kind)),
    history: (entity) => withFacts((facts) => facts.history(entity)),
    erase: (id) => changed((facts) => facts.erase(id)),
    preparePhoto: async (file) => (await import('./photo.ts')).preparePhoto(file),
    savePhoto: (entity, jpeg, widthPx, heightPx) =>
      changed((facts) => facts.savePhoto(entity, jpeg, widthPx, heightPx)),
    photos: (entity) => withFacts((facts) => facts.photos(entity)),
    async *facts() {
      yield* (await part()).facts();
    },
    fact: (id) => withFacts((facts) => facts.fact(id)),
    putFacts: (incoming) => changed((facts) => facts.putFacts(incoming)),
    rawOf: (id) => withFacts((facts) => facts.rawOf(id)),
    storedRawOf: (id) => withFacts((facts) => facts.storedRawOf(id)),
    changesSince: (sequence, limit) => withFacts((facts) => facts.changesSince(sequence, limit)),
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

/** Loads at the first call; a failed load is tried again at the next. */
function loadedOnce<T>(load: () => Promise<T>): () => Promise<T> {
  let loaded: Promise<T> | undefined;
  return () => {
    loaded ??= load().catch((error: unknown) => {
      loaded = undefined;
      throw error;
    });
    return loaded;
  };
}

/** A name for this phone in edits, made once; says nothing about its owner. */
async function deviceOf(connection: Connection, environment: StoreEnvironment): Promise<string> {
  const made = await connection.run((database) => database.get('settings', 'device'));
  if (typeof made === 'string') return made;
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
