import type { ComponentChildren } from 'preact';
import { useEffect, useState } from 'preact/hooks';
import { screenText } from '../text/screens.ts';

/** Shows a part of the program that is loaded when first needed; everything is precached, so this also works offline. */
export function Later<M>(props: {
  readonly load: () => Promise<M>;
  readonly children: (module: M) => ComponentChildren;
}) {
  const [state, setState] = useState<{ module?: M; error?: unknown }>({});
  useEffect(() => {
    let isCurrent = true;
    props.load().then(
      (module) => isCurrent && setState({ module }),
      (error: unknown) => isCurrent && setState({ error }),
    );
    return () => {
      isCurrent = false;
    };
  }, []);
  if (state.error !== undefined) throw state.error;
  return (
    <>{state.module ? props.children(state.module) : <p class="quiet">{screenText.common.loading}</p>}</>
  );
}
