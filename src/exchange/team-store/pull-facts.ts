import type { Fact } from '../../core/model/fact.ts';
import type { FactRefusal, RefusedFact, TeamStoreProblem } from '../../core/model/team-store.ts';
import { aboutOf } from '../../core/packet/merge-facts.ts';
import { parseFact } from '../../core/packet/parse-fact.ts';
import { revisionOf } from '../../core/packet/revision.ts';
import { withRefused } from './check-point.ts';
import type { Run } from './run.ts';
import type { ChangePage, ChangeRow } from './team-store-calls.ts';
import { codeOf, TeamStoreError } from './team-store-error.ts';

/** Rows of a page without documents: enough to pass by what is known in few calls. */
const LISTED_COUNT = 500;
/** Documents of a page; fewer where it turns out too large or unreadable. */
const FETCHED_COUNTS = [50, 10, 1];
/** Attachments that are fetched beside each other and kept together: what a cut costs at most. */
const KEPT_TOGETHER_COUNT = 6;
/** A server that never comes to an end is left (our own bound: a million facts and more). */
const PAGE_COUNT_LIMIT = 20_000;
/** Largest attachment, bytes unpacked, as in packets. */
const RAW_LIMIT_BYTES = 160_000_000;
/** What gzip may add to bytes that do not pack (RFC 1952: header, trailer, 5 bytes a block). */
const packedLimit = (bytes: number): number => Math.ceil(bytes * 1.01) + 1_000;

interface Wanted {
  readonly fact: Fact;
  readonly revision: string;
}

/**
 * Fetches every fact of the server that is not here, in the server's order. The check-point moves past a page when all of it is
 * kept, known or refused with a reason; damaged facts are named and left, the rest goes on.
 */
export async function pullFacts(run: Run): Promise<void> {
  let wasNew = false;
  for (let pageCount = 0; pageCount < PAGE_COUNT_LIMIT; pageCount += 1) {
    // Pages of what this phone itself sent are passed by without fetching them back.
    const listed = wasNew ? undefined : await run.calls.changes(run.point.since, LISTED_COUNT, false);
    const known = listed && (await examined(run, listed));
    if (listed && known?.wanted.length === 0) {
      const isSame = listed.last === run.point.since;
      await run.move({ ...withRefused(run.point, known.refused), since: listed.last });
      if (listed.rows.length === 0) return;
      if (isSame) throw new TeamStoreError('strange-answer');
      continue;
    }
    const page = await documentPage(run);
    run.pendingCount = page.pendingCount + page.rows.length;
    const { wanted, refused } = await examined(run, page);
    wasNew = wanted.length > 0;
    run.tell('fetching');
    const kept = await keep(run, wanted);
    run.pendingCount = page.pendingCount;
    const pushed = await passedBy(run, wanted);
    await run.move({
      ...withRefused(run.point, [...refused, ...page.refused, ...kept]),
      since: page.last,
      pushed,
    });
    run.tell('fetching');
  }
  throw new TeamStoreError('too-much');
}

/** Too large or unreadable pages are asked for in smaller pieces, so that one bad document costs only itself. */
async function documentPage(run: Run): Promise<ChangePage & { readonly refused: readonly RefusedFact[] }> {
  const splittable: readonly (TeamStoreProblem | undefined)[] = ['too-much', 'strange-answer'];
  for (const limit of FETCHED_COUNTS) {
    try {
      return { ...(await run.calls.changes(run.point.since, limit, true)), refused: [] };
    } catch (error) {
      if (!splittable.includes(codeOf(error))) throw error;
    }
  }
  const bare = await run.calls.changes(run.point.since, 1, false);
  if (bare.rows.length === 0) throw new TeamStoreError('strange-answer');
  return {
    ...bare,
    rows: [],
    refused: bare.rows.map(({ id }) => ({ id, lies: 'there', reason: 'damaged' })),
  };
}

/** What of a page is not here yet. Without documents the facts are told by id and revision only. */
async function examined(
  run: Run,
  page: ChangePage,
): Promise<{ readonly wanted: readonly ChangeRow[]; readonly refused: readonly RefusedFact[] }> {
  const refused: RefusedFact[] = [];
  const isWanted = await Promise.all(
    page.rows.map(async (row) => {
      // A server's own documents (indexes, rules) are not facts.
      if (row.id.startsWith('_')) return false;
      const here = await run.store.fact(row.id);
      const hasOther = row.revisions.some((revision) => revision !== (here?.revision ?? row.revisions[0]));
      // Two devices may erase the same thing; what an administrator deleted stays here.
      if (hasOther && !row.deleted && !row.id.startsWith('erase:'))
        refused.push({ id: row.id, lies: 'there', reason: 'other-content' });
      if (here !== undefined || row.deleted) return false;
      return (await run.store.fact(`erase:${row.id}`)) === undefined;
    }),
  );
  return { wanted: page.rows.filter((_, index) => isWanted[index]), refused };
}

/** What came from the server is not waiting to be sent there, unless something of this phone's came between. */
async function passedBy({ store, point }: Run, rows: readonly ChangeRow[]): Promise<number> {
  const { ids, last } = await store.changesSince(point.pushed, rows.length + 1);
  const came = new Set(rows.map(({ id }) => id));
  return ids.every((id) => came.has(id)) ? last : point.pushed;
}

/** @returns what was refused, with the reason. */
async function keep(run: Run, rows: readonly ChangeRow[]): Promise<readonly RefusedFact[]> {
  const refused: RefusedFact[] = [];
  const refuse = (id: string, reason: FactRefusal) => refused.push({ id, lies: 'there', reason });
  const put = async (facts: readonly { fact: Fact; raw?: Uint8Array }[], reason: FactRefusal) => {
    if (facts.length === 0) return;
    const { added, damaged } = await run.store.putFacts(facts);
    damaged.forEach((id) => refuse(id, reason));
    run.fetchedCount += added;
    run.pendingCount = Math.max(0, run.pendingCount - facts.length);
    run.tell('fetching');
  };

  const sound: Wanted[] = [];
  for (const row of rows) {
    const wanted = genuine(row);
    if (wanted === undefined) refuse(row.id, 'damaged');
    else sound.push(wanted);
  }
  const light = sound.filter(({ fact }) => rawBytesOf(fact) === undefined);
  await put(light, 'damaged');
  const heavy = sound.filter(({ fact }) => rawBytesOf(fact) !== undefined);
  for (let from = 0; from < heavy.length; from += KEPT_TOGETHER_COUNT) {
    const some = heavy.slice(from, from + KEPT_TOGETHER_COUNT);
    const fetched = await Promise.all(some.map((wanted) => withRaw(run, wanted)));
    fetched.forEach((one) => {
      if ('reason' in one) refuse(one.id, one.reason);
    });
    await put(
      fetched.filter((one) => 'fact' in one),
      'raw-damaged',
    );
  }
  return refused;
}

/** The fact of a row when its content is what its revision says. */
function genuine({ id, document }: ChangeRow): Wanted | undefined {
  if (document?.['_id'] !== id) return undefined;
  const members = Object.entries(document).filter(([name]) => name === '_id' || !name.startsWith('_'));
  const content: unknown = Object.fromEntries(members);
  const parsed = parseFact(content);
  if (!parsed.ok || revisionOf(parsed.value.fact) !== document['_rev']) return undefined;
  return { fact: parsed.value.fact, revision: revisionOf(parsed.value.fact) };
}

function rawBytesOf(fact: Fact): number | undefined {
  const { rawSha256, rawBytes } = fact as { rawSha256?: unknown; rawBytes?: unknown };
  if (typeof rawSha256 !== 'string') return undefined;
  return typeof rawBytes === 'number' ? rawBytes : 0;
}

type Fetched =
  { readonly fact: Fact; readonly raw?: Uint8Array } | { readonly id: string; readonly reason: FactRefusal };

async function withRaw(run: Run, { fact, revision }: Wanted): Promise<Fetched> {
  const about = aboutOf(fact);
  // Of something that was erased here: the store refuses it anyway, its bytes are not fetched.
  if (about !== undefined && (await run.store.fact(`erase:${about}`)) !== undefined) return { fact };
  const bytes = rawBytesOf(fact) ?? 0;
  if (bytes > RAW_LIMIT_BYTES) return { id: fact._id, reason: 'too-large' };
  try {
    const raw = await run.calls.raw(fact._id, revision, packedLimit(bytes));
    return raw === undefined ? { id: fact._id, reason: 'raw-missing' } : { fact, raw };
  } catch (error) {
    // More bytes than the fact declares: it cannot be what was measured.
    if (codeOf(error) === 'too-much') return { id: fact._id, reason: 'raw-damaged' };
    throw error;
  }
}
