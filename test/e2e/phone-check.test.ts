import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { launchBrowser, serveApp, type ServedApp, type TestBrowser } from '../support/browser.ts';
import { scriptSensor } from '../support/scripted-sensor.ts';

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

describe('the check of this phone', () => {
  it('says what the sensor sees after ten seconds at rest, worked out in the worker, and keeps it', async () => {
    const { page } = browser;
    await scriptSensor(page, { as: 'accelerometer', rateHz: 60, noiseMps2: 0.01, speed: 4 });
    await page.goto(`${app.url}#/phone/check`);
    await page.getByText('Not checked yet.').waitFor();
    await page.getByRole('button', { name: 'Start the check' }).click();
    await page.getByRole('button', { name: 'Check again' }).waitFor({ timeout: 30_000 });
    expect(page.workers()).toHaveLength(1);
    await page.reload();
    await page.getByRole('button', { name: 'Check again' }).waitFor();
    const said = await page.locator('main').innerText();
    // Stamps of 4x speed: the scripted clock runs with them, so the sensor still has 60 samples a second.
    const rateHz = Number(/Samples\s+([\d.]+) \/s/.exec(said)?.[1]);
    expect(Math.abs(rateHz - 60)).toBeLessThan(0.5);
    // Uniform noise of half-width 0.01 has sd 0.01 / sqrt 3; one-sided density over 30 Hz: 1.05 mm/s² per root Hz.
    const noise = Number(/Noise\s+([\d.]+) mm/.exec(said)?.[1]);
    expect(noise).toBeGreaterThan(0.8);
    expect(noise).toBeLessThan(1.4);
    expect(browser.faults).toEqual([]);
  });
});
