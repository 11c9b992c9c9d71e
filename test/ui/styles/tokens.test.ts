import { readFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';

const css = readFileSync(new URL('../../../src/ui/styles/tokens.css', import.meta.url), 'utf8');

/** WCAG 2.2: text 4.5:1 (1.4.3), graphics and borders of controls 3:1 (1.4.11). */
const TEXT_RATIO = 4.5;
const GRAPHIC_RATIO = 3;
/** The sunlight theme is for glare: our own choice, the enhanced level of WCAG 1.4.6. */
const SUNLIGHT_TEXT_RATIO = 7;

const THEMES = ['light', 'dark', 'sunlight'] as const;
const GROUNDS = ['--paper', '--surface', '--surface-sunk'];
const TEXTS = [
  '--text',
  '--text-quiet',
  '--accent',
  '--verdict-coincident',
  '--verdict-close',
  '--verdict-apart',
  '--verdict-undecided',
  '--verdict-blind',
  '--chart-mode',
  '--chart-source',
];
const GRAPHICS = [
  '--edge-strong',
  '--focus',
  '--chart-fit',
  '--chart-residual',
  '--chart-hatch',
  '--chart-x',
  '--chart-y',
  '--chart-z',
];

/** Colours of one theme, as written in tokens.css. */
function tokensOf(theme: string): ReadonlyMap<string, string> {
  const block = new RegExp(`\\[data-theme='${theme}'\\]\\s*\\{([^}]*)\\}`).exec(css)?.[1] ?? '';
  return new Map([...block.matchAll(/(--[\w-]+):\s*(#[0-9a-f]{6})/g)].map(([, name, hex]) => [name!, hex!]));
}

/** Relative luminance of an sRGB colour, WCAG 2.2 definition. */
function luminance(hex: string): number {
  const [r, g, b] = [1, 3, 5]
    .map((at) => Number.parseInt(hex.slice(at, at + 2), 16) / 255)
    .map((v) => (v <= 0.04045 ? v / 12.92 : ((v + 0.055) / 1.055) ** 2.4));
  return 0.2126 * r! + 0.7152 * g! + 0.0722 * b!;
}

function contrast(a: string, b: string): number {
  const [low, high] = [luminance(a), luminance(b)].sort((x, y) => x - y);
  return (high! + 0.05) / (low! + 0.05);
}

describe('contrast of two colours', () => {
  it('is 21 for black on white and 4.54 for #767676 on white (WCAG 2.2, understanding 1.4.3)', () => {
    expect(contrast('#000000', '#ffffff')).toBeCloseTo(21, 6);
    expect(contrast('#767676', '#ffffff')).toBeCloseTo(4.54, 2);
  });
});

describe.each(THEMES)('theme %s', (theme) => {
  const tokens = tokensOf(theme);
  const ratio = (name: string, ground: string) => contrast(tokens.get(name) ?? '', tokens.get(ground) ?? '');
  const wanted = theme === 'sunlight' ? SUNLIGHT_TEXT_RATIO : TEXT_RATIO;

  it('has the same tokens as the others', () => {
    expect([...tokens.keys()].sort()).toEqual([...tokensOf('light').keys()].sort());
  });

  it.each(TEXTS)('%s can be read on every ground', (name) => {
    for (const ground of GROUNDS) expect(ratio(name, ground)).toBeGreaterThanOrEqual(wanted);
  });

  it.each(GRAPHICS)('%s can be seen on paper and surface', (name) => {
    for (const ground of ['--paper', '--surface'])
      expect(ratio(name, ground)).toBeGreaterThanOrEqual(GRAPHIC_RATIO);
  });

  it('keeps what stands on ink and accent readable', () => {
    expect(ratio('--on-accent', '--accent')).toBeGreaterThanOrEqual(wanted);
    expect(ratio('--paper', '--text')).toBeGreaterThanOrEqual(wanted);
    expect(ratio('--text', '--chart-mode-soft')).toBeGreaterThanOrEqual(TEXT_RATIO);
  });
});

describe('tokens', () => {
  it('are few enough to know', () => {
    expect(tokensOf('light').size).toBeLessThanOrEqual(45);
  });
});
