/** The day of the office side (design: the job), at laptop size, without a network; and every screen under axe. */
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { axeFindings, showTheme } from '../support/axe-findings.ts';
import { launchBrowser, serveApp, type ServedApp, type TestBrowser } from '../support/browser.ts';
import { furnish, screenHashes, type Furnished } from '../support/furnish.ts';
import { walkTakeStates } from '../support/take-states.ts';

let app: ServedApp;
let browser: TestBrowser;
let ids: Furnished;

beforeAll(async () => {
  app = await serveApp();
  browser = await launchBrowser({ viewport: { width: 1280, height: 800 } });
  browser.page.setDefaultTimeout(10_000);
  ids = await furnish(browser.page, app.url);
  await browser.page.waitForFunction(() => navigator.serviceWorker.controller?.state === 'activated');
  await app.stop();
  await browser.context.setOffline(true);
});
afterAll(() => browser.close());

const heading = (name: string | RegExp) => browser.page.getByRole('heading', { level: 1, name });
const button = (name: string | RegExp) => browser.page.getByRole('button', { name });
const open = (hash: string) => browser.page.goto(`${app.url}${hash}`);

describe('the office: opens, compares, edits, undoes', () => {
  it('opens a reading by its address, with the others beside it', async () => {
    await open(`#/reading/${ids.reading}`);
    await heading(/Rings at 7\.0/).waitFor();
    const beside = browser.page.getByRole('navigation', { name: 'Readings' });
    expect(await beside.getByRole('link', { name: /Hz/ }).count()).toBe(4);
    await beside
      .getByRole('link', { name: /7\.400/ })
      .last()
      .click();
    await heading(/Rings at 7\.[34]/).waitFor();
    await browser.page.goBack();
    await heading(/Rings at 7\.0/).waitFor();
  });

  it('compares the first visit with the last: the frequency fell', async () => {
    const { page } = browser;
    await open('#/readings');
    await button('Select').click();
    const rows = page.getByRole('checkbox', { name: /^Select Quay stair/ });
    await rows.first().check();
    await rows.last().check();
    await page.getByText('2 selected').waitFor();
    await button('Compare').click();
    await heading('Two readings compared').waitFor();
    await page.getByText(/Frequency of the strongest mode: 4\.7 % lower/).waitFor();
    await page.getByText('Indicative survey, not a certified measurement').waitFor();
  });

  it('puts many in the trash at once and takes them back', async () => {
    const { page } = browser;
    await open('#/readings');
    await button('Select').click();
    await page.getByRole('checkbox', { name: 'Select all' }).check();
    await button('Move to trash').click();
    await page.getByText('4 readings moved to the trash.').waitFor();
    await page.getByText('Nothing here.').waitFor();
    await button('Undo').click();
    await page
      .getByRole('link', { name: /Quay stair/ })
      .first()
      .waitFor();
    expect(await page.getByRole('main').getByRole('link', { name: /Hz/ }).count()).toBe(4);
  });

  it('renames a spot, and undoes it', async () => {
    const { page } = browser;
    await open(`#/spot/${ids.spot}`);
    await heading('Upper rail, mid-span').waitFor();
    await button('Edit').click();
    await page.getByLabel('Name').fill('Upper rail, third post');
    await button('Save').click();
    await heading('Upper rail, third post').waitFor();
    await button('Undo').click();
    await heading('Upper rail, mid-span').waitFor();
  });

  it('keeps a photo of the spot, and takes its removal back', async () => {
    const { page } = browser;
    await open(`#/spot/${ids.spot}`);
    const choosing = page.waitForEvent('filechooser');
    await button('Add a photo').click();
    const picture = await page.screenshot();
    await (await choosing).setFiles({ name: 'rail.png', mimeType: 'image/png', buffer: picture });
    const photo = page.getByRole('img', { name: 'Photo 1 of the spot' });
    await photo.waitFor();
    await button('Move to trash: Photo 1 of the spot').click();
    await photo.waitFor({ state: 'detached' });
    await button('Undo').click();
    await photo.waitFor();
  });

  it('does all of it with the keyboard', async () => {
    const { page } = browser;
    await open('#/readings');
    await page.getByRole('searchbox').focus();
    await page.keyboard.type('upper rail');
    await page.getByRole('main').getByRole('link', { name: /7\.0/ }).focus();
    await page.keyboard.press('Enter');
    await heading(/Rings at 7\.0/).waitFor();
    expect(browser.faults).toEqual([]);
  });
});

describe('text at 200 % on a phone', () => {
  it('is never cut off at the side', async () => {
    const { page } = browser;
    const devtools = await page.context().newCDPSession(page);
    await page.setViewportSize({ width: 360, height: 740 });
    await devtools.send('Page.setFontSizes', { fontSizes: { standard: 32, fixed: 26 } });
    const tooWide: string[] = [];
    for (const [name, hash] of Object.entries(screenHashes)) {
      await open(hash(ids));
      await page.getByRole('heading', { level: 1 }).first().waitFor();
      await page.waitForTimeout(50);
      const surplusPx = await page.evaluate(
        () => document.documentElement.scrollWidth - document.documentElement.clientWidth,
      );
      if (surplusPx > 0) tooWide.push(`${name}: ${surplusPx} px`);
    }
    await devtools.send('Page.setFontSizes', { fontSizes: { standard: 16, fixed: 13 } });
    await page.setViewportSize({ width: 1280, height: 800 });
    expect(tooWide).toEqual([]);
  });
});

describe('every screen under axe', () => {
  /** Where the other themes are looked at too; `npm run soak -- themes` does all of them, the tokens have a test of their own. */
  const THEMED = ['start', 'reading', 'readings', 'asset', 'source', 'phone'];

  it('the states of taking a reading', async () => {
    const found: string[] = [];
    await browser.page.setViewportSize({ width: 360, height: 740 });
    await walkTakeStates(browser.page, app.url, async (state) => {
      found.push(...(await axeFindings(browser.page)).map((finding) => `${state}: ${finding}`));
    });
    await browser.page.setViewportSize({ width: 1280, height: 800 });
    expect(found).toEqual([]);
  }, 90_000);

  it.each(Object.keys(screenHashes))('%s', async (name) => {
    const { page } = browser;
    await open(screenHashes[name as keyof typeof screenHashes](ids));
    await page.getByRole('heading', { level: 1 }).first().waitFor();
    if (name === 'reading') await page.getByRole('img', { name: /Ring-down \d/ }).waitFor();
    else await page.waitForTimeout(100);
    expect(await axeFindings(page)).toEqual([]);
    for (const theme of THEMED.includes(name) ? ['dark', 'sunlight'] : []) {
      await showTheme(page, theme);
      expect(await axeFindings(page, ['color-contrast'])).toEqual([]);
    }
  });
});
