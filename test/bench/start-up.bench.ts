/*
 * `npm run bench -- start-up`: how long until a person can press "Take a reading" (budgets of design.md), in the built
 * app on a four times slowed processor: a first visit over 1.6 Mbit/s with 150 ms round trip (3 s, 250 kB), and a cold
 * start after a flat battery without any network (1.0 s). Time counts from the start of the navigation to the frame
 * that shows the button. Long tasks while recording: `live`; 10,000 readings: `field`.
 */
import { loadavg } from 'node:os';
import type { Page } from 'playwright-core';
import { launchBrowser, serveApp, type TestBrowser } from '../support/browser.ts';
import { openSlowLine } from '../support/slow-line.ts';

const RUNS = 5;
const LINE = { bitsPerS: 1.6e6, roundTripMs: 150 };
const SLOWDOWN = 4;

type MarkedWindow = Window & { usableAtMs?: number };

/** Notes in every page from now on when the button stands in a finished frame. */
async function markUsable(page: Page): Promise<void> {
  await page.addInitScript(() => {
    const observer = new MutationObserver(() => {
      const isThere = [...document.querySelectorAll('a, button')].some((element) =>
        element.textContent.includes('Take a reading'),
      );
      if (!isThere) return;
      observer.disconnect();
      requestAnimationFrame(() =>
        setTimeout(() => ((window as MarkedWindow).usableAtMs = performance.now()), 0),
      );
    });
    observer.observe(document, { childList: true, subtree: true });
  });
}

async function slowDown(page: Page, rate: number): Promise<void> {
  const session = await page.context().newCDPSession(page);
  await session.send('Emulation.setCPUThrottlingRate', { rate });
}

async function usableAtMs(page: Page): Promise<number> {
  await page.waitForFunction(() => (window as MarkedWindow).usableAtMs !== undefined, undefined, {
    timeout: 60_000,
  });
  return page.evaluate(() => (window as MarkedWindow).usableAtMs!);
}

/** Resolves when a service worker has everything for work without a network. */
const isKept = (page: Page): Promise<void> =>
  page.evaluate(async () => void (await navigator.serviceWorker.ready));

async function firstVisit(url: string) {
  const line = await openSlowLine(url, LINE);
  const browser = await launchBrowser();
  try {
    const { page } = browser;
    await markUsable(page);
    await slowDown(page, SLOWDOWN);
    const startMs = performance.now();
    await page.goto(line.url, { waitUntil: 'commit' });
    const usableMs = await usableAtMs(page);
    const usableBytes = line.receivedBytes();
    await isKept(page);
    return { usableMs, usableBytes, keptMs: performance.now() - startMs, keptBytes: line.receivedBytes() };
  } finally {
    await browser.close();
    await line.stop();
  }
}

async function coldStarts(rate: number): Promise<number[]> {
  const app = await serveApp();
  let browser: TestBrowser = await launchBrowser();
  const times: number[] = [];
  try {
    await browser.page.goto(app.url);
    await isKept(browser.page);
    await app.stop();
    for (let i = 0; i < RUNS; i += 1) {
      browser = await browser.killAndRestart();
      await browser.context.setOffline(true);
      await markUsable(browser.page);
      await slowDown(browser.page, rate);
      await browser.page.goto(app.url, { waitUntil: 'commit' });
      times.push(await usableAtMs(browser.page));
    }
  } finally {
    await browser.close();
    await app.stop();
  }
  return times;
}

const median = (values: readonly number[]) => [...values].sort((a, b) => a - b)[values.length >> 1] ?? 0;
const whole = (values: readonly number[]) => values.map((value) => Math.round(value)).join(' ');
const kB = (bytes: number) => `${Math.round(bytes / 1000)} kB`;
const load = () => `load ${loadavg()[0]!.toFixed(1)}`;

const app = await serveApp();
const visits: Awaited<ReturnType<typeof firstVisit>>[] = [];
for (let i = 0; i < RUNS; i += 1) visits.push(await firstVisit(app.url));
await app.stop();
const [visit] = visits;
console.log(
  `first visit, 1.6 Mbit/s, 150 ms, CPU ${SLOWDOWN}x slower: usable after ${whole(visits.map((v) => v.usableMs))} ms, ` +
    `median ${whole([median(visits.map((v) => v.usableMs))])} (budget 3000), ${kB(visit!.usableBytes)} by then; ` +
    `kept for offline after ${whole([median(visits.map((v) => v.keptMs))])} ms, ${kB(visit!.keptBytes)} in all (budget 250 kB); ${load()}`,
);
for (const rate of [1, SLOWDOWN]) {
  const times = await coldStarts(rate);
  console.log(
    `cold start without network, CPU ${rate}x slower: usable after ${whole(times)} ms, ` +
      `median ${whole([median(times)])}${rate === SLOWDOWN ? ' (budget 1000)' : ''}; ${load()}`,
  );
}
