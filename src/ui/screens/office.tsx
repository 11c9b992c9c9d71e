/** Screens that are not needed before the first reading: one part of the program, loaded when first opened. */
import type { App } from '../../app/app.ts';
import type { Route } from '../../app/route.ts';
import type { ListName } from '../list-name.ts';
import { Later } from '../later.tsx';
import { AssetScreen } from './assets/asset-screen.tsx';
import { AssetsScreen } from './assets/assets-screen.tsx';
import { CompareScreen } from './assets/compare-screen.tsx';
import { PlaceList } from './assets/place-list.tsx';
import { SeriesScreen } from './assets/series-screen.tsx';
import { SiteScreen } from './assets/site-screen.tsx';
import { SpotScreen } from './assets/spot-screen.tsx';
import { LostScreen } from './lost-screen.tsx';
import { PaceScreen } from './pace/pace-screen.tsx';
import { PhoneScreen } from './phone/phone-screen.tsx';
import { ReadingsScreen } from './readings/readings-screen.tsx';
import { ReadingsColumn } from './readings/readings-column.tsx';
import { SourceScreen } from './sources/source-screen.tsx';
import { SourceList, SourcesScreen } from './sources/sources-screen.tsx';

export function OfficeScreen({ app, route }: { readonly app: App; readonly route: Route }) {
  switch (route.screen) {
    case 'readings':
      return <ReadingsScreen app={app} trashed={route.trashed ?? false} />;
    case 'compare':
      return <CompareScreen app={app} first={route.first} second={route.second} />;
    case 'assets':
      return <AssetsScreen app={app} />;
    case 'site':
      return <SiteScreen app={app} id={route.id} />;
    case 'asset':
      return <AssetScreen app={app} id={route.id} />;
    case 'spot':
      return <SpotScreen app={app} id={route.id} />;
    case 'series':
      return <SeriesScreen app={app} id={route.id} />;
    case 'sources':
      return <SourcesScreen app={app} />;
    case 'source':
      return <SourceScreen app={app} route={route} />;
    case 'hand-over':
      return (
        <Later load={() => import('./hand-over/hand-over-screen.tsx')}>
          {({ HandOverScreen }) => (
            <HandOverScreen app={app} {...(route.reading ? { reading: route.reading } : {})} />
          )}
        </Later>
      );
    case 'phone':
      return <PhoneScreen app={app} {...(route.part ? { part: route.part } : {})} />;
    case 'pace':
      return <PaceScreen app={app} {...(route.frequencyHz ? { frequencyHz: route.frequencyHz } : {})} />;
    default:
      return <LostScreen app={app} />;
  }
}

/** The list beside the detail on a laptop. */
export function OfficeList(props: { readonly app: App; readonly route: Route; readonly list: ListName }) {
  const { app, route, list } = props;
  const current = 'id' in route ? route.id : undefined;
  const shown = current ? { current } : {};
  if (list === 'readings') return <ReadingsColumn app={app} {...shown} />;
  if (list === 'places') return <PlaceList app={app} {...shown} />;
  return <SourceList app={app} {...shown} />;
}
