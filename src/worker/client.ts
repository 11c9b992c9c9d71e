import type { AnalysisPort } from '../app/ports.ts';
import { failure } from '../core/model/outcome.ts';
import type { Outcome } from '../core/model/outcome.ts';
import type { MessageEnd, Work, WorkReply, WorkRequest } from './protocol.ts';

/** A worker as the client needs it. */
export interface WorkerEnd extends MessageEnd {
  onerror: ((event: { readonly message?: string }) => void) | null;
  terminate(): void;
}

export type AnalysisErrorCode = 'analysis-failed' | 'worker-failed';

/** Something broke that no recording should break: recognised by `code`, which survives copying. */
export class AnalysisError extends Error {
  override readonly name = 'AnalysisError';
  readonly code: AnalysisErrorCode;
  /** Name, message and stack from inside the worker, for a person to copy. */
  readonly detail: string;

  constructor(code: AnalysisErrorCode, message: string, detail: string) {
    super(message);
    this.code = code;
    this.detail = detail;
  }
}

const startWorker = (): WorkerEnd =>
  new Worker(new URL('./entry.ts', import.meta.url), { type: 'module' }) as unknown as WorkerEnd;

interface Waiting {
  readonly settle: (outcome: Outcome<unknown>) => void;
  readonly reject: (error: AnalysisError) => void;
}

/**
 * Analysis in a worker, one request at a time, others queued. Aborting gives the problem `cancelled` at once: a running
 * request's worker is ended (a busy loop cannot be interrupted) and the next request starts a new one.
 * @param start makes a worker; tests pass their own
 */
export function createAnalysisClient(start: () => WorkerEnd = startWorker): AnalysisPort {
  let worker: WorkerEnd | undefined;
  let waiting: Waiting | undefined;
  let requestCount = 0;
  let queue: Promise<unknown> = Promise.resolve();

  const discard = (): void => {
    worker?.terminate();
    worker = undefined;
    waiting = undefined;
  };

  const fail = (code: AnalysisErrorCode, message: string, detail: string): void => {
    const { reject } = waiting ?? {};
    discard();
    reject?.(new AnalysisError(code, message, detail));
  };

  const opened = (): WorkerEnd => {
    if (worker !== undefined) return worker;
    const fresh = start();
    fresh.onmessage = ({ data }) => receive(data as WorkReply);
    fresh.onerror = ({ message }) => fail('worker-failed', 'the analysis worker stopped', message ?? '');
    worker = fresh;
    return fresh;
  };

  const receive = (reply: WorkReply): void => {
    if (waiting === undefined || reply.requestIndex !== requestCount) return;
    if (reply.kind === 'thrown') {
      fail('analysis-failed', `${reply.name}: ${reply.message}`, reply.stack);
      return;
    }
    const { settle } = waiting;
    waiting = undefined;
    settle(reply.outcome);
  };

  const run = (work: Work, signal: AbortSignal | undefined): Promise<Outcome<unknown>> =>
    new Promise((resolve, reject) => {
      if (signal?.aborted === true) {
        resolve(failure('cancelled'));
        return;
      }
      const cancel = (): void => {
        discard();
        resolve(failure('cancelled'));
      };
      const done = (): void => signal?.removeEventListener('abort', cancel);
      signal?.addEventListener('abort', cancel, { once: true });
      waiting = {
        settle: (outcome) => {
          done();
          resolve(outcome);
        },
        reject: (error) => {
          done();
          reject(error);
        },
      };
      requestCount++;
      opened().postMessage({ ...work, requestIndex: requestCount } satisfies WorkRequest);
    });

  /** `T` is what the worker's core answers to this kind of work. */
  const request = <T>(work: Work, signal?: AbortSignal): Promise<Outcome<T>> => {
    const turn = queue.then(() => run(work, signal)) as Promise<Outcome<T>>;
    queue = turn.catch(() => undefined);
    // A queued request is given up at once, without waiting for its turn.
    return signal === undefined ? turn : Promise.race([turn, cancelled(signal)]);
  };

  return {
    analyse: (recording, settings, signal) => request({ kind: 'analyse', recording, settings }, signal),
    checkPhone: (recording, checkedAt) => request({ kind: 'check-phone', recording, checkedAt }),
  };
}

function cancelled(signal: AbortSignal): Promise<Outcome<never>> {
  return new Promise((resolve) => {
    const give = (): void => resolve(failure('cancelled'));
    if (signal.aborted) give();
    else signal.addEventListener('abort', give, { once: true });
  });
}
