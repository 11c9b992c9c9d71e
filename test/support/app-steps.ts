/** Steps that people take, by role and name: shared by the days, the first reading and the screenshots. */
import type { Page } from 'playwright-core';

export interface PracticeTake {
  /** Kind tile to choose; only asked the first time. */
  readonly kind?: string;
}

/** From the start screen to the open reading, on the practice rig that the address describes. */
export async function takePracticeReading(page: Page, options: PracticeTake = {}): Promise<void> {
  await page.getByRole('button', { name: 'Take a reading' }).click();
  await recordHere(page, options);
}

/** From the Take screen on: kind if asked, sensor on, cautions, recording, until the reading is open. */
export async function recordHere(page: Page, options: PracticeTake = {}): Promise<void> {
  const on = page.getByRole('button', { name: /^Switch the (sensor|practice rig) on$/ });
  const kind = page.getByRole('button', { name: options.kind ?? 'Handrail', exact: true });
  await on.or(kind).first().waitFor();
  if (await kind.isVisible()) await kind.click();
  await on.first().click();
  await confirmCautions(page);
  await page.getByRole('button', { name: 'Enough, work it out' }).click();
  await page.waitForURL(/#\/reading\//, { timeout: 30_000 });
}

/** Cautions come once a day and kind: confirmed where they come. */
export async function confirmCautions(page: Page): Promise<void> {
  const dialog = page.getByRole('dialog', { name: 'Before you start' });
  const sensor = page.getByRole('button', { name: /^(Cancel|Finish)$/ });
  await dialog.or(sensor).first().waitFor();
  if (!(await dialog.isVisible())) return;
  await dialog.getByLabel('I have read this').check();
  await dialog.getByRole('button', { name: /^Switch/ }).click();
}
