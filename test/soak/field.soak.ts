/*
 * `npm run soak -- field [--kills 20] [--minutes 30] [--fuzz 10000] [--seed 1]`: recordings and the store under attack.
 * Prints one line of figures per proof; exit status 1 when one fails.
 */
import { parseArgs } from 'node:util';
import { fuzzReadBack } from '../support/fuzz-read-back.ts';
import { launchBrowser, type TestBrowser } from '../support/browser.ts';
import { serveFieldPage } from '../support/field-bench.ts';
import { seededChance } from '../../src/capture/seeded-chance.ts';
import { fuzzParsers } from './field-fuzz.ts';
import { recordLong } from './field-long-recording.ts';
import { killWhileMigrating, killWhileRecording, killWhileSaving, saveWithQuota } from './field-trials.ts';

const { values } = parseArgs({
  strict: false,
  options: {
    kills: { type: 'string', default: '20' },
    minutes: { type: 'string', default: '30' },
    fuzz: { type: 'string', default: '10000' },
    seed: { type: 'string', default: '1' },
  },
});
const killCount = Number(values['kills']);
const chance = seededChance(Number(values['seed']));
const served = await serveFieldPage();
let browser: TestBrowser = await launchBrowser();

function report(name: string, isGood: boolean, figures: object): void {
  console.log(`${isGood ? 'ok  ' : 'FAIL'} ${name} ${JSON.stringify(figures)}`);
  if (!isGood) process.exitCode = 1;
}

async function recordingKills(): Promise<void> {
  const lost: number[] = [];
  let strangeCount = 0;
  for (let i = 0; i < killCount; i += 1) {
    const trial = await killWhileRecording(browser, served.url, 1500 + 6000 * chance.uniform());
    browser = trial.browser;
    lost.push(trial.kill.lostS);
    if (trial.kill.matchIndex < 0) strangeCount += 1;
  }
  const mostS = Math.max(...lost);
  const meanS = lost.reduce((sum, one) => sum + one / lost.length, 0);
  report('kill while recording', mostS <= 2 && strangeCount === 0, { killCount, mostS, meanS, strangeCount });
}

async function savingKills(): Promise<void> {
  let acknowledgedCount = 0;
  let foundCount = 0;
  let isGood = true;
  for (let i = 0; i < killCount; i += 1) {
    const trial = await killWhileSaving(browser, served.url, 50 + 500 * chance.uniform());
    browser = trial.browser;
    acknowledgedCount += trial.acknowledged;
    foundCount += trial.found;
    isGood &&= trial.found >= trial.acknowledged;
  }
  report('kill while saving', isGood, { killCount, acknowledgedCount, foundCount });
}

async function migrationKills(): Promise<void> {
  const readingCount = 2000;
  const found: Record<string, number> = {};
  let isGood = true;
  for (let i = 0; i < killCount; i += 1) {
    const trial = await killWhileMigrating(browser, served.url, readingCount, 3000 * chance.uniform());
    browser = trial.browser;
    const { versionFound, summaryCount, listed } = trial.kill;
    const state = `version ${versionFound}, ${summaryCount} summaries`;
    found[state] = (found[state] ?? 0) + 1;
    isGood &&= listed === readingCount && [0, readingCount].includes(summaryCount);
  }
  report('kill while migrating', isGood, { killCount, ...found });
}

async function quotas(): Promise<void> {
  const savedCounts: number[] = [];
  let isGood = true;
  for (let point = 0; point < 40; point += 1) {
    const trial = await saveWithQuota(browser.page, served.url, 20_000 + point * 25_000);
    savedCounts.push(trial.savedCount);
    isGood &&= trial.code === 'quota' && trial.savedCount === trial.wholeCount && trial.isGoingOn;
  }
  report('quota', isGood, { trialCount: savedCounts.length, savedCounts });
}

async function longRecording(): Promise<void> {
  const long = await recordLong(Number(values['minutes']) * 60);
  const isGood = long.lostCount === 0 && long.differentCount === 0 && long.growthBytes <= 5_000_000;
  report('long recording', isGood, long);
}

try {
  await recordingKills();
  await savingKills();
  await migrationKills();
  await quotas();
  const fuzzCount = Number(values['fuzz']);
  for (const [name, caseCount] of fuzzParsers(fuzzCount)) report(name, true, { caseCount });
  await fuzzReadBack(fuzzCount);
  report('fuzz read-back', true, { caseCount: fuzzCount });
  if (Number(values['minutes']) > 0) await longRecording();
} finally {
  await browser.close();
  await served.stop();
}
