/**
 * The service worker: registered once, asked for news hourly and when the page comes to the front. A newer version
 * waits for the person; it is taken only while no tab records, and only the tab that asked loads again.
 */
import { live } from './live-state.ts';
import type { UpdatePort } from './update-port.ts';

/** How often a long-open app looks for a newer version. */
const LOOK_EVERY_MS = 60 * 60 * 1000;

export interface OfflineParts {
  readonly container: ServiceWorkerContainer | undefined;
  readonly locks: LockManager | undefined;
  /** Name of the lock held by the tab that records; a version must not change under it. */
  readonly recorderLock: string;
  readonly reload: () => void;
  readonly isOff: boolean;
  readonly onError: (error: unknown) => void;
}

export function createOfflineUpdates(parts: OfflineParts): UpdatePort {
  const { container } = parts;
  const state = live<ReturnType<UpdatePort['state']['get']>>(
    container ? (parts.isOff ? 'off' : 'starting') : 'unsupported',
  );
  let isAskedHere = false;
  const isRecording = async () => {
    const held = (await parts.locks?.query())?.held ?? [];
    return held.some((lock) => lock.name === parts.recorderLock);
  };
  const start = async () => {
    if (!container) return;
    const registration = await container.register('./sw.js', { scope: './', updateViaCache: 'none' });
    follow(registration, container, (next) => state.set(next));
    const look = () => void registration.update().catch(() => undefined);
    setInterval(look, LOOK_EVERY_MS);
    document.addEventListener('visibilitychange', () => {
      if (document.visibilityState === 'visible') look();
    });
  };
  container?.addEventListener('controllerchange', () => {
    if (isAskedHere) parts.reload();
  });
  if (container && !parts.isOff) start().catch(parts.onError);
  return {
    state,
    async take() {
      if (await isRecording()) return false;
      const waiting = (await container?.getRegistration())?.waiting;
      isAskedHere = true;
      if (waiting) waiting.postMessage({ type: 'SKIP_WAITING' });
      else parts.reload();
      return true;
    },
    async switchOff() {
      const registrations = (await container?.getRegistrations()) ?? [];
      await Promise.all(registrations.map((registration) => registration.unregister()));
      await Promise.all((await caches.keys()).map((name) => caches.delete(name)));
      state.set('off');
    },
    async switchOn() {
      state.set('starting');
      await start();
    },
  };
}

/** Ready when everything is kept for offline use; waiting when a newer version stands behind a working one. */
function follow(
  registration: ServiceWorkerRegistration,
  container: ServiceWorkerContainer,
  tell: (state: 'ready' | 'waiting') => void,
): void {
  const look = () => {
    if (registration.waiting && container.controller) tell('waiting');
    else if (registration.active?.state === 'activated') tell('ready');
  };
  const watch = (worker: ServiceWorker | null) => worker?.addEventListener('statechange', look);
  for (const worker of [registration.installing, registration.waiting, registration.active]) watch(worker);
  registration.addEventListener('updatefound', () => watch(registration.installing));
  look();
}
