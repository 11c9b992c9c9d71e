import type { Theme } from '../app/settings.ts';

const KEY = 'theme';

/** Sets the theme on the root, and remembers it where the next start can read it before the first paint. */
export function applyTheme(theme: Theme, systemIsDark: boolean): void {
  const shown = theme === 'auto' ? (systemIsDark ? 'dark' : 'light') : theme;
  document.documentElement.dataset.theme = shown;
  const paper = getComputedStyle(document.documentElement).getPropertyValue('--paper').trim();
  document.querySelector('meta[name="theme-color"]')?.setAttribute('content', paper);
  try {
    localStorage.setItem(KEY, shown);
  } catch {
    // Storage may be closed to us (private mode): the theme then comes a moment later.
  }
}

/** Before the store is open: the theme of the last time, else that of the system. */
export function applyRememberedTheme(): void {
  let kept: string | null = null;
  try {
    kept = localStorage.getItem(KEY);
  } catch {
    // As above.
  }
  const isDark = matchMedia('(prefers-color-scheme: dark)').matches;
  document.documentElement.dataset.theme =
    kept === 'light' || kept === 'dark' || kept === 'sunlight' ? kept : isDark ? 'dark' : 'light';
}
