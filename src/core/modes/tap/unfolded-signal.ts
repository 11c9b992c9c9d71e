import type { ConditionedSignal } from '../../signal/condition-recording.ts';
import { foldOfMode, signedCandidatesHz } from '../fold.ts';
import type { DecaySignal } from './decay-model.ts';
import { amplitudeAtStart, dampingRatioOf, directionOf } from './mode-estimate.ts';
import { quietNoiseVariance } from './quiet-noise.ts';
import type { RingDownSearch } from './ring-down-state.ts';
import { strongestDecay } from './start-bank.ts';

/** A record with phases paced for the image at one apparent frequency. */
export interface PacedSignal extends DecaySignal {
  readonly apparentHz: number;
  readonly imageOffsetHz: number;
}

/**
 * The record with phases that follow the stamps' scatter as the strongest line's true frequency does, where that is
 * folded: on its apparent frequency alone, true scatter would look like strong noise.
 */
export function unfoldedSignal(
  conditioned: ConditionedSignal,
  signal: DecaySignal,
  search: RingDownSearch,
): PacedSignal | undefined {
  const { fit, fitted } = search;
  const k = strongestComponent(search);
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
  return trueHz === undefined
    ? undefined
    : pacedSignal(conditioned, signal, frequencyHz, trueHz - frequencyHz);
}

/** Scatter of the stamps that leaves a mark on an image's phase, s. */
const TELLING_SCATTER_S = 2e-4;

/**
 * The same on the mere supposition that the strongest line of the record, taken on the clock, is the nearest image: for
 * a record that gave no answer or left more than noise. Whoever asks must compare the fits.
 */
export function supposedUnfolded(
  conditioned: ConditionedSignal,
  signal: DecaySignal,
): PacedSignal | undefined {
  const { facts, hasClock, clockS } = conditioned;
  if (!hasClock || facts.timing.scatterSdS < TELLING_SCATTER_S) return undefined;
  const weights = quietNoiseVariance(signal.y, facts.rateHz, facts.stepMps2).map((v) => 1 / v);
  const whole = [{ start: 0, end: clockS.length }];
  const line = strongestDecay({ ...signal, timeS: clockS }, signal.y, whole, facts.rateHz, weights, [0]);
  return (
    line && pacedSignal(conditioned, signal, line.component.angularRadPerS / (2 * Math.PI), -facts.rateHz)
  );
}

/** Difference of paced and found frequency that calls for a new pace. */
const PACE_SHARE = 0.003;

/** The image's phases paced by the frequency that was found, where it is another than supposed. */
export function repacedSignal(
  conditioned: ConditionedSignal,
  paced: PacedSignal,
  search: RingDownSearch,
): PacedSignal | undefined {
  const { angularRadPerS } = search.fit.components[strongestComponent(search)]!;
  const frequencyHz = angularRadPerS / (2 * Math.PI);
  if (Math.abs(frequencyHz / paced.apparentHz - 1) < PACE_SHARE) return undefined;
  return pacedSignal(conditioned, paced, frequencyHz, paced.imageOffsetHz);
}

function strongestComponent({ fit, fitted }: RingDownSearch): number {
  const energies = fit.components.map(
    (c, k) =>
      Math.max(...fitted.map((_, s) => amplitudeAtStart(fit, s, k))) ** 2 / Math.max(c.decayPerS, SLOW_PER_S),
  );
  return energies.indexOf(Math.max(...energies));
}

/** Decay rate below which a line is as strong as a steady one, 1/s. */
const SLOW_PER_S = 0.05;

/** @param imageOffsetHz true signed frequency less the apparent one: a multiple of the rate */
function pacedSignal(
  { clockS, deviationS }: ConditionedSignal,
  signal: DecaySignal,
  apparentHz: number,
  imageOffsetHz: number,
): PacedSignal {
  const pace = (apparentHz + imageOffsetHz) / apparentHz;
  const phaseTimeS = clockS.map((t, i) => t + pace * deviationS[i]!);
  return { y: signal.y, timeS: clockS, phaseTimeS, apparentHz, imageOffsetHz };
}
