/**
 * Pictures of every screen at three sizes and three themes, into look/: `npm run look [-- name]`.
 * Needs the built app (`npm run build`). Everything shown was made on the practice rig, in an invented place.
 */
import { mkdirSync } from 'node:fs';
import { showTheme } from '../support/axe-findings.ts';
import { launchBrowser, serveApp } from '../support/browser.ts';
import { furnish, screenHashes } from '../support/furnish.ts';
import { walkTakeStates } from '../support/take-states.ts';

const SIZES = [
  { width: 360, height: 740 },
  { width: 412, height: 915 },
  { width: 1280, height: 800 },
] as const;
const THEMES = ['light', 'dark', 'sunlight'] as const;
const FOLDER = 'look';

const wanted = process.argv[2];
const started = Date.now();
const app = await serveApp();
const browser = await launchBrowser({ viewport: SIZES[0] });
const { page } = browser;
mkdirSync(FOLDER, { recursive: true });

const shoot = async (name: string, theme: string, width: number, whole: boolean) => {
  await page.waitForTimeout(120);
  await page.screenshot({ path: `${FOLDER}/${name}-${width}-${theme}.png`, fullPage: whole });
};

let count = 0;
const inThemes = (width: number) => async (name: string) => {
  if (wanted && !name.includes(wanted)) return;
  for (const theme of THEMES) {
    await showTheme(page, theme);
    await shoot(name, theme, width, false);
    count += 1;
  }
};
for (const size of SIZES) {
  await page.setViewportSize(size);
  if (!wanted || wanted.startsWith('take')) await walkTakeStates(page, app.url, inThemes(size.width));
}
await page.setViewportSize(SIZES[0]);
const ids = await furnish(page, app.url, inThemes(SIZES[0].width));
for (const [name, hash] of Object.entries(screenHashes)) {
  if (wanted && !name.includes(wanted)) continue;
  for (const size of SIZES) {
    await page.setViewportSize(size);
    await page.goto(`${app.url}${hash(ids)}`);
    await page.getByRole('heading', { level: 1 }).first().waitFor();
    await page.waitForTimeout(name === 'reading' ? 900 : 250);
    await inThemes(size.width)(name);
  }
}
process.stdout.write(
  `${count} pictures in ${FOLDER}/, ${Math.round((Date.now() - started) / 1000)} s; faults: ${browser.faults.length}\n`,
);
for (const fault of browser.faults) process.stdout.write(`${fault}\n`);
await browser.close();
await app.stop();
