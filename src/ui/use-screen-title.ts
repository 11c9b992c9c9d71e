import { useEffect } from 'preact/hooks';
import type { Route } from '../app/route.ts';
import { screenText } from '../text/screens.ts';

/** The title of the window follows the screen, so that tabs and histories can be told apart. */
export function useScreenTitle(route: Route): void {
  useEffect(() => {
    const name = screenText.titles[route.screen];
    document.title = name ? `${name} · ${screenText.appName}` : screenText.appName;
  }, [route.screen]);
}
