import type { Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Analysis } from '../../src/core/model/analysis.ts';
import { launchBrowser, serveApp, type ServedApp, type TestBrowser } from '../support/browser.ts';
import { scriptSensor, type ScriptedSensorOptions } from '../support/scripted-sensor.ts';
import { tappedStructureSamples } from '../support/tapped-structure.ts';

const RAIL = {
  rateHz: 60,
  // Until the last ring-down is below the noise: going back to rest before would be a knock of its own.
  durationS: 17,
  frequencyHz: 7.4,
  dampingRatio: 0.012,
  tapTimesS: [1.005, 4.005, 7.005],
  amplitudeMps2: 1,
};

interface KeptFact {
  readonly kind: string;
  readonly analysis: Analysis;
}

/** What the store really holds, past the app. */
function keptFacts(page: Page): Promise<KeptFact[]> {
  return page.evaluate(
    () =>
      new Promise<KeptFact[]>((resolve, reject) => {
        const opening = indexedDB.open('thrumbook');
        opening.onerror = () => reject(opening.error);
        opening.onsuccess = () => {
          const all = opening.result.transaction('facts').objectStore('facts').getAll();
          all.onsuccess = () => {
            opening.result.close();
            resolve((all.result as { fact: KeptFact }[]).map((row) => row.fact));
          };
        };
      }),
  );
}

/** Start, Take, Reading as a person does it, with three taps on the structure; ends on the reading's screen. */
async function takeReading(page: Page, url: string, as: ScriptedSensorOptions['as']): Promise<void> {
  const sensor = await scriptSensor(page, { as, rateHz: RAIL.rateHz, noiseMps2: 0.01, speed: 4 });
  await page.goto(url);
  await page
    .getByRole('button', { name: 'Take a reading' })
    .or(page.getByRole('link', { name: 'Take a reading' }))
    .click();
  await page.getByText('Handrail', { exact: true }).click();
  await page.getByRole('button', { name: 'Switch the sensor on' }).click();
  const cautions = page.getByRole('dialog');
  await cautions.getByRole('checkbox', { name: 'I have read this' }).check();
  await cautions.getByRole('button', { name: 'Switch the sensor on' }).click();
  await page.getByText('At rest. Tap now.').waitFor();
  await sensor.play(tappedStructureSamples(RAIL));
  const counted = page.getByText('3 taps', { exact: true });
  const result = page.getByText('Indicative survey, not a certified measurement');
  // On a busy machine the recording ends by itself before the count is looked at.
  await counted.or(result).first().waitFor();
  if (await counted.isVisible())
    await page
      .getByRole('button', { name: 'Enough, work it out' })
      .click({ timeout: 5000 })
      .catch(() => undefined);
  await result.waitFor();
}

describe.each(['accelerometer', 'devicemotion'] as const)('a first reading through %s', (as) => {
  let app: ServedApp;
  let browser: TestBrowser;

  beforeAll(async () => {
    app = await serveApp();
    browser = await launchBrowser();
  });
  afterAll(async () => {
    await browser.close();
    await app.stop();
  });

  it('gives the frequency within 0.2 % and the damping within 5 %, with intervals that say so', async () => {
    await takeReading(browser.page, app.url, as);
    const reading = (await keptFacts(browser.page)).find((fact) => fact.kind === 'reading');
    const [mode, ...others] = reading!.analysis.modes;
    expect(others).toEqual([]);
    expect(Math.abs(mode!.frequencyHz / RAIL.frequencyHz - 1)).toBeLessThan(0.002);
    expect(Math.abs(mode!.dampingRatio / RAIL.dampingRatio - 1)).toBeLessThan(0.05);
    expect(reading!.analysis.tapTimesS).toHaveLength(3);
    expect(mode!.frequencySdHz / RAIL.frequencyHz).toBeLessThan(0.001);
    expect(mode!.dampingRatioSd / RAIL.dampingRatio).toBeLessThan(0.05);
    const sentence = await browser.page.getByRole('heading', { level: 1 }).textContent();
    expect(sentence).toMatch(/7\.[34]\d*\s*Hz\s±/);
    expect(browser.faults).toEqual([]);
  });

  it('is still there with the server gone, the network off and the battery dead, and redone gives the same', async () => {
    const address = new URL(browser.page.url()).hash;
    await browser.page.evaluate(async () => void (await navigator.serviceWorker.ready));
    await app.stop();
    browser = await browser.killAndRestart();
    const { page } = browser;
    await browser.context.setOffline(true);
    await page.goto(app.url + address);
    await page.getByRole('heading', { level: 1 }).filter({ hasText: 'Hz' }).waitFor();
    const analysis = page.locator('summary').filter({ hasText: /^Analysis$/ });
    await analysis.click();
    await page.getByRole('button', { name: 'Analyse again' }).click();
    await page.getByText('The same numbers.').waitFor();
    expect(browser.faults).toEqual([]);
  });
});
