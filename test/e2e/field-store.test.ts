import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Page } from 'playwright-core';
import {
  killWhileMigrating,
  killWhileRecording,
  killWhileSaving,
  saveWithQuota,
} from '../soak/field-trials.ts';
import { launchBrowser, type TestBrowser } from '../support/browser.ts';
import { serveFieldPage } from '../support/field-bench.ts';

let served: Awaited<ReturnType<typeof serveFieldPage>>;
let browser: TestBrowser;

beforeAll(async () => {
  served = await serveFieldPage();
  browser = await launchBrowser();
});
afterAll(async () => {
  await browser?.close();
  await served?.stop();
});

const load = async (page: Page = browser.page): Promise<Page> => {
  await page.goto(served.url);
  return page;
};
const opened = async (page: Page = browser.page): Promise<Page> => {
  await load(page);
  await page.evaluate(() => window.field.openStore());
  return page;
};
const pause = (ms: number) => new Promise((resolve) => setTimeout(resolve, ms));

describe('store in Chromium', () => {
  it('keeps a reading over a reload', async () => {
    const page = await opened();
    const id = await page.evaluate(async () => {
      const { readingDraft, sampleRecording } = window.field;
      return (await window.field.store().saveReading(readingDraft(), sampleRecording(3600)))._id;
    });
    await opened();
    const count = await page.evaluate(
      async (readingId) => (await window.field.store().openReading(readingId))?.recording.timeS.length,
      id,
    );
    expect(count).toBe(3600);
    expect(browser.faults).toEqual([]);
  });

  it('saves whole or not at all when the disk is full, and goes on', async () => {
    for (let point = 1; point <= 10; point += 1) {
      const trial = await saveWithQuota(browser.page, served.url, 50_000 + point * 60_000);
      expect(trial).toEqual({
        code: 'quota',
        savedCount: trial.savedCount,
        wholeCount: trial.savedCount,
        isGoingOn: true,
      });
    }
  });

  it('waits for a tab with the older version, and says so', async () => {
    const page = await load();
    await page.evaluate(async () => {
      await window.field.deleteDatabase();
      await window.field.fillVersion1(3);
      const old = await window.field.openAsVersion(1);
      Object.assign(window, { old });
    });
    const other = await browser.context.newPage();
    await load(other);
    await other.evaluate(() => void window.field.openStore().then(() => window.field.heard.push('open')));
    await pause(300);
    expect(await other.evaluate(() => window.field.heard)).toEqual(['blocked']);
    await page.evaluate(() => (window as unknown as { old: IDBDatabase }).old.close());
    await pause(300);
    expect(await other.evaluate(() => window.field.heard)).toEqual(['blocked', 'open']);
    expect(await other.evaluate(async () => (await window.field.store().listReadings()).length)).toBe(3);
    await other.close();
  });

  it('gives way to a newer version when idle, and refuses a database newer than itself', async () => {
    const page = await opened();
    const other = await browser.context.newPage();
    await load(other);
    await other.evaluate(async () => {
      const newer = await window.field.openAsVersion(99);
      newer.close();
    });
    expect(await page.evaluate(() => window.field.heard)).toEqual(['blocking', 'closed']);
    const codes = await page.evaluate(async () => {
      const late = await window.field
        .store()
        .listReadings()
        .catch((error: { code?: string }) => error.code);
      const again = await window.field.openStore().catch((error: { code?: string }) => error.code);
      return [late, again];
    });
    expect(codes).toEqual(['closed', 'newer-database']);
    await page.evaluate(() => window.field.deleteDatabase());
    await other.close();
  });

  it('lets a newer version wait while it records, and gives way after the save', async () => {
    const page = await opened();
    await page.evaluate(async () => {
      const practice = '?rig=handrail&pace=10';
      await window.field.session({ durationS: 25, startBy: 'hand', practice }, ['settling']);
      window.field.capture().start();
    });
    const other = await browser.context.newPage();
    await load(other);
    await other.evaluate(
      () => void window.field.openAsVersion(99).then(() => window.field.heard.push('open')),
    );
    await pause(300);
    expect(await other.evaluate(() => window.field.heard)).toEqual([]);
    const saved = await page.evaluate(async () => {
      const state = await window.field.until(['done', 'cut']);
      if (state.phase !== 'done') return state.phase;
      const { recording, journalId } = state;
      const { readingDraft } = window.field;
      const reading = await window.field.store().saveReading(readingDraft(), recording, { journalId });
      return { isPractice: reading.practice, heard: window.field.heard };
    });
    expect(saved).toMatchObject({ isPractice: true });
    await pause(300);
    expect(await page.evaluate(() => window.field.heard)).toEqual(['blocking', 'facts', 'closed']);
    expect(await other.evaluate(() => window.field.heard)).toEqual(['open']);
    await other.close();
    await load();
    await page.evaluate(() => window.field.deleteDatabase());
  });

  it('tells the other tab of a change, and does not offer it a recording that still runs', async () => {
    const page = await opened();
    const other = await browser.context.newPage();
    await opened(other);
    await page.evaluate(async () => {
      const practice = '?rig=handrail&pace=5';
      await window.field.session({ durationS: 60, startBy: 'hand', practice }, ['settling']);
      window.field.capture().start();
      await window.field.store().newEntity('site', { name: 'Quay' });
    });
    await pause(1500);
    expect(await other.evaluate(() => window.field.heard)).toContain('facts');
    expect(await other.evaluate(() => window.field.store().recoverable())).toEqual([]);
    await page.evaluate(() => window.field.capture().cancel());
    await other.close();
  });

  it('draws photos anew: smaller, without what the camera wrote into the file', async () => {
    const page = await opened();
    const photo = await page.evaluate(async () => {
      const canvas = document.createElement('canvas');
      canvas.width = 2600;
      canvas.height = 1300;
      canvas.getContext('2d')!.fillRect(10, 10, 100, 100);
      const jpeg = await new Promise<Blob>((resolve) =>
        canvas.toBlob((blob) => resolve(blob!), 'image/jpeg'),
      );
      const bytes = new Uint8Array(await jpeg.arrayBuffer());
      // An APP1 segment as cameras write it, with a position in plain text.
      const note = new TextEncoder().encode('Exif\0\0GPS 48.1 N 11.5 E');
      const length = note.length + 2;
      const marked = new Blob([
        bytes.slice(0, 2),
        new Uint8Array([0xff, 0xe1, length >> 8, length & 255]),
        note,
        bytes.slice(2),
      ]);
      const prepared = await window.field.store().preparePhoto(marked);
      const site = await window.field.store().newEntity('site', { name: 'Quay' });
      await window.field.store().savePhoto(site.id, prepared.jpeg, prepared.widthPx, prepared.heightPx);
      const [kept] = await window.field.store().photos(site.id);
      const isMarked = (data: Uint8Array) => new TextDecoder('latin1').decode(data).includes('GPS 48.1');
      return {
        wasMarked: isMarked(new Uint8Array(await marked.arrayBuffer())),
        isMarked: isMarked(kept!.jpeg),
        size: [prepared.widthPx, prepared.heightPx],
        code: await window.field
          .store()
          .preparePhoto(new Blob(['no picture']))
          .catch((error: { code?: string }) => error.code),
      };
    });
    expect(photo).toEqual({ wasMarked: true, isMarked: false, size: [1280, 640], code: 'damaged' });
  });
});

describe('a browser that is killed', () => {
  it('loses at most 2 s of a recording', async () => {
    const trial = await killWhileRecording(browser, served.url, 2600);
    browser = trial.browser;
    expect(trial.kill.lostS).toBeLessThan(2);
    expect(trial.kill.matchIndex).toBeGreaterThanOrEqual(0);
    expect(trial.kill.keptCount).toBeGreaterThan(30);
  });

  it('has every acknowledged reading, and no half one', async () => {
    const trial = await killWhileSaving(browser, served.url, 400);
    browser = trial.browser;
    expect(trial.found).toBeGreaterThanOrEqual(trial.acknowledged);
    expect(trial.found).toBeLessThanOrEqual(trial.acknowledged + 2);
  });

  it('is at the old version or the new one after a kill in the migration', async () => {
    const trial = await killWhileMigrating(browser, served.url, 400, 60);
    browser = trial.browser;
    expect([1, 2]).toContain(trial.kill.versionFound);
    expect([0, 400]).toContain(trial.kill.summaryCount);
    expect(trial.kill.listed).toBe(400);
  });
});
