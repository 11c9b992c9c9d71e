import type { Interval } from '../model/interval.ts';
import type { Resonance } from './resonance-profile.ts';

/** Half-widths of the fading in standard deviations; 1.96 is the 95 % interval of a normal distribution. */
export const FADING_SDS = [1.96, 1.4, 0.9, 0.45, 0] as const;

/**
 * Nested frequency ranges of a mode, widest first: its half-power bandwidth f (1 ± zeta), widened by ever fewer standard
 * deviations of its frequency. Drawn over each other in a pale tint they make an edge that fades as the number is unsure.
 */
export const modeBandHz = (mode: Resonance & { readonly frequencySdHz: number }): readonly Interval[] => {
  const halfWidthHz = mode.frequencyHz * mode.dampingRatio;
  return FADING_SDS.map((sds): Interval => {
    const reachHz = halfWidthHz + sds * mode.frequencySdHz;
    return [Math.max(mode.frequencyHz - reachHz, mode.frequencyHz * 1e-3), mode.frequencyHz + reachHz];
  });
};
