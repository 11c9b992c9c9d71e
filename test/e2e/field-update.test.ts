import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { rm } from 'node:fs/promises';
import { readdirSync } from 'node:fs';
import { join } from 'node:path';
import type { Page } from 'playwright-core';
import { launchBrowser, type TestBrowser } from '../support/browser.ts';
import { editFile, laterBuild, removeBuild, serveDeployments } from '../support/versioned-build.ts';

let site: Awaited<ReturnType<typeof serveDeployments>>;
let browser: TestBrowser;
let later: string;

beforeAll(async () => {
  later = await laterBuild('later-');
  browser = await launchBrowser();
});
afterAll(async () => {
  await browser.close();
  await removeBuild(later);
});
// A new port is a new origin: no worker and no readings from the test before.
beforeEach(async () => {
  site = await serveDeployments();
  await browser.context.setOffline(false);
  await browser.page.goto(site.url);
  await browser.page.getByRole('button', { name: 'Take a reading' }).waitFor();
  await browser.page.evaluate(async () => void (await navigator.serviceWorker.ready));
  await browser.page.waitForFunction(() => navigator.serviceWorker.controller !== null);
});
afterEach(() => site.stop());

const lookForUpdate = (page: Page) =>
  page.evaluate(async () => void (await (await navigator.serviceWorker.getRegistration())?.update()));
const buildOf = (page: Page) =>
  page.evaluate(() => document.querySelector<HTMLMetaElement>('meta[name=build]')?.content ?? 'first');
const startRecording = async (page: Page, pace: number): Promise<void> => {
  await page.goto(`${site.url}?rig=handrail&pace=${pace}`);
  await page.getByRole('button', { name: 'Take a reading' }).click();
  await page.getByText('Handrail', { exact: true }).click();
  await page.getByRole('button', { name: 'Switch the practice rig on' }).click();
  const cautions = page.getByRole('dialog');
  await cautions.getByRole('checkbox', { name: 'I have read this' }).check();
  await cautions.getByRole('button', { name: /^Switch the/ }).click();
  await page
    .getByText(/^\d taps?$/)
    .or(page.getByText(/taps?, at least/))
    .first()
    .waitFor();
};

describe('a newer version', () => {
  it('waits while any tab records, then comes only where it was asked for', async () => {
    const recording = await browser.context.newPage();
    await startRecording(recording, 5);
    await site.deploy(later);
    const { page } = browser;
    await lookForUpdate(page);
    const take = page.getByRole('button', { name: 'Update now' });
    await take.waitFor();
    await take.click();
    await page.getByText('A recording is running in some tab.').waitFor();
    expect(await buildOf(page)).toBe('first');

    await recording.getByText('Indicative survey, not a certified measurement').waitFor();
    await Promise.all([page.waitForEvent('load'), take.click()]);
    await page.getByRole('button', { name: 'Take a reading' }).waitFor();
    expect(await buildOf(page)).toBe('later-');

    // The other tab keeps its version and its reading, and finds a way on where a part of it is gone.
    expect(await buildOf(recording)).toBe('first');
    await recording.evaluate(() => void (location.hash = '#/phone'));
    const wayOn = recording.getByRole('button', { name: /again|reload/i }).or(recording.getByText('Storage'));
    await wayOn.first().waitFor();
    await recording.reload();
    await recording.getByRole('heading', { level: 1 }).waitFor();
    expect(await buildOf(recording)).toBe('later-');
  });

  it('that arrives in pieces is not taken: the working one goes on, offline too', async () => {
    const broken = await laterBuild('torn-');
    const lost = readdirSync(join(broken, 'assets')).find(
      (name) => name.includes('reading-screen') && name.endsWith('.js'),
    )!;
    await rm(join(broken, 'assets', lost));
    await site.deploy(broken);
    const { page } = browser;
    await lookForUpdate(page).catch(() => undefined);
    await page.waitForFunction(
      async () => (await navigator.serviceWorker.getRegistration())?.installing === null,
    );
    await browser.context.setOffline(true);
    await page.reload();
    await page.getByRole('button', { name: 'Take a reading' }).waitFor();
    expect(await buildOf(page)).toBe('first');
    expect(await page.getByRole('button', { name: 'Update now' }).count()).toBe(0);
    await removeBuild(broken);
  });

  it('whose database is newer than this program is told of in words, nothing touched', async () => {
    const { page } = browser;
    await page.evaluate(
      () =>
        new Promise((resolve) => {
          const opening = indexedDB.open('thrumbook', 99);
          opening.onsuccess = () => resolve(opening.result.close());
        }),
    );
    await page.reload();
    await page.getByText('written by a newer version').waitFor();
    const version = await page.evaluate(async () => (await indexedDB.databases())[0]?.version);
    expect(version).toBe(99);
  });

  it('that does not start can be thrown out by the rescue page, readings kept', async () => {
    const recording = await browser.context.newPage();
    await startRecording(recording, 20);
    await recording.getByText('Indicative survey, not a certified measurement').waitFor();
    const address = new URL(recording.url()).hash;
    await recording.close();

    const broken = await laterBuild('dead-');
    const entry = readdirSync(join(broken, 'assets')).find((name) => name.startsWith('dead-index-'))!;
    await editFile(broken, `assets/${entry}`, () => 'throw new Error("dead on arrival");');
    await site.deploy(broken);
    const { page } = browser;
    await lookForUpdate(page);
    await page.getByRole('button', { name: 'Update now' }).click();
    await page.waitForFunction(() => document.querySelector('meta[name=build]') !== null);
    expect(await page.getByRole('button', { name: 'Take a reading' }).count()).toBe(0);

    await browser.context.setOffline(true);
    await page.goto(`${site.url}rescue.html`);
    await page.getByRole('button', { name: 'Remove the kept program' }).click();
    await page.getByText('Removed.').waitFor();
    await browser.context.setOffline(false);
    await site.deploy(later);
    await page.goto(site.url + address);
    await page.getByRole('heading', { level: 1 }).filter({ hasText: 'Hz' }).waitFor();
    expect(await buildOf(page)).toBe('later-');
    await removeBuild(broken);
  });
});
