import { fitDecays } from './fit-decays.ts';
import type { DecayFit } from './fit-decays.ts';
import { used } from './find-taps.ts';
import type { FreeDecay } from './find-taps.ts';
import type { Component, DecaySignal } from './decay-model.ts';

export interface RingDownSearch {
  readonly decays: readonly FreeDecay[];
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
  fit: DecayFit,
  quietVariance: readonly number[],
): RingDownSearch => ({
  decays,
  fit,
  quietVariance,
  tapCount: decays.filter((d) => d.onset !== undefined).length,
});

export function refit(
  signal: DecaySignal,
  decays: readonly FreeDecay[],
  components: readonly Component[],
  noise: readonly number[],
): RingDownSearch {
  return found(decays, fitDecays(signal, used(decays), components, noise), noise);
}
