/** Faults of measured files in twos, under every procedure: never an exception, never a number that is not finite, never slow. */
import { analyse } from '../../src/core/analyse.ts';
import { PROCEDURES } from '../../src/core/model/analysis.ts';
import { generateCase } from '../support/cases/generate-case.ts';
import { seededRandom } from '../support/cases/random.ts';
import { CASE_KINDS } from '../support/cases/truth.ts';
import { FAULTS, notFinite, spoiledRecording } from '../support/spoiled-recording.ts';

/** More processor time than this for a record of a few minutes is a fault, ms. */
const SLOW_MS = 4000;

const option = (name: string, otherwise: number): number => {
  const at = process.argv.indexOf(`--${name}`);
  return at < 0 ? otherwise : Number(process.argv[at + 1]);
};

const seed = option('seed', 1);
const count = option('n', 300);
const endMs = Date.now() + 1000 * option('seconds', 1800);
let bad = 0;
let done = 0;
let slowestMs = 0;
for (let i = 0; i < count && Date.now() < endMs; i++) {
  const random = seededRandom(seed, i);
  const kind = random.pick(CASE_KINDS);
  const made = generateCase(kind, seed, i);
  const faults = [random.pick(Object.keys(FAULTS)), random.pick(Object.keys(FAULTS))];
  const recording = spoiledRecording(made.recording, faults, random);
  for (const procedure of [...PROCEDURES, 'auto'] as const) {
    const before = process.cpuUsage();
    let fault: string | undefined;
    try {
      const found = notFinite(analyse(recording, { procedure, timing: 'auto' }));
      if (found !== undefined) fault = `not finite: ${found}`;
    } catch (error) {
      fault = error instanceof Error ? (error.stack ?? error.message) : String(error);
    }
    const spent = process.cpuUsage(before);
    const spentMs = (spent.user + spent.system) / 1000;
    slowestMs = Math.max(slowestMs, spentMs);
    if (fault === undefined && spentMs > SLOW_MS) fault = `slow: ${Math.round(spentMs)} ms`;
    done++;
    if (fault === undefined) continue;
    bad++;
    console.log(`${kind} seed ${seed} index ${i} [${faults.join(' + ')}] ${procedure}: ${fault}`);
  }
}
console.log(`${done} analyses, ${bad} faults, slowest ${Math.round(slowestMs)} ms`);
process.exitCode = bad ? 1 : 0;
