/**
 * Confusion of the procedure `auto` on generated records, and what it says of measured ones where they are present.
 *   npx tsx test/bench/recognition.bench.ts [--n 40] [--seed 7]
 */
import { existsSync, readFileSync, readdirSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { parseArgs } from 'node:util';
import { recogniseProcedure } from '../../src/core/modes/recognise-procedure.ts';
import { readCsv } from '../../src/core/packet/read-csv.ts';
import { conditionRecording } from '../../src/core/signal/condition-recording.ts';
import type { Recording } from '../../src/core/model/recording.ts';
import { generateCase } from '../support/cases/generate-case.ts';
import { CASE_KINDS } from '../support/cases/truth.ts';

const { values } = parseArgs({
  args: process.argv.slice(2).filter((a) => a !== 'recognition'),
  allowPositionals: true,
  options: {
    n: { type: 'string', default: '40' },
    seed: { type: 'string', default: '7' },
    list: { type: 'boolean', default: false },
  },
});

const recognised = (recording: Recording): string => {
  const conditioned = conditionRecording(recording, 'auto');
  return conditioned.ok ? recogniseProcedure(conditioned.value) : conditioned.problem.code;
};

const table: Record<string, Record<string, number>> = {};
for (const kind of CASE_KINDS)
  for (let index = 0; index < Number(values.n); index++) {
    const { recording, truth, name } = generateCase(kind, Number(values.seed), index);
    const row = (table[truth.sub ? `${kind} ${truth.sub}` : kind] ??= {});
    const said = recognised(recording);
    row[said] = (row[said] ?? 0) + 1;
    const mode = truth.modes?.[0];
    if (values.list)
      console.log(
        name,
        truth.sub ?? '',
        said,
        mode ? `${mode.f_hz.toFixed(2)} Hz ${(100 * mode.zeta).toFixed(2)} %` : '',
      );
  }
console.table(table);

const folder = fileURLToPath(new URL('../../../shared/data/', import.meta.url));
if (existsSync(folder))
  for (const file of readdirSync(folder).filter((name) => name.endsWith('.csv'))) {
    const read = readCsv(readFileSync(folder + file, 'utf8'), { name: file });
    console.log(file, read.ok ? recognised(read.value) : read.problem.code);
  }
