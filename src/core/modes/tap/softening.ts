import { bayesCost } from './bayes-cost.ts';
import type { Component, DecaySignal } from './decay-model.ts';
import type { FreeDecay } from './find-taps.ts';
import { fitDecays } from './fit-decays.ts';
import type { DecayFit } from './fit-decays.ts';
import { amplitudeAtStart } from './mode-estimate.ts';

/** Fall of the Bayesian criterion that calls for softening: "very strong" (Kass & Raftery 1995). */
const STRONG_EVIDENCE = 10;
/** One decay alone cannot tell softening from a beat. */
const FEWEST_DECAYS = 2;
/** Start amplitudes and slopes in turn. */
const ROUNDS = 3;
/** A weaker mode this near may be what softening of the stronger one looks like without its slopes. */
const NEIGHBOUR_SHARE = 0.1;

export interface SoftenedFit {
  readonly decays: readonly FreeDecay[];
  readonly fit: DecayFit;
}

/**
 * Lets frequency and damping of the strongest mode change with amplitude (frequency w (1 + s A), decay a + b A, to first
 * order) if the data ask for it; frequency and damping are then those of small motion. A weaker neighbour that the
 * change makes needless is dropped.
 * @returns undefined when the plain fit is as good
 */
export function softenedFit(
  signal: DecaySignal,
  decays: readonly FreeDecay[],
  plain: DecayFit,
): SoftenedFit | undefined {
  if (decays.length < FEWEST_DECAYS) return undefined;
  const strongest = strongestMode(plain);
  if (strongest === undefined) return undefined;
  const main = plain.components[strongest]!;
  const beside = plain.components.filter((c) => c !== main);
  const apart = beside.filter(
    (c) => c.kind === 'tone' || Math.abs(c.angularRadPerS / main.angularRadPerS - 1) > NEIGHBOUR_SHARE,
  );
  const trials = [beside, ...(apart.length < beside.length ? [apart] : [])].map((others) =>
    softened(signal, decays, plain, main, others, strongest),
  );
  const costs = trials.map((t) => bayesCost(signal, t.decays, t.fit));
  const best = costs.indexOf(Math.min(...costs));
  return costs[best]! < bayesCost(signal, decays, plain) - STRONG_EVIDENCE ? trials[best] : undefined;
}

function strongestMode({ components, evaluation }: DecayFit): number | undefined {
  let best: number | undefined;
  let most = 0;
  components.forEach((c, k) => {
    if (c.kind === 'tone') return;
    const energy = evaluation.segments.reduce(
      (sum, { coefficients }) =>
        sum + coefficients.reduce((e, v) => e + v[2 * k]! ** 2 + v[2 * k + 1]! ** 2, 0) / c.decayPerS,
      0,
    );
    if (energy > most) [best, most] = [k, energy];
  });
  return best;
}

function softened(
  signal: DecaySignal,
  decays: readonly FreeDecay[],
  plain: DecayFit,
  main: Component,
  others: readonly Component[],
  strongest: number,
): SoftenedFit {
  const start: Component = { ...main, softening: { frequencySlopePerMps2: 0, decaySlopePerMps2: 0 } };
  let current: SoftenedFit = { decays: withAmplitudes(decays, plain, strongest), fit: plain };
  let components: readonly Component[] = [start, ...others];
  for (let round = 0; round < ROUNDS; round++) {
    const fit = fitDecays(signal, current.decays, components, plain.variance, round === 0 ? 1 : 2);
    components = fit.components;
    current = { decays: round < ROUNDS - 1 ? withAmplitudes(decays, fit, 0) : current.decays, fit };
  }
  return current;
}

const withAmplitudes = (decays: readonly FreeDecay[], fit: DecayFit, k: number): FreeDecay[] =>
  decays.map((decay, s) => ({ ...decay, amplitudeMps2: amplitudeAtStart(fit, s, k) }));
