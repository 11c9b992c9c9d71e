import type { Component, DecaySignal, Segment } from './decay-model.ts';
import { bayesCost } from './bayes-cost.ts';
import { used } from './find-taps.ts';
import { fitDecays } from './fit-decays.ts';
import { residuals } from './modelled-signal.ts';
import { found } from './ring-down-state.ts';
import type { RingDownSearch, SearchInput } from './ring-down-state.ts';
import { strongestDecay } from './start-bank.ts';

/** Modes and tones together. */
const COMPONENT_LIMIT = 5;

/** The strongest line of what the fit left, added and fitted along, if the data pay for it. */
export function withOneMore(
  input: SearchInput,
  current: RingDownSearch,
  noise: readonly number[],
): RingDownSearch | undefined {
  const { signal, rateHz } = input;
  if (current.fit.components.length >= COMPONENT_LIMIT) return undefined;
  const segments = used(current.decays);
  const residual = residuals(signal, segments, current.fit);
  const weights = current.fit.variance.map((v) => 1 / v);
  const peak = strongestDecay(signal, residual, segments, rateHz, weights);
  if (peak === undefined) return undefined;
  const trial = fitDecays(signal, segments, [...current.fit.components, peak.component], noise);
  if (areTooClose(signal, segments, trial.components)) return undefined;
  if (bayesCost(signal, segments, trial) >= bayesCost(signal, segments, current.fit)) return undefined;
  return found(current.decays, trial, noise);
}

/** Two lines nearer than these shares of one over the longest decay are one line to a single decay, to several. */
const CLOSEST_IN_ONE_DECAY = 0.5;
const CLOSEST_IN_SEVERAL = 0.2;

/** What softening or a poor start looks like: a second line inside the resolution of the first. */
function areTooClose(
  signal: DecaySignal,
  segments: readonly Segment[],
  components: readonly Component[],
): boolean {
  const longestS = Math.max(...segments.map((s) => signal.timeS[s.end - 1]! - signal.timeS[s.start]!));
  const share = segments.length > 1 ? CLOSEST_IN_SEVERAL : CLOSEST_IN_ONE_DECAY;
  const leastRadPerS = (2 * Math.PI * share) / longestS;
  return components.some((a, i) =>
    components.some((b, j) => j < i && Math.abs(a.angularRadPerS - b.angularRadPerS) < leastRadPerS),
  );
}
