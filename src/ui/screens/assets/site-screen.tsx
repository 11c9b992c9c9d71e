import { useState } from 'preact/hooks';
import type { App } from '../../../app/app.ts';
import { officeText } from '../../../text/office-screens.ts';
import { screenText } from '../../../text/screens.ts';
import { BottomBar } from '../../components/bottom-bar.tsx';
import { Button } from '../../components/button.tsx';
import { IconAdd } from '../../components/icons.tsx';
import { Page } from '../../components/page.tsx';
import { useLoaded } from '../../use-loaded.ts';
import { LostScreen } from '../lost-screen.tsx';
import { SourceRows } from '../sources/sources-screen.tsx';
import { AddPlaceDialog } from './add-place-dialog.tsx';
import { EditPlaceDialog } from './edit-place-dialog.tsx';
import { AssetRows } from './place-rows.tsx';

const text = officeText.places;

/** A site: its assets and what shakes them all. */
export function SiteScreen({ app, id }: { readonly app: App; readonly id: string }) {
  const loaded = useLoaded(
    app.store,
    async () => {
      const tree = await app.places.tree();
      const sources = (await app.sources.list()).filter((entry) => entry.site === id && !entry.asset);
      return { site: tree.sites.find((entry) => entry.id === id), sources };
    },
    [id],
  );
  const [open, setOpen] = useState<'add' | 'edit'>();
  if (!loaded) return null;
  const { site, sources } = loaded;
  if (!site) return <LostScreen app={app} />;
  const back = () => app.navigation.back({ screen: 'assets' });
  return (
    <Page
      over={text.kinds.site.name}
      title={site.name || screenText.common.unnamed}
      back={{ label: screenText.common.back, onClick: back }}
      aside={
        <Button kind="quiet" onClick={() => setOpen('edit')}>
          {screenText.common.edit}
        </Button>
      }
    >
      <section class="stack">
        <h2>{text.assets}</h2>
        {site.assets.length > 0 ? (
          <AssetRows app={app} assets={site.assets} label={text.assets} />
        ) : (
          <p class="quiet">{text.noAssets}</p>
        )}
      </section>
      {sources.length > 0 && (
        <section class="stack">
          <h2>{text.siteSources}</h2>
          <SourceRows app={app} sources={sources} />
        </section>
      )}
      <BottomBar>
        <Button kind="main" onClick={() => setOpen('add')}>
          <IconAdd />
          {text.addKind.asset}
        </Button>
      </BottomBar>
      {open === 'add' && (
        <AddPlaceDialog
          app={app}
          under={{ site: id }}
          onClose={() => setOpen(undefined)}
          onAdded={(route) => app.navigation.go(route)}
        />
      )}
      {open === 'edit' && (
        <EditPlaceDialog app={app} entity={site.entity} onClose={() => setOpen(undefined)} onTrashed={back} />
      )}
    </Page>
  );
}
