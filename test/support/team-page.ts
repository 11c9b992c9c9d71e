/*
 * A page that holds nothing but store and team store: browser tests reach both through `window.team`. Never shipped.
 */
import { createTeamStore } from '../../src/exchange/team-store/create-team-store.ts';
import { openStore, type Store } from '../../src/store/open-store.ts';
import type { TeamStoreAccount, TeamStoreReport } from '../../src/core/model/team-store.ts';
import { sha256Hex } from '../../src/core/packet/sha256.ts';
import { readingDraft, sampleRecording } from './reading-draft.ts';

// What tsx wraps named functions in, for those that tests send into the page.
Object.assign(globalThis, { __name: (value: unknown) => value });

let store: Store | undefined;
const opened = async (): Promise<Store> => (store ??= await openStore());

/** About 100 kB packed: samples with 18 random bits, as a fine sensor gives them. */
function largeRecording(seed: number) {
  const recording = sampleRecording(7_900);
  const state = new Uint32Array(1);
  crypto.getRandomValues(state);
  for (const axis of recording.accelerationMps2) {
    axis.forEach((value, index) => {
      state[0] = Math.imul(state[0]!, 1664525) + 1013904223;
      axis[index] = value + (state[0]! >>> 14) * 1e-5 + seed * 1e-6;
    });
  }
  return recording;
}

const team = {
  done: undefined as TeamStoreReport | undefined,
  /** Facts acknowledged so far in this run. */
  progressCount: 0,
  async fill(count: number): Promise<readonly { id: string; packedBytes: number }[]> {
    const here = await opened();
    const made: { id: string; packedBytes: number }[] = [];
    for (let i = 0; i < count; i += 1) {
      const { _id } = await here.saveReading(readingDraft(), largeRecording(i));
      made.push({ id: _id, packedBytes: (await here.storedRawOf(_id))!.length });
    }
    return made;
  },
  /** Starts a run and returns at once: the test may cut or reload in its middle. */
  async start(account: TeamStoreAccount): Promise<void> {
    const here = await opened();
    team.done = undefined;
    team.progressCount = 0;
    void createTeamStore(here)
      .replicate(account, {
        signal: new AbortController().signal,
        onProgress: ({ doneCount }) => (team.progressCount = doneCount),
      })
      .then((report) => (team.done = report));
  },
  async replicate(account: TeamStoreAccount): Promise<TeamStoreReport & { readonly tookMs: number }> {
    const here = await opened();
    const port = createTeamStore(here);
    const startMs = performance.now();
    const report = await port.replicate(account, {
      signal: new AbortController().signal,
      onProgress: () => {},
    });
    return { ...report, tookMs: performance.now() - startMs };
  },
  /** Hashes of all raw samples against their readings, and how many readings there are. */
  async verify(): Promise<{ readonly readingCount: number; readonly wrong: readonly string[] }> {
    const here = await opened();
    const wrong: string[] = [];
    const readings = await here.listReadings();
    for (const { id } of readings) {
      const kept = await here.fact(id);
      const raw = await here.rawOf(id);
      const { rawSha256 } = kept!.fact as { rawSha256: string };
      if (raw === undefined || sha256Hex(raw) !== rawSha256) wrong.push(id);
    }
    return { readingCount: readings.length, wrong };
  },
};

export type TeamPage = typeof team;
declare global {
  interface Window {
    team: TeamPage;
  }
}
window.team = team;
