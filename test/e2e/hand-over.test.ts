import AxeBuilder from '@axe-core/playwright';
import { mkdtemp, readFile, rm, writeFile } from 'node:fs/promises';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import type { Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { analysePacket, type RedoneReading } from '../../src/cli/analyse-packet.ts';
import { takePracticeReading } from '../support/app-steps.ts';
import { launchBrowser, serveApp, type ServedApp, type TestBrowser } from '../support/browser.ts';

let app: ServedApp;
let phone: TestBrowser;
let folder: string;
let reading: string;
const strayRequests: string[] = [];
const AUTO = { procedure: 'auto', timing: 'auto' } as const;

function watchRequests(browser: TestBrowser): void {
  browser.context.on('request', (request) => {
    const url = request.url();
    if (!url.startsWith(app.url) && !/^(?:blob|data|about|file):/.test(url)) strayRequests.push(url);
  });
}

async function openHandOver(page: Page, hash = '#/hand-over'): Promise<void> {
  await page.goto('about:blank');
  await page.goto(`${app.url}${hash}`);
  await page.getByRole('heading', { name: 'Take in' }).waitFor();
}

/** Makes a form of what is chosen and saves it into the folder. */
async function saved(page: Page, form: string): Promise<string> {
  await page.getByRole('button', { name: form }).click();
  await page.getByText(/Ready\./).waitFor({ timeout: 30_000 });
  const download = page.waitForEvent('download');
  await page.getByRole('button', { name: 'Save' }).click();
  const file = await download;
  const path = join(folder, file.suggestedFilename());
  await file.saveAs(path);
  await page.getByText('Saved with your downloads.').waitFor();
  await page.getByRole('button', { name: 'Put away' }).click();
  return path;
}

async function redoneOf(path: string): Promise<readonly RedoneReading[]> {
  const redone: RedoneReading[] = [];
  for await (const { outcome } of analysePacket(path, AUTO)) {
    if (!outcome.ok) throw new Error(JSON.stringify(outcome.problem));
    redone.push(outcome.value);
  }
  return redone;
}

beforeAll(async () => {
  folder = await mkdtemp(join(tmpdir(), 'thrumbook-hand-'));
  app = await serveApp();
  phone = await launchBrowser();
  watchRequests(phone);
  const { page } = phone;
  await page.goto(`${app.url}?rig=handrail&pace=4#/source/new?kind=footfall`);
  await page.getByRole('button', { name: 'Save' }).click();
  // Saving leads on by itself: only then to the start.
  await page
    .getByRole('link', { name: /^People/ })
    .first()
    .waitFor();
  await page.goto(`${app.url}?rig=handrail&pace=4#/`);
  await takePracticeReading(page);
  reading = new URL(page.url()).hash.split('/').at(-1) ?? '';
}, 60_000);

afterAll(async () => {
  await phone.close();
  await app.stop();
  await rm(folder, { recursive: true, force: true });
});

describe('handing over in the built app', () => {
  it('makes a report whose numbers are the stored ones and that lays out for paper', async () => {
    const { page } = phone;
    await openHandOver(page);
    const path = await saved(page, 'Report');
    const [redone] = await redoneOf(path);
    expect(redone?.equal).toBe(true);
    const paper = await phone.context.newPage();
    await paper.goto(`file://${path}`);
    const stated = await paper.$$eval('data', (all) => all.map((each) => Number(each.getAttribute('value'))));
    for (const mode of redone!.stored.modes)
      for (const value of [mode.frequencyHz, mode.frequencySdHz, mode.dampingRatio, mode.dampingRatioSd])
        expect(stated).toContain(value);
    await paper.emulateMedia({ media: 'print' });
    const foot = await paper.$eval('tfoot', (element) => ({
      display: getComputedStyle(element).display,
      heightPx: element.getBoundingClientRect().height,
      text: element.textContent,
    }));
    // Engines repeat a table foot on every page as long as it takes less than a quarter of it (A4: 1123 px).
    expect(foot.display).toBe('table-footer-group');
    expect(foot.heightPx).toBeLessThan(1123 / 4);
    expect(foot.text).toContain('Indicative survey, not a certified measurement.');
    for (const format of ['A4', 'Letter']) {
      const pdf = await paper.pdf({ format, printBackground: true });
      expect(pdf.toString('latin1').match(/\/Type\s*\/Page\b/g)?.length).toBeGreaterThan(1);
    }
    await paper.close();
  }, 60_000);

  it('hands the report to a laptop as a packet: looked at first, taken once, the same sentence there', async () => {
    const { page } = phone;
    await openHandOver(page);
    const path = await saved(page, 'Report');
    const laptop = await launchBrowser({ viewport: { width: 1280, height: 800 } });
    watchRequests(laptop);
    await openHandOver(laptop.page);
    const picker = laptop.page.locator('input[type=file]');
    await picker.setInputFiles(path);
    await laptop.page.getByText('1 reading not here yet').waitFor();
    await laptop.page.getByRole('button', { name: 'Take in 1 reading' }).click();
    await laptop.page.getByText('1 reading taken in.').waitFor();
    await laptop.page.getByRole('button', { name: 'Close' }).click();
    await picker.setInputFiles(path);
    await laptop.page.getByText('Everything in it is here already.').waitFor();
    const [there] = await redoneOf(await saved(laptop.page, 'Packet'));
    const [here] = await redoneOf(path);
    expect(there).toEqual(here);
    const hostile = join(folder, 'holiday.zip');
    await writeFile(hostile, Buffer.concat([Buffer.from('PK\u0003\u0004'), Buffer.alloc(2000, 7)]));
    await laptop.page.getByRole('button', { name: 'Close' }).click();
    await picker.setInputFiles(hostile);
    await laptop.page.getByText('This is no packet and carries none.').waitFor();
    expect(laptop.faults).toEqual([]);
    await laptop.close();
  }, 60_000);

  it('shares what the share sheet takes, in the tap; offers saving for the rest; never traps a home-screen app', async () => {
    const page = await phone.context.newPage();
    await page.addInitScript(() => {
      const shared: unknown[] = [];
      const takes = /^(?:text\/html|text\/csv|image\/)/;
      Object.assign(navigator, {
        canShare: ({ files = [] }: ShareData) => files.every(({ type }) => takes.test(type)),
        share: async ({ files = [] }: ShareData) => {
          shared.push({ type: files[0]?.type, isInTap: navigator.userActivation.isActive });
        },
      });
      Object.assign(globalThis, { shared });
    });
    await openHandOver(page);
    await page.getByRole('button', { name: 'Report' }).click();
    await page.getByRole('button', { name: 'Share…' }).click({ timeout: 30_000 });
    await page.getByText('Handed to the share sheet.').waitFor();
    expect(await page.evaluate('shared')).toEqual([{ type: 'text/html', isInTap: true }]);
    await page.getByRole('button', { name: 'Put away' }).click();
    await page.getByRole('button', { name: 'Packet' }).click();
    await page.getByText('The share sheet of this browser takes no packets.').waitFor({ timeout: 30_000 });
    expect(await page.getByRole('button', { name: 'Share…' }).count()).toBe(0);
    await page.addInitScript(() => Object.assign(navigator, { standalone: true }));
    await openHandOver(page);
    await page.getByRole('button', { name: 'Table' }).click();
    await page.getByRole('button', { name: 'Share…' }).waitFor({ timeout: 30_000 });
    expect(await page.getByRole('button', { name: 'Save', exact: true }).count()).toBe(0);
    await page.close();
  }, 60_000);

  it('gives samples and charts of one reading, and prints without a file', async () => {
    const { page } = phone;
    await openHandOver(page, `#/hand-over?reading=${reading}`);
    await page.getByText('Files of this one reading').click();
    const png = await readFile(await saved(page, 'Ladder, PNG'));
    expect(png.subarray(1, 4).toString()).toBe('PNG');
    expect(png.readUInt32BE(16)).toBeGreaterThan(1000);
    await page.getByText('Files of this one reading').click();
    const svg = await readFile(await saved(page, 'Spectrum, SVG'), 'utf8');
    expect(svg).toContain('Practice. Indicative survey, not a certified measurement.');
    await page.getByText('Files of this one reading').click();
    expect(await readFile(await saved(page, 'Samples as CSV'), 'utf8')).toMatch(/^# practice/);
    await page.getByRole('button', { name: 'Report' }).click();
    await page.getByRole('button', { name: 'Print' }).click({ timeout: 30_000 });
    const printed = page.frameLocator('iframe[data-print]');
    await printed.locator('.sentence').first().waitFor({ state: 'attached' });
    const width = await printed.locator('.ladder svg').evaluate((svg) => getComputedStyle(svg).display);
    expect(width).toBe('block');
  }, 60_000);

  it('passes axe, and nothing of all this has left the origin or broken the policy', async () => {
    const { page } = phone;
    await openHandOver(page);
    await page.getByText('Which road for what').click();
    const { violations } = await new AxeBuilder({ page }).setLegacyMode().analyze();
    expect(violations.map(({ id, nodes }) => `${id}: ${nodes[0]?.html}`)).toEqual([]);
    expect(strayRequests).toEqual([]);
    expect(phone.faults).toEqual([]);
  }, 60_000);
});
