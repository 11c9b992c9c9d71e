/** The analysis command: one line of JSON per recording (see README, "On a laptop"). */
import { analyse } from '../core/analyse.ts';
import type { Analysis } from '../core/model/analysis.ts';
import type { Separation } from '../core/model/judgement.ts';
import type { Outcome } from '../core/model/outcome.ts';
import type { Problem } from '../core/model/problem.ts';
import type { Source } from '../core/model/source.ts';
import { readCsv } from '../core/packet/read-csv.ts';
import { judge } from '../core/survey/judge.ts';
import { problemSentence } from '../text/problems.ts';
import { ANALYSE_USAGE, parseAnalyseArguments, type AnalyseArguments } from './analyse-arguments.ts';
import { readSourcesFile } from './read-sources-file.ts';
import { readTextFile } from './read-text-file.ts';

const ALL_ANALYSED = 0;
const WRONG_USE = 2;
const SOME_NOT_ANALYSED = 3;

type JudgedAnalysis = Analysis & { readonly separations: readonly Separation[] };

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
  const sources = await readSourcesFile(parsed.sourcesPath);
  if (!sources.ok) {
    process.stderr.write(`${parsed.sourcesPath}: ${problemSentence(sources.problem)}\n`);
    return WRONG_USE;
  }
  let status = ALL_ANALYSED;
  for (const file of parsed.files) {
    const outcome = await analyseFile(file, parsed, sources.value);
    if (!outcome.ok) status = SOME_NOT_ANALYSED;
    await printLine(file, outcome);
  }
  return status;
}

async function analyseFile(
  file: string,
  { unit, settings }: AnalyseArguments,
  sources: readonly Source[],
): Promise<Outcome<JudgedAnalysis>> {
  const text = await readTextFile(file);
  if (!text.ok) return text;
  const recording = readCsv(text.value, unit === undefined ? { name: file } : { name: file, unit });
  if (!recording.ok) return recording;
  const result = analyse(recording.value, settings);
  if (!result.ok) return result;
  const { analysis } = result.value;
  return { ok: true, value: { ...analysis, separations: judge(analysis, sources).separations } };
}

async function printLine(file: string, outcome: Outcome<JudgedAnalysis>): Promise<void> {
  const line = outcome.ok
    ? { file, analysis: outcome.value }
    : { file, problem: problemRecord(outcome.problem) };
  if (!process.stdout.write(`${JSON.stringify(line)}\n`)) {
    await new Promise((resolve) => process.stdout.once('drain', resolve));
  }
}

function problemRecord(problem: Problem): Record<string, string | number> {
  return { ...problem.facts, code: problem.code, message: problemSentence(problem) };
}

process.exitCode = await main(process.argv.slice(2));
