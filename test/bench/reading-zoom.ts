/**
 * Interaction to next paint while the ladder of a reading with over twenty forcings is zoomed by wheel and a slider is
 * moved: `npx tsx test/bench/reading-zoom.ts`. Budget 100 ms (issue 6); also with a processor four times as slow.
 */
import { launchBrowser } from '../support/browser.ts';
import { servedPreview } from '../preview/build-preview.ts';

const preview = await servedPreview('reading');
const browser = await launchBrowser({ viewport: { width: 412, height: 915 } });
const { page } = browser;
const session = await browser.context.newCDPSession(page);

const measured = async (slowdown: number): Promise<void> => {
  await session.send('Emulation.setCPUThrottlingRate', { rate: 1 });
  await page.goto(`${preview.url}?example=many`);
  await page.locator('.u-over').first().waitFor();
  await session.send('Emulation.setCPUThrottlingRate', { rate: slowdown });
  // from the event to the second frame after it: its drawing is then on the screen
  await page.evaluate(() => {
    const delays: number[] = [];
    Object.assign(window, { delays });
    for (const type of ['wheel', 'input'])
      addEventListener(
        type,
        (event) =>
          requestAnimationFrame(() =>
            requestAnimationFrame(() => delays.push(performance.now() - event.timeStamp)),
          ),
        { capture: true, passive: true },
      );
  });
  const take = () => page.evaluate(() => (window as unknown as { delays: number[] }).delays.splice(0));
  const ladder = page.getByRole('img', { name: /Ladder of frequencies/ });
  await ladder.click({ position: { x: 150, y: 250 } });
  for (let i = 0; i < 40; i += 1) {
    await page.mouse.wheel(0, i % 20 < 10 ? -100 : 100);
    await page.waitForTimeout(40);
  }
  const zoom = await take();
  await page.getByRole('button', { name: 'Try a change' }).click();
  const slider = page.getByRole('slider', { name: 'Stiffness' });
  await slider.focus();
  for (let i = 0; i < 40; i += 1) {
    await page.keyboard.press('ArrowRight');
    await page.waitForTimeout(40);
  }
  const slide = await take();
  for (const [name, delays] of [
    ['zoom', zoom],
    ['slider', slide],
  ] as const) {
    const sorted = [...delays].sort((a, b) => a - b);
    const at = (share: number) => Math.round(sorted[Math.floor(share * (sorted.length - 1))] ?? NaN);
    process.stdout.write(
      `${name}, processor ${slowdown}x slower: ${delays.length} events, median ${at(0.5)} ms, 95 % ${at(0.95)} ms, largest ${at(1)} ms to paint\n`,
    );
  }
};

for (const slowdown of [1, 4]) await measured(slowdown);
await browser.close();
await preview.close();
