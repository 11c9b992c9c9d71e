import { AxeBuilder } from '@axe-core/playwright';
import type { Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { servedPreview, type ServedPreview } from '../preview/build-preview.ts';
import { launchBrowser, type TestBrowser } from '../support/browser.ts';
import { READING_EXAMPLES } from '../support/reading-examples.ts';

let preview: ServedPreview;
let browser: TestBrowser;
let page: Page;

beforeAll(async () => {
  [preview, browser] = await Promise.all([servedPreview('reading'), launchBrowser()]);
  page = browser.page;
});
afterAll(async () => {
  await browser.close();
  await preview.close();
});

const PHONE = { width: 360, height: 740 };
const LAPTOP = { width: 1280, height: 800 };

async function open(example: string, theme = 'light', size = PHONE): Promise<void> {
  await page.setViewportSize(size);
  await page.goto(`${preview.url}?example=${encodeURIComponent(example)}&theme=${theme}`);
  await page.getByRole('heading', { level: 1 }).waitFor();
}
const openWithPlots = async (example: string, theme?: string, size?: typeof PHONE) => {
  await open(example, theme, size);
  await page.locator('.u-over').first().waitFor();
};
const ladder = () => page.getByRole('img', { name: /Ladder of frequencies/ });
const numbersOnRails = () => ladder().locator('.ladder-number').allTextContents();
const asked = () =>
  page.evaluate(() => (window as unknown as { asked: { what: string; with: unknown }[] }).asked);

/** Contrast takes axe longest and is the same in every state of a theme: asked for once a theme. */
const findings = async (withContrast: boolean) => {
  const axe = new AxeBuilder({ page }).setLegacyMode().exclude('.ladder-drawing > *');
  const { violations } = await (withContrast ? axe : axe.disableRules('color-contrast')).analyze();
  return violations.map((one) => `${one.id}: ${one.nodes.map((node) => node.target.join(' ')).join(', ')}`);
};

describe('the reading screen', () => {
  it('says first what rings and what drives it, then shows the ladder, then the numbers', async () => {
    await open('stair');
    const first = await page.getByRole('heading', { level: 1 }).textContent();
    expect(first?.replaceAll('\u00a0', ' ')).toMatch(/^Rings at 7\.42\d* Hz ± .*, damping 1\.1\d* % ±/);
    await ladder().waitFor();
    const order = await page.evaluate(() =>
      ['h1', '[class*=lead]', 'svg[role=img]', 'dl[class*=grid]'].map(
        (selector) => document.querySelector(selector)!.getBoundingClientRect().top,
      ),
    );
    expect([...order].sort((a, b) => a - b)).toEqual(order);
    expect(await page.getByText('Indicative survey, not a certified measurement.').count()).toBe(1);
    expect(await page.getByText('half-width of a 95 % interval').count()).toBe(1);
  });

  it('shows the pair of a mark that is tapped, with ratio and amplification', async () => {
    await open('stair');
    await page.getByText('walking 3rd', { exact: true }).click();
    const card = page.getByRole('region', { name: 'Ladder' });
    expect(await card.getByText(/The third harmonic of walking against the mode at 7.42 Hz/).count()).toBe(1);
    expect(await card.locator('dt').allTextContents()).toEqual(['ratio', 'a steady force amplified']);
    expect(await card.getByRole('link', { name: /pace/ }).getAttribute('href')).toMatch(/^#\/pace\?hz=7\.42/);
    expect(await card.locator('dd').nth(1).textContent()).toMatch(/^[\d.]+ to [\d.]+ times$/);
  });

  it('zooms by wheel once in use, by buttons, by pinch; the page keeps its own wheel', async () => {
    await open('stair', 'light', LAPTOP);
    const whole = await numbersOnRails();
    await ladder().hover({ position: { x: 150, y: 200 } });
    await page.mouse.wheel(0, -300);
    await page.waitForTimeout(150);
    expect(await numbersOnRails()).toEqual(whole);
    await page.evaluate(() => scrollTo(0, 0));
    await ladder().click({ position: { x: 150, y: 200 } });
    await page.mouse.wheel(0, -300);
    await expect.poll(numbersOnRails).not.toEqual(whole);
    await page.getByRole('button', { name: 'Whole range: Ladder' }).click();
    await expect.poll(numbersOnRails).toEqual(whole);
    await page.getByRole('button', { name: 'Closer: Ladder' }).click();
    await expect.poll(numbersOnRails).not.toEqual(whole);
  });

  it('zooms with two fingers, and drags with one when zoomed', async () => {
    await open('stair');
    await ladder().scrollIntoViewIfNeeded();
    const whole = await numbersOnRails();
    const box = (await ladder().boundingBox())!;
    const session = await browser.context.newCDPSession(page);
    const x = box.x + 140;
    const y = box.y + 200;
    const touch = (type: 'touchStart' | 'touchMove' | 'touchEnd', points: readonly number[]) =>
      session.send('Input.dispatchTouchEvent', {
        type,
        touchPoints: points.map((at, id) => ({ x, y: at, id })),
      });
    await touch('touchStart', [y - 40, y + 40]);
    for (const spread of [55, 70, 85, 100]) await touch('touchMove', [y - spread, y + spread]);
    await touch('touchEnd', []);
    await expect.poll(numbersOnRails).not.toEqual(whole);
    const zoomed = await ladder()
      .locator('.ladder-number')
      .evaluateAll((all) => all.map((n) => n.getAttribute('y')));
    await touch('touchStart', [y]);
    for (const move of [15, 30, 45, 60]) await touch('touchMove', [y + move]);
    await touch('touchEnd', []);
    await expect
      .poll(() =>
        ladder()
          .locator('.ladder-number')
          .evaluateAll((all) => all.map((n) => n.getAttribute('y'))),
      )
      .not.toEqual(zoomed);
    await session.detach();
  });

  it('is picked and zoomed by keyboard alone, and says what is picked', async () => {
    await open('stair', 'light', LAPTOP);
    const group = page.getByRole('group', { name: /^Ladder\./ });
    await group.focus();
    const whole = await numbersOnRails();
    const card = page.getByRole('region', { name: 'Ladder' }).locator('[aria-live]');
    const before = await card.textContent();
    await page.keyboard.press('ArrowUp');
    await expect.poll(() => card.textContent()).not.toBe(before);
    await page.keyboard.press('+');
    await expect.poll(numbersOnRails).not.toEqual(whole);
    await page.keyboard.press('0');
    await expect.poll(numbersOnRails).toEqual(whole);
    await page.keyboard.press('Escape');
    await expect.poll(() => card.textContent()).toContain('Tap a mark');
  });

  it('moves the ladder at once when a change is tried, and says what came of it', async () => {
    await open('stair');
    await page.getByRole('button', { name: /^The third harmonic of walking/ }).click();
    await page.getByRole('button', { name: 'Try a change' }).click();
    const tryPanel = page.getByRole('group', { name: 'Try a change' });
    expect(await tryPanel.getByText('Coincident.').count()).toBeGreaterThan(0);
    const stiffness = page.getByRole('slider', { name: 'Stiffness' });
    expect(await stiffness.getAttribute('aria-valuetext')).toBe('as measured');
    await stiffness.focus();
    await page.keyboard.press('ArrowRight');
    expect(await stiffness.getAttribute('aria-valuetext')).toMatch(/^× 1\.0/);
    await page.keyboard.press('End');
    // stiffness times 5: f goes with its root, 7.42 Hz times 2.236 is 16.6 Hz
    expect(await tryPanel.getByText(/Mode at 16\.6 Hz, was 7\.42 Hz\./).count()).toBe(1);
    expect(await ladder().locator('.ladder-title').first().textContent()).toMatch(/^16\.\d+ Hz$/);
    expect(await ladder().locator('.ladder-move').count()).toBe(1);
    const speed = page.getByRole('slider', { name: 'Speed of Roof fan' });
    await speed.focus();
    await page.keyboard.press('Home');
    expect(await speed.getAttribute('aria-valuetext')).toBe('384 r/min');
    await page.getByRole('button', { name: 'Back to as measured' }).click();
    expect(await stiffness.getAttribute('aria-valuetext')).toBe('as measured');
    await page.getByRole('button', { name: 'Done trying' }).click();
    expect(await page.getByRole('slider').count()).toBe(0);
  });

  it('draws spectrum, ring-downs with residual and trace, each with a sentence, a cursor and a table', async () => {
    await openWithPlots('stair');
    for (const name of [
      /Amplitude of each axis against frequency/,
      /Ring-down 1: measured points and the fitted curve/,
      /Measured minus fitted/,
      /Acceleration of each axis over 32/,
    ])
      expect(await page.getByRole('img', { name }).count()).toBe(1);
    await page
      .getByRole('button', { name: 'Tap 2'.concat(', at') })
      .first()
      .click();
    await page.getByRole('img', { name: /Ring-down 2:/ }).waitFor();
    const group = page.getByRole('group', { name: /^Ring-down 2\./ });
    await group.focus();
    await page.keyboard.press('ArrowRight');
    await page
      .getByText(/ s: measured .* fitted /)
      .first()
      .waitFor();
    await page.getByRole('button', { name: 'Closer: Spectrum' }).click();
    expect(await page.getByRole('button', { name: 'Whole range: Spectrum' }).isEnabled()).toBe(true);
    await page.getByText('Numbers behind the picture').first().click();
    expect(await page.getByRole('columnheader', { name: 'Amplitude' }).count()).toBe(1);
  });

  it('keeps name and notes as they are typed, and lets a person choose between two versions', async () => {
    await open('practice');
    await page.getByLabel('Notes', { exact: true }).fill('Rattles.');
    await page.getByLabel('Notes', { exact: true }).blur();
    expect((await asked()).at(-1)).toMatchObject({ what: 'edit', with: { set: { notes: 'Rattles.' } } });
    await page.getByRole('button', { name: 'Keep “Third post, canal side”' }).click();
    await expect.poll(() => page.getByText('Two versions of the name').count()).toBe(0);
    expect(await page.getByLabel('Name of this reading').inputValue()).toBe('Third post, canal side');
  });

  it('shows the analysis redone beside the old one, and keeps it only when asked', async () => {
    await open('stair', 'light', LAPTOP);
    await page.getByText('Analysis', { exact: true }).click();
    await page.getByLabel('Time base').selectOption('clock');
    await page.getByRole('button', { name: 'Analyse again' }).click();
    const row = page.getByRole('row', { name: /Frequency, mode 1/ });
    await row.waitFor();
    const [kept, fresh] = await row.getByRole('cell').allTextContents();
    expect(kept).not.toBe(fresh);
    await page.getByRole('button', { name: 'Keep the new analysis' }).click();
    await page.getByText(/Redone with analysis version/).waitFor();
    expect((await asked()).map((entry) => entry.what)).toContain('keepAnalysis');
  });

  it('goes to the trash and back', async () => {
    await open('stair');
    await page.getByRole('button', { name: 'Move to trash' }).click();
    await page.getByText('This reading is in the trash.').waitFor();
    await page.getByRole('button', { name: 'Put it back' }).click();
    await expect.poll(() => page.getByText('This reading is in the trash.').count()).toBe(0);
  });

  it('says what no mode means, and what must be known of practice, interruption, newer and missing readings', async () => {
    await open('no mode');
    expect(await page.getByRole('heading', { level: 1 }).textContent()).toContain('No mode found');
    expect((await ladder().locator('.ladder-note').allTextContents()).join(' ')).toContain(
      'does not mean there is none',
    );
    await open('practice');
    expect(await page.getByText('Simulated: it says nothing about a real structure').count()).toBe(1);
    expect(await page.getByText('The page was hidden, so the sensor stopped.').count()).toBeGreaterThan(0);
    await open('newer');
    expect(await page.getByRole('heading', { level: 1 }).textContent()).toContain('newer version');
    await open('nowhere');
    expect(await page.getByRole('heading', { level: 1 }).textContent()).toContain('not on this phone');
  });

  it('loses nothing and never scrolls sideways with text twice as large', async () => {
    await openWithPlots('stair');
    await page.evaluate(() => void (document.documentElement.style.fontSize = '200%'));
    await page.waitForTimeout(300);
    const tooWide = await page.evaluate(() =>
      [...document.querySelectorAll('[class*=body] *')]
        .filter((one) => one.getBoundingClientRect().right > innerWidth && !one.closest('[role=region], svg'))
        .map((one) => `${one.tagName} ${one.textContent}`),
    );
    expect(tooWide).toEqual([]);
    expect(await ladder().locator('.ladder-title').count()).toBe(2);
  });

  it('has no findings of axe in any state', async () => {
    // the stair is looked at below, with its contrast; the ambient and folded readings hold nothing that these do not
    const others = READING_EXAMPLES.filter(
      ({ name }) => !['stair', 'ambient', 'fold undecided'].includes(name),
    );
    const found: string[] = [];
    for (const { name } of others) {
      await openWithPlots(name);
      found.push(...(await findings(false)).map((one) => `${name}: ${one}`));
    }
    expect(found).toEqual([]);
  });

  it.each(['light', 'dark', 'sunlight'])(
    'has no findings of axe on a laptop in the %s theme',
    async (theme) => {
      await openWithPlots('stair', theme, LAPTOP);
      await page.getByRole('button', { name: 'Try a change' }).click();
      for (const summary of await page.locator('summary').all()) await summary.click();
      expect(await findings(true)).toEqual([]);
    },
  );

  it('broke no rule of the security policy and raised no error on the way', () => {
    expect(browser.faults.filter((fault) => !fault.includes('favicon'))).toEqual([]);
  });
});
