import { existsSync, readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { readCsv } from '../../src/core/packet/read-csv.ts';
import type { Recording } from '../../src/core/model/recording.ts';

const FOLDER = fileURLToPath(new URL('../../../shared/data/', import.meta.url));

/** True where the measured recordings beside the project are there; tests that need them skip visibly where not. */
export const hasMeasured = existsSync(FOLDER);

export function measuredRecording(name: string): Recording {
  const read = readCsv(readFileSync(`${FOLDER}${name}`, 'utf8'), { name });
  if (!read.ok) throw new Error(`${name}: ${read.problem.code}`);
  return read.value;
}
