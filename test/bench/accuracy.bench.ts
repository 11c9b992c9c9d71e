/**
 * Accuracy on fresh generated records, as ratios to the Cramér-Rao bound.
 *   npx tsx test/bench/accuracy.bench.ts [--kind A1,B] [--n 100] [--seed 7] [--procedure own|auto] [--list] [--write FOLDER]
 * --list prints every failure and outlier; --write keeps the records as CSV and JSON for the shared scorer.
 */
import { mkdirSync } from 'node:fs';
import { parseArgs } from 'node:util';
import { analyse } from '../../src/core/analyse.ts';
import type { Procedure } from '../../src/core/model/analysis.ts';
import { generateCase } from '../support/cases/generate-case.ts';
import { scoreRecord, scoreTable } from '../support/cases/score-case.ts';
import type { RecordScore } from '../support/cases/score-case.ts';
import { CASE_KINDS } from '../support/cases/truth.ts';
import type { CaseKind } from '../support/cases/truth.ts';
import { writeCase } from '../support/cases/write-case.ts';

/** An error of more bounds than this is listed as an outlier. */
const OUTLIER_BOUNDS = 4;

export const procedureOfKind = (kind: CaseKind): Procedure =>
  kind === 'B' ? 'ambient' : kind === 'D' ? 'coastdown' : /^A[123]/.test(kind) ? 'tap' : 'running';

const { values } = parseArgs({
  args: process.argv.slice(2).filter((a) => a !== 'accuracy'),
  allowPositionals: true,
  options: {
    kind: { type: 'string', default: CASE_KINDS.join(',') },
    n: { type: 'string', default: '40' },
    seed: { type: 'string', default: '7' },
    procedure: { type: 'string', default: 'own' },
    list: { type: 'boolean', default: false },
    write: { type: 'string' },
  },
});

function scored(kind: CaseKind, index: number): { score: RecordScore; ms: number } {
  const generated = generateCase(kind, Number(values.seed), index);
  if (values.write) writeCase(values.write, generated);
  const procedure = values.procedure === 'auto' ? 'auto' : procedureOfKind(kind);
  const before = performance.now();
  const outcome = analyse(generated.recording, { procedure, timing: 'auto' });
  const ms = performance.now() - before;
  const answer = outcome.ok ? outcome.value.analysis : { problem: outcome.problem.code };
  return { score: scoreRecord(generated.name, generated.truth, answer), ms };
}

function list(record: RecordScore): void {
  for (const { mode, failure, found } of record.modes) {
    const truth = `${record.name} true ${mode.f_hz.toFixed(3)} Hz ${(100 * mode.zeta).toFixed(2)} % (cv ${((100 * (mode.crlb_zeta as number)) / mode.zeta).toFixed(1)} %, step ${record.truth.device.q})`;
    if (failure) console.log(`FAIL ${truth}: ${failure}`);
    if (!found) continue;
    const f = (found.frequencyHz - mode.f_hz) / (mode.crlb_f as number);
    const z = (found.dampingRatio - mode.zeta) / (mode.crlb_zeta as number);
    if (Math.max(Math.abs(f), Math.abs(z)) > OUTLIER_BOUNDS)
      console.log(
        `OUT  ${truth}: f ${f.toFixed(1)} z ${z.toFixed(1)} bounds; said sd f ${(found.frequencySdHz / (mode.crlb_f as number)).toFixed(1)} z ${(found.dampingRatioSd / (mode.crlb_zeta as number)).toFixed(1)}; ${record.answered}`,
      );
  }
  if (record.spuriousCount) console.log(`EXTRA ${record.name}: ${record.answered}`);
  if (record.right === false || record.fold === 'wrong' || record.fold === 'none')
    console.log(
      `WRONG ${record.name} ${record.fold ?? ''} ${JSON.stringify({ ...record.truth, device: undefined })}: ${record.answered}`,
    );
}

if (values.write) mkdirSync(values.write, { recursive: true });
const records: RecordScore[] = [];
const times: Record<string, number[]> = {};
for (const kind of values.kind.split(',') as CaseKind[])
  for (let index = 0; index < Number(values.n); index++) {
    const { score, ms } = scored(kind, index);
    records.push(score);
    (times[kind] ??= []).push(ms);
    if (values.list) list(score);
  }
const rounded = Object.entries(scoreTable(records)).map(([name, row]) => [
  name,
  Object.fromEntries(Object.entries(row).map(([key, v]) => [key, +v.toFixed(3)])),
]);
console.table(Object.fromEntries(rounded));
for (const [kind, ms] of Object.entries(times)) {
  ms.sort((a, b) => a - b);
  console.log(`${kind}: median ${ms[ms.length >> 1]?.toFixed(0)} ms, longest ${ms.at(-1)?.toFixed(0)} ms`);
}
