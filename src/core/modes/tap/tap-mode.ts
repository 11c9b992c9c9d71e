import type { DampingCheck, Mode, Softening, Tone } from '../../model/analysis.ts';
import type { DoubtCode } from '../../model/doubt.ts';
import type { ConditionedSignal } from '../../signal/condition-recording.ts';
import { median } from '../../signal/sample-counter.ts';
import { foldOfMode, foldOfTone } from '../fold.ts';
import { parameterIndex } from './decay-model.ts';
import type { Component, DecaySignal } from './decay-model.ts';
import type { FreeDecay } from './find-taps.ts';
import type { DecayFit } from './fit-decays.ts';
import { halfPowerOfDecay } from './half-power.ts';
import { logDecrementOfDecay } from './log-decrement.ts';
import { amplitudeAtStart, directionOf, naturalFrequencyHz } from './mode-estimate.ts';
import type { ModeEstimate } from './mode-estimate.ts';
import { decayAlone } from './modelled-signal.ts';

/** Half-power or decrement further than this from the fit is said. */
const DISAGREEMENT_SHARE = 0.25;
/** What a mode is read from. */
export interface ModeContext {
  readonly conditioned: ConditionedSignal;
  readonly signal: DecaySignal;
  readonly decays: readonly FreeDecay[];
  readonly fit: DecayFit;
  readonly left: readonly Float64Array[];
  readonly k: number;
  readonly estimate: ModeEstimate;
  readonly isRounded: boolean;
}

/** One mode with its cross-checks, fold and doubts. */
export function modeOf(context: ModeContext): Mode {
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
  // Near half the rate the sensor's own low-pass and the timing bite, and the fold can hardly be told.
  if (frequencyHz > conditioned.facts.usableBandHz[1]) doubts.push('band-edge');
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
    eventCount: Math.max(decays.filter((d) => d.onset !== undefined).length, 1),
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

/** A steady line fitted beside the ring-downs. */
export function toneOf(conditioned: ConditionedSignal, fit: DecayFit, k: number): Tone {
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
