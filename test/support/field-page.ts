/*
 * A page that holds nothing but capture and store: browser tests reach both through `window.field`. Never shipped.
 */
import { createCapture } from '../../src/capture/create-capture.ts';
import { openStore, type Store } from '../../src/store/open-store.ts';
import { migrate, MIGRATIONS } from '../../src/store/schema.ts';
import { deleteDB, openDB } from 'idb';
import { rowOf } from '../../src/store/fact-row.ts';
import { phoneCheck } from '../../src/core/phone-check.ts';
import type { ReadingFact } from '../../src/core/model/fact.ts';
import { encodeRaw } from '../../src/core/packet/raw-recording.ts';
import { gzip, ownBuffer, sha256Of } from '../../src/store/raw-bytes.ts';
import type { SessionOptions, SessionState } from '../../src/app/ports.ts';
import { readingDraft, sampleRecording } from './reading-draft.ts';

// What tsx wraps named functions in, for those that tests send into the page.
Object.assign(globalThis, { __name: (value: unknown) => value });

let store: Store | undefined;
let capture: ReturnType<typeof createCapture> | undefined;
const heard: string[] = [];

let longestTaskMs = 0;

const field = {
  /** Notes the longest time that the page was busy, from now on. */
  watchTasks() {
    new PerformanceObserver((list) => {
      for (const { duration } of list.getEntries()) longestTaskMs = Math.max(longestTaskMs, duration);
    }).observe({ type: 'longtask' });
  },
  longestTaskMs: () => longestTaskMs,
  heard,
  readingDraft,
  sampleRecording,
  async openStore() {
    store = await openStore({ onBlocked: () => heard.push('blocked') });
    store.onChange((what) => heard.push(what));
    return store.device;
  },
  store: () => store!,
  capture: () => {
    capture ??= createCapture({
      journal: store!,
      checkPhone: async (recording, checkedAt) => phoneCheck(recording, checkedAt),
    });
    return capture;
  },
  /** Opens a session and resolves with the first state in `phases` (JSON: typed arrays as lengths). */
  session(options: SessionOptions, phases: readonly string[]): Promise<SessionState> {
    const running = field.capture();
    return new Promise((resolve) => {
      const stop = running.subscribe((state) => {
        if (!phases.includes(state.phase)) return;
        stop();
        resolve(state);
      });
      void running.open(options);
    });
  },
  until(phases: readonly string[]): Promise<SessionState> {
    const running = field.capture();
    if (phases.includes(running.state.phase)) return Promise.resolve(running.state);
    return new Promise((resolve) => {
      const stop = running.subscribe((state) => {
        if (!phases.includes(state.phase)) return;
        stop();
        resolve(state);
      });
    });
  },
  /** Samples that do not shrink: a megabyte stays one. */
  noisyRecording(count: number) {
    const recording = sampleRecording(count);
    for (const axis of recording.accelerationMps2) axis.forEach((_, i) => (axis[i] = 10 * Math.random()));
    return recording;
  },
  /** Readings over two years at 200 spots, without raw samples. */
  async fillWithReadings(count: number) {
    const spots: string[] = [];
    for (let i = 0; i < 200; i += 1) spots.push((await store!.newEntity('spot', { name: `post ${i}` })).id);
    for (let from = 0; from < count; from += 500) {
      const facts = Array.from({ length: Math.min(500, count - from) }, (_, k) => {
        const i = from + k;
        const fact: ReadingFact = {
          ...readingDraft({
            recordedAt: new Date(Date.UTC(2024, 0, 1) + i * 6_300_000).toISOString(),
            procedure: i % 3 === 0 ? 'running' : 'tap',
            spot: spots[i % 200]!,
          }),
          _id: `reading:01J${String(i).padStart(23, '0')}`,
          v: 1,
          kind: 'reading',
          rawSha256: 'a'.repeat(64),
          rawBytes: 1,
        };
        return { fact };
      });
      await store!.putFacts(facts);
    }
  },
  /** Version and summaries of the database as it lies there, past the store. */
  async rawState() {
    const database = await openDB('thrumbook');
    const { version, objectStoreNames } = database;
    const summaryCount = objectStoreNames.contains('summaries') ? await database.count('summaries') : 0;
    database.close();
    return { versionFound: version, summaryCount };
  },
  async deleteDatabase() {
    store?.close();
    await deleteDB('thrumbook');
  },
  /** What version 1 of the program left behind: readings without summaries. */
  async fillVersion1(count: number) {
    const database = await field.openAsVersion(1);
    const raw = encodeRaw(sampleRecording(600));
    const bytes = ownBuffer(await gzip(raw));
    const rawSha256 = await sha256Of(raw);
    const change = database.transaction(['facts', 'raw', 'log'], 'readwrite');
    for (let i = 0; i < count; i += 1) {
      const ulid = `01J${String(i).padStart(23, '0')}`;
      const fact: ReadingFact = {
        ...readingDraft(),
        _id: `reading:${ulid}`,
        v: 1,
        kind: 'reading',
        rawSha256,
        rawBytes: raw.length,
      };
      void change.objectStore('facts').add(rowOf(fact));
      void change.objectStore('raw').add({ id: fact._id, bytes });
      void change.objectStore('log').add({ id: fact._id });
    }
    await change.done;
    database.close();
  },
  /** The database as an earlier version of the program left it. */
  async openAsVersion(version: number) {
    const database = await openDB('thrumbook', version, {
      upgrade: (db, old) =>
        migrate(
          db as never,
          old,
          MIGRATIONS.filter(({ to }) => to <= version),
        ),
    });
    return database;
  },
};

export type FieldPage = typeof field;
declare global {
  interface Window {
    field: FieldPage;
  }
}
window.field = field;
