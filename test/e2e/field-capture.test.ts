import { afterAll, afterEach, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import type { Page } from 'playwright-core';
import type { SessionState } from '../../src/app/ports.ts';
import { launchBrowser, type TestBrowser } from '../support/browser.ts';
import { serveFieldPage } from '../support/field-bench.ts';
import { launchPlainBrowser } from '../support/plain-browser.ts';
import { overrideSensors, setMotionPermission, type SensorOverride } from '../support/sensor-override.ts';

let served: Awaited<ReturnType<typeof serveFieldPage>>;
let browser: TestBrowser;
let page: Page;
let sensors: SensorOverride | undefined;
let feeding: { stop(): void } | undefined;

beforeAll(async () => {
  served = await serveFieldPage();
  browser = await launchBrowser();
});
afterAll(async () => {
  await browser?.close();
  await served?.stop();
});
beforeEach(async () => {
  page = await browser.context.newPage();
  await setMotionPermission(page, served.url, 'granted');
});
afterEach(async () => {
  feeding?.stop();
  feeding = undefined;
  sensors = undefined;
  await page.close();
});

/** Trembling a little, so that 0.1 m/s² rounding shows several values. */
const trembling = (t: number) =>
  [0.15 * Math.sin(91 * t), 0.15 * Math.sin(131 * t), 9.81 + 0.15 * Math.sin(73 * t)] as const;

async function feed(): Promise<void> {
  sensors = await overrideSensors(page);
  feeding = sensors.feed(trembling, 100);
}

async function load(): Promise<void> {
  await page.goto(served.url);
  await page.evaluate(() => window.field.openStore());
}

const open = (phases: readonly string[]): Promise<SessionState> =>
  page.evaluate(
    async (wanted) => {
      const state = await window.field.session({ durationS: 1.8, startBy: 'hand' }, wanted);
      return JSON.parse(JSON.stringify(state)) as typeof state;
    },
    [...phases],
  );

/** State once in one of the phases, the recording reduced to what the checks need. */
const until = (phases: readonly string[]) =>
  page.evaluate(
    async (wanted) => {
      const state = await window.field.until(wanted);
      const recording = 'recording' in state ? state.recording : undefined;
      return {
        phase: state.phase,
        reason: 'reason' in state ? state.reason : undefined,
        problem: 'problem' in state ? state.problem : undefined,
        sensor: recording?.sensor,
        sampleCount: recording?.timeS.length ?? 0,
        durationS: recording?.timeS.at(-1) ?? 0,
        steps: [
          ...new Set([...(recording?.accelerationMps2[2] ?? [])].map((value) => Math.round(value * 10))),
        ],
      };
    },
    [...phases],
  );

const start = () => page.evaluate(() => window.field.capture().start());
const pause = (ms: number) => new Promise((resolve) => setTimeout(resolve, ms));

async function recording(): Promise<void> {
  await feed();
  await load();
  await open(['settling']);
  await start();
  await pause(900);
}

describe('capture in Chromium, page out of sight', () => {
  let plain: Awaited<ReturnType<typeof launchPlainBrowser>>;
  beforeAll(async () => {
    plain = await launchPlainBrowser();
  });
  afterAll(() => plain?.close());

  /** A practice recording of some seconds in a tab of the browser that really hides its tabs. */
  async function practice(): Promise<Page> {
    const tab = await plain.context.newPage();
    await tab.goto(served.url);
    await tab.evaluate(async () => {
      await window.field.openStore();
      await window.field.session({ durationS: 60, startBy: 'hand', practice: '?rig=handrail' }, ['settling']);
      window.field.capture().start();
    });
    await pause(900);
    return tab;
  }

  it('ends as "hidden" when another tab comes to the front, keeping what there is', async () => {
    const tab = await practice();
    const other = await plain.context.newPage();
    await other.bringToFront();
    const cut = await tab.evaluate(async () => {
      const state = await window.field.until(['cut', 'done']);
      return 'recording' in state ? { ...state, recording: state.recording?.timeS.length ?? 0 } : state;
    });
    expect(cut).toMatchObject({
      phase: 'cut',
      reason: 'hidden',
      journalId: expect.stringMatching(/^\w{26}$/),
    });
    expect('recording' in cut && cut.recording).toBeGreaterThan(35);
    await other.close();
    await tab.close();
  });

  it('ends when the browser freezes the page, and the journal has what there is', async () => {
    const tab = await practice();
    const session = await tab.context().newCDPSession(tab);
    await session.send('Page.setWebLifecycleState', { state: 'frozen' });
    await pause(300);
    await session.send('Page.setWebLifecycleState', { state: 'active' });
    const { phase, count, journaled } = await tab.evaluate(async () => {
      const state = await window.field.until(['cut', 'done']);
      if (state.phase !== 'cut') return { phase: state.phase, count: 0, journaled: 0 };
      const kept = await window.field.store().recover(state.journalId);
      return { phase: state.phase, count: state.recording?.timeS.length ?? 0, journaled: kept.timeS.length };
    });
    expect(phase).toBe('cut');
    expect(count).toBeGreaterThan(35);
    expect(journaled).toBe(count);
    await tab.close();
  });
});

describe('capture in Chromium', () => {
  it('records from the Generic Sensor at its own stamps, values rounded by the browser', async () => {
    await feed();
    await load();
    expect(await open(['settling', 'refused'])).toMatchObject({ phase: 'settling' });
    await start();
    const done = await until(['done', 'cut']);
    expect(done.phase).toBe('done');
    expect(done.sensor).toMatchObject({ source: 'accelerometer', gravityReads: 'up', requestedRateHz: 60 });
    // About 60 a second on an idle machine; a busy one delivers fewer, which is not this test's matter.
    expect(done.sampleCount).toBeGreaterThan(50);
    expect(done.durationS).toBeGreaterThan(1.7);
    expect(done.steps.length).toBeLessThan(6);
  });

  it('falls back on motion events where the Generic Sensor is missing', async () => {
    await feed();
    await page.addInitScript(() => Reflect.deleteProperty(window, 'Accelerometer'));
    await load();
    await open(['settling', 'refused']);
    await start();
    const done = await until(['done', 'cut']);
    expect(done.sensor).toMatchObject({ source: 'devicemotion', claimedIntervalMs: 16 });
    // About 60 a second on an idle machine; a busy one delivers fewer, which is not this test's matter.
    expect(done.sampleCount).toBeGreaterThan(50);
  });

  it('says "no sensor" by each path: an error of the Generic Sensor, one event of nulls', async () => {
    await load();
    expect(await open(['settling', 'refused'])).toEqual({ phase: 'refused', problem: 'no-sensor' });
    await page.addInitScript(() => Reflect.deleteProperty(window, 'Accelerometer'));
    await load();
    expect(await open(['settling', 'refused'])).toEqual({ phase: 'refused', problem: 'no-sensor' });
  });

  it.each(['denied', 'prompt'] as const)('is refused when the permission is "%s"', async (setting) => {
    await setMotionPermission(page, served.url, setting);
    await feed();
    await load();
    expect(await open(['settling', 'refused'])).toEqual({ phase: 'refused', problem: 'not-allowed' });
  });

  it('ends when the permission is withdrawn, keeping what there is', async () => {
    await recording();
    await setMotionPermission(page, served.url, 'denied');
    const cut = await until(['cut', 'done']);
    expect(cut).toMatchObject({ phase: 'cut', reason: 'permission-withdrawn' });
    expect(cut.sampleCount).toBeGreaterThan(30);
  });

  it('ends when the sensor is lost, keeping what there is', async () => {
    await recording();
    feeding?.stop();
    await sensors?.remove();
    const cut = await until(['cut', 'done']);
    expect(cut.phase).toBe('cut');
    expect(['sensor-error', 'long-gap']).toContain(cut.reason);
    expect(cut.sampleCount).toBeGreaterThan(30);
  });

  it('refuses a sensor of 10 readings a second', async () => {
    sensors = await overrideSensors(page, { maximumFrequency: 10 });
    feeding = sensors.feed(trembling, 100);
    await load();
    expect(await open(['settling', 'refused'])).toEqual({ phase: 'refused', problem: 'slow-sensor' });
  });

  it('flags a page that was busy for a second, and records on', async () => {
    await recording();
    await page.evaluate(() => {
      for (const end = performance.now() + 1000; performance.now() < end;);
    });
    const done = await until(['cut', 'done']);
    expect(done.phase).toBe('done');
    expect(done.sensor?.interruption).toBe('main-thread-stall');
  });

  it('lets one tab record at a time', async () => {
    await feed();
    const other = await browser.context.newPage();
    await other.goto(served.url);
    await other.evaluate(() => window.field.openStore());
    await load();
    const rig = { durationS: 30, startBy: 'hand', practice: '?rig=handrail&pace=5' } as const;
    const openRig = (tab: Page) =>
      tab.evaluate(
        async (options) => (await window.field.session(options, ['settling', 'refused'])).phase,
        rig,
      );
    const phases = await Promise.all([openRig(page), openRig(other)]);
    expect(phases.sort()).toEqual(['refused', 'settling']);
    await other.close();
  });
});
