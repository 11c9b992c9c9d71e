/*
 * Trials that end the browser, fill its disk and feed it damage: a few of each in `npm test`, many in `npm run soak`.
 */
import type { Page } from 'playwright-core';
import { PracticeRig } from '../../src/capture/practice-rig.ts';
import { parseRigParameters } from '../../src/capture/rig-parameters.ts';
import type { TestBrowser } from '../support/browser.ts';

/** No taps and no machine: the samples depend on the seed alone, so each can be compared with what was fed. */
export const TRIAL_RIG = '?rig=footbridge&taps=0&handling=0&seed=7&noise=0.05';

export interface RecordingKill {
  /** Time from the newest sample kept to the newest sample seen before the kill, s. */
  readonly lostS: number;
  readonly keptCount: number;
  /** Index in the fed samples of the first kept one; -1 when they are not what was fed. */
  readonly matchIndex: number;
}

const pause = (ms: number) => new Promise((resolve) => setTimeout(resolve, ms));

/** Kills the browser `afterMs` into a recording and recovers it in the next. Returns the new browser too. */
export async function killWhileRecording(
  browser: TestBrowser,
  url: string,
  afterMs: number,
): Promise<{ readonly browser: TestBrowser; readonly kill: RecordingKill }> {
  const { page } = browser;
  await page.goto(url);
  await page.evaluate(async (practice) => {
    await window.field.openStore();
    await window.field.session({ durationS: 600, startBy: 'hand', practice }, ['settling']);
    window.field.capture().start();
  }, TRIAL_RIG);
  await pause(afterMs);
  const seenS = await page.evaluate(() => window.field.capture().live()!.elapsedS);
  const restarted = await browser.killAndRestart();
  await restarted.page.goto(url);
  const kept = await restarted.page.evaluate(async () => {
    await window.field.openStore();
    const store = window.field.store();
    const journals = await store.recoverable();
    if (journals.length !== 1) throw new Error(`${journals.length} journals to recover`);
    const recording = await store.recover(journals[0]!.journalId);
    const { interruption } = recording.sensor;
    if (interruption !== 'recovered-after-crash') throw new Error(`marked ${interruption}`);
    await store.dropJournal(journals[0]!.journalId);
    if ((await store.recoverable()).length > 0) throw new Error('dropped journal still there');
    return { timeS: [...recording.timeS], z: [...recording.accelerationMps2[2]!] };
  });
  const lastS = kept.timeS.at(-1) ?? 0;
  const kill = {
    lostS: seenS - lastS,
    keptCount: kept.timeS.length,
    matchIndex: matchInRig(kept.timeS, kept.z),
  };
  return { browser: restarted, kill };
}

/** Where in the rig's samples the kept ones lie, every one compared; -1 when they are not there. */
export function matchInRig(timeS: readonly number[], z: readonly number[]): number {
  const rig = new PracticeRig(parseRigParameters(TRIAL_RIG));
  const fed = Array.from({ length: timeS.length + 4000 }, () => rig.next()).filter(
    (one) => one !== undefined,
  );
  const first = fed.findIndex((sample) => Math.fround(sample.z) === z[0]);
  const isSame =
    first >= 0 &&
    z.every((value, i) => {
      const sample = fed[first + i];
      const stampS = (sample?.stampS ?? 0) - fed[first]!.stampS;
      return sample !== undefined && Math.fround(sample.z) === value && Math.abs(stampS - timeS[i]!) < 1e-9;
    });
  return isSame ? first : -1;
}

/** Kills the browser while readings are saved one after another; then every reading must open, whole. */
export async function killWhileSaving(
  browser: TestBrowser,
  url: string,
  afterMs: number,
): Promise<{ readonly browser: TestBrowser; readonly acknowledged: number; readonly found: number }> {
  const { page } = browser;
  await page.goto(url);
  const before = await page.evaluate(async () => {
    await window.field.openStore();
    return (await window.field.store().listReadings()).length;
  });
  await page.evaluate(() => {
    const { readingDraft, sampleRecording } = window.field;
    const recording = sampleRecording(30_000);
    const saveOn = async (): Promise<void> => {
      const saved = await window.field.store().saveReading(readingDraft(), recording, { label: 'kill' });
      window.field.heard.push(saved._id);
      await saveOn();
    };
    void saveOn();
  });
  await pause(afterMs);
  const acknowledged = await page.evaluate(
    () => window.field.heard.filter((one) => one.startsWith('reading:')).length,
  );
  const restarted = await browser.killAndRestart();
  await restarted.page.goto(url);
  const found = (await wholeReadings(restarted.page)) - before;
  return { browser: restarted, acknowledged, found };
}

/** Opens everything in the store; throws when facts, raw samples and list do not agree. Number of readings. */
export async function wholeReadings(page: Page): Promise<number> {
  return page.evaluate(async () => {
    await window.field.openStore();
    const store = window.field.store();
    const listed = await store.listReadings();
    const ids = new Set(listed.map(({ id }) => id));
    const labels = new Set<string>();
    for await (const fact of store.facts()) {
      if (fact.kind === 'reading' && !ids.has(fact._id)) throw new Error(`${fact._id} is not listed`);
      if (fact.kind === 'edit') labels.add(String((fact as { entity?: unknown }).entity));
    }
    for (const { id, label } of listed) {
      const opened = await store.openReading(id);
      if (opened === undefined) throw new Error(`${id} is listed but not there`);
      if ((label !== undefined) !== labels.has(id)) throw new Error(`${id} lost its label`);
    }
    return listed.length;
  });
}

export interface MigrationKill {
  readonly versionFound: number;
  /** Summaries there after the kill, before anything was repaired: none or all. */
  readonly summaryCount: number;
  /** Readings listed, each opened, after the next start. */
  readonly listed: number;
}

/** A database of version 1 with readings, then a kill `afterMs` into its migration and the making of its summaries. */
export async function killWhileMigrating(
  browser: TestBrowser,
  url: string,
  readingCount: number,
  afterMs: number,
): Promise<{ readonly browser: TestBrowser; readonly kill: MigrationKill }> {
  const { page } = browser;
  await page.goto(url);
  await page.evaluate(async (count) => {
    await window.field.deleteDatabase();
    await window.field.fillVersion1(count);
  }, readingCount);
  await page.evaluate(() => void window.field.openStore());
  await pause(afterMs);
  const restarted = await browser.killAndRestart();
  await restarted.page.goto(url);
  const found = await restarted.page.evaluate(() => window.field.rawState());
  const listed = await wholeReadings(restarted.page);
  return { browser: restarted, kill: { ...found, listed } };
}

export interface QuotaTrial {
  /** Code of the first failed save; undefined when all five went in. */
  readonly code: string | undefined;
  readonly savedCount: number;
  /** Readings that open whole afterwards. */
  readonly wholeCount: number;
  /** Whether a reading could be saved once there was room again. */
  readonly isGoingOn: boolean;
}

/**
 * Saves readings of a quarter of a megabyte with `quotaBytes` in all, then gives the room back and saves once more. Each
 * trial has an origin of its own: the browser asks for the quota only now and then.
 */
export async function saveWithQuota(page: Page, url: string, quotaBytes: number): Promise<QuotaTrial> {
  const own = url.replace('127.0.0.1', `quota-${quotaBytes}.localhost`);
  const origin = new URL(own).origin;
  const session = await page.context().newCDPSession(page);
  await page.goto(own);
  await session.send('Storage.overrideQuotaForOrigin', { origin, quotaSize: quotaBytes });
  const outcome = await page.evaluate(async () => {
    const { readingDraft, noisyRecording } = window.field;
    let savedCount = 0;
    try {
      await window.field.openStore();
      for (; savedCount < 5; savedCount += 1) {
        await window.field.store().saveReading(readingDraft(), noisyRecording(20_000), { label: 'quota' });
      }
      return { savedCount, code: undefined };
    } catch (error) {
      return { savedCount, code: String((error as { code?: unknown }).code) };
    }
  });
  const wholeCount = await wholeReadings(page);
  await session.send('Storage.overrideQuotaForOrigin', { origin });
  const isGoingOn = await page.evaluate(async () => {
    const { readingDraft, sampleRecording } = window.field;
    const saved = await window.field.store().saveReading(readingDraft(), sampleRecording(600));
    return (await window.field.store().openReading(saved._id)) !== undefined;
  });
  await session.detach();
  return { ...outcome, wholeCount, isGoingOn };
}
