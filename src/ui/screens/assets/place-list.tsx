import type { App } from '../../../app/app.ts';
import { screenText } from '../../../text/screens.ts';
import { useLoaded } from '../../use-loaded.ts';
import { PlaceTreeRows } from './place-rows.tsx';

/** Everything that has a place, beside the open one, on a laptop. */
export function PlaceList({ app, current }: { readonly app: App; readonly current?: string }) {
  const tree = useLoaded(app.store, () => app.places.tree(), []);
  return (
    <nav class="stack stack-loose" aria-label={screenText.tabs.assets}>
      {tree && <PlaceTreeRows app={app} tree={tree} {...(current ? { current } : {})} />}
    </nav>
  );
}
