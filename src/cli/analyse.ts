/** The analysis command: one line of JSON per recording (see README, "On a laptop"). */
import { analyse } from '../core/analyse.ts';
import type { Analysis } from '../core/model/analysis.ts';
import type { Outcome } from '../core/model/outcome.ts';
import type { Problem } from '../core/model/problem.ts';
import { readCsv } from '../core/packet/read-csv.ts';
import { problemSentence } from '../text/problems.ts';
import { ANALYSE_USAGE, parseAnalyseArguments, type AnalyseArguments } from './analyse-arguments.ts';
import { readTextFile } from './read-text-file.ts';

const ALL_ANALYSED = 0;
const WRONG_USE = 2;
const SOME_NOT_ANALYSED = 3;

async function main(args: readonly string[]): Promise<number> {
  if (args.includes('--help')) {
    process.stderr.write(`${ANALYSE_USAGE}\n`);
    return ALL_ANALYSED;
  }
  const parsed = parseAnalyseArguments(args);
  if (typeof parsed === 'string') {
    process.stderr.write(`${parsed}\n\n${ANALYSE_USAGE}\n`);
    return WRONG_USE;
  }
  let status = ALL_ANALYSED;
  for (const file of parsed.files) {
    const outcome = await analyseFile(file, parsed);
    if (!outcome.ok) status = SOME_NOT_ANALYSED;
    await printLine(file, outcome);
  }
  return status;
}

async function analyseFile(file: string, { unit, settings }: AnalyseArguments): Promise<Outcome<Analysis>> {
  const text = await readTextFile(file);
  if (!text.ok) return text;
  const recording = readCsv(text.value, unit === undefined ? { name: file } : { name: file, unit });
  if (!recording.ok) return recording;
  const result = analyse(recording.value, settings);
  return result.ok ? { ok: true, value: result.value.analysis } : result;
}

async function printLine(file: string, outcome: Outcome<Analysis>): Promise<void> {
  const line = outcome.ok
    ? { file, analysis: { ...outcome.value, separations: [] } }
    : { file, problem: flatProblem(outcome.problem) };
  if (!process.stdout.write(`${JSON.stringify(line)}\n`)) {
    await new Promise((resolve) => process.stdout.once('drain', resolve));
  }
}

function flatProblem(problem: Problem): Record<string, string | number> {
  return { code: problem.code, ...problem.facts, message: problemSentence(problem) };
}

process.exitCode = await main(process.argv.slice(2));
