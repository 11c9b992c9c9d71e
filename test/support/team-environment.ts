import type { TeamStoreEnvironment } from '../../src/exchange/team-store/team-store-environment.ts';

/** A host without a window: pauses are short, chance is even. */
export function nodeEnvironment(over: Partial<TeamStoreEnvironment> = {}): TeamStoreEnvironment {
  return {
    fetch: (url, init) => fetch(url, init),
    nowIso: () => '2026-03-01T12:00:00.000Z',
    chance: () => 0.5,
    async pause(_ms, signal) {
      await new Promise((resolve) => setTimeout(resolve, 5));
      signal.throwIfAborted();
    },
    wasBlocked: () => Promise.resolve(false),
    stallMs: 2_000,
    ...over,
  };
}
