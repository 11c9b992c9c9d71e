/*
 * `npm run soak -- team-store [--readings 500] [--cuts 6] [--reloads 3] [--kills 2] [--seed 1]`: readings of 100 kB go from real
 * Chromium to a foreign CouchDB-protocol server under random cuts, reloads and kills. Exit status 1 when anything is missing.
 */
import { parseArgs } from 'node:util';
import { seededChance } from '../../src/capture/seeded-chance.ts';
import { pushUnderCuts } from '../support/team-trial.ts';

const { values } = parseArgs({
  strict: false,
  options: {
    readings: { type: 'string', default: '500' },
    cuts: { type: 'string', default: '6' },
    reloads: { type: 'string', default: '3' },
    kills: { type: 'string', default: '2' },
    seed: { type: 'string', default: '1' },
  },
});
const readingCount = Number(values['readings']);
const chance = seededChance(Number(values['seed']));

const figures = await pushUnderCuts({
  readingCount,
  cutCount: Number(values['cuts']),
  reloadCount: Number(values['reloads']),
  killCount: Number(values['kills']),
  chance: () => chance.uniform(),
});
const { arrivedCount, conflictCount, strangeCount, pulledCount, wrongCount, idleMs } = figures;
const isWhole = arrivedCount === readingCount && pulledCount === readingCount;
const isClean = conflictCount === 0 && strangeCount === 0 && wrongCount === 0;
const isGood = isWhole && isClean && idleMs < 200;
console.log(`${isGood ? 'ok  ' : 'FAIL'} team store under cuts ${JSON.stringify(figures)}`);
if (!isGood) process.exitCode = 1;
