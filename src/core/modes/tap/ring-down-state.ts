import { fitDecays } from './fit-decays.ts';
import type { DecayFit } from './fit-decays.ts';
import type { FreeDecay } from './find-taps.ts';
import { linearColumnCount } from './decay-model.ts';
import type { Component, DecaySignal } from './decay-model.ts';

export interface RingDownSearch {
  /** All stretches of the record between contacts. */
  readonly decays: readonly FreeDecay[];
  /** Those that the fit uses: all, or all but the first. */
  readonly fitted: readonly FreeDecay[];
  readonly fit: DecayFit;
  readonly tapCount: number;
  /** Noise variance per axis in the quietest stretches, (m/s²)². */
  readonly quietVariance: readonly number[];
}

export interface SearchInput {
  readonly signal: DecaySignal;
  readonly rateHz: number;
  readonly stepMps2: readonly number[];
}

export const found = (
  decays: readonly FreeDecay[],
  fitted: readonly FreeDecay[],
  fit: DecayFit,
  quietVariance: readonly number[],
): RingDownSearch => ({
  decays,
  fitted,
  fit,
  quietVariance,
  tapCount: decays.filter((d) => d.onset !== undefined).length,
});

/** Fits all decays; what precedes the first tap only if it is silence or free decay too, not handling. */
export function refit(
  signal: DecaySignal,
  decays: readonly FreeDecay[],
  components: readonly Component[],
  noise: readonly number[],
): RingDownSearch {
  const all = fitDecays(signal, decays, components, noise, 1);
  if (!beginsWithHandling(decays, all)) return found(decays, decays, all, noise);
  const tapped = decays.slice(1);
  return found(decays, tapped, fitDecays(signal, tapped, all.components, noise, 1), noise);
}

/** Residual variance before the first tap above this many times the other decays' is not theirs. Our own choice. */
const HANDLING_FACTOR = 3;

function beginsWithHandling(decays: readonly FreeDecay[], fit: DecayFit): boolean {
  if (decays.length < 2 || decays[0]!.onset !== undefined) return false;
  const variances = decays.map((decay, s) => {
    const { rss } = fit.evaluation.segments[s]!;
    const freedom = Math.max(decay.end - decay.start - linearColumnCount(fit.components.length), 1);
    return rss.reduce((a, b) => a + b, 0) / freedom;
  });
  const others = variances.slice(1).sort((a, b) => a - b);
  return variances[0]! > HANDLING_FACTOR * others[Math.floor(others.length / 2)]!;
}
