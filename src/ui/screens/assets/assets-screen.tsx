/** Sites, assets and spots at a glance, and the way to add one. */
import { useState } from 'preact/hooks';
import type { App } from '../../../app/app.ts';
import { officeText } from '../../../text/office-screens.ts';
import { BottomBar } from '../../components/bottom-bar.tsx';
import { Button } from '../../components/button.tsx';
import { IconAdd } from '../../components/icons.tsx';
import { Page } from '../../components/page.tsx';
import { PlacementDrawing } from '../../components/placement-drawing.tsx';
import { useLoaded } from '../../use-loaded.ts';
import { AddPlaceDialog } from './add-place-dialog.tsx';
import { isEmptyTree, PlaceTreeRows } from './place-rows.tsx';

const text = officeText.places;

export function AssetsScreen({ app }: { readonly app: App }) {
  const tree = useLoaded(app.store, () => app.places.tree(), []);
  const [isAdding, setIsAdding] = useState(false);
  return (
    <Page title={text.title}>
      {tree && isEmptyTree(tree) && (
        <div class="stack">
          <PlacementDrawing kind="stair" />
          <p>{text.empty}</p>
          <p class="quiet">{text.emptyNote}</p>
        </div>
      )}
      {tree && <PlaceTreeRows app={app} tree={tree} />}
      <BottomBar>
        <Button kind="main" onClick={() => setIsAdding(true)}>
          <IconAdd />
          {text.addPlace}
        </Button>
      </BottomBar>
      {isAdding && (
        <AddPlaceDialog
          app={app}
          under={{}}
          onClose={() => setIsAdding(false)}
          onAdded={(route) => app.navigation.go(route)}
        />
      )}
    </Page>
  );
}
