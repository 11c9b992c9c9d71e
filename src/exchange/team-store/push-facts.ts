import type { RefusedFact } from '../../core/model/team-store.ts';
import { START, withRefused } from './check-point.ts';
import { inTurn } from './in-turn.ts';
import type { ReplicatedStore, Run } from './run.ts';
import type { KeptFact } from './team-store-calls.ts';
import { TeamStoreError } from './team-store-error.ts';

/** Facts that are compared in one call. */
const COMPARED_COUNT = 100;
/** Facts without attachment that go in one call. */
const BULK_LIMIT_CHARACTERS = 1_000_000;
/** Uploads beside each other: enough to fill the link, few enough that a cut costs little (tried: 2 to 6). */
const UPLOADS_AT_ONCE = 3;
/** Newest acknowledged facts that the server is asked for again, in case it forgot. */
const CANARY_COUNT = 20;
/** Counting what waits ends here. */
export const COUNTED_LIMIT = 100_000;

/**
 * Sends every fact that the server lacks, oldest first. A fact counts as sent when the server, asked again after its answer,
 * says that it has it: only then the check-point moves.
 */
export async function pushFacts(run: Run): Promise<void> {
  run.pendingCount = (await run.store.changesSince(run.point.pushed, COUNTED_LIMIT)).ids.length;
  for (;;) {
    const { ids, last } = await run.store.changesSince(run.point.pushed, COMPARED_COUNT);
    if (ids.length === 0) return;
    run.tell('sending');
    const facts = await keptFacts(run.store, ids);
    const refused = facts.length === 0 ? [] : await pushSome(run, facts);
    run.pendingCount = Math.max(0, run.pendingCount - ids.length);
    await run.move({ ...withRefused(run.point, refused), pushed: last });
    run.tell('sending');
  }
}

/** A server that was set up anew, or came back from an old copy, lacks what it once acknowledged: then all is compared. */
export async function beginAgainIfForgotten(run: Run): Promise<void> {
  const { pushed, refused } = run.point;
  if (pushed === 0) return;
  const { ids } = await run.store.changesSince(Math.max(0, pushed - CANARY_COUNT), CANARY_COUNT);
  const refusedHere = new Set(refused.filter(({ lies }) => lies === 'here').map(({ id }) => id));
  const facts = await keptFacts(
    run.store,
    ids.filter((id) => !refusedHere.has(id)),
  );
  if (facts.length === 0) return;
  const missing = await run.calls.missing(facts);
  if (missing.size > 0) await run.move({ ...run.point, pushed: START.pushed, since: START.since });
}

/** Erased ones are gone from here and not sent. */
async function keptFacts(store: ReplicatedStore, ids: readonly string[]): Promise<KeptFact[]> {
  const kept = await Promise.all([...new Set(ids)].map((id) => store.fact(id)));
  return kept.filter((one) => one !== undefined);
}

async function pushSome(run: Run, facts: readonly KeptFact[]): Promise<readonly RefusedFact[]> {
  const missing = await run.calls.missing(facts);
  const wanted = facts.filter(({ fact }) => missing.has(fact._id));
  const refused: RefusedFact[] = [];
  const refuse = (id: string, reason: RefusedFact['reason']) => refused.push({ id, lies: 'here', reason });
  const sent = (count: number): void => {
    run.sentCount += count;
    run.pendingCount = Math.max(0, run.pendingCount - count);
    run.tell('sending');
  };

  const light = wanted.filter((kept) => !hasRaw(kept));
  for (const part of inParts(light)) {
    const failed = await run.calls.putFacts(part);
    failed.forEach((reason, id) => refuse(id, reason));
    sent(part.length - failed.size);
  }
  await inTurn(wanted.filter(hasRaw), UPLOADS_AT_ONCE, async (kept) => {
    const raw = await run.store.storedRawOf(kept.fact._id);
    // Without its samples it would take the place of the whole one on the server.
    const reason = raw === undefined ? 'raw-missing' : await run.calls.putWithRaw(kept, raw);
    if (reason === undefined) sent(1);
    else refuse(kept.fact._id, reason);
  });

  const refusedIds = new Set(refused.map(({ id }) => id));
  const claimed = wanted.filter(({ fact }) => !refusedIds.has(fact._id));
  if (claimed.length > 0 && (await run.calls.missing(claimed)).size > 0) throw new TeamStoreError('not-kept');
  // What is done is not counted as pending once more by the caller.
  run.pendingCount += wanted.length - refused.length;
  return refused;
}

function hasRaw({ fact }: KeptFact): boolean {
  return typeof (fact as { rawSha256?: unknown }).rawSha256 === 'string';
}

function inParts(facts: readonly KeptFact[]): KeptFact[][] {
  const parts: KeptFact[][] = [];
  let room = 0;
  for (const kept of facts) {
    const size = JSON.stringify(kept.fact).length;
    if (size > room || parts.length === 0) {
      parts.push([]);
      room = BULK_LIMIT_CHARACTERS;
    }
    parts.at(-1)!.push(kept);
    room -= size;
  }
  return parts;
}
