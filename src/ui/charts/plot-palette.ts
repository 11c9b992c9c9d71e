import type { ColourToken } from './plot-spec.ts';

export interface PlotPalette {
  colour(token: ColourToken): string;
  readonly font: string;
  readonly textPx: number;
}

/** Colours and letters as the theme has them now; forced colours win over the theme. */
export function plotPalette(element: HTMLElement): PlotPalette {
  const style = getComputedStyle(element);
  const isForced = matchMedia('(forced-colors: active)').matches;
  const textPx = Number.parseFloat(style.fontSize);
  return {
    colour: (token) => (isForced ? style.color : style.getPropertyValue(token).trim() || style.color),
    font: `${textPx}px ${style.fontFamily}`,
    textPx,
  };
}

/** Calls back when the theme changes, by choice or by the system. Returns the way to stop. */
export function onThemeChange(listener: () => void): () => void {
  const observer = new MutationObserver(listener);
  observer.observe(document.documentElement, { attributes: true, attributeFilter: ['data-theme', 'class'] });
  const queries = ['(prefers-color-scheme: dark)', '(forced-colors: active)'].map((query) =>
    matchMedia(query),
  );
  for (const query of queries) query.addEventListener('change', listener);
  return () => {
    observer.disconnect();
    for (const query of queries) query.removeEventListener('change', listener);
  };
}
