import type { Analysis, Mode } from '../model/analysis.ts';
import type { Interval } from '../model/interval.ts';
import type { Separation, Verdict } from '../model/judgement.ts';
import type { Forcing } from '../model/source.ts';
import { amplificationInterval } from './amplification.ts';
import {
  candidateFrequencies,
  dampingInterval,
  frequencyInterval,
  frequencySpreadRatio,
} from './mode-intervals.ts';
import type { Thresholds } from '../model/thresholds.ts';
import { criticalWindSpeedMps, scrutonNumber } from './wind.ts';
import { zonesFor } from './zones.ts';
import { logDecrement } from './damping-measures.ts';

/** What can be true of a pair, uncertainty by uncertainty. */
interface Possible {
  readonly coincident: boolean;
  readonly close: boolean;
  readonly apart: boolean;
}

/**
 * Verdict of what is possible. Coincident may not be ruled out by close, nor close by apart: the worse of two neighbours stands;
 * a span from coincident to apart is undecided.
 */
function verdictOf(possible: Possible): Verdict {
  if (possible.coincident) return possible.apart ? 'undecided' : 'coincident';
  return possible.close ? 'close' : 'apart';
}

/**
 * What the ratios can be as one unknown factor runs over `unknown`: the forcing covers `range` (ratios, visited for sure),
 * the factor multiplies both ends. The nearest point of the range counts.
 */
function possibleOf(range: Interval, unknown: Interval, zones: ReturnType<typeof zonesFor>): Possible {
  const [low, high] = range;
  const coincident = high * unknown[1] >= zones.coincident[0] && low * unknown[0] <= zones.coincident[1];
  const apart = high * unknown[0] <= zones.apart[0] || low * unknown[1] >= zones.apart[1];
  const touchesClose = (factor: number): boolean =>
    high * factor > zones.apart[0] && low * factor < zones.apart[1];
  const close = touchesClose(unknown[0]) || touchesClose(unknown[1]) || (coincident && apart);
  return { coincident, close, apart };
}

const nearestToOne = (range: Interval): number => Math.min(Math.max(1, range[0]), range[1]);

interface Candidate {
  readonly modeHz: number;
  readonly ratio: Interval;
  readonly nearestRatio: number;
  readonly damping: Interval;
  readonly possible: Possible;
}

function heldAgainst(
  mode: Mode,
  candidateHz: number,
  forcing: Forcing,
  modelRatio: number,
  thresholds: Thresholds,
): Candidate {
  const damping = dampingInterval(mode, candidateHz);
  const frequencyHz = frequencyInterval(candidateHz, frequencySpreadRatio(mode, modelRatio));
  const range: Interval = [forcing.rangeHz[0] / candidateHz, forcing.rangeHz[1] / candidateHz];
  const unknown: Interval = [
    ((1 - forcing.toleranceRatio) * candidateHz) / frequencyHz[1],
    ((1 + forcing.toleranceRatio) * candidateHz) / frequencyHz[0],
  ];
  const zones = zonesFor(forcing.amplificationKind, damping[1], thresholds);
  return {
    modeHz: candidateHz,
    ratio: [range[0] * unknown[0], range[1] * unknown[1]],
    nearestRatio: nearestToOne(range),
    damping,
    possible: possibleOf(range, unknown, zones),
  };
}

const closeness = (candidate: Candidate): number => Math.abs(Math.log(candidate.nearestRatio));
const anyOf = (candidates: readonly Candidate[]): Possible => ({
  coincident: candidates.some(({ possible }) => possible.coincident),
  close: candidates.some(({ possible }) => possible.close),
  apart: candidates.some(({ possible }) => possible.apart),
});

/** True when the recording saw the whole forcing band, and the mode where it truly is. */
function isSeen(mode: Mode, forcing: Forcing, seenHz: Interval): boolean {
  const inside = forcing.frequencyHz[0] >= seenHz[0] && forcing.frequencyHz[1] <= seenHz[1];
  return inside && mode.fold.verdict === 'direct';
}

/** Frequencies at which this reading could have found a mode: the usable band, of a coast-down only what it swept. */
export function seenBand(analysis: Analysis): Interval {
  const [low, high] = analysis.recording.usableBandHz;
  const sweep = analysis.coastdown;
  if (!sweep) return [low, high];
  const ends = [sweep.startHz, sweep.endHz];
  return [Math.max(low, Math.min(...ends)), Math.min(high, Math.max(...ends))];
}

const MACHINE_KINDS: readonly Forcing['sourceKind'][] = ['machine', 'belt', 'mains'];

/** Whether a mode of this reading, found at rest, is held against something that runs. */
export function isStoppedAgainstRunning(
  analysis: Analysis,
  forcing: Forcing,
  machineState: string | undefined,
): boolean {
  const atRest = analysis.procedure === 'tap' || analysis.procedure === 'ambient';
  return atRest && machineState !== 'running' && MACHINE_KINDS.includes(forcing.sourceKind);
}

export interface SeparationContext {
  readonly analysis: Analysis;
  readonly machineState: string | undefined;
  readonly thresholds: Thresholds;
}

/**
 * One mode against one forcing: ratio interval, verdict, amplification interval.
 * `apart` is given only where the recording saw the whole forcing band and the mode is not folded; else it is `blind`.
 * A mode whose fold is undecided is held against every frequency it may have.
 */
export function separationOf(
  modeIndex: number,
  forcingIndex: number,
  forcing: Forcing,
  context: SeparationContext,
): Separation {
  const mode = context.analysis.modes[modeIndex];
  if (!mode)
    throw new RangeError(`modeIndex must be below ${context.analysis.modes.length}, got ${modeIndex}`);
  const stopped = isStoppedAgainstRunning(context.analysis, forcing, context.machineState);
  const modelRatio = stopped ? context.thresholds.stoppedRunningRatio : 0;
  const candidates = candidateFrequencies(mode).map((candidateHz) =>
    heldAgainst(mode, candidateHz, forcing, modelRatio, context.thresholds),
  );
  const nearest = candidates.reduce((best, next) => (closeness(next) < closeness(best) ? next : best));
  const verdict = verdictOf(anyOf(candidates));
  const seen = isSeen(mode, forcing, seenBand(context.analysis));
  const kind = forcing.amplificationKind;
  const interval = amplificationInterval(kind, nearest.ratio, nearest.damping, forcing.cycleCount);
  const buildUpLimited =
    forcing.cycleCount !== undefined &&
    interval[1] < BUILD_UP_NOTICED_SHARE * amplificationInterval(kind, nearest.ratio, nearest.damping)[1];
  return {
    source: forcing.source,
    forcing: forcing.label,
    forcingIndex,
    forcingHz: forcing.frequencyHz,
    modeIndex,
    modeHz: nearest.modeHz,
    ratio: nearest.ratio,
    nearestRatio: nearest.nearestRatio,
    amplification: { kind, interval },
    verdict: verdict === 'apart' && !seen ? 'blind' : verdict,
    ...(mode.fold.verdict === 'undecided'
      ? { atFaceValue: separationOf(modeIndex, forcingIndex, forcing, atFaceValue(context)).verdict }
      : {}),
    ...(buildUpLimited ? { buildUpLimited } : {}),
    ...(stopped ? { stoppedAgainstRunning: true } : {}),
    ...(forcing.wind ? { wind: windOf(forcing.wind, nearest) } : {}),
    ...(forcing.loadFactorRatio ? { effectRatio: forcing.loadFactorRatio[1] * interval[1] } : {}),
  };
}

function windOf(wind: NonNullable<Forcing['wind']>, { modeHz, damping }: Candidate) {
  const speed = (strouhal: number): number => criticalWindSpeedMps(wind.widthM, modeHz, strouhal);
  const criticalSpeedMps: Interval = [speed(wind.strouhalRatio[1]), speed(wind.strouhalRatio[0])];
  const mass = wind.massPerLengthKgPerM;
  if (mass === undefined) return { criticalSpeedMps };
  const scruton = (dampingRatio: number): number =>
    scrutonNumber(mass, logDecrement(dampingRatio), wind.widthM);
  const scrutonRatio: Interval = [scruton(damping[0]), scruton(damping[1])];
  return { criticalSpeedMps, scrutonRatio };
}

/** The same reading if no mode of undecided fold is a folded image. */
export function atFaceValue<Context extends Pick<SeparationContext, 'analysis'>>(context: Context): Context {
  const modes = context.analysis.modes.map((mode): Mode => {
    if (mode.fold.verdict !== 'undecided') return mode;
    return { ...mode, fold: { verdict: 'direct', candidatesHz: [mode.frequencyHz] } };
  });
  return { ...context, analysis: { ...context.analysis, modes } };
}

/** A build-up that lacks less than 2 % of the steady value is not worth a word. Our own bound. */
const BUILD_UP_NOTICED_SHARE = 0.98;
