import type { TeamStoreAccount } from '../../core/model/team-store.ts';
import { TeamStoreError } from './team-store-error.ts';
import type { TeamStoreEnvironment } from './team-store-environment.ts';

export interface Call {
  /** Below the database, with its query. */
  readonly path: string;
  readonly method: 'GET' | 'POST' | 'PUT';
  readonly body?: Blob;
  readonly type?: string;
  /** Most bytes that the answer may have. */
  readonly limitBytes: number;
}

export interface Reply {
  readonly status: number;
  readonly bytes: Uint8Array;
}

/** Slowest link that is still waited for, bytes per ms: 4 kB/s, a poor mobile cell (our own choice). */
const SLOWEST_BYTES_PER_MS = 4;

/**
 * One call to the server, bounded in time and size. Redirections are not followed: name and password go where the person
 * sent them and nowhere else. Cookies of the browser stay out of it.
 * @throws TeamStoreError `unreachable`, `stalled`, `redirected`, `too-much`, `blocked-by-policy`; the signal's reason.
 */
export async function boundedCall(
  account: TeamStoreAccount,
  environment: TeamStoreEnvironment,
  call: Call,
  signal: AbortSignal,
): Promise<Reply> {
  signal.throwIfAborted();
  const control = new AbortController();
  const onAbort = () => control.abort();
  signal.addEventListener('abort', onAbort);
  const deadline = createDeadline(environment.stallMs, () => control.abort());
  try {
    deadline.moved(call.body?.size ?? 0);
    const response = await environment.fetch(account.url + call.path, {
      method: call.method,
      headers: {
        Accept: 'application/json',
        Authorization: basic(account),
        ...(call.type === undefined ? {} : { 'Content-Type': call.type }),
      },
      ...(call.body === undefined ? {} : { body: call.body }),
      credentials: 'omit',
      cache: 'no-store',
      redirect: 'manual',
      referrerPolicy: 'no-referrer',
      signal: control.signal,
    });
    const { status } = response;
    if (response.type === 'opaqueredirect' || (status >= 300 && status < 400)) {
      throw new TeamStoreError('redirected');
    }
    return { status, bytes: await boundedBody(response, call.limitBytes, deadline) };
  } catch (error) {
    if (signal.aborted) throw signal.reason;
    if (error instanceof TeamStoreError) throw error;
    if (deadline.isPassed()) throw new TeamStoreError('stalled', error);
    const isOurs = await environment.wasBlocked(new URL(account.url).origin);
    throw new TeamStoreError(isOurs ? 'blocked-by-policy' : 'unreachable', error);
  } finally {
    deadline.clear();
    signal.removeEventListener('abort', onAbort);
    // Whatever is left of the answer is not wanted any more.
    control.abort();
  }
}

interface Deadline {
  /** So many bytes went or came: that earns more time. */
  moved(bytes: number): void;
  isPassed(): boolean;
  clear(): void;
}

/** A silent server runs into it, and so does one that drips a byte now and then to be waited for without end. */
function createDeadline(stallMs: number, onPassed: () => void): Deadline {
  const startMs = performance.now();
  let movedBytes = 0;
  let isPassed = false;
  let timer: ReturnType<typeof setTimeout> | undefined;
  return {
    moved(bytes) {
      movedBytes += bytes;
      clearTimeout(timer);
      const leftMs = startMs + stallMs + movedBytes / SLOWEST_BYTES_PER_MS - performance.now();
      timer = setTimeout(() => {
        isPassed = true;
        onPassed();
      }, leftMs);
    },
    isPassed: () => isPassed,
    clear: () => clearTimeout(timer),
  };
}

async function boundedBody(response: Response, limitBytes: number, deadline: Deadline): Promise<Uint8Array> {
  if (Number(response.headers.get('Content-Length') ?? 0) > limitBytes) throw new TeamStoreError('too-much');
  const parts: Uint8Array[] = [];
  let length = 0;
  const reader = response.body?.getReader();
  for (;;) {
    const part = await reader?.read();
    if (part === undefined || part.done) return joined(parts, length);
    length += part.value.length;
    if (length > limitBytes) throw new TeamStoreError('too-much');
    deadline.moved(part.value.length);
    parts.push(part.value);
  }
}

function joined(parts: readonly Uint8Array[], length: number): Uint8Array {
  const bytes = new Uint8Array(length);
  let at = 0;
  for (const part of parts) {
    bytes.set(part, at);
    at += part.length;
  }
  return bytes;
}

/** Basic authentication (RFC 7617), name and password in UTF-8. */
function basic({ user, password }: TeamStoreAccount): string {
  const bytes = new TextEncoder().encode(`${user}:${password}`);
  return `Basic ${btoa(String.fromCharCode(...bytes))}`;
}
