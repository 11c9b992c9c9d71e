import { linearColumnCount, parameterCount } from './decay-model.ts';
import { evaluateDecays } from './evaluate-decays.ts';
import type { DecaySignal, Segment } from './decay-model.ts';
import { CONTACT_SAMPLE_PRICE } from './find-taps.ts';
import type { DecayFit } from './fit-decays.ts';
import type { RingDownSearch } from './ring-down-state.ts';

/** Bayesian information criterion (Schwarz 1978) with the residual variance of each axis estimated. */
export function bayesCost(signal: DecaySignal, segments: readonly Segment[], fit: DecayFit): number {
  const { sampleCount } = fit;
  const axes = signal.y.length;
  let cost = 0;
  for (let a = 0; a < axes; a++) cost += sampleCount * Math.log(fit.evaluation.rss[a]! / sampleCount);
  const parameters =
    parameterCount(fit.components) + segments.length * axes * linearColumnCount(fit.components.length);
  return cost + parameters * Math.log(sampleCount * axes);
}

/** Bayesian information criterion of the whole record: silence before the first tap and contacts count too. */
export function recordCost(signal: DecaySignal, search: RingDownSearch): number {
  const { components, variance } = search.fit;
  const weights = variance.map((v) => 1 / v);
  const all = evaluateDecays(signal, search.decays, components, weights);
  const axes = signal.y.length;
  const n = signal.timeS.length;
  const inside = search.decays.reduce((sum, d) => sum + d.end - d.start, 0);
  let cost = 0;
  for (let a = 0; a < axes; a++) {
    const contact = ((n - inside) * (axes + CONTACT_SAMPLE_PRICE) * variance[a]!) / axes;
    cost += n * Math.log((all.rss[a]! + contact) / n);
  }
  const parameters =
    parameterCount(components) + search.decays.length * axes * linearColumnCount(components.length);
  return cost + parameters * Math.log(n * axes);
}
