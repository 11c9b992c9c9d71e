import type { Live } from './live-state.ts';

/** The service worker as the app sees it: works offline or not, and whether a newer version waits for the person. */
export interface UpdatePort {
  readonly state: Live<'none' | 'starting' | 'ready' | 'waiting' | 'off' | 'unsupported'>;
  /** Takes the waiting version, unless a recording runs in any tab. Resolves to false when one does. */
  take(): Promise<boolean>;
  /** Removes the worker and its cache: the app then needs the network to start. Kept readings are untouched. */
  switchOff(): Promise<void>;
  switchOn(): Promise<void>;
}
