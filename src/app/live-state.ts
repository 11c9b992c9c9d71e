/** One value that changes, and those who listen. All state that screens share is held in these. */
export interface Live<T> {
  get(): T;
  set(next: T): void;
  /** Calls back after each change; returns the way to stop. */
  subscribe(listener: (value: T) => void): () => void;
}

export function live<T>(initial: T): Live<T> {
  let value = initial;
  const listeners = new Set<(value: T) => void>();
  return {
    get: () => value,
    set(next) {
      if (Object.is(next, value)) return;
      value = next;
      for (const listener of [...listeners]) listener(value);
    },
    subscribe(listener) {
      listeners.add(listener);
      return () => listeners.delete(listener);
    },
  };
}
