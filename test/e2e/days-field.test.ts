/** The days of the two people on site (design: the job), on a phone, without a network, by role and name. */
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { confirmCautions, recordHere, takePracticeReading } from '../support/app-steps.ts';
import { launchBrowser, serveApp, type ServedApp, type TestBrowser } from '../support/browser.ts';

let app: ServedApp;
let browser: TestBrowser;

beforeAll(async () => {
  app = await serveApp();
});
afterAll(() => app.stop());

/** Opens the app, lets it settle in for offline use, and takes the server away. */
async function goOffline(query: string): Promise<void> {
  browser = await launchBrowser({ viewport: { width: 360, height: 740 } });
  browser.page.setDefaultTimeout(10_000);
  await app.start();
  await browser.page.goto(`${app.url}${query}`);
  await browser.page.waitForFunction(() => navigator.serviceWorker.controller?.state === 'activated');
  await app.stop();
  await browser.context.setOffline(true);
}

const heading = (name: string | RegExp) => browser.page.getByRole('heading', { level: 1, name });
const button = (name: string | RegExp) => browser.page.getByRole('button', { name });

describe('the inspector: five spots, one of them twice, no signal', () => {
  beforeAll(() => goOffline('?rig=handrail&pace=20'));
  afterAll(() => browser.close());

  it('goes from spot to spot with one tap, names them on the way, and visits one again', async () => {
    const { page } = browser;
    await takePracticeReading(page);
    for (const spot of ['Post 1', 'Post 2', 'Post 3', 'Post 4']) {
      await button('Next spot').click();
      await button(/^Spot/).click();
      const dialog = page.getByRole('dialog', { name: 'Which spot?' });
      const known = dialog.getByLabel('Known spots');
      await dialog.getByLabel('Name of the spot').waitFor();
      if (await known.isVisible()) await known.selectOption({ label: 'A new spot' });
      await dialog.getByLabel('Name of the spot').fill(spot);
      await dialog.getByLabel(/^Asset/).fill('Gallery rail');
      await dialog.getByLabel(/^Site/).fill('Mill yard');
      await dialog.getByRole('button', { name: 'Use this spot' }).click();
      await dialog.waitFor({ state: 'detached' });
      await recordHere(page);
    }
    await button('Same spot again').click();
    await page.getByText('Post 4').waitFor();
    await recordHere(page);
    await page.getByRole('link', { name: 'Start' }).click();
    const round = page.getByRole('list', { name: 'This round' });
    await round.getByRole('link').nth(5).waitFor();
    expect(await round.getByRole('link').count()).toBe(6);
    expect(await round.getByRole('link', { name: /Gallery rail · Post 4/ }).count()).toBe(2);
  });

  it('loses nothing when the back button ends a recording', async () => {
    const { page } = browser;
    await page.getByRole('link', { name: 'Start' }).click();
    await button('Take a reading').click();
    await button('Switch the practice rig on').click();
    await button('Enough, work it out').waitFor();
    await page.goBack();
    await page.getByText('The reading is kept.').waitFor();
    await page.getByRole('button', { name: 'Open', exact: true }).click();
    await heading(/Rings at 7\.[34]/).waitFor();
    await page.getByRole('link', { name: 'Start' }).click();
  });

  it('sees what the visits to that spot say, and the way back leads back', async () => {
    const { page } = browser;
    await page.getByRole('link', { name: 'Assets' }).click();
    await page.getByRole('link', { name: /Gallery rail/ }).click();
    await page
      .getByRole('list', { name: 'Spots' })
      .getByRole('link', { name: /^Post 4/ })
      .click();
    await heading('Post 4').waitFor();
    await page.getByText(/^Frequency since the first visit: no change/i).waitFor();
    await page.goBack();
    await heading('Gallery rail').waitFor();
    await page.goBack();
    await heading('Assets').waitFor();
    expect(browser.faults).toEqual([]);
  });
});

describe('the technician: a pump base running, then stopped and tapped', () => {
  beforeAll(() => goOffline('?rig=pump&pace=20'));
  afterAll(() => browser.close());

  it('records the running machine first', async () => {
    const { page } = browser;
    await button('Take a reading').click();
    await button('Machine base').click();
    await button(/^Procedure/).click();
    await page.getByRole('radio', { name: /Running machine/ }).check({ force: true });
    await button('Done').click();
    await button('Switch the practice rig on').click();
    await confirmCautions(page);
    await page.waitForURL(/#\/reading\//);
    await page
      .getByRole('main')
      .getByText(/16\.1\d* Hz/)
      .first()
      .waitFor();
  });

  it('stops it, taps it, and enters the drive', async () => {
    const { page } = browser;
    await page.goto(`${app.url}?rig=handrail&f=18.6&damping=2.5&strength=2&pace=20#/take?procedure=tap`);
    await recordHere(page);
    await heading(/Rings at 18\.[56]/).waitFor();
    await page
      .getByRole('link', { name: /Add what shakes it|Add a source/ })
      .first()
      .click();
    await page.getByRole('link', { name: /machine/i }).click();
    await page.getByLabel('Speed', { exact: true }).fill('600-1500');
    await page.getByLabel('The speed can be set within the range').check();
    await page.getByRole('heading', { name: /^Gives \d+ forcings/ }).waitFor();
    await button('Save').click();
    await heading(/Rings at 18\.[56]/).waitFor();
  });

  it('reads which speeds to keep out of', async () => {
    await browser.page
      .getByText(/Keep out of/)
      .first()
      .waitFor();
    await browser.page.getByText('Indicative survey, not a certified measurement').first().waitFor();
    expect(browser.faults).toEqual([]);
  });
});
