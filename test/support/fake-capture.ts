import type { CapturePort, SessionOptions, SessionState } from '../../src/app/ports.ts';
import { failure } from '../../src/core/model/outcome.ts';

/** A capture whose states the test tells; what was asked of it is kept. */
export function fakeCapture(): CapturePort & {
  readonly asked: string[];
  readonly opened: SessionOptions[];
  tell(state: SessionState): void;
} {
  const listeners = new Set<(state: SessionState) => void>();
  const asked: string[] = [];
  const opened: SessionOptions[] = [];
  let state: SessionState = { phase: 'idle' };
  return {
    support: 'likely',
    keepsScreenOn: true,
    get state() {
      return state;
    },
    subscribe(listener) {
      listeners.add(listener);
      return () => listeners.delete(listener);
    },
    open(options) {
      opened.push(options);
      return Promise.resolve();
    },
    check: () => Promise.resolve(failure('no-samples')),
    start: () => void asked.push('start'),
    finish: () => void asked.push('finish'),
    cancel: () => void asked.push('cancel'),
    live: () => undefined,
    asked,
    opened,
    tell(next) {
      state = next;
      for (const listener of listeners) listener(next);
    },
  };
}
