import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { launchBrowser, type TestBrowser } from '../support/browser.ts';
import { serveFieldPage } from '../support/field-bench.ts';

let page: Awaited<ReturnType<typeof serveFieldPage>>;
let browser: TestBrowser;

beforeAll(async () => {
  page = await serveFieldPage();
  browser = await launchBrowser();
  await browser.page.goto(page.url);
});
afterAll(async () => {
  await browser?.close();
  await page?.stop();
});

describe('store in Chromium', () => {
  it('keeps a reading over a reload', async () => {
    const id = await browser.page.evaluate(async () => {
      await window.field.openStore();
      const { readingDraft, sampleRecording } = window.field;
      return (await window.field.store().saveReading(readingDraft(), sampleRecording(3600)))._id;
    });
    await browser.page.reload();
    const count = await browser.page.evaluate(async (readingId) => {
      await window.field.openStore();
      return (await window.field.store().openReading(readingId))?.recording.timeS.length;
    }, id);
    expect(count).toBe(3600);
    expect(browser.faults).toEqual([]);
  });
});
