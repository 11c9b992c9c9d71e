/*
 * A page that holds nothing but capture and store: browser tests reach both through `window.field`. Never shipped.
 */
import { createCapture } from '../../src/capture/create-capture.ts';
import { openStore, type Store } from '../../src/store/open-store.ts';
import { migrate, MIGRATIONS } from '../../src/store/schema.ts';
import { openDB } from 'idb';
import type { SessionOptions, SessionState } from '../../src/app/ports.ts';
import { readingDraft, sampleRecording } from './reading-draft.ts';

let store: Store | undefined;
let capture: ReturnType<typeof createCapture> | undefined;
const heard: string[] = [];

const field = {
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
    capture ??= createCapture({ journal: store! });
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
  /** The database as an earlier version of the program left it. */
  async openAsVersion(version: number) {
    const database = await openDB('thrumbook', version, {
      upgrade: (db, old, _new, transaction) =>
        migrate(
          db as never,
          old,
          transaction as never,
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
