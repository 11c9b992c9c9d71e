import type { OpenedReading } from '../app/ports.ts';
import type {
  EditFact,
  Entity,
  EntityKind,
  Fact,
  FieldValue,
  ReadingFact,
  ResultFact,
} from '../core/model/fact.ts';
import type { Recording } from '../core/model/recording.ts';
import { wellFormedValue } from '../core/packet/canonical-json.ts';
import { currentEdits, foldEdits } from '../core/packet/fold-edits.ts';
import { parseFact } from '../core/packet/parse-fact.ts';
import { decodeRaw, encodeRaw } from '../core/packet/raw-recording.ts';
import { storedNumbers } from '../core/packet/stored-numbers.ts';
import { ulid } from '../core/packet/ulid.ts';
import type { Change, Connection } from './connection.ts';
import { knownFact, rowOf } from './fact-row.ts';
import { removeJournal } from './journal.ts';
import { gunzip, gzip, isGzip, ownBuffer, sha256Of } from './raw-bytes.ts';
import { summaryOf } from './reading-summary.ts';
import type { Database } from './schema.ts';
import type { StoreEnvironment } from './store-environment.ts';
import { StoreError } from './store-error.ts';

type ReadingDraft = Omit<ReadingFact, '_id' | 'rawSha256' | 'rawBytes' | 'v' | 'kind'>;

export const FACT_STORES = ['facts', 'raw', 'log', 'summaries'] as const;

/** Facts in and out of the database, one transaction each. */
export interface FactStore {
  saveReading(
    draft: ReadingDraft,
    recording: Recording,
    options: { readonly label?: string; readonly journalId?: string },
  ): Promise<ReadingFact>;
  saveResult(draft: Omit<ResultFact, '_id' | 'v' | 'kind'>): Promise<ResultFact>;
  openReading(id: string): Promise<OpenedReading | undefined>;
  newerReadings(): Promise<readonly string[]>;
  edit(entity: string, set: Readonly<Record<string, FieldValue>>): Promise<EditFact>;
  newEntity(kind: EntityKind, fields: Readonly<Record<string, FieldValue>>): Promise<Entity>;
  entity(id: string): Promise<Entity | undefined>;
  entities(kind: EntityKind): Promise<readonly Entity[]>;
  history(entity: string): Promise<readonly EditFact[]>;
  erase(id: string): Promise<void>;
  savePhoto(entity: string, jpeg: Uint8Array, widthPx: number, heightPx: number): Promise<string>;
  photos(entity: string): Promise<readonly { readonly id: string; readonly jpeg: Uint8Array }[]>;
}

export function createFactStore(
  connection: Connection,
  environment: StoreEnvironment,
  device: string,
): FactStore {
  const newId = (kind: string): string => `${kind}:${ulid(environment.nowMs(), environment.randomBytes(10))}`;

  const newEdit = (
    entity: string,
    set: Readonly<Record<string, FieldValue>>,
    earlier: readonly EditFact[],
  ): EditFact =>
    sound({
      _id: newId('edit'),
      v: 1,
      kind: 'edit',
      entity,
      set: wellFormedValue(set) as Readonly<Record<string, FieldValue>>,
      over: Object.fromEntries(
        Object.keys(set).map((field) => [field, currentEdits(entity, field, earlier)]),
      ),
      device,
      at: environment.nowIso(),
    } satisfies EditFact);

  const store: FactStore = {
    async saveReading(draft, recording, { label, journalId }) {
      const raw = soundRaw(recording);
      const [packed, rawSha256] = await Promise.all([gzip(raw), sha256Of(raw)]);
      const fact = sound<ReadingFact>({
        ...storedNumbers(wellFormedValue(draft as unknown as FieldValue) as unknown as ReadingDraft),
        practice: draft.practice || recording.sensor.practice,
        _id: newId('reading'),
        v: 1,
        kind: 'reading',
        rawSha256,
        rawBytes: raw.length,
      });
      const edits = label === undefined || label === '' ? [] : [newEdit(fact._id, { label }, [])];
      const bytes = ownBuffer(packed);
      await connection.change([...FACT_STORES, 'journals', 'chunks'], 'strict', async (change) => {
        await change.objectStore('raw').put({ id: fact._id, bytes });
        for (const kept of [fact, ...edits]) await addFact(change, kept);
        await change.objectStore('summaries').put(summaryOf(fact, edits));
        if (journalId !== undefined) await removeJournal(change, journalId);
      });
      return fact;
    },

    async saveResult(draft) {
      const fact = sound<ResultFact>({ ...storedNumbers(draft), _id: newId('result'), v: 1, kind: 'result' });
      await connection.change(FACT_STORES, 'strict', (change) => addFact(change, fact));
      return fact;
    },

    async openReading(id) {
      const kept = await connection.run(async (database) => ({
        row: await database.get('facts', id),
        raw: await database.get('raw', id),
        about: await database.getAllFromIndex('facts', 'about', id),
      }));
      const reading = knownFact(kept.row, 'reading');
      if (reading === undefined) return undefined;
      const recording = await recordingFrom(reading, kept.raw?.bytes);
      const results = kept.about.map((row) => knownFact(row, 'result')).filter((fact) => fact !== undefined);
      const edits = kept.about.map((row) => knownFact(row, 'edit')).filter((fact) => fact !== undefined);
      return {
        reading,
        recording,
        results: results.sort((a, b) => (a._id < b._id ? -1 : 1)),
        entity: foldEdits(id, edits),
      };
    },

    newerReadings() {
      return connection.run(async (database) => {
        const kept = await database.getAllKeysFromIndex('facts', 'kind', 'reading');
        const listed = new Set(await database.getAllKeys('summaries'));
        return kept.filter((id) => !listed.has(id));
      });
    },

    edit(entity, set) {
      return connection.change(FACT_STORES, 'relaxed', async (change) => {
        const edits = await editsIn(change, entity);
        const fact = newEdit(entity, set, edits);
        await addFact(change, fact);
        await refreshSummary(change, entity);
        return fact;
      });
    },

    async newEntity(kind, fields) {
      const id = newId(kind);
      const fact = newEdit(id, fields, []);
      await connection.change(FACT_STORES, 'relaxed', (change) => addFact(change, fact));
      return foldEdits(id, [fact]);
    },

    async entity(id) {
      const edits = await store.history(id);
      return edits.length === 0 ? undefined : foldEdits(id, edits);
    },

    async entities(kind) {
      const range = IDBKeyRange.bound(`${kind}:`, `${kind};`, false, true);
      const rows = await connection.run((database) => database.getAllFromIndex('facts', 'about', range));
      const byEntity = new Map<string, EditFact[]>();
      for (const row of rows) {
        const edit = knownFact(row, 'edit');
        if (edit !== undefined) byEntity.set(edit.entity, [...(byEntity.get(edit.entity) ?? []), edit]);
      }
      return [...byEntity].map(([id, edits]) => foldEdits(id, edits));
    },

    async history(entity) {
      const rows = await connection.run((database) => database.getAllFromIndex('facts', 'about', entity));
      const edits = rows.map((row) => knownFact(row, 'edit')).filter((edit) => edit !== undefined);
      return edits.sort((a, b) => (a.at === b.at ? (a._id < b._id ? -1 : 1) : a.at < b.at ? -1 : 1));
    },

    async erase(id) {
      const at = environment.nowIso();
      const fact = sound<Fact>({ _id: `erase:${id}`, v: 1, kind: 'erase', target: id, device, at });
      await connection.change(FACT_STORES, 'strict', async (change) => {
        await addFact(change, fact);
        await dropErased(change, id);
      });
    },

    async savePhoto(entity, jpeg, widthPx, heightPx) {
      const fact = sound<Fact>({
        _id: newId('photo'),
        v: 1,
        kind: 'photo',
        entity,
        type: 'image/jpeg',
        widthCount: widthPx,
        heightCount: heightPx,
        rawSha256: await sha256Of(jpeg),
        rawBytes: jpeg.length,
        at: environment.nowIso(),
      });
      const bytes = ownBuffer(jpeg);
      await connection.change(FACT_STORES, 'strict', async (change) => {
        await change.objectStore('raw').put({ id: fact._id, bytes });
        await addFact(change, fact);
      });
      return fact._id;
    },

    photos(entity) {
      return connection.run(async (database) => {
        const rows = await database.getAllFromIndex('facts', 'about', entity);
        const ids = rows.flatMap((row) => knownFact(row, 'photo')?._id ?? []);
        const shown = await Promise.all(ids.map((id) => shownPhoto(database, id)));
        return shown.filter((photo) => photo !== undefined);
      });
    },
  };
  return store;
}

/** A fact that its own reader would refuse must never be written. @throws TypeError with the member's path. */
function sound<T extends Fact>(fact: T): T {
  const parsed = parseFact(fact);
  if (parsed.ok && parsed.value.known) return fact;
  const where = parsed.ok ? 'version' : String(parsed.problem.facts['path']);
  throw new TypeError(`fact ${fact._id} is malformed at "${where}"`);
}

/** Raw v1 that its own reader takes. @throws TypeError otherwise, e.g. for samples that are not finite. */
function soundRaw(recording: Recording): Uint8Array {
  const raw = encodeRaw(recording);
  const decoded = decodeRaw(raw);
  if (!decoded.ok) throw new TypeError(`recording is malformed: ${String(decoded.problem.facts['part'])}`);
  return raw;
}

export async function addFact(change: Change, fact: Fact, revision?: string): Promise<void> {
  const facts = change.objectStore('facts');
  // A change may run twice when the connection was lost while it was being confirmed.
  if ((await facts.getKey(fact._id)) !== undefined) return;
  await facts.add(rowOf(fact, revision));
  await change.objectStore('log').add({ id: fact._id });
}

async function editsIn(change: Change, entity: string): Promise<EditFact[]> {
  const rows = await change.objectStore('facts').index('about').getAll(entity);
  return rows.map((row) => knownFact(row, 'edit')).filter((edit) => edit !== undefined);
}

/** Bring the summary of a reading up to its edits; nothing for other entities. */
export async function refreshSummary(change: Change, readingId: string): Promise<void> {
  if (!readingId.startsWith('reading:')) return;
  const reading = knownFact(await change.objectStore('facts').get(readingId), 'reading');
  if (reading === undefined) return;
  await change.objectStore('summaries').put(summaryOf(reading, await editsIn(change, readingId)));
}

/** Take out a fact, what hangs on it, and the raw bytes of both; ids stay in the log. */
export async function dropErased(change: Change, target: string): Promise<void> {
  const facts = change.objectStore('facts');
  const hanging = await facts.index('about').getAll(target);
  const ids = [target, ...hanging.filter(({ kind }) => kind !== 'erase').map(({ id }) => id)];
  for (const id of ids) {
    await facts.delete(id);
    await change.objectStore('raw').delete(id);
  }
  await change.objectStore('summaries').delete(target);
  if (target.startsWith('edit:')) return;
  // Edits of photos of what was erased go too: captions name people.
  for (const id of ids.filter((one) => one.startsWith('photo:') && one !== target))
    await dropErased(change, id);
}

async function recordingFrom(reading: ReadingFact, packed: ArrayBuffer | undefined): Promise<Recording> {
  if (!(packed instanceof ArrayBuffer)) throw new StoreError('damaged');
  const raw = await unpackedRaw(new Uint8Array(packed));
  if (raw.length !== reading.rawBytes || (await sha256Of(raw)) !== reading.rawSha256)
    throw new StoreError('damaged');
  const decoded = decodeRaw(raw);
  if (!decoded.ok) throw new StoreError('damaged', decoded.problem);
  return decoded.value;
}

export async function unpackedRaw(bytes: Uint8Array): Promise<Uint8Array> {
  return isGzip(bytes) ? gunzip(bytes) : bytes;
}

async function shownPhoto(
  database: Database,
  id: string,
): Promise<{ readonly id: string; readonly jpeg: Uint8Array } | undefined> {
  const rows = await database.getAllFromIndex('facts', 'about', id);
  const edits = rows.map((row) => knownFact(row, 'edit')).filter((edit) => edit !== undefined);
  const raw = await database.get('raw', id);
  if (foldEdits(id, edits).trashed || !(raw?.bytes instanceof ArrayBuffer)) return undefined;
  return { id, jpeg: new Uint8Array(raw.bytes) };
}
