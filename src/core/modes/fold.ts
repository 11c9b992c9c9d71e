import type { Fold, FoldVerdict } from '../model/analysis.ts';
import type { ConditionedSignal } from '../signal/condition-recording.ts';
import { averagedDensity } from '../signal/spectrum.ts';
import { withoutTone } from '../signal/tone-envelope.ts';
import { likelihoodAt, slopeProfile, type SlopeProfile } from '../signal/jitter-slope.ts';

/**
 * Whether a line or mode appears where it is, or is the image of a frequency above half the rate (browsers sample without a
 * filter before). The only witness is the true part of the stamps' scatter: see `jitter-slope`. Four signed frequencies are
 * weighed for every true share ρ; the share being unknown, late stamps alone can never decide. Nor can a motion event's:
 * it is stamped when the page polls, while the reading is older by as much as the sensor's own period.
 */

/** Prior weights of f, fs-f, fs+f, 2fs-f: the sensor's own low-pass makes the higher ones rarer. Our choice. */
const CANDIDATE_WEIGHTS = [1, 1, 0.02, 0.02] as const;
/** Prior of all scatter being true; the rest is spread evenly over shares from `LEAST_TELLING_SHARE` to 1. */
const ALL_TRUE_WEIGHT = 0.5;
/** Shares below this count as "late stamps": nothing is decided on them. */
const LEAST_TELLING_SHARE = 0.3;
/** Prior of late stamps. */
const LATE_WEIGHT = 0.5;
/** Posterior probability needed to decide: wrong answers cost far more than undecided ones. */
const DECISION_PROBABILITY = 0.95;
/** Log likelihoods are shrunk by this: blocks are not quite independent and the noise not quite white. Our test, 2026. */
const CAUTION_FACTOR = 0.7;
/** Log likelihood that the decided hypothesis may lack against the best slope of all. */
const FIT_TOLERANCE = 8;
const SHARE_STEPS = 140;
/** Log likelihood by which a decided slope must stand above its neighbourhood. */
const PEAK_LOG_LIKELIHOOD = 6;

/** Samples the fold of a steady line is taken on, at most: ten minutes at 100 Hz say all there is to say. */
const MOST_SAMPLES = 60_000;
/** A line may run ahead of its mean by this much of a cycle within a block. */
const PHASE_TOGETHER_CYCLES = 0.15;

export interface FoldCandidate {
  readonly frequencyHz: number;
  readonly dampingRatio?: number;
  /** How far the line wanders, Hz: blocks are kept short enough for its phase to stay together. */
  readonly frequencyDeviationHz?: number;
  /** Unit vector, one entry per axis. */
  readonly direction: readonly number[];
  /** Signal to use instead of the recording along `direction` (e.g. with the other modes taken out); length n. */
  readonly samples?: Float64Array;
}

/** Signed frequencies that appear at f when sampled at `rateHz`: f, then its images, most plausible first. */
export function signedCandidatesHz(frequencyHz: number, rateHz: number): readonly number[] {
  return [frequencyHz, frequencyHz - rateHz, frequencyHz + rateHz, frequencyHz - 2 * rateHz];
}

/** Fold of a steady line. */
export function foldOfTone(signal: ConditionedSignal, tone: FoldCandidate): Fold {
  const steadyS = PHASE_TOGETHER_CYCLES / Math.max(tone.frequencyDeviationHz ?? 0, 1e-6);
  const blockS = Math.max(
    10 * signal.periodS,
    Math.min(steadyS, Math.max(0.6, Math.min(2, 6 / tone.frequencyHz))),
  );
  return decide(signal, tone, blockS, [[0, Math.min(signal.timeS.length, MOST_SAMPLES)]], 0);
}

/**
 * Fold of a mode, from its ring-downs.
 * @param ringStartsS times of the onsets, s; each ring is used from just after its onset to just before the next
 */
export function foldOfMode(
  signal: ConditionedSignal,
  mode: FoldCandidate & { readonly dampingRatio: number },
  ringStartsS: readonly number[],
): Fold {
  const decayRatePerS = 2 * Math.PI * mode.dampingRatio * mode.frequencyHz;
  const samples = mode.samples ?? samplesAlone(signal, mode);
  const blockS = Math.max(5 * signal.periodS, Math.min(1, 2 / Math.max(decayRatePerS, 1e-3)));
  return decide(
    signal,
    { ...mode, samples },
    Math.max(blockS, 2 / mode.frequencyHz),
    ringSegments(signal, ringStartsS),
    decayRatePerS,
  );
}

/** Other lines this much weaker (density) than the mode do not disturb; at most so many are taken out, over blocks of this length. */
const DISTURBING_SHARE = 0.02;
const MOST_DISTURBING = 3;
const REMOVAL_BLOCK_S = 0.5;
/** Stands out of the median density by so much. */
const DISTURBING_ABOVE_MEDIAN = 12;

/** The record along the mode's direction with other strong lines taken out: they would pass for structured noise. */
function samplesAlone(signal: ConditionedSignal, mode: FoldCandidate): Float64Array {
  let along = alongDirection(signal.accelerationMps2, mode.direction);
  for (const frequencyHz of otherLines(signal, mode)) {
    const timed = { timeS: signal.timeS, clockS: signal.clockS, accelerationMps2: [along] };
    [along] = withoutTone(timed, frequencyHz, frequencyHz, REMOVAL_BLOCK_S) as [Float64Array];
  }
  return along;
}

function otherLines(signal: ConditionedSignal, mode: FoldCandidate): number[] {
  const { grid } = signal;
  const along = alongDirection(grid.accelerationMps2, mode.direction);
  const { densityPerHz, stepHz } = averagedDensity([along], grid.periodS, Math.round(8 / grid.periodS));
  const density = densityPerHz[0]!;
  const median = Float64Array.from(density).sort()[density.length >> 1]!;
  const own = density[Math.min(density.length - 1, Math.round(mode.frequencyHz / stepHz))]!;
  const least = Math.max(DISTURBING_ABOVE_MEDIAN * median, DISTURBING_SHARE * own);
  const apartHz = 2 / REMOVAL_BLOCK_S;
  const found: number[] = [];
  for (let k = Math.ceil(1 / stepHz); k < density.length - 1; k++) {
    const isPeak = density[k]! > least && density[k]! >= density[k - 1]! && density[k]! > density[k + 1]!;
    if (isPeak && Math.abs(k * stepHz - mode.frequencyHz) > apartHz) found.push(k);
  }
  found.sort((a, b) => density[b]! - density[a]!);
  const kept: number[] = [];
  for (const k of found)
    if (kept.length < MOST_DISTURBING && kept.every((f) => Math.abs(k * stepHz - f) > apartHz))
      kept.push(k * stepHz);
  return kept;
}

/** Contact left out after an onset, and before the next: s. A hand's contact lasts about 20 ms. */
const CONTACT_S = 0.045;
const BEFORE_NEXT_S = 0.05;

function ringSegments(
  signal: ConditionedSignal,
  ringStartsS: readonly number[],
): (readonly [number, number])[] {
  const { timeS } = signal;
  const n = timeS.length;
  if (!ringStartsS.length) return [[0, n]];
  const starts = [...ringStartsS].sort((a, b) => a - b);
  let i = 0;
  return starts.map((start, r) => {
    while (i < n && (timeS[i] as number) < start + CONTACT_S) i++;
    const first = i;
    const stop = (starts[r + 1] ?? Infinity) - BEFORE_NEXT_S;
    while (i < n && (timeS[i] as number) < stop) i++;
    return [first, i] as const;
  });
}

function decide(
  signal: ConditionedSignal,
  item: FoldCandidate,
  blockS: number,
  segments: readonly (readonly [number, number])[],
  decayRatePerS: number,
): Fold {
  const rateHz = 1 / signal.periodS;
  const signed = signedCandidatesHz(item.frequencyHz, rateHz);
  const undecided: Fold = { verdict: 'undecided', candidatesHz: signed.map(Math.abs) };
  const isBlind =
    !signal.hasClock ||
    signal.isPolled ||
    signal.sensor.source === 'devicemotion' ||
    signal.facts.timing.trueShare < LEAST_TELLING_SHARE;
  if (isBlind || signal.facts.timing.scatterSdS < 1e-6) return undecided;
  const samples = item.samples ?? alongDirection(signal.accelerationMps2, item.direction);
  const profile = slopeProfile(
    { ...signal, samples },
    item.frequencyHz,
    blockS,
    2.05 * rateHz,
    segments,
    decayRatePerS,
  );
  return verdictOf(profile, signed) ?? undecided;
}

/** Signal along a direction: sum of axis times component; length n. */
export function alongDirection(axes: readonly Float64Array[], direction: readonly number[]): Float64Array {
  const out = new Float64Array(axes[0]?.length ?? 0);
  axes.forEach((axis, a) => {
    const share = direction[a] ?? 0;
    if (share !== 0)
      for (let i = 0; i < out.length; i++) out[i] = (out[i] as number) + share * (axis[i] as number);
  });
  return out;
}

/** Posterior of the four hypotheses and of "late stamps"; undefined where none reaches the probability asked for. */
export function verdictOf(profile: SlopeProfile, signedHz: readonly number[]): Fold | undefined {
  const top = Math.max(...profile.logLikelihood);
  const weightAt = (slopeHz: number): number =>
    Math.exp(CAUTION_FACTOR * (likelihoodAt(profile, slopeHz) - top));
  const meanOver = (frequencyHz: number, low: number, high: number): number => {
    let sum = 0;
    for (let s = 0; s < SHARE_STEPS; s++)
      sum += weightAt(frequencyHz * (low + ((s + 0.5) / SHARE_STEPS) * (high - low)));
    return sum / SHARE_STEPS;
  };
  let late = 0;
  const evidence = signedHz.map((frequencyHz, h) => {
    const weight = CANDIDATE_WEIGHTS[h] ?? 0;
    late += weight * LATE_WEIGHT * meanOver(frequencyHz, 0, LEAST_TELLING_SHARE);
    return (
      weight *
      (1 - LATE_WEIGHT) *
      (ALL_TRUE_WEIGHT * weightAt(frequencyHz) +
        (1 - ALL_TRUE_WEIGHT) * meanOver(frequencyHz, LEAST_TELLING_SHARE, 1))
    );
  });
  const total = late + evidence.reduce((sum, e) => sum + e, 0);
  const best = evidence.indexOf(Math.max(...evidence));
  if (!(total > Math.exp(-FIT_TOLERANCE)) || (evidence[best] as number) < DECISION_PROBABILITY * total)
    return undefined;
  if (!isPeaked(profile, signedHz[best] as number)) return undefined;
  const ordered = [...signedHz.keys()].sort((a, b) => (evidence[b] as number) - (evidence[a] as number));
  const verdict: FoldVerdict = best === 0 ? 'direct' : 'folded';
  const candidatesHz = ordered.map((h) => Math.abs(signedHz[h] as number));
  return { verdict, candidatesHz: verdict === 'direct' ? candidatesHz.slice(0, 1) : candidatesHz };
}

/** A true line's likelihood falls off within one radian of phase to both sides; another mode's disturbance is a plateau. */
function isPeaked(profile: SlopeProfile, signedHz: number): boolean {
  const widthHz = 1 / (2 * Math.PI * Math.max(profile.scatterS, 1e-6));
  let bestHz = signedHz;
  for (let s = 0; s <= SHARE_STEPS; s++) {
    const slopeHz = signedHz * (LEAST_TELLING_SHARE + (s / SHARE_STEPS) * (1 - LEAST_TELLING_SHARE));
    if (likelihoodAt(profile, slopeHz) > likelihoodAt(profile, bestHz)) bestHz = slopeHz;
  }
  const beside = Math.max(likelihoodAt(profile, bestHz - widthHz), likelihoodAt(profile, bestHz + widthHz));
  return likelihoodAt(profile, bestHz) - beside > PEAK_LOG_LIKELIHOOD;
}
