/**
 * What can go wrong on the way to a first reading, in real Chromium, each with its way back; and recordings that come as
 * files. Check values: the played structure itself (7.4 Hz, 1.2 %, three taps).
 */
import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest';
import { confirmCautions, recordHere } from '../support/app-steps.ts';
import { launchBrowser, serveApp, type ServedApp, type TestBrowser } from '../support/browser.ts';
import { scriptSensor } from '../support/scripted-sensor.ts';
import { overrideSensors, setMotionPermission } from '../support/sensor-override.ts';
import { tappedStructureAt, tappedStructureSamples } from '../support/tapped-structure.ts';

const TRUE_HZ = 7.4;
const TRUE_DAMPING = 0.012;
/** Issue 2, "Must show" 2. */
const FREQUENCY_TOLERANCE = 0.002;
const DAMPING_TOLERANCE = 0.05;
/** Simulated time over real time: tests must not take the thirty seconds that a person has. */
const SPEED = 4;

const rail = {
  rateHz: 60,
  durationS: 16,
  frequencyHz: TRUE_HZ,
  dampingRatio: TRUE_DAMPING,
  tapTimesS: [0.5, 5.5, 10.5],
  amplitudeMps2: 1.5,
};
const threeTaps = tappedStructureSamples(rail);

/** Uniform numbers 0..1, the same in every run (Park & Miller 1988). */
function seededChance(seed: number): () => number {
  let state = seed;
  return () => {
    state = (state * 48271) % 2147483647;
    return state / 2147483647;
  };
}

let app: ServedApp;
let browser: TestBrowser;

beforeAll(async () => {
  app = await serveApp();
});
afterEach(() => browser.close());
afterAll(() => app.stop());

async function openStart(query = ''): Promise<void> {
  await browser.page.goto(`${app.url}${query}`);
  await browser.page.getByRole('button', { name: 'Take a reading' }).waitFor();
}

async function switchOn(): Promise<void> {
  const { page } = browser;
  await page.getByRole('button', { name: 'Take a reading' }).click();
  await page.getByRole('button', { name: 'Handrail', exact: true }).click();
  await page.getByRole('button', { name: /^Switch the (sensor|practice rig) on$/ }).click();
  await confirmCautions(page);
}

const heading = (name: string | RegExp) => browser.page.getByRole('heading', { level: 1, name });
const thisRound = () => browser.page.getByRole('list', { name: 'This round' });

describe('when the sensor does not answer', () => {
  it('says that access was refused, and goes on once it is allowed', async () => {
    browser = await launchBrowser();
    const { page } = browser;
    await setMotionPermission(page, app.url, 'denied');
    const sensors = await overrideSensors(page);
    const feeding = sensors.feed((timeS) => [0, 0, 9.81 + 0.3 * Math.sin(40 * timeS)], 100);
    await openStart();
    await switchOn();
    await heading('Motion access was refused').waitFor();
    await page.getByRole('alert').filter({ hasText: 'Motion sensors' }).waitFor();
    await setMotionPermission(page, app.url, 'granted');
    await page.getByRole('button', { name: 'Try again' }).click();
    await heading(/Wait\. It still moves\.|At rest/).waitFor();
    feeding.stop();
  });

  it('says that there is no sensor, and takes a practice reading that stays marked', async () => {
    browser = await launchBrowser();
    const { page } = browser;
    await openStart();
    await switchOn();
    await heading('No motion sensor here').waitFor();
    await page.getByRole('button', { name: 'Use the practice rig' }).click();
    await heading(/Wait|At rest/).waitFor();
    await page.getByRole('button', { name: 'Cancel' }).click();
    await page.goto(`${app.url}?rig=handrail&pace=20#/take`);
    await recordHere(page);
    await heading(/Rings at 7\.[34]/).waitFor();
    await page.goto(`${app.url}#/`);
    await thisRound().getByText('Practice').waitFor();
  });

  it('says that the sensor was lost, and keeps the way back', async () => {
    browser = await launchBrowser();
    const { page } = browser;
    const sensor = await scriptSensor(page, { as: 'accelerometer', rateHz: 60, speed: SPEED });
    await openStart();
    await switchOn();
    await heading('At rest. Tap now.').waitFor();
    await page.getByRole('button', { name: 'Start now' }).click();
    await sensor.play(threeTaps.slice(0, 400));
    await sensor.silence();
    await heading('The recording was cut').waitFor();
    await page.getByRole('button', { name: /take it again/i }).click();
    await page.getByRole('button', { name: 'Switch the sensor on' }).waitFor();
  });

  it('offers a recording that a dead battery cut off', async () => {
    browser = await launchBrowser();
    // Slow enough that thirty simulated seconds outlast the taps and the wait.
    await openStart('?rig=handrail&pace=5');
    await switchOn();
    await browser.page.getByRole('button', { name: 'Enough, work it out' }).waitFor();
    await browser.page.waitForTimeout(1500);
    browser = await browser.killAndRestart();
    const { page } = browser;
    await page.goto(app.url);
    await page.getByRole('heading', { name: 'A recording was cut off' }).waitFor();
    await page.getByRole('button', { name: 'Make a reading of it' }).click();
    await heading(/Rings at 7\.[34]/).waitFor();
    await page.goto(`${app.url}#/`);
    await thisRound().waitFor();
    expect(await page.getByRole('heading', { name: 'A recording was cut off' }).count()).toBe(0);
  });
});

describe('a recording that comes as a file', () => {
  // Noise and scatter of the stamps as every sensor has; without the scatter a folded mode could not be told from a direct one.
  const chance = seededChance(7);
  const rows = Array.from({ length: rail.durationS * rail.rateHz }, (_, i) => {
    const timeS = (i + 0.2 * (chance() - 0.5)) / rail.rateHz;
    const sample = tappedStructureAt(rail, timeS).map((value) => value + 0.02 * (chance() - 0.5));
    return [timeS.toFixed(6), ...sample].join(',');
  });
  const csv = ['time (s),x (m/s²),y (m/s²),z (m/s²)', ...rows].join('\n');

  const pick = async (name: string, text: string) => {
    const choosing = browser.page.waitForEvent('filechooser');
    await browser.page.getByRole('button', { name: 'Open a recording' }).click();
    await (await choosing).setFiles({ name, mimeType: 'text/csv', buffer: Buffer.from(text) });
  };

  it('becomes a reading, picked or dropped', async () => {
    browser = await launchBrowser({ viewport: { width: 1280, height: 800 } });
    const { page } = browser;
    await openStart();
    await pick('rail.csv', csv);
    const title = await heading(/Rings at/).innerText();
    const frequencyHz = Number(/([\d.]+)\s*Hz/.exec(title)?.[1]);
    const dampingRatio = Number(/damping\s+([\d.]+)\s*%/.exec(title)?.[1]) / 100;
    expect(Math.abs(frequencyHz / TRUE_HZ - 1)).toBeLessThan(FREQUENCY_TOLERANCE);
    expect(Math.abs(dampingRatio / TRUE_DAMPING - 1)).toBeLessThan(DAMPING_TOLERANCE);
    await page.goto(`${app.url}#/`);
    await page.evaluate((text) => {
      const data = new DataTransfer();
      data.items.add(new File([text], 'dropped.csv', { type: 'text/csv' }));
      dispatchEvent(new DragEvent('drop', { dataTransfer: data, cancelable: true, bubbles: true }));
    }, csv);
    await heading(/Rings at/).waitFor();
    await page.goto(`${app.url}#/readings`);
    await page.getByRole('link', { name: /dropped\.csv/ }).waitFor();
    await page.getByRole('link', { name: /rail\.csv/ }).waitFor();
  });

  it('is refused with row and reason, and nothing is stored', async () => {
    browser = await launchBrowser({ viewport: { width: 1280, height: 800 } });
    const { page } = browser;
    await openStart();
    await pick('bad.csv', ['time (s),x (m/s²)', '0,0.1', '0.016,oops', '0.033,0.2'].join('\n'));
    await page
      .getByRole('alert')
      .filter({ hasText: /bad\.csv.*row 3/i })
      .waitFor();
    await page.goto(`${app.url}#/readings`);
    await page.getByText('Nothing here.').waitFor();
  });
});
