import type { Fact } from '../../core/model/fact.ts';
import type { FactRefusal, TeamStoreAccount } from '../../core/model/team-store.ts';
import { isPlainObject } from '../../core/packet/canonical-json.ts';
import { parseJsonBytes } from '../../core/packet/parse-json.ts';
import { boundedCall, type Call, type Reply } from './bounded-call.ts';
import { ATTACHMENT, documentOf, multipartFact } from './multipart-fact.ts';
import type { TeamStoreEnvironment } from './team-store-environment.ts';
import { TeamStoreError } from './team-store-error.ts';

/*
 * The five calls of CouchDB's documented interface that a team store needs, and no others: whatever answers these can be one.
 * Every answer is unknown data: its shape is checked, its size bounded, and what was not asked for is refused.
 */

export interface KeptFact {
  readonly fact: Fact;
  readonly revision: string;
}

/** Place in the server's order of changes: a number on a single server, a text on a cluster. */
export type Sequence = string | number;

export interface ChangeRow {
  readonly id: string;
  /** All revisions that the server holds side by side: one, unless something is wrong. */
  readonly revisions: readonly string[];
  readonly deleted: boolean;
  readonly document?: Readonly<Record<string, unknown>>;
}

export interface ChangePage {
  readonly rows: readonly ChangeRow[];
  readonly last: Sequence;
  /** Rows that are still to come, as the server says. */
  readonly pendingCount: number;
}

export interface TeamStoreCalls {
  /** Of these facts, those that the server lacks. */
  missing(facts: readonly KeptFact[]): Promise<ReadonlySet<string>>;
  /** Facts without attachment, many at once; resolves with those that the server will not take. */
  putFacts(facts: readonly KeptFact[]): Promise<ReadonlyMap<string, FactRefusal>>;
  putWithRaw(kept: KeptFact, raw: Uint8Array): Promise<FactRefusal | undefined>;
  changes(since: Sequence, limit: number, withDocuments: boolean): Promise<ChangePage>;
  /** Undefined where the server has none. */
  raw(id: string, revision: string, limitBytes: number): Promise<Uint8Array | undefined>;
}

/** Most bytes of a page of changes: several times what fifty readings have (our own bound). */
const PAGE_LIMIT_BYTES = 24_000_000;
/** A row without its document: id, revisions, and the long sequence texts of large clusters. */
const ROW_LIMIT_BYTES = 4_000;
const SEQUENCE_LIMIT = 4_000;

export function createCalls(
  account: TeamStoreAccount,
  environment: TeamStoreEnvironment,
  signal: AbortSignal,
): TeamStoreCalls {
  const call = (wanted: Call): Promise<Reply> => boundedCall(account, environment, wanted, signal);
  const post = async (path: string, content: unknown, limitBytes: number): Promise<unknown> => {
    const body = new Blob([JSON.stringify(content)]);
    return answerOf(await call({ path, method: 'POST', body, type: 'application/json', limitBytes }));
  };

  return {
    async missing(facts) {
      const asked = new Map(facts.map(({ fact, revision }) => [fact._id, revision]));
      const question = Object.fromEntries([...asked].map(([id, revision]) => [id, [revision]]));
      return parseMissing(await post('/_revs_diff', question, 10_000 + 500 * facts.length), asked);
    },

    async putFacts(facts) {
      const docs = facts.map(({ fact, revision }) => documentOf(fact, revision));
      const answer = await post('/_bulk_docs', { docs, new_edits: false }, 10_000 + 1_000 * facts.length);
      return parseBulkAnswer(answer, new Set(facts.map(({ fact }) => fact._id)));
    },

    async putWithRaw({ fact, revision }, raw) {
      const path = `/${encodeURIComponent(fact._id)}?new_edits=false`;
      const reply = await call({
        path,
        method: 'PUT',
        ...multipartFact(fact, revision, raw),
        limitBytes: 10_000,
      });
      if (reply.status === 413) return 'too-large';
      if (reply.status === 403) return 'not-permitted';
      // CouchDB names the document, other servers answer with an empty list: what counts is the comparison afterwards.
      const answer = answerOf(reply);
      const isNamed = isPlainObject(answer) && answer['id'] === fact._id;
      if (!isNamed && !(Array.isArray(answer) && answer.length === 0))
        throw new TeamStoreError('strange-answer');
      return undefined;
    },

    async changes(since, limit, withDocuments) {
      const query = new URLSearchParams({
        feed: 'normal',
        style: 'all_docs',
        since: String(since),
        limit: String(limit),
        ...(withDocuments ? { include_docs: 'true' } : {}),
      });
      const limitBytes = withDocuments ? PAGE_LIMIT_BYTES : 10_000 + limit * ROW_LIMIT_BYTES;
      const reply = await call({ path: `/_changes?${query.toString()}`, method: 'GET', limitBytes });
      return parseChanges(answerOf(reply), limit);
    },

    async raw(id, revision, limitBytes) {
      const path = `/${encodeURIComponent(id)}/${ATTACHMENT}?rev=${encodeURIComponent(revision)}`;
      const reply = await call({ path, method: 'GET', limitBytes });
      if (reply.status === 404) return undefined;
      if (reply.status !== 200) throw refusal(reply);
      return reply.bytes;
    },
  };
}

/** @throws TeamStoreError for every status but 200 to 202, and for what is not JSON. */
function answerOf(reply: Reply): unknown {
  if (reply.status < 200 || reply.status > 202) throw refusal(reply);
  const answer = parseJsonBytes(reply.bytes);
  if (answer === undefined)
    throw new TeamStoreError(isMarkup(reply.bytes) ? 'not-a-team-store' : 'strange-answer');
  return answer;
}

function refusal({ status }: Reply): TeamStoreError {
  if (status === 401) return new TeamStoreError('not-signed-in');
  if (status === 403) return new TeamStoreError('not-permitted');
  if (status === 404) return new TeamStoreError('no-database');
  if (status === 408 || status === 429 || status >= 500) return new TeamStoreError('server-failing');
  return new TeamStoreError('strange-answer');
}

/** A page for people: the wrong address, or the sign-in page of a guest network. */
function isMarkup(bytes: Uint8Array): boolean {
  const start = String.fromCharCode(...bytes.subarray(0, 200)).trimStart();
  return start.startsWith('<') || start.startsWith('\u00ef\u00bb\u00bf<');
}

function parseMissing(answer: unknown, asked: ReadonlyMap<string, string>): ReadonlySet<string> {
  if (!isPlainObject(answer)) throw new TeamStoreError('strange-answer');
  const missing = new Set<string>();
  for (const [id, said] of Object.entries(answer)) {
    const revisions: unknown = isPlainObject(said) ? said['missing'] : undefined;
    if (!Array.isArray(revisions) || revisions.length !== 1 || revisions[0] !== asked.get(id))
      throw new TeamStoreError('strange-answer');
    missing.add(id);
  }
  return missing;
}

/** With `new_edits: false` the list holds failures only; some servers list successes too. */
function parseBulkAnswer(answer: unknown, sent: ReadonlySet<string>): ReadonlyMap<string, FactRefusal> {
  if (!Array.isArray(answer) || answer.length > sent.size) throw new TeamStoreError('strange-answer');
  const refused = new Map<string, FactRefusal>();
  for (const row of answer as unknown[]) {
    if (!isPlainObject(row) || !sent.has(String(row['id']))) throw new TeamStoreError('strange-answer');
    if (row['error'] === undefined) continue;
    if (row['error'] !== 'forbidden' && row['error'] !== 'unauthorized')
      throw new TeamStoreError('server-failing');
    refused.set(String(row['id']), 'not-permitted');
  }
  return refused;
}

function parseChanges(answer: unknown, limit: number): ChangePage {
  if (!isPlainObject(answer) || !Array.isArray(answer['results'])) throw new TeamStoreError('strange-answer');
  const rows = answer['results'] as unknown[];
  const last = answer['last_seq'];
  if (rows.length > limit || !isSequence(last)) throw new TeamStoreError('strange-answer');
  const pending = answer['pending'];
  return {
    rows: rows.map((row) => parseRow(row)),
    last,
    pendingCount: typeof pending === 'number' && pending > 0 ? pending : 0,
  };
}

function parseRow(row: unknown): ChangeRow {
  if (!isPlainObject(row) || typeof row['id'] !== 'string' || !Array.isArray(row['changes']))
    throw new TeamStoreError('strange-answer');
  const revisions = (row['changes'] as unknown[]).map((change) => isPlainObject(change) && change['rev']);
  if (!revisions.every((revision) => typeof revision === 'string'))
    throw new TeamStoreError('strange-answer');
  const document: unknown = row['doc'];
  return {
    id: row['id'],
    revisions,
    deleted: row['deleted'] === true,
    ...(isPlainObject(document) ? { document } : {}),
  };
}

function isSequence(value: unknown): value is Sequence {
  return typeof value === 'string'
    ? value.length <= SEQUENCE_LIMIT
    : typeof value === 'number' && Number.isSafeInteger(value) && value >= 0;
}
