/** Walks through the states of Take that no address leads to, on the practice rig; each is named when it is on screen. */
import type { Page } from 'playwright-core';

export async function walkTakeStates(
  page: Page,
  url: string,
  onState: (name: string) => Promise<void>,
): Promise<void> {
  const button = (name: string | RegExp) => page.getByRole('button', { name });
  const heading = (name: string | RegExp) => page.getByRole('heading', { level: 1, name });
  await page.goto('about:blank');
  await page.goto(`${url}?rig=handrail&pace=2#/take?procedure=tap`);
  await button('Handrail').or(button('Switch the practice rig on')).first().waitFor();
  if (await heading('What are you measuring on?').isVisible()) {
    await onState('take-kinds');
    await button('Handrail').click();
  }
  await onState('take-prepare');
  await button(/^Circumstances/).click();
  await onState('take-circumstances');
  await button('Done').click();
  await button(/^Procedure/).click();
  await onState('take-procedure');
  await button('Done').click();
  await button('Switch the practice rig on').click();
  const cautions = page.getByRole('dialog', { name: 'Before you start' });
  await cautions
    .or(heading(/Wait|At rest/))
    .first()
    .waitFor();
  if (await cautions.isVisible()) {
    await onState('take-cautions');
    await cautions.getByLabel('I have read this').check();
    await cautions.getByRole('button', { name: /^Switch/ }).click();
  }
  await heading('Wait. It still moves.').waitFor();
  await onState('take-settling');
  await heading('Tap, then let it ring').waitFor();
  await page
    .getByText(/^[2-9] taps/)
    .first()
    .waitFor();
  await onState('take-recording');
  await button('Leave').click();
  await onState('take-leave');
  await button('Drop it').click();
  await button('Take a reading').waitFor();
  await page.goto('about:blank');
  await page.goto(`${url}?rig=handrail&pace=4&fail=16#/take?procedure=tap`);
  await button('Switch the practice rig on').click();
  await heading('The recording was cut').waitFor();
  await onState('take-cut');
  await button(/take it again/i).click();
  await button('Switch the practice rig on').waitFor();
  await page.goto('about:blank');
  await page.goto(`${url}#/take?procedure=tap`);
  await button('Switch the sensor on').click();
  await heading('No motion sensor here').waitFor();
  await onState('take-refused');
}
