import type { Component, DecaySignal, Segment } from './decay-model.ts';
import { bayesCost } from './bayes-cost.ts';
import { fitDecays } from './fit-decays.ts';
import type { DecayFit } from './fit-decays.ts';
import { amplitudeAtStart } from './mode-estimate.ts';
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
  const segments = current.fitted;
  const residual = residuals(signal, segments, current.fit);
  const weights = current.fit.variance.map((v) => 1 / v);
  const peak = strongestDecay(signal, residual, segments, rateHz, weights);
  if (peak === undefined || peak.gain < HOPELESS_GAIN_SHARE * leastGain(signal, segments)) return undefined;
  const trial = fitDecays(signal, segments, [...current.fit.components, peak.component], noise);
  if (areTooClose(signal, segments, trial.components) || isWeakNeighbour(segments, trial)) return undefined;
  if (bayesCost(signal, segments, trial) >= bayesCost(signal, segments, current.fit)) return undefined;
  return found(current.decays, segments, trial, noise);
}

/** A line that by itself brings less than this share of its price will not pay when fitted along. */
const HOPELESS_GAIN_SHARE = 0.3;

/** What one more component must bring by the Bayesian criterion, in noise variances. */
function leastGain({ y }: DecaySignal, segments: readonly Segment[]): number {
  const samples = segments.reduce((n, s) => n + s.end - s.start, 0);
  return (2 + 2 * segments.length * y.length) * Math.log(samples * y.length);
}

/** Two lines nearer than these shares of one over the longest decay are one line to a single decay, to several. */
const CLOSEST_IN_ONE_DECAY = 0.5;
const CLOSEST_IN_SEVERAL = 0.2;

/** In one decay alone a weak line near a strong one is what the strong one's own amplitude dependence looks like. */
const NEIGHBOUR_SHARE = 0.15;
const WEAK_SHARE = 0.35;

function isWeakNeighbour(segments: readonly Segment[], trial: DecayFit): boolean {
  if (segments.length > 1) return false;
  const amplitudes = trial.components.map((_, k) => amplitudeAtStart(trial, 0, k));
  return trial.components.some((a, i) =>
    trial.components.some(
      (b, j) =>
        Math.abs(a.angularRadPerS / b.angularRadPerS - 1) < NEIGHBOUR_SHARE &&
        amplitudes[i]! < WEAK_SHARE * amplitudes[j]!,
    ),
  );
}

/** Nearer than this share of the broader one's bandwidth, two modes are one whose frequency scatters from tap to tap. */
const CLOSEST_BANDWIDTHS = 0.4;

/** What softening, scatter or a poor start looks like: a second line inside the resolution or the width of the first. */
function areTooClose(
  signal: DecaySignal,
  segments: readonly Segment[],
  components: readonly Component[],
): boolean {
  const longestS = Math.max(...segments.map((s) => signal.timeS[s.end - 1]! - signal.timeS[s.start]!));
  const share = segments.length > 1 ? CLOSEST_IN_SEVERAL : CLOSEST_IN_ONE_DECAY;
  const resolved = (2 * Math.PI * share) / longestS;
  return components.some((a, i) =>
    components.some((b, j) => {
      // Half-power bandwidth of a mode, rad/s: twice its decay rate.
      const width = 2 * Math.max(a.decayPerS, b.decayPerS);
      const apart = Math.abs(a.angularRadPerS - b.angularRadPerS);
      return j < i && apart < Math.max(resolved, CLOSEST_BANDWIDTHS * width);
    }),
  );
}
