import type { ConditionedSignal } from '../../signal/condition-recording.ts';
import { bayesCost } from './bayes-cost.ts';
import type { DecaySignal } from './decay-model.ts';
import { ROUGH_ITERATIONS, fitDecays } from './fit-decays.ts';
import type { RingDownSearch } from './ring-down-state.ts';

/** Shares of the stamps' scatter tried as true: none is a steady clock read late, one is true stamps. */
const SHARES = [0, 0.25, 0.5, 0.75, 1] as const;
/** Half the distance between them. */
const SHARE_REACH = 0.125;
/** Scatter below this moves nothing a ring-down could tell, s. */
const LEAST_SCATTER_S = 1e-4;
/** Fall of the Bayesian criterion that overrules the record's own time base: "very strong" (Kass & Raftery 1995). */
const STRONG_EVIDENCE = 10;

/**
 * The time base on which the ring-downs fit best, where it is clearly another than the one the record as a whole
 * suggested: a struck structure tells true stamps from late ones by far better than the noise around it.
 * @returns undefined where the present one stands
 */
export function retimedByRingDowns(
  conditioned: ConditionedSignal,
  signal: DecaySignal,
  search: RingDownSearch,
): ConditionedSignal | undefined {
  const { timing } = conditioned.facts;
  if (!conditioned.hasClock || timing.scatterSdS < LEAST_SCATTER_S) return undefined;
  const costAt = (share: number): number => {
    const timed = { ...signal, timeS: timesOf(conditioned, share) };
    const { components, variance } = search.fit;
    const fit = fitDecays(timed, search.fitted, components, variance, 1, ROUGH_ITERATIONS);
    return bayesCost(timed, search.fitted, fit);
  };
  const costs = SHARES.map(costAt);
  const best = costs.indexOf(Math.min(...costs));
  const present = costAt(timing.trueShare);
  if (Math.abs(SHARES[best]! - timing.trueShare) <= SHARE_REACH || costs[best]! > present - STRONG_EVIDENCE)
    return undefined;
  const trueShare = betweenShares(costs, best);
  const model = trueShare > 0.9 ? 'stamps' : trueShare < 0.1 ? 'clock' : 'mixed';
  return {
    ...conditioned,
    timeS: timesOf(conditioned, trueShare),
    isTimeBaseDecided: true,
    facts: { ...conditioned.facts, timing: { ...timing, model, trueShare } },
  };
}

const timesOf = ({ clockS, deviationS }: ConditionedSignal, share: number): Float64Array =>
  clockS.map((t, i) => t + share * deviationS[i]!);

/** Lowest point of a parabola through the best share and its neighbours; at the ends none and one are taken as they are. */
function betweenShares(costs: readonly number[], best: number): number {
  const [before, here, after] = [costs[best - 1], costs[best]!, costs[best + 1]];
  if (before === undefined || after === undefined) return SHARES[best]!;
  const bend = before - 2 * here + after;
  return SHARES[best]! + (bend > 0 ? SHARE_REACH * ((before - after) / bend) : 0);
}
