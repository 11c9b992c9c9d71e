/** Route to screen. What is not needed before the first reading is loaded when it is first opened. */
import type { ComponentChildren } from 'preact';
import { useEffect } from 'preact/hooks';
import type { App } from '../app/app.ts';
import type { Route } from '../app/route.ts';
import type { Theme } from '../app/settings.ts';
import { Boundary } from './boundary.tsx';
import { Later } from './later.tsx';
import type { ListName } from './list-name.ts';
import { LostScreen } from './screens/lost-screen.tsx';
import { StartScreen } from './screens/start/start-screen.tsx';
import { TakeScreen } from './screens/take/take-screen.tsx';
import { Shell } from './shell.tsx';
import { applyTheme } from './theme.ts';
import { useLive } from './use-live.ts';
import { useMedia } from './use-media.ts';
import { useScreenTitle } from './use-screen-title.ts';

const office = () => import('./screens/office.tsx');
const readingScreen = () => import('./screens/reading/reading-screen.tsx');

export function Root({ app }: { readonly app: App }) {
  const route = useLive(app.navigation.route);
  const { theme } = useLive(app.settings);
  useTheme(theme);
  useScreenTitle(route);
  useEffect(() => scrollTo(0, 0), [app.navigation.href(route)]);
  const isWide = useMedia('(min-width: 900px)');
  const list = isWide ? listFor(app, route) : undefined;
  return (
    <Shell app={app} route={route} bare={route.screen === 'take'} {...(list ? { list } : {})}>
      <Boundary key={app.navigation.href(route)} onError={app.noteError}>
        <Screen app={app} route={route} />
      </Boundary>
    </Shell>
  );
}

function Screen({ app, route }: { readonly app: App; readonly route: Route }) {
  switch (route.screen) {
    case 'start':
      return <StartScreen app={app} />;
    case 'take':
      return <TakeScreen app={app} route={route} />;
    case 'reading':
      return (
        <Later load={readingScreen}>{({ ReadingScreen }) => <ReadingScreen id={route.id} app={app} />}</Later>
      );
    case 'lost':
      return <LostScreen app={app} />;
    default:
      return <Later load={office}>{({ OfficeScreen }) => <OfficeScreen app={app} route={route} />}</Later>;
  }
}

/** The column beside the detail, on screens where one picks from a list. */
function listFor(app: App, route: Route): ComponentChildren {
  const list = LISTS[route.screen];
  if (!list) return undefined;
  return (
    <Later key={list} load={office}>
      {({ OfficeList }) => <OfficeList app={app} route={route} list={list} />}
    </Later>
  );
}

const LISTS: Partial<Record<Route['screen'], ListName>> = {
  reading: 'readings',
  site: 'places',
  asset: 'places',
  spot: 'places',
  source: 'sources',
};

function useTheme(theme: Theme): void {
  const systemIsDark = useMedia('(prefers-color-scheme: dark)');
  useEffect(() => applyTheme(theme, systemIsDark), [theme, systemIsDark]);
}
