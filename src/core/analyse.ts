import { ANALYSIS_VERSION } from './model/analysis.ts';
import type { Analysis, AnalysisSettings, Procedure } from './model/analysis.ts';
import type { Doubt } from './model/doubt.ts';
import { failure, success } from './model/outcome.ts';
import type { Outcome } from './model/outcome.ts';
import type { Problem, ProblemCode } from './model/problem.ts';
import type { AnalysisResult } from './model/pictures.ts';
import type { Recording } from './model/recording.ts';
import { ambientProcedure } from './modes/ambient.ts';
import { coastdownProcedure } from './modes/coastdown.ts';
import { levelsOf } from './modes/levels.ts';
import type { ProcedureAnswer } from './modes/procedure-answer.ts';
import { recordingDoubts } from './modes/recording-doubts.ts';
import { runningProcedure } from './modes/running-procedure.ts';
import { tapProcedure } from './modes/tap/tap-procedure.ts';
import { isAtRest, otherProcedure, recogniseProcedure } from './modes/recognise-procedure.ts';
import { roundedForKeeping } from './modes/rounded-for-keeping.ts';
import { conditionRecording } from './signal/condition-recording.ts';
import type { ConditionedSignal } from './signal/condition-recording.ts';
import { median } from './signal/sample-counter.ts';
import { amplitudeSpectrum } from './signal/spectrum.ts';
import { thinnedTrace } from './signal/trace.ts';
import { combineTrust } from './survey/trust.ts';

type ProcedureFunction = (signal: ConditionedSignal, settings: AnalysisSettings) => Outcome<ProcedureAnswer>;

/**
 * The chain: recording, conditioned signal, modes and tones, analysis. Pure: the same recording and settings give the
 * same numbers anywhere.
 * @returns a problem of the closed list when the recording cannot be answered
 */
export function analyse(recording: Recording, settings: AnalysisSettings): Outcome<AnalysisResult> {
  const conditioned = conditionRecording(recording, settings.timing);
  if (!conditioned.ok) return conditioned;
  const signal = conditioned.value;
  const procedure: Procedure =
    settings.procedure === 'auto' ? recogniseProcedure(signal) : settings.procedure;
  const answer = PROCEDURES[procedure](signal, settings);
  if (!answer.ok)
    return (
      (procedure === 'tap' ? withoutStart(recording, signal, settings, answer.problem) : undefined) ??
      refusalOf(signal, settings, answer.problem)
    );
  return success(resultOf(answer.value.retimed ?? signal, settings, procedure, answer.value));
}

/** A tap's contact lasts no longer than this, s. Common practice, no source. */
const CONTACT_S = 0.03;
/** A record begins within a contact where its first samples stand this many times above its middle motion. */
const CONTACT_RATIO = 2.5;

/**
 * The tap test without the contact a record began in, which is no free decay and has no onset before it either.
 * @returns undefined where the record did not begin in a contact, or nothing is found without it
 */
function withoutStart(
  recording: Recording,
  signal: ConditionedSignal,
  settings: AnalysisSettings,
  { code }: Problem,
): Outcome<AnalysisResult> | undefined {
  if (code !== 'no-decay' || !beginsInContact(signal)) return undefined;
  const from = signal.rows[signal.timeS.findIndex((t) => t > signal.timeS[0]! + CONTACT_S)]!;
  const later = conditionRecording(
    {
      ...recording,
      timeS: recording.timeS.subarray(from),
      accelerationMps2: recording.accelerationMps2.map((axis) => axis.subarray(from)),
    },
    settings.timing,
  );
  if (!later.ok) return undefined;
  const answer = tapProcedure(later.value, settings);
  return answer.ok
    ? success(resultOf(answer.value.retimed ?? later.value, settings, 'tap', answer.value))
    : undefined;
}

function beginsInContact({ accelerationMps2, timeS }: ConditionedSignal): boolean {
  const motion = timeS.map((_, i) => Math.hypot(...accelerationMps2.map((axis) => axis[i]!)));
  const first = motion.filter((_, i) => timeS[i]! <= timeS[0]! + CONTACT_S);
  return Math.max(...first) > CONTACT_RATIO * median(motion);
}

const PROCEDURES: Readonly<Record<Procedure, ProcedureFunction>> = {
  tap: tapProcedure,
  running: runningProcedure,
  ambient: ambientProcedure,
  coastdown: coastdownProcedure,
};

function resultOf(
  signal: ConditionedSignal,
  settings: AnalysisSettings,
  procedure: Procedure,
  answer: ProcedureAnswer,
): AnalysisResult {
  const { modes, tones, broadPeaks, tapTimesS, ringDowns, pass, coastdown } = answer;
  // A tap's background tones are not what it is trusted for.
  const doubts = eachOnce([
    ...answer.doubts,
    ...recordingDoubts(signal, modes, procedure === 'tap' ? [] : tones),
    ...procedureDoubts(signal, settings),
  ]);
  const analysis: Analysis = {
    version: ANALYSIS_VERSION,
    procedure,
    procedureFrom: settings.procedure === 'auto' ? 'data' : 'person',
    settings,
    recording: signal.facts,
    modes,
    tones,
    broadPeaks,
    levels: levelsOf(signal, tones),
    ...(coastdown === undefined ? {} : { coastdown }),
    tapTimesS,
    doubts,
    trust: combineTrust(doubts, modes),
  };
  return {
    analysis: roundedForKeeping(analysis),
    pictures: {
      trace: thinnedTrace(signal.timeS, signal.accelerationMps2),
      spectrum: amplitudeSpectrum(signal.grid),
      ringDowns,
      ...(pass === undefined ? {} : { pass }),
    },
  };
}

/** Nothing of their own was found: another procedure may find something. */
const NOTHING_FOUND: ReadonlySet<ProblemCode> = new Set([
  'no-taps',
  'no-decay',
  'no-tone',
  'no-mode',
  'no-pass',
]);

/** Which of the four found nothing says little where nobody asked for it and nothing moved; where one was asked for, which fits. */
function refusalOf(
  signal: ConditionedSignal,
  { procedure }: AnalysisSettings,
  problem: Problem,
): Outcome<AnalysisResult> {
  const refused = failure(problem.code, problem.facts);
  if (procedure === 'auto')
    return isAtRest(signal) ? failure('no-motion', { durationS: signal.facts.durationS }) : refused;
  if (!NOTHING_FOUND.has(problem.code) || isAtRest(signal)) return refused;
  const fitting = recogniseProcedure(signal);
  // Ambient is also what is left where nothing is recognised.
  if (fitting === procedure || fitting === 'ambient') return refused;
  return failure(problem.code, { ...problem.facts, fitting });
}

/** Only what a person chose can be the wrong choice. */
function procedureDoubts(signal: ConditionedSignal, { procedure }: AnalysisSettings): Doubt[] {
  const other = procedure === 'auto' ? undefined : otherProcedure(signal, procedure);
  return other === undefined ? [] : [{ code: 'other-procedure', facts: { procedure: other } }];
}

/** A code stands once, with the figures of whoever said it first (the procedure before the recording). */
const eachOnce = (doubts: readonly Doubt[]): Doubt[] =>
  doubts.filter((doubt, i) => doubts.findIndex((other) => other.code === doubt.code) === i);
