import type { StorePort } from '../../app/ports.ts';
import type { TeamStoreProgress } from '../../core/model/team-store.ts';
import { readCheckPoint, writeCheckPoint, type CheckPoint } from './check-point.ts';
import type { TeamStoreCalls } from './team-store-calls.ts';

export type ReplicatedStore = Pick<
  StorePort,
  'fact' | 'putFacts' | 'storedRawOf' | 'changesSince' | 'getSetting' | 'putSetting'
>;

/** One run of the work with a server: what it works with, how far it is, what it has done. */
export interface Run {
  readonly store: ReplicatedStore;
  readonly calls: TeamStoreCalls;
  readonly point: CheckPoint;
  sentCount: number;
  fetchedCount: number;
  /** Facts that are known to be still to do. */
  pendingCount: number;
  /** Keep how far it is. */
  move(point: CheckPoint): Promise<void>;
  tell(step: TeamStoreProgress['step']): void;
}

export async function openRun(
  store: ReplicatedStore,
  calls: TeamStoreCalls,
  url: string,
  onProgress: (progress: TeamStoreProgress) => void,
): Promise<Run> {
  let point = await readCheckPoint(store, url);
  const run: Run = {
    store,
    calls,
    get point() {
      return point;
    },
    sentCount: 0,
    fetchedCount: 0,
    pendingCount: 0,
    async move(next) {
      point = next;
      await writeCheckPoint(store, url, next);
    },
    tell(step) {
      const doneCount = run.sentCount + run.fetchedCount;
      onProgress({ step, doneCount, totalCount: doneCount + run.pendingCount });
    },
  };
  return run;
}
