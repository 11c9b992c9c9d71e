/** `npm run soak -- themes`: every screen and state under every axe rule, in three themes, on a phone and a laptop. */
import { axeFindings, showTheme } from '../support/axe-findings.ts';
import { launchBrowser, serveApp } from '../support/browser.ts';
import { furnish, screenHashes } from '../support/furnish.ts';
import { walkTakeStates } from '../support/take-states.ts';

const SIZES = [
  { width: 360, height: 740 },
  { width: 1280, height: 800 },
] as const;
const THEMES = ['light', 'dark', 'sunlight'] as const;

const app = await serveApp();
const browser = await launchBrowser({ viewport: SIZES[0] });
const { page } = browser;
let lookCount = 0;
let findingCount = 0;

async function look(name: string): Promise<void> {
  for (const theme of THEMES) {
    await showTheme(page, theme);
    const findings = await axeFindings(page);
    lookCount += 1;
    findingCount += findings.length;
    for (const finding of findings) console.log(`FAIL ${name} ${theme}: ${finding}`);
  }
}

await walkTakeStates(page, app.url, look);
const ids = await furnish(page, app.url, look);
for (const size of SIZES) {
  await page.setViewportSize(size);
  for (const [name, hash] of Object.entries(screenHashes)) {
    await page.goto(`${app.url}${hash(ids)}`);
    await page.getByRole('heading', { level: 1 }).first().waitFor();
    await page.waitForTimeout(name === 'reading' ? 800 : 200);
    await look(`${name} ${size.width}`);
  }
}
console.log(`${findingCount === 0 ? 'ok  ' : 'FAIL'} themes ${JSON.stringify({ lookCount, findingCount })}`);
if (findingCount > 0) process.exitCode = 1;
await browser.close();
await app.stop();
