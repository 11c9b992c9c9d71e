import type { AnalysisSettings, DampingCheck, Mode, Softening, Tone } from '../../model/analysis.ts';
import type { Doubt, DoubtCode } from '../../model/doubt.ts';
import { failure, success, type Outcome } from '../../model/outcome.ts';
import type { RingDown } from '../../model/pictures.ts';
import type { ConditionedSignal } from '../../signal/condition-recording.ts';
import { median } from '../../signal/sample-counter.ts';
import { foldOfMode, foldOfTone, signedCandidatesHz } from '../fold.ts';
import type { ProcedureAnswer } from '../procedure-answer.ts';
import { linearColumnCount, parameterIndex } from './decay-model.ts';
import type { Component, DecaySignal } from './decay-model.ts';
import { TAP_LIMIT } from './find-taps.ts';
import type { FreeDecay } from './find-taps.ts';
import type { DecayFit } from './fit-decays.ts';
import { halfPowerOfDecay } from './half-power.ts';
import { logDecrementOfDecay } from './log-decrement.ts';
import {
  dampingRatioOf,
  directionOf,
  amplitudeAtStart,
  modeEstimate,
  naturalFrequencyHz,
} from './mode-estimate.ts';
import type { ModeEstimate } from './mode-estimate.ts';
import { decayAlone, residuals } from './modelled-signal.ts';
import { residualColour } from './residual-colour.ts';
import { fitRounded, isStepCoarse } from './rounding-likelihood.ts';
import { softenedFit } from './softening.ts';
import { searchRingDowns } from './ring-down-search.ts';
import type { RingDownSearch } from './ring-down-state.ts';

/** Fewer samples than this hold no ring-down worth fitting. */
const FEWEST_SAMPLES = 64;
/** Smallest full scale of a phone's sensor, ±2 g, less what gravity takes: below, equal extreme values are rounding. */
const LEAST_FULL_SCALE_MPS2 = 9.8;
/** A mode must stand out of the noise by this many standard deviations of a sample at its strongest tap... */
const LEAST_AMPLITUDE_SDS = 3;
/** ...and its damping must be known to this relative standard deviation, else it is no answer. */
const LARGEST_DAMPING_SPREAD = 0.3;
/** ...its frequency to this one... */
const LARGEST_FREQUENCY_SPREAD = 0.02;
/** Above this damping nothing rings that a tap test could read: a tenth is left after two cycles. */
const LARGEST_DAMPING_RATIO = 0.2;
/** A mode must be seen ringing for this many cycles between two taps: less is a shape, not a vibration. */
const LEAST_CYCLES = 4;
/** Two lines that cancel each other have amplitudes beyond anything measured. */
const LARGEST_AMPLITUDE_FACTOR = 3;
/** Share of the motion under the ring-downs that the fit must explain; below, it is not free decay. */
const LEAST_EXPLAINED_SHARE = 0.8;
/** Half-power or decrement further than this from the fit is said. */
const DISAGREEMENT_SHARE = 0.25;
/** Fewer taps than this leave tap-to-tap scatter unknown (common practice: three to eight). */
const FEWEST_TAPS = 3;

/** Tap test: free decays found, fitted jointly, cross-checked. */
export function tapProcedure(
  conditioned: ConditionedSignal,
  _settings: AnalysisSettings,
): Outcome<ProcedureAnswer> {
  const signal = tapSignal(conditioned);
  const { facts } = conditioned;
  if (signal.timeS.length < FEWEST_SAMPLES)
    return failure('too-short', { durationS: facts.durationS, sampleCount: facts.sampleCount });
  const largest = Math.max(...signal.y.map((y) => y.reduce((m, v) => Math.max(m, Math.abs(v)), 0)));
  if (facts.clippedCount > signal.timeS.length / 4 && largest > LEAST_FULL_SCALE_MPS2)
    return failure('clipped-throughout', { clippedCount: facts.clippedCount });
  const input = { rateHz: facts.rateHz, stepMps2: facts.stepMps2 };
  const search = searchRingDowns({ ...input, signal });
  if (search === undefined) return failure('no-motion');
  const unfolded = unfoldedSignal(conditioned, signal, search);
  if (unfolded === undefined) return answerOf(conditioned, signal, search);
  const again = searchRingDowns({ ...input, signal: unfolded });
  return again === undefined ? answerOf(conditioned, signal, search) : answerOf(conditioned, unfolded, again);
}

/**
 * The record with phases that follow the stamps' scatter as the strongest line's true frequency does, where that is
 * folded: on its apparent frequency alone, true scatter would look like strong noise.
 */
function unfoldedSignal(
  conditioned: ConditionedSignal,
  signal: DecaySignal,
  search: RingDownSearch,
): DecaySignal | undefined {
  const { fit, fitted } = search;
  const energies = fit.components.map((c, k) =>
    c.kind === 'mode' ? Math.max(...fitted.map((_, s) => amplitudeAtStart(fit, s, k))) ** 2 / c.decayPerS : 0,
  );
  const k = energies.indexOf(Math.max(...energies));
  const component = fit.components[k]!;
  if (component.kind !== 'mode') return undefined;
  const frequencyHz = component.angularRadPerS / (2 * Math.PI);
  const fold = foldOfMode(
    conditioned,
    { frequencyHz, dampingRatio: dampingRatioOf(component), direction: directionOf(fit, k) },
    fitted.map((d) => signal.timeS[d.onset ?? d.start]!),
  );
  if (fold.verdict !== 'folded') return undefined;
  const trueHz = signedCandidatesHz(frequencyHz, conditioned.facts.rateHz).find(
    (hz) => Math.abs(Math.abs(hz) - fold.candidatesHz[0]!) < 1e-6 * Math.abs(hz),
  );
  if (trueHz === undefined) return undefined;
  const { clockS, deviationS } = conditioned;
  const pace = trueHz / frequencyHz;
  return { ...signal, timeS: clockS, phaseTimeS: clockS.map((t, i) => t + pace * deviationS[i]!) };
}

/** Sensor values about their median: the slow part stays, for the fit's own constant and slope to take up. */
function tapSignal(conditioned: ConditionedSignal): DecaySignal {
  const y = conditioned.accelerationMps2.map((fast, a) => {
    const whole = fast.map((v, i) => v + conditioned.slowMps2[a]![i]!);
    const middle = median(whole);
    return whole.map((v) => v - middle);
  });
  return { timeS: conditioned.timeS, y };
}

function answerOf(
  conditioned: ConditionedSignal,
  signal: DecaySignal,
  search: RingDownSearch,
): Outcome<ProcedureAnswer> {
  if (search.tapCount >= TAP_LIMIT) return failure('no-decay', { tapCount: search.tapCount });
  const { decays, fit, isRounded } = finalFit(signal, search, conditioned.facts.stepMps2);
  const left = residuals(signal, decays, fit);
  const largest = Math.max(...signal.y.map((y) => y.reduce((m, v) => Math.max(m, Math.abs(v)), 0)));
  const modeIndexes = fit.components.flatMap((c, k) => (c.kind === 'mode' ? [k] : []));
  const estimates = modeIndexes
    .map((k) => {
      const colour = residualColour(signal, decays, fit, left, fit.components[k]!);
      return { k, estimate: modeEstimate(signal, decays, fit, k, colour) };
    })
    .filter(({ estimate }) => isAnswer(signal, decays, estimate, fit, largest))
    .sort((a, b) => ringEnergy(b.estimate) - ringEnergy(a.estimate));
  if (estimates.length === 0) return failure(search.tapCount === 0 ? 'no-taps' : 'no-decay');
  const strongest = fit.components[estimates[0]!.k]!;
  const explained = explainedShare(
    signal,
    decays,
    left,
    strongest.decayPerS,
    search.quietVariance.map((v, a) => v + (conditioned.facts.stepMps2[a] ?? 0) ** 2 / 12),
    fit.components.length,
  );
  if (explained < LEAST_EXPLAINED_SHARE) return failure('no-decay', { explainedShare: explained });
  const modes = estimates.map(({ k, estimate }) =>
    modeOf({ conditioned, signal, decays, fit, left, k, estimate, isRounded }),
  );
  return success({
    modes,
    tones: fit.components.flatMap((c, k) => (c.kind === 'tone' ? [toneOf(conditioned, fit, k)] : [])),
    broadPeaks: [],
    tapTimesS: decays.flatMap((d) => (d.onset === undefined ? [] : [signal.timeS[d.onset]!])),
    doubts: tapDoubts(search, decays, modes, explained),
    ringDowns: ringDownPictures(signal, decays, fit, left, estimates[0]!.k, modes[0]!.direction),
  });
}

/** The search's fit, refined by what the record calls for: the rounding's own likelihood, or change with amplitude. */
function finalFit(
  signal: DecaySignal,
  search: RingDownSearch,
  stepMps2: readonly number[],
): { decays: readonly FreeDecay[]; fit: DecayFit; isRounded: boolean } {
  const { fit, fitted: decays } = search;
  if (isStepCoarse(fit.variance, stepMps2))
    return { decays, fit: fitRounded(signal, decays, fit, stepMps2), isRounded: true };
  return { ...(softenedFit(signal, decays, fit) ?? { decays, fit }), isRounded: false };
}

/** The part of a decay that is looked at, in time constants of the strongest mode: later there is mostly noise. */
const JUDGED_DECAYS = 1.5;

/** Share of the squared motion early in the decays, noise taken off, that the model takes up. */
function explainedShare(
  signal: DecaySignal,
  decays: readonly FreeDecay[],
  left: readonly Float64Array[],
  decayPerS: number,
  noise: readonly number[],
  componentCount: number,
): number {
  let whole = 0;
  let unexplained = 0;
  let count = 0;
  for (const { start, end } of decays) {
    const limitS = signal.timeS[start]! + JUDGED_DECAYS / decayPerS;
    for (let i = start; i < end && signal.timeS[i]! < limitS; i++) {
      for (let a = 0; a < left.length; a++) {
        whole += signal.y[a]![i]! ** 2;
        unexplained += left[a]![i]! ** 2 - noise[a]!;
      }
      count++;
    }
  }
  // Every free amplitude takes a share of the noise with it.
  const freedom = Math.max(count - decays.length * linearColumnCount(componentCount), 1);
  return whole > 0 ? 1 - (Math.max(unexplained, 0) * count) / freedom / whole : 0;
}

/** Strength of a mode: energy of its strongest ring-down, amplitude² over decay rate; a brief rattle is no strong mode. */
const ringEnergy = ({ amplitudesMps2, dampingRatio, frequencyHz }: ModeEstimate): number =>
  Math.max(...amplitudesMps2) ** 2 / (dampingRatio * frequencyHz);

/** Cycles of a mode within a decay, averaged over the decays by its energy in them. */
function cyclesSeen(signal: DecaySignal, decays: readonly FreeDecay[], estimate: ModeEstimate): number {
  let cycles = 0;
  let energy = 0;
  decays.forEach(({ start, end }, s) => {
    const weight = estimate.amplitudesMps2[s]! ** 2;
    cycles += weight * estimate.frequencyHz * (signal.timeS[end - 1]! - signal.timeS[start]!);
    energy += weight;
  });
  return cycles / Math.max(energy, 1e-30);
}

function isAnswer(
  signal: DecaySignal,
  decays: readonly FreeDecay[],
  estimate: ModeEstimate,
  fit: DecayFit,
  largestMps2: number,
): boolean {
  const noise = Math.sqrt(fit.variance.reduce((a, b) => a + b, 0) / fit.variance.length);
  return (
    Math.max(...estimate.amplitudesMps2) > LEAST_AMPLITUDE_SDS * noise &&
    Math.max(...estimate.amplitudesMps2) < LARGEST_AMPLITUDE_FACTOR * largestMps2 &&
    estimate.frequencySdHz < LARGEST_FREQUENCY_SPREAD * estimate.frequencyHz &&
    estimate.dampingRatio < LARGEST_DAMPING_RATIO &&
    cyclesSeen(signal, decays, estimate) > LEAST_CYCLES &&
    estimate.dampingRatioSd < LARGEST_DAMPING_SPREAD * estimate.dampingRatio
  );
}

interface ModeContext {
  readonly conditioned: ConditionedSignal;
  readonly signal: DecaySignal;
  readonly decays: readonly FreeDecay[];
  readonly fit: DecayFit;
  readonly left: readonly Float64Array[];
  readonly k: number;
  readonly estimate: ModeEstimate;
  readonly isRounded: boolean;
}

function modeOf(context: ModeContext): Mode {
  const { conditioned, decays, fit, k, estimate } = context;
  const { direction } = estimate;
  const { up } = conditioned.facts;
  const upShare = up === undefined ? undefined : direction.reduce((s, d, a) => s + d * (up[a] ?? 0), 0) ** 2;
  const checks = crossChecks(context);
  const doubts: DoubtCode[] = [];
  if (estimate.scatters) doubts.push('tap-scatter');
  const softening = softeningOf(fit.components[k]!);
  if (softening !== undefined) doubts.push('amplitude-dependent');
  if ('refusal' in checks.halfPower) doubts.push('half-power-refused');
  if (disagrees(checks.halfPower, estimate) || disagrees(checks.logDecrement, estimate))
    doubts.push('methods-disagree');
  const { frequencyHz, dampingRatio } = estimate;
  const samples = modeAlone(context);
  const ringStartsS = decays.map((d) => context.signal.timeS[d.start]!);
  const fold = foldOfMode(conditioned, { frequencyHz, dampingRatio, direction, samples }, ringStartsS);
  if (fold.verdict === 'folded') doubts.push('folded');
  if (fold.verdict === 'undecided') doubts.push('fold-undecided');
  return {
    frequencyHz: estimate.frequencyHz,
    frequencySdHz: estimate.frequencySdHz,
    dampingRatio: estimate.dampingRatio,
    dampingRatioSd: estimate.dampingRatioSd,
    amplitudeMps2: Math.max(...estimate.amplitudesMps2),
    direction,
    ...(upShare === undefined ? {} : { verticalShare: Math.min(upShare, 1) }),
    method: context.isRounded ? 'ring-down-fit-rounding-aware' : 'ring-down-fit',
    eventCount: Math.max(decays.filter((_, s) => amplitudeAtStart(fit, s, k) > 0).length, 1),
    ...checks,
    ...(softening === undefined ? {} : { softening }),
    fold,
    doubts,
  };
}

function softeningOf(component: Component): Softening | undefined {
  if (component.softening === undefined) return undefined;
  const { frequencySlopePerMps2, decaySlopePerMps2 } = component.softening;
  return { frequencySlopePerMps2, dampingSlopePerMps2: decaySlopePerMps2 / component.angularRadPerS };
}

/** The mode with what the fit left, along its direction, over the whole record; zero between the decays. */
function modeAlone({ signal, decays, fit, left, k, estimate }: ModeContext): Float64Array {
  const samples = new Float64Array(signal.timeS.length);
  decays.forEach((decay, s) => {
    samples.set(decayAlone(signal, decays, fit, left, s, k, estimate.direction), decay.start);
  });
  return samples;
}

const disagrees = (check: DampingCheck, estimate: ModeEstimate): boolean =>
  'dampingRatio' in check &&
  Math.abs(check.dampingRatio / estimate.dampingRatio - 1) > DISAGREEMENT_SHARE &&
  Math.abs(check.dampingRatio - estimate.dampingRatio) > 3 * estimate.dampingRatioSd;

/** Half-power and logarithmic decrement of the decay that carries most, other modes taken off by the fit. */
function crossChecks(context: ModeContext): { halfPower: DampingCheck; logDecrement: DampingCheck } {
  const { signal, decays, fit, left, k, estimate, conditioned } = context;
  let best = 0;
  decays.forEach((_, s) => {
    if (amplitudeAtStart(fit, s, k) > amplitudeAtStart(fit, best, k)) best = s;
  });
  const samples = decayAlone(signal, decays, fit, left, best, k, estimate.direction);
  const { start, end } = decays[best]!;
  const component = fit.components[k]!;
  const noiseSd = Math.sqrt(fit.variance.reduce((s, v, a) => s + v * estimate.direction[a]! ** 2, 0));
  const dampedHz = component.angularRadPerS / (2 * Math.PI);
  return {
    halfPower: halfPowerOfDecay(samples, conditioned.facts.rateHz, dampedHz, component.decayPerS),
    logDecrement: logDecrementOfDecay(signal.timeS.subarray(start, end), samples, dampedHz, noiseSd),
  };
}

function toneOf(conditioned: ConditionedSignal, fit: DecayFit, k: number): Tone {
  const component = fit.components[k]!;
  const amplitudes = fit.evaluation.segments.map((_, s) => amplitudeAtStart(fit, s, k));
  const amplitudeMps2 = median(Float64Array.from(amplitudes));
  const at = parameterIndex(fit.components, k);
  const size = Math.round(Math.sqrt(fit.evaluation.curvature.length));
  const variance = fit.covariance?.[at * size + at] ?? 0;
  const noise = Math.sqrt(Math.max(...fit.variance));
  const direction = directionOf(fit, k);
  const frequencyHz = naturalFrequencyHz(component);
  return {
    frequencyHz,
    frequencySdHz: Math.sqrt(variance) / (2 * Math.PI),
    amplitudeMps2,
    amplitudeSdMps2: noise * Math.sqrt(2 / fit.sampleCount),
    direction,
    nature: 'forced',
    fold: foldOfTone(conditioned, { frequencyHz, direction }),
  };
}

/** Below this the fit takes up too little of the motion to be trusted fully. */
const GOOD_EXPLAINED_SHARE = 0.9;
/** In one decay two modes nearer than this may be one whose frequency changes with amplitude. */
const CLOSE_MODES_SHARE = 0.1;

function tapDoubts(
  search: RingDownSearch,
  decays: readonly FreeDecay[],
  modes: readonly Mode[],
  explainedShare: number,
): Doubt[] {
  const doubts: Doubt[] = [];
  const tapCount = Math.max(search.tapCount, 1);
  if (tapCount < FEWEST_TAPS) doubts.push({ code: 'few-taps', facts: { tapCount } });
  if (explainedShare < GOOD_EXPLAINED_SHARE) doubts.push({ code: 'poor-fit', facts: { explainedShare } });
  const isClose = modes.some((a, i) =>
    modes.some((b, j) => j < i && Math.abs(a.frequencyHz / b.frequencyHz - 1) < CLOSE_MODES_SHARE),
  );
  if (decays.filter((d) => d.onset !== undefined).length <= 1 && isClose)
    doubts.push({ code: 'one-decay-close-modes' });
  return doubts;
}

function ringDownPictures(
  signal: DecaySignal,
  decays: readonly FreeDecay[],
  fit: DecayFit,
  left: readonly Float64Array[],
  k: number,
  direction: readonly number[],
): RingDown[] {
  return decays.map((decay, s) => {
    const measuredMps2 = decayAlone(signal, decays, fit, left, s, k, direction);
    const fittedMps2 = measuredMps2.map(
      (v, i) => v - direction.reduce((sum, d, a) => sum + d * left[a]![decay.start + i]!, 0),
    );
    return {
      tapTimeS: signal.timeS[decay.onset ?? decay.start]!,
      timeS: signal.timeS.slice(decay.start, decay.end),
      measuredMps2,
      fittedMps2,
    };
  });
}
