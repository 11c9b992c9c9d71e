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
