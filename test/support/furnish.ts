/** An invented place with sources and visits, made through the screens as a person would, on the practice rig. */
import type { Page } from 'playwright-core';
import { recordHere, takePracticeReading } from './app-steps.ts';

/** Ids without their kind, as they stand in the addresses. */
export interface Furnished {
  readonly site: string;
  readonly asset: string;
  readonly spot: string;
  readonly source: string;
  readonly reading: string;
  readonly earlier: string;
}

/** Every screen that an address leads to. */
export const screenHashes = {
  start: () => '#/',
  take: () => '#/take',
  reading: (ids: Furnished) => `#/reading/${ids.reading}`,
  readings: () => '#/readings',
  trash: () => '#/readings?trash=1',
  compare: (ids: Furnished) => `#/compare/${ids.earlier}/${ids.reading}`,
  assets: () => '#/assets',
  site: (ids: Furnished) => `#/site/${ids.site}`,
  asset: (ids: Furnished) => `#/asset/${ids.asset}`,
  spot: (ids: Furnished) => `#/spot/${ids.spot}`,
  series: (ids: Furnished) => `#/series/${ids.spot}`,
  sources: () => '#/sources',
  source: (ids: Furnished) => `#/source/${ids.source}`,
  'source-new': () => '#/source/new?kind=wind',
  'source-kind': (ids: Furnished) => `#/source/new?reading=${ids.reading}`,
  'hand-over': () => '#/hand-over',
  phone: () => '#/phone',
  'phone-check': () => '#/phone/check',
  'phone-storage': () => '#/phone/storage',
  'phone-limits': () => '#/phone/limits',
  'phone-about': () => '#/phone/about',
  'phone-privacy': () => '#/phone/privacy',
  'phone-cautions': () => '#/phone/cautions',
  'phone-licences': () => '#/phone/licences',
  'phone-log': () => '#/phone/log',
  pace: () => '#/pace?hz=7.4',
  lost: () => '#/nowhere',
} as const satisfies Readonly<Record<string, (ids: Furnished) => string>>;

/** Last part of the present hash. */
const idInAddress = (page: Page): string => new URL(page.url()).hash.split('/').at(-1) ?? '';

/** Simulated time runs this many times faster than the clock. */
const PACE = 20;

/** @param onState called with a name whenever a state is on screen that no address leads to. */
export async function furnish(
  page: Page,
  url: string,
  onState: (name: string) => Promise<void> = async () => {},
): Promise<Furnished> {
  await page.goto(`${url}?rig=handrail&pace=${PACE}`);
  await page.getByRole('button', { name: 'Take a reading' }).waitFor();
  await onState('start-new');
  await page.goto(`${url}?rig=handrail&pace=${PACE}#/assets`);
  const site = await addPlace(page, 'Add a place', 'Mill yard', 'Site');
  const asset = await addPlace(page, 'Add an asset', 'Quay stair, upper flight');
  const spot = await addPlace(page, 'Add a spot', 'Upper rail, mid-span');
  const readings: string[] = [];
  for (const f of ['7.4,11.9', '7.38,11.9', '7.05,11.8']) {
    await page.goto('about:blank');
    await page.goto(`${url}?rig=handrail&pace=${PACE}&f=${f}#/take?spot=${spot}`);
    await recordHere(page);
    readings.push(idInAddress(page));
  }
  await page.goto('about:blank');
  await page.goto(`${url}?rig=handrail&pace=${PACE}#/source/new?kind=footfall`);
  await page.getByRole('button', { name: 'Save' }).click();
  await page
    .getByRole('link', { name: /^People/ })
    .first()
    .click();
  await page.getByRole('heading', { level: 1, name: 'People' }).waitFor();
  const source = idInAddress(page);
  await page.goto(`${url}?rig=handrail&pace=${PACE}#/`);
  await takePracticeReading(page);
  return { site, asset, spot, source, reading: readings[2] ?? '', earlier: readings[0] ?? '' };
}

async function addPlace(page: Page, button: string, name: string, kind?: string): Promise<string> {
  await page.getByRole('button', { name: button }).click();
  const dialog = page.getByRole('dialog');
  if (kind) await dialog.getByRole('radio', { name: kind }).check({ force: true });
  await dialog.getByLabel('Name').fill(name);
  if (button === 'Add a spot') await dialog.getByLabel('Kind of spot').selectOption('handrail');
  await dialog.getByRole('button', { name: 'Add' }).click();
  await page.getByRole('heading', { level: 1, name }).waitFor();
  return idInAddress(page);
}
