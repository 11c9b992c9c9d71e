/*
 * `npm run soak -- packet [--readings 1000] [--flips 1000] [--fuzz 10000]`: a packet of a year's readings through real Chromium
 * with times and memory; random flips and random bytes against the reader.
 */
import { parseArgs } from 'node:util';
import { examinePacket } from '../../src/core/packet/packet-examine.ts';
import { revisionOf } from '../../src/core/packet/revision.ts';
import { launchBrowser } from '../support/browser.ts';
import { serveFieldPage } from '../support/field-bench.ts';
import { samplePacket, sourceOf } from '../support/sample-packet.ts';

const { values } = parseArgs({
  options: {
    readings: { type: 'string', default: '1000' },
    flips: { type: 'string', default: '1000' },
    fuzz: { type: 'string', default: '10000' },
    seed: { type: 'string', default: String(Date.now() % 1e6) },
  },
});
/** 60 s at 60 samples a second. */
const SAMPLE_COUNT = 3600;
const LIMIT_S = 10;
const LIMIT_HEAP_BYTES = 150e6;
const failures: string[] = [];
const check = (isFine: boolean, what: string) => {
  console.log(`${isFine ? 'ok  ' : 'FAIL'} ${what}`);
  if (!isFine) failures.push(what);
};

await roads(Number(values.readings));
await damage(Number(values.flips), Number(values.fuzz), Number(values.seed));
process.exitCode = failures.length === 0 ? 0 : 1;

async function roads(count: number): Promise<void> {
  const served = await serveFieldPage('exchange-page.ts');
  const browser = await launchBrowser();
  try {
    const { page } = browser;
    await page.goto(served.url);
    await page.evaluate(({ n, samples }) => window.packets.fill('phone', n, samples), {
      n: count,
      samples: SAMPLE_COUNT,
    });
    const before = await page.evaluate(() => window.packets.heapBytes());
    const written = await page.evaluate(() => window.packets.write('phone'));
    const afterWriting = await page.evaluate(() => window.packets.heapBytes());
    const first = await page.evaluate(() => window.packets.take('laptop'));
    const afterTaking = await page.evaluate(() => window.packets.heapBytes());
    const second = await page.evaluate(() => window.packets.take('laptop'));
    const megabytes = (bytes: number) => (bytes / 1e6).toFixed(0);
    console.log(
      `${count} readings, ${megabytes(written.bytes)} MB; heap ${megabytes(before)}, ${megabytes(afterWriting)}, ${megabytes(afterTaking)} MB`,
    );
    check(written.seconds < LIMIT_S, `written in ${written.seconds.toFixed(1)} s`);
    check(first.lookS < LIMIT_S, `read and checked in ${first.lookS.toFixed(1)} s`);
    check(first.takeS < LIMIT_S, `merged in ${first.takeS.toFixed(1)} s`);
    check(first.added === 2 * count && first.refused === 0, `${first.added} facts added, none refused`);
    check(second.added === 0, `second import adds ${second.added}, in ${second.lookS.toFixed(1)} s`);
    const grownBytes = Math.max(afterWriting, afterTaking) - before;
    check(grownBytes < LIMIT_HEAP_BYTES, `heap grew by ${megabytes(grownBytes)} MB`);
    check(browser.faults.length === 0, 'no faults');
  } finally {
    await browser.close();
    await served.stop();
  }
}

async function damage(flips: number, fuzz: number, seed: number): Promise<void> {
  let state = seed;
  // Park & Miller 1988, minimal standard.
  const random = (below: number) => (state = (state * 48_271) % 2_147_483_647) % below;
  const packet = await samplePacket();
  const revisions = new Map(packet.facts.map((fact) => [fact._id, revisionOf(fact)]));
  let wrong = 0;
  let lostMost = 0;
  const look = async (bytes: Uint8Array) => {
    const { facts } = await examinePacket(sourceOf(bytes));
    wrong += facts.filter(({ fact }) => revisions.get(fact._id) !== revisionOf(fact)).length;
    return packet.facts.length - facts.length;
  };
  for (let i = 0; i < flips; i += 1) {
    const bytes = packet.bytes.slice();
    bytes[random(bytes.length)]! ^= 1 << random(8);
    lostMost = Math.max(lostMost, await look(bytes));
  }
  check(wrong === 0, `${flips} flipped bits: ${wrong} wrong facts, at most ${lostMost} lost (seed ${seed})`);
  check(lostMost <= 1, 'one flip costs one entry at most');
  for (let i = 0; i < fuzz; i += 1) {
    const bytes = packet.bytes.slice(0, 1 + random(packet.bytes.length));
    for (let k = random(30); k > 0; k -= 1) bytes[random(bytes.length)] = random(256);
    await look(bytes);
  }
  check(wrong === 0, `${fuzz} cut and scribbled packets: ${wrong} wrong facts (seed ${seed})`);
}
