/** What the survey asks and answers on the screens: whose vibration, class of the spot, limits, added mass. By role and name. */
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { confirmCautions } from '../support/app-steps.ts';
import { launchBrowser, serveApp, type ServedApp, type TestBrowser } from '../support/browser.ts';

let app: ServedApp;
let browser: TestBrowser;
let spot = '';

beforeAll(async () => {
  app = await serveApp();
  browser = await launchBrowser({ viewport: { width: 412, height: 915 } });
  browser.page.setDefaultTimeout(10_000);
});
afterAll(async () => {
  await browser.close();
  await app.stop();
});

const button = (name: string | RegExp) => browser.page.getByRole('button', { name });

async function go(query: string, hash: string): Promise<void> {
  await browser.page.goto('about:blank');
  await browser.page.goto(`${app.url}?${query}${hash}`);
}

async function addSpot(name: string, kind: string): Promise<string> {
  const { page } = browser;
  await go('rig=pump&pace=20', '#/assets');
  await button('Add a place').click();
  await page
    .getByRole('dialog')
    .getByRole('radio', { name: /^Asset/ })
    .check({ force: true });
  await page.getByRole('dialog').getByLabel('Name').fill('Mill pump');
  await page.getByRole('dialog').getByRole('button', { name: 'Add' }).click();
  await button('Add a spot').click();
  const dialog = page.getByRole('dialog');
  await dialog.getByLabel('Name').fill(name);
  await dialog.getByLabel('Kind of spot').selectOption(kind);
  await dialog.getByRole('button', { name: 'Add' }).click();
  await page.getByRole('heading', { level: 1, name }).waitFor();
  return new URL(page.url()).hash.split('/').at(-1) ?? '';
}

/** A running reading at the spot; with the machine off where that is said under the circumstances. */
async function recordRunning(query: string, isOff: boolean): Promise<void> {
  const { page } = browser;
  await go(query, `#/take?spot=${spot}&procedure=running`);
  if (isOff) {
    await button(/^Circumstances/).click();
    const machine = page.getByRole('dialog').getByRole('group', { name: 'Machine' });
    await machine.getByRole('radio', { name: 'Off', exact: true }).check({ force: true });
    await button('Done').click();
  }
  await button('Switch the practice rig on').click();
  await confirmCautions(page);
  await page.waitForURL(/#\/reading\//, { timeout: 30_000 });
  await page.getByRole('heading', { level: 1, name: /tone/i }).waitFor();
}

describe('a bearing housing, running and off', () => {
  it('asks for the other reading, and tells whose vibration each tone is', async () => {
    const { page } = browser;
    spot = await addSpot('Drive end', 'bearing-housing');
    await recordRunning('rig=pump&pace=20', false);
    await page.getByText('Take a reading at this spot with the machine off').waitFor();
    // With the pump off, a neighbour at 1,260 r/min is left: weaker, at another frequency.
    await recordRunning('rig=pump&pace=20&speed=1260&unbalance=0.2', true);
    const origins = page.getByRole('region', { name: 'Whose vibration it is' });
    await origins.getByText(/16\.[12]\d* Hz: Gone with the machine off: it is this machine’s\./).waitFor();
    await origins.getByText('Against the reading with the machine running').waitFor();
  });

  it('is graded once what it is has been said, in two taps', async () => {
    const { page } = browser;
    const levels = page.getByRole('region', { name: 'How strong the shaking is' });
    await levels
      .getByText(/the class is not known/)
      .first()
      .waitFor();
    await levels.getByRole('button', { name: 'Say what it is' }).click();
    const dialog = page.getByRole('dialog', { name: 'Say what it is' });
    await dialog.getByLabel('Rated power').fill('30');
    await dialog.getByLabel('Support').selectOption('Rigid');
    await dialog.getByRole('button', { name: 'Save' }).click();
    await levels
      .getByText(/zone [ABCD]/)
      .first()
      .waitFor();
    expect(await levels.getByText(/the class is not known/).count()).toBe(0);
  });
});

describe('limits of the verdicts', () => {
  it('are set on This phone, and a reading says that they are one’s own', async () => {
    const { page } = browser;
    const reading = new URL(page.url()).hash;
    await go('rig=pump&pace=20', '#/phone/limits');
    await page.getByLabel('Coincident within').fill('40');
    await page.getByText('Use a number from 0 to 20.').waitFor();
    await page.getByLabel('Coincident within').fill('8');
    await page.getByText('Readings say that the limits are your own.').waitFor();
    await go('rig=pump&pace=20', reading);
    await page.getByRole('link', { name: 'See the limits' }).click();
    await button('Back to the usual limits').click();
    await page.getByText('These are the usual limits.').waitFor();
    expect(await page.getByLabel('Coincident within').inputValue()).toBe('5');
  });
});

describe('an added-mass test', () => {
  it('is kept with the spot, and its ways out are told in kilograms', async () => {
    const { page } = browser;
    spot = await addSpot('Rail, mid-span', 'handrail');
    for (const f of ['14.34', '14.9']) {
      await go(`rig=handrail&pace=20&f=${f}`, `#/take?spot=${spot}`);
      await button('Switch the practice rig on').click();
      await confirmCautions(page);
      await page.waitForURL(/#\/reading\//, { timeout: 30_000 });
    }
    const reading = new URL(page.url()).hash;
    await go('rig=handrail&pace=20', `#/series/${spot}`);
    await page.getByLabel('Without the mass').locator('option').nth(1).waitFor({ state: 'attached' });
    const [withMass, without] = await page.getByLabel('Without the mass').locator('option').all();
    await page.getByLabel('Without the mass').selectOption(await without!.getAttribute('value'));
    await page.getByLabel('With the mass').selectOption(await withMass!.getAttribute('value'));
    await page.getByLabel('Added mass', { exact: true }).last().fill('0.5');
    await page.getByText(/moves an effective mass of 6\.\d* kg/).waitFor();
    await page.getByText(/A phone of 0.2 kg lying there lowers the frequency by 1\.\d %/).waitFor();
    await button('Use it for the ways out of this spot').click();
    await page.getByText('now told in kg and N/mm too').waitFor();
    await go('rig=handrail&pace=20', '#/source/new?kind=band');
    await page.getByLabel('Frequency', { exact: true }).fill('14.8');
    await button('Save').click();
    await go('rig=handrail&pace=20', reading);
    await page
      .getByText(/That is .* kg there/)
      .first()
      .waitFor();
    expect(browser.faults).toEqual([]);
  });
});
