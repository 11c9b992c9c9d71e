import { useEffect, useState } from 'preact/hooks';
import type { StorePort } from '../app/ports.ts';

/** Loads again whenever the facts change; undefined while the first load runs. A failed load throws into the screen's boundary. */
export function useLoaded<T>(
  store: Pick<StorePort, 'onChange'>,
  load: () => Promise<T>,
  keys: readonly unknown[],
): T | undefined {
  const [state, setState] = useState<{ value?: T; error?: unknown }>({});
  useEffect(() => {
    let isCurrent = true;
    const run = () => {
      load().then(
        (value) => isCurrent && setState({ value }),
        (error: unknown) => isCurrent && setState({ error }),
      );
    };
    run();
    const stop = store.onChange((what) => {
      if (what === 'facts') run();
    });
    return () => {
      isCurrent = false;
      stop();
    };
  }, [store, ...keys]);
  if (state.error !== undefined) throw state.error;
  return state.value;
}
