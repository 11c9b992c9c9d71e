import type { StorePort } from '../app/ports.ts';
import type { Fact } from '../core/model/fact.ts';
import { aboutOf, isErased, planMerge } from '../core/packet/merge-facts.ts';
import { parseFact } from '../core/packet/parse-fact.ts';
import type { Change, Connection } from './connection.ts';
import { addFact, dropErased, FACT_STORES, refreshSummary, unpackedRaw } from './fact-store.ts';
import { gzip, isGzip, ownBuffer, sha256Of } from './raw-bytes.ts';

interface Incoming {
  readonly fact: Fact;
  readonly raw?: ArrayBuffer;
}

/** Facts per step of `facts()`: small enough for a phone's memory, large enough to be quick. */
const PAGE_COUNT = 200;

/** The store as the exchange sees it: facts out as they are, facts in by "put if absent". */
export function createMergeStore(
  connection: Connection,
): Pick<StorePort, 'facts' | 'fact' | 'putFacts' | 'rawOf' | 'storedRawOf' | 'changesSince'> {
  const storedRawOf = async (id: string): Promise<Uint8Array | undefined> => {
    const row = await connection.run((database) => database.get('raw', id));
    return row?.bytes instanceof ArrayBuffer ? new Uint8Array(row.bytes) : undefined;
  };

  return {
    async *facts() {
      let after: string | undefined;
      for (;;) {
        const range = after === undefined ? undefined : IDBKeyRange.lowerBound(after, true);
        const rows = await connection.run((database) => database.getAll('facts', range, PAGE_COUNT));
        for (const row of rows) yield row.fact;
        after = rows.at(-1)?.id;
        if (rows.length < PAGE_COUNT) return;
      }
    },

    async fact(id) {
      const row = await connection.run((database) => database.get('facts', id));
      return row === undefined ? undefined : { fact: row.fact, revision: row.revision };
    },

    async putFacts(facts) {
      const { sound, damaged } = await examined(facts);
      const outcome = await connection.change(FACT_STORES, 'strict', (change) => merge(change, sound));
      return { ...outcome, damaged: [...damaged, ...outcome.damaged] };
    },

    async rawOf(id) {
      const bytes = await storedRawOf(id);
      return bytes === undefined ? undefined : unpackedRaw(bytes);
    },

    storedRawOf,

    async changesSince(sequence, limit) {
      return connection.run(async (database) => {
        const range = IDBKeyRange.lowerBound(sequence, true);
        // One transaction: keys and values of the same moment.
        const log = database.transaction('log').store;
        const [keys, rows] = await Promise.all([log.getAllKeys(range, limit), log.getAll(range, limit)]);
        return { ids: rows.map(({ id }) => id), last: keys.at(-1) ?? sequence };
      });
    },
  };
}

/** Before any transaction: shape of each fact, hash of each attachment, attachments packed. */
async function examined(
  facts: readonly { readonly fact: Fact; readonly raw?: Uint8Array }[],
): Promise<{ readonly sound: readonly Incoming[]; readonly damaged: readonly string[] }> {
  const sound: Incoming[] = [];
  const damaged: string[] = [];
  // Hashing and packing run beside each other, outside this thread where the browser can.
  const packed = await Promise.all(
    facts.map(async ({ fact, raw }) => (raw === undefined ? undefined : packedIfGenuine(fact, raw))),
  );
  facts.forEach(({ fact }, index) => {
    const parsed = parseFact(fact);
    const bytes = packed[index];
    if (!parsed.ok || bytes === 'damaged')
      damaged.push(String((fact as Partial<Fact> | undefined)?._id ?? ''));
    else sound.push({ fact: parsed.value.fact, ...(bytes === undefined ? {} : { raw: bytes }) });
  });
  return { sound, damaged };
}

async function packedIfGenuine(fact: Fact, raw: Uint8Array): Promise<ArrayBuffer | 'damaged'> {
  try {
    const unpacked = await unpackedRaw(raw);
    const { rawSha256, rawBytes } = fact as { rawSha256?: unknown; rawBytes?: unknown };
    if (rawBytes !== unpacked.length || rawSha256 !== (await sha256Of(unpacked))) return 'damaged';
    if (fact.kind === 'photo') return ownBuffer(unpacked);
    return ownBuffer(isGzip(raw) ? raw : await gzip(raw));
  } catch {
    return 'damaged';
  }
}

async function merge(
  change: Change,
  incoming: readonly Incoming[],
): Promise<{ added: number; known: number; damaged: readonly string[] }> {
  const facts = change.objectStore('facts');
  const revisions = new Map<string, string>();
  for (const { fact } of incoming) {
    const row = await facts.get(fact._id);
    if (row !== undefined) revisions.set(row.id, row.revision);
  }
  const erasures = await facts.index('kind').getAll('erase');
  const erased = new Set(erasures.flatMap((row) => row.about ?? []));
  const plan = planMerge(
    { revisions, erased },
    incoming.map(({ fact }) => fact),
  );
  for (const { fact, revision } of plan.add) await addFact(change, fact, revision);
  for (const target of plan.drop) await dropErased(change, target);
  await addRaw(change, incoming, new Set(plan.damaged), new Set([...erased, ...plan.drop]));
  for (const reading of touchedReadings(plan.add.map(({ fact }) => fact)))
    await refreshSummary(change, reading);
  return { added: plan.add.length, known: plan.known.length, damaged: plan.damaged };
}

/** Attachments of new facts, and of known ones that had come without. */
async function addRaw(
  change: Change,
  incoming: readonly Incoming[],
  damaged: ReadonlySet<string>,
  erased: ReadonlySet<string>,
): Promise<void> {
  const store = change.objectStore('raw');
  for (const { fact, raw } of incoming) {
    if (raw === undefined || damaged.has(fact._id) || isErased(fact, erased)) continue;
    if ((await store.getKey(fact._id)) === undefined) await store.put({ id: fact._id, bytes: raw });
  }
}

function touchedReadings(facts: readonly Fact[]): ReadonlySet<string> {
  const ids = facts.flatMap((fact) => [fact._id, aboutOf(fact)]);
  return new Set(ids.filter((id): id is string => id?.startsWith('reading:') ?? false));
}
