/*
 * `npm run bench -- field`: 10,000 readings in the store of real Chromium (budgets of design.md: list 300 ms, filter
 * 100 ms), and the cost of one save. Each time is the median of five.
 */
import { launchBrowser } from '../support/browser.ts';
import { serveFieldPage } from '../support/field-bench.ts';

const COUNT = 10_000;
const served = await serveFieldPage();
const browser = await launchBrowser();
try {
  const { page } = browser;
  await page.goto(served.url);
  const fillMs = await page.evaluate(async (count) => {
    await window.field.openStore();
    const startMs = performance.now();
    await window.field.fillWithReadings(count);
    return performance.now() - startMs;
  }, COUNT);
  const listMs: number[] = [];
  const openMs: number[] = [];
  for (let i = 0; i < 5; i += 1) {
    await page.goto(served.url);
    const times = await page.evaluate(async () => {
      const startMs = performance.now();
      await window.field.openStore();
      const openedMs = performance.now();
      await window.field.store().listReadings();
      return [openedMs - startMs, performance.now() - openedMs] as const;
    });
    openMs.push(times[0]);
    listMs.push(times[1]);
  }
  const filters = [
    { text: 'post 17' },
    { procedure: 'running' as const },
    { text: 'label 99', procedure: 'tap' as const },
  ];
  const filterMs = await page.evaluate(async (list) => {
    const times: number[] = [];
    const counts: number[] = [];
    for (const filter of list) {
      // The first question loads the names of spots and sites; later ones are what a person types.
      const startMs = performance.now();
      counts.push((await window.field.store().listReadings(filter)).length);
      times.push(performance.now() - startMs);
      const againMs = performance.now();
      await window.field.store().listReadings(filter);
      times.push(performance.now() - againMs);
    }
    return { times, counts };
  }, filters);
  const saveMs = await page.evaluate(async () => {
    const { readingDraft, sampleRecording } = window.field;
    const times: number[] = [];
    for (let i = 0; i < 5; i += 1) {
      const startMs = performance.now();
      await window.field.store().saveReading(readingDraft(), sampleRecording(3600));
      times.push(performance.now() - startMs);
    }
    return times;
  });
  const mergeMs = await page.evaluate(async () => {
    const { readingDraft, noisyRecording } = window.field;
    const store = window.field.store();
    const incoming = [];
    for (let i = 0; i < 50; i += 1) {
      const { _id } = await store.saveReading(readingDraft(), noisyRecording(3600));
      const raw = (await store.rawOf(_id))!;
      incoming.push({ fact: (await store.fact(_id))!.fact, raw });
    }
    await window.field.deleteDatabase();
    await window.field.openStore();
    await window.field.store().listReadings();
    const startMs = performance.now();
    const { added } = await window.field.store().putFacts(incoming);
    return (performance.now() - startMs) / added;
  });
  const rounded = (values: readonly number[]) => values.map((value) => Math.round(value));
  console.log(`fill ${COUNT} readings: ${Math.round(fillMs)} ms`);
  console.log(`open store: ${rounded(openMs).join(' ')} ms`);
  console.log(`list all, first time after a load: ${rounded(listMs).join(' ')} ms (budget 300)`);
  console.log(
    `filters, first and again: ${rounded(filterMs.times).join(' ')} ms (budget 100), found ${filterMs.counts.join(' ')}`,
  );
  console.log(`merge one of 60 s, in batches of 50: ${mergeMs.toFixed(1)} ms (budget of a packet: 10)`);
  console.log(`save one of 60 s: ${rounded(saveMs).join(' ')} ms`);
} finally {
  await browser.close();
  await served.stop();
}
