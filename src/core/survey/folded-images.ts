import type { FoldedForcing } from '../model/folded-forcing.ts';
import type { Interval } from '../model/interval.ts';
import type { Forcing } from '../model/source.ts';

/** Where a frequency appears when sampled at a rate: folded about multiples of the rate into 0 to half of it. */
export function imageHz(frequencyHz: number, rateHz: number): number {
  const rest = frequencyHz % rateHz;
  return Math.min(rest, rateHz - rest);
}

/** Where a band appears; a band that crosses a multiple of half the rate reaches that edge. */
export function imageBandHz(bandHz: Interval, rateHz: number): Interval {
  const half = rateHz / 2;
  if (bandHz[1] - bandHz[0] >= half) return [0, half];
  const ends = bandHz.map((frequencyHz) => imageHz(frequencyHz, rateHz));
  const fold = Math.floor(bandHz[1] / half);
  const crosses = Math.floor(bandHz[0] / half) !== fold;
  if (crosses) ends.push(fold % 2 === 1 ? half : 0);
  return [Math.min(...ends), Math.max(...ends)];
}

/** Within this share of half the rate (or of zero) a line beats against the sampling and its amplitude cannot be read. Our own bound. */
export const EDGE_SHARE = 0.03;

/** Forcings that lie, at least in part, above half the rate (or on it), with where they would appear: told before recording. */
export function foldedForcings(forcings: readonly Forcing[], rateHz: number): readonly FoldedForcing[] {
  const half = rateHz / 2;
  return forcings
    .filter((forcing) => forcing.frequencyHz[1] > half * (1 - EDGE_SHARE))
    .map((forcing) => {
      const image = imageBandHz(forcing.frequencyHz, rateHz);
      const atHalf = image[1] > half * (1 - EDGE_SHARE);
      const atZero = image[0] < half * EDGE_SHARE;
      return { forcing, imageHz: image, edge: atHalf ? 'half-rate' : atZero ? 'zero' : 'none' };
    });
}
