import type { ConditionedSignal } from '../../signal/condition-recording.ts';
import { foldOfMode, signedCandidatesHz } from '../fold.ts';
import type { DecaySignal } from './decay-model.ts';
import { amplitudeAtStart, dampingRatioOf, directionOf } from './mode-estimate.ts';
import type { RingDownSearch } from './ring-down-state.ts';

/**
 * The record with phases that follow the stamps' scatter as the strongest line's true frequency does, where that is
 * folded: on its apparent frequency alone, true scatter would look like strong noise.
 */
export function unfoldedSignal(
  conditioned: ConditionedSignal,
  signal: DecaySignal,
  search: RingDownSearch,
): DecaySignal | undefined {
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
  return trueHz === undefined ? undefined : pacedSignal(conditioned, signal, trueHz / frequencyHz);
}

/** Scatter of the stamps that leaves a mark on an image's phase, s. */
const TELLING_SCATTER_S = 2e-4;

/**
 * The same on the mere supposition that the strongest line is the nearest image: for a record whose fit left more than
 * noise. Whoever asks must compare the fits.
 */
export function supposedUnfolded(
  conditioned: ConditionedSignal,
  signal: DecaySignal,
  search: RingDownSearch,
): DecaySignal | undefined {
  const { facts, hasClock } = conditioned;
  if (!hasClock || facts.timing.scatterSdS < TELLING_SCATTER_S) return undefined;
  const { angularRadPerS } = search.fit.components[strongestComponent(search)]!;
  const frequencyHz = angularRadPerS / (2 * Math.PI);
  return pacedSignal(conditioned, signal, (frequencyHz - facts.rateHz) / frequencyHz);
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

function pacedSignal(conditioned: ConditionedSignal, signal: DecaySignal, pace: number): DecaySignal {
  const { clockS, deviationS } = conditioned;
  return { ...signal, timeS: clockS, phaseTimeS: clockS.map((t, i) => t + pace * deviationS[i]!) };
}
