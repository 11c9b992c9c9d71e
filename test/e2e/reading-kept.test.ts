import type { Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { takePracticeReading } from '../support/app-steps.ts';
import { launchBrowser, serveApp, type ServedApp, type TestBrowser } from '../support/browser.ts';

let app: ServedApp;
let browser: TestBrowser;
let page: Page;

beforeAll(async () => {
  app = await serveApp();
  browser = await launchBrowser();
  page = browser.page;
  await page.goto(`${app.url}?rig=handrail&pace=4`);
  await takePracticeReading(page);
  await page.getByRole('img', { name: /Ladder of frequencies/ }).waitFor();
});
afterAll(async () => {
  await browser.close();
  await app.stop();
});

/** A picture larger than what is kept, made by the browser itself. */
const pictureFile = async () => {
  const bytes = await page.evaluate(async () => {
    const canvas = document.createElement('canvas');
    canvas.width = 2000;
    canvas.height = 1000;
    canvas.getContext('2d')!.fillRect(0, 0, 900, 900);
    const blob = await new Promise<Blob | null>((done) => canvas.toBlob(done, 'image/png'));
    return [...new Uint8Array(await blob!.arrayBuffer())];
  });
  return { name: 'rail.png', mimeType: 'image/png', buffer: Buffer.from(bytes) };
};

describe('a reading kept by the app', () => {
  it('draws its plots from the stored samples', async () => {
    await page.getByRole('img', { name: /Ring-down \d: measured points/ }).waitFor();
    expect(await page.getByRole('img', { name: /Amplitude of each axis/ }).count()).toBe(1);
    expect(await page.getByText('Simulated: it says nothing about a real structure.').count()).toBe(1);
  });

  it('keeps notes and a photo, scaled down, over a reload', async () => {
    await page.getByLabel('Notes', { exact: true }).fill('Loose bolt at the foot.');
    await page.getByLabel('Notes', { exact: true }).blur();
    await page.getByLabel('Add a photo').setInputFiles(await pictureFile());
    await page.getByRole('img', { name: 'Photo 1 of this spot' }).waitFor();
    await page.reload();
    const photo = page.getByRole('img', { name: 'Photo 1 of this spot' });
    await photo.waitFor();
    const size = await photo.evaluate(async (image: HTMLImageElement) => {
      await image.decode();
      return [image.naturalWidth, image.naturalHeight];
    });
    expect(size).toEqual([1280, 640]);
    expect(await page.getByLabel('Notes', { exact: true }).inputValue()).toBe('Loose bolt at the foot.');
    await page.getByRole('button', { name: 'Remove photo 1' }).click();
    await expect.poll(() => page.getByRole('img', { name: /^Photo/ }).count()).toBe(0);
  });

  it('gives the same numbers when its analysis is redone from the stored samples', async () => {
    await page.getByText('Analysis', { exact: true }).click();
    await page.getByRole('button', { name: 'Analyse again' }).click();
    await page.getByText('The same numbers.').waitFor();
    await page.getByRole('button', { name: 'Leave as it is' }).click();
  });

  it('leads to the form of a source, and holds the reading against it afterwards', async () => {
    await page.getByRole('link', { name: 'Add what shakes it' }).first().click();
    await page.waitForURL(/#\/source\/new\?.*reading=/);
    await page
      .getByRole('link', { name: /People|Footfall|walking/i })
      .first()
      .click();
    await page.getByRole('button', { name: 'Save' }).click();
    await page.waitForURL(/#\/reading\//);
    // the practice rail rings near 7.4 Hz, where the third and fourth harmonics of walking reach
    await page.getByRole('button', { name: /^The third harmonic of walking/ }).click();
    const card = page.getByRole('region', { name: 'Ladder' });
    await card.getByText(/The third harmonic of walking against the mode at 7\.4/).waitFor();
  });

  it('is given its spot after it was taken, and leads to the history of that spot', async () => {
    await page.getByRole('button', { name: 'Name this spot' }).click();
    const dialog = page.getByRole('dialog');
    await dialog.getByRole('textbox').first().fill('Third post');
    await dialog.getByRole('button', { name: 'Use this spot' }).click();
    const place = page.getByRole('link', { name: /Third post/ }).last();
    await place.waitFor();
    await place.click();
    await page.waitForURL(/#\/spot\//);
  });

  it('raised no error on the way', () => {
    expect(browser.faults).toEqual([]);
  });
});
