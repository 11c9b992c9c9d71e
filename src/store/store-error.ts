import type { StoreProblem } from '../app/ports.ts';

/** The store could not do it, and the environment is why. Told apart by `code`. */
export class StoreError extends Error {
  override readonly name = 'StoreError';
  readonly code: StoreProblem;

  constructor(code: StoreProblem, cause?: unknown) {
    super(`store: ${code}`, cause === undefined ? undefined : { cause });
    this.code = code;
  }
}

/**
 * What a failure of IndexedDB means. By name only: QuotaExceededError is a class of its own in newer browsers, and an
 * aborted transaction carries the true reason in its cause.
 */
export function asStoreError(error: unknown): unknown {
  if (error instanceof StoreError || error instanceof TypeError || error instanceof RangeError) return error;
  switch (nameOf(error)) {
    case 'QuotaExceededError':
      return new StoreError('quota', error);
    case 'VersionError':
      return new StoreError('newer-database', error);
    case 'InvalidStateError':
    case 'AbortError':
      return new StoreError('closed', error);
    case 'UnknownError':
    case 'SecurityError':
    case 'DataError':
      return new StoreError('unavailable', error);
    default:
      return error;
  }
}

export function nameOf(error: unknown): string {
  return typeof error === 'object' && error !== null && 'name' in error ? String(error.name) : '';
}
