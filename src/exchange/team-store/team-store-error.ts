import type { TeamStoreProblem } from '../../core/model/team-store.ts';

/** Work with the server ended for a reason of the link or the server; told by `code`. */
export class TeamStoreError extends Error {
  override readonly name = 'TeamStoreError';
  readonly code: TeamStoreProblem;

  constructor(code: TeamStoreProblem, cause?: unknown) {
    super(`team store: ${code}`, { cause });
    this.code = code;
  }
}

/** May be over by itself in a moment. */
export function isPassing(code: TeamStoreProblem): boolean {
  return code === 'unreachable' || code === 'stalled' || code === 'server-failing';
}

export function codeOf(error: unknown): TeamStoreProblem | undefined {
  return error instanceof TeamStoreError ? error.code : undefined;
}
