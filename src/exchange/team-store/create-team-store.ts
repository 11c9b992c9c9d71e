import type { TeamStorePort } from '../../app/ports.ts';
import type {
  TeamStoreAccount,
  TeamStoreProblem,
  TeamStoreProgress,
  TeamStoreReport,
} from '../../core/model/team-store.ts';
import { readCheckPoint, START } from './check-point.ts';
import { parseAddress } from './parse-address.ts';
import { pullFacts } from './pull-facts.ts';
import { beginAgainIfForgotten, COUNTED_LIMIT, pushFacts } from './push-facts.ts';
import { openRun, type ReplicatedStore, type Run } from './run.ts';
import { createCalls } from './team-store-calls.ts';
import { browserEnvironment, type TeamStoreEnvironment } from './team-store-environment.ts';
import { codeOf, isPassing } from './team-store-error.ts';

/** Attempts in a row that may fail without anything having arrived between them (our own choice: about half a minute). */
const ATTEMPT_LIMIT = 6;
const FIRST_PAUSE_MS = 1_000;
const LONGEST_PAUSE_MS = 16_000;

/**
 * Replication with a team's CouchDB server: push and pull of immutable facts, each put if absent on the other side. Stopping,
 * a cut link or a closed page cost at most what was on its way; the next run compares and goes on.
 */
export function createTeamStore(
  store: ReplicatedStore,
  environment: TeamStoreEnvironment = browserEnvironment(),
): TeamStorePort {
  return {
    address: parseAddress,

    async check(account, signal) {
      try {
        await createCalls(account, environment, signal).missing([]);
        return undefined;
      } catch (error) {
        return problemOf(error);
      }
    },

    replicate: (account, options) => replicate(store, environment, account, options),

    async standing(url) {
      const { pushed, refused, lastSuccessAt } = await readCheckPoint(store, url);
      const waiting = await store.changesSince(pushed, COUNTED_LIMIT);
      return {
        waitingCount: waiting.ids.length,
        refused,
        ...(lastSuccessAt === undefined ? {} : { lastSuccessAt }),
      };
    },
  };
}

async function replicate(
  store: ReplicatedStore,
  environment: TeamStoreEnvironment,
  account: TeamStoreAccount,
  options: {
    readonly signal: AbortSignal;
    readonly onProgress: (progress: TeamStoreProgress) => void;
    readonly again?: boolean;
  },
): Promise<TeamStoreReport> {
  const { signal } = options;
  const calls = createCalls(account, environment, signal);
  const run = await openRun(store, calls, account.url, options.onProgress);
  const report = (end: TeamStoreReport['end']): TeamStoreReport => ({
    sentCount: run.sentCount,
    fetchedCount: run.fetchedCount,
    end,
  });
  if (options.again === true) await run.move(START);
  let failedCount = 0;
  for (;;) {
    const doneBefore = run.sentCount + run.fetchedCount;
    try {
      await exchangeAll(run);
      await run.move({ ...run.point, lastSuccessAt: environment.nowIso() });
      return report('done');
    } catch (error) {
      if (signal.aborted) return report('cancelled');
      const code = problemOf(error);
      failedCount = run.sentCount + run.fetchedCount > doneBefore ? 1 : failedCount + 1;
      if (!isPassing(code) || failedCount >= ATTEMPT_LIMIT) return report(code);
    }
    run.tell('pausing');
    try {
      await environment.pause(pauseMs(failedCount, environment.chance()), signal);
    } catch {
      return report('cancelled');
    }
  }
}

/** What this phone has goes first; what came in is then known on both sides, so that nothing is left waiting. */
async function exchangeAll(run: Run): Promise<void> {
  await beginAgainIfForgotten(run);
  await pushFacts(run);
  await pullFacts(run);
  await pushFacts(run);
}

/** Twice as long each time, spread by a quarter either way. */
function pauseMs(failedCount: number, chance: number): number {
  const longer = FIRST_PAUSE_MS * 2 ** (failedCount - 1);
  return Math.min(LONGEST_PAUSE_MS, longer) * (0.75 + 0.5 * chance);
}

/** Reasons of the link and the server; anything else is the phone's own and rejects. */
function problemOf(error: unknown): TeamStoreProblem {
  const code = codeOf(error);
  if (code === undefined) throw error;
  return code;
}
