/** The analysis command: one line of JSON per recording (see README, "On a laptop"). */
import { analyse } from '../core/analyse.ts';
import type { Analysis } from '../core/model/analysis.ts';
import type { Separation } from '../core/model/judgement.ts';
import { failure, success, type Outcome } from '../core/model/outcome.ts';
import type { Problem } from '../core/model/problem.ts';
import { readCsv } from '../core/packet/read-csv.ts';
import { problemSentence } from '../text/problems.ts';
import { ANALYSE_USAGE, parseAnalyseArguments, type AnalyseArguments } from './analyse-arguments.ts';
import type { RedoneReading } from './analyse-packet.ts';
import { isPacketName } from './packet-name.ts';
import type { PrintedJudgement, PrintedSurvey } from './printed-judgement.ts';
import { FILE_FAILURES, readTextFile } from './read-text-file.ts';

const ALL_ANALYSED = 0;
const WRONG_USE = 2;
const SOME_NOT_ANALYSED = 3;

/** Undefined where nothing is known that it could be held against. */
type Judging = (analysis: Analysis) => PrintedSurvey | undefined;
interface Judged {
  readonly analysis: Analysis & { readonly separations: readonly Separation[] };
  readonly judgement?: PrintedJudgement;
}
type Printed = Judged & Partial<Omit<RedoneReading, 'analysis'>>;

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
  const judging = await judgingBy(parsed);
  if (typeof judging === 'string') {
    process.stderr.write(`${judging}\n`);
    return WRONG_USE;
  }
  let status = ALL_ANALYSED;
  for (const file of parsed.files) {
    for await (const { name, outcome } of linesOf(file, parsed, judging)) {
      if (!outcome.ok) status = SOME_NOT_ANALYSED;
      await printLine(name, outcome);
    }
  }
  return status;
}

/** The survey is loaded only when there is something to hold a reading against: it would double the time to the first line. */
async function judgingBy({ sourcesPath, spotPath }: AnalyseArguments): Promise<Judging | string> {
  if (sourcesPath === undefined && spotPath === undefined) return () => undefined;
  const { readSourcesFile } = await import('./read-sources-file.ts');
  const sources = await readSourcesFile(sourcesPath);
  if (!sources.ok) return `${sourcesPath}: ${problemSentence(sources.problem)}`;
  const { readSpotFile } = await import('./read-spot-file.ts');
  const place = await readSpotFile(spotPath);
  if (!place.ok) return `${spotPath}: ${problemSentence(place.problem)}`;
  const { printedSurvey } = await import('./printed-judgement.ts');
  return (analysis) => printedSurvey(analysis, sources.value, place.value);
}

function judgedBy(judging: Judging, analysis: Analysis): Judged {
  const survey = judging(analysis);
  return survey
    ? { analysis: { ...analysis, separations: survey.separations }, judgement: survey.judgement }
    : { analysis: { ...analysis, separations: [] } };
}

type Line = { readonly name: string; readonly outcome: Outcome<Printed> };

/** One line a recording; one a reading for a packet, with what was stored beside what comes out now. */
async function* linesOf(file: string, args: AnalyseArguments, judging: Judging): AsyncGenerator<Line> {
  if (!isPacketName(file)) {
    yield { name: file, outcome: await analyseFile(file, args, judging) };
    return;
  }
  const { analysePacket } = await import('./analyse-packet.ts');
  let count = 0;
  try {
    for await (const { name, outcome } of analysePacket(file, args.settings)) {
      count += 1;
      yield { name: name === '' ? file : `${file}#${name}`, outcome: judged(outcome, judging) };
    }
  } catch (error) {
    const reason = error instanceof Error && 'code' in error ? String(error.code) : 'unknown';
    yield { name: file, outcome: failure('unreadable-file', { reason: FILE_FAILURES[reason] ?? reason }) };
    return;
  }
  if (count === 0) yield { name: file, outcome: failure('unreadable-file', { reason: 'no-packet' }) };
}

function judged(outcome: Outcome<RedoneReading>, judging: Judging): Outcome<Printed> {
  if (!outcome.ok) return outcome;
  return success({ ...outcome.value, ...judgedBy(judging, outcome.value.analysis) });
}

async function analyseFile(
  file: string,
  { unit, settings }: AnalyseArguments,
  judging: Judging,
): Promise<Outcome<Printed>> {
  const text = await readTextFile(file);
  if (!text.ok) return text;
  const recording = readCsv(text.value, unit === undefined ? { name: file } : { name: file, unit });
  if (!recording.ok) return recording;
  const result = analyse(recording.value, settings);
  if (!result.ok) return result;
  return success(judgedBy(judging, result.value.analysis));
}

async function printLine(file: string, outcome: Outcome<Printed>): Promise<void> {
  const line = outcome.ok ? { file, ...outcome.value } : { file, problem: problemRecord(outcome.problem) };
  if (!process.stdout.write(`${JSON.stringify(line)}\n`)) {
    await new Promise((resolve) => process.stdout.once('drain', resolve));
  }
}

function problemRecord(problem: Problem): Record<string, string | number> {
  return { ...problem.facts, code: problem.code, message: problemSentence(problem) };
}

process.exitCode = await main(process.argv.slice(2));
