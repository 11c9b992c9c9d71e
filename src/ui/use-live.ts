import { useEffect, useState } from 'preact/hooks';
import type { Live } from '../app/live-state.ts';

/** The present value of a live state; the component draws again when it changes. */
export function useLive<T>(state: Live<T>): T {
  const [value, setValue] = useState(state.get());
  useEffect(() => {
    setValue(() => state.get());
    return state.subscribe((next) => setValue(() => next));
  }, [state]);
  return value;
}
