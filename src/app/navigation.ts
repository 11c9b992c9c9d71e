/** The hash and the history of the browser as one live route. The back button does what people expect: every screen is an entry. */
import { live, type Live } from './live-state.ts';
import { parseRoute, routeHash, type Route } from './route.ts';

export interface Navigation {
  readonly route: Live<Route>;
  href(route: Route): string;
  go(route: Route): void;
  /** Takes the place of the present entry: the way back then skips it. */
  replace(route: Route): void;
  /** One entry back inside the app, else to the fallback (a deep link has nothing behind it). */
  back(fallback: Route): void;
}

interface Entry {
  readonly depth: number;
}
const depthOf = (state: unknown): number | undefined =>
  typeof state === 'object' && state !== null && 'depth' in state ? (state as Entry).depth : undefined;

export function createNavigation(page: Window): Navigation {
  const route = live<Route>(parseRoute(page.location.hash));
  let depth = depthOf(page.history.state) ?? 0;
  const show = () => route.set(parseRoute(page.location.hash));
  page.history.replaceState({ depth }, '');
  page.addEventListener('popstate', () => {
    const known = depthOf(page.history.state);
    depth = known ?? depth + 1;
    if (known === undefined) page.history.replaceState({ depth }, '');
    show();
  });
  return {
    route,
    href: routeHash,
    go(next) {
      if (routeHash(next) === page.location.hash) return;
      depth += 1;
      page.history.pushState({ depth }, '', routeHash(next));
      show();
    },
    replace(next) {
      page.history.replaceState({ depth }, '', routeHash(next));
      show();
    },
    back(fallback) {
      if (depth > 0) page.history.back();
      else this.replace(fallback);
    },
  };
}
