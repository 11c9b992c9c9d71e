import type { DampingCheck } from '../../model/analysis.ts';
import { averagedDensity } from '../../signal/spectrum.ts';
import { halfPowerDamping } from '../tap/half-power.ts';

/** Bins per half-power half-width below which the window, not the mode, sets the width (study, section 2: bias above 10 %). */
const RESOLUTION_PER_HALF_WIDTH = 0.4;
/** Fewer averages leave the peak too ragged for half-power points: random error above 35 % (Bendat & Piersol). */
const LEAST_AVERAGES = 8;

/**
 * Half-power damping read off an averaged density (Hann, half overlap), for comparison with the likelihood fit only.
 * Refused where resolution and averages cannot both be had.
 * @param samples uniform, along the mode's direction, m/s²
 */
export function halfPowerOfDensity(
  samples: Float64Array,
  periodS: number,
  frequencyHz: number,
  dampingRatio: number,
): DampingCheck {
  const halfWidthHz = dampingRatio * frequencyHz;
  const segmentSamples = Math.ceil(1 / (RESOLUTION_PER_HALF_WIDTH * halfWidthHz * periodS));
  if (2 * segmentSamples > samples.length) return { refusal: 'below-resolution' };
  const density = averagedDensity([samples], periodS, segmentSamples);
  if (density.averageCount < LEAST_AVERAGES) return { refusal: 'too-few-averages' };
  const values = density.densityPerHz[0] as Float64Array;
  const reach = Math.ceil((2 * halfWidthHz) / density.stepHz) + 1;
  const centre = Math.round(frequencyHz / density.stepHz);
  let peak = Math.max(1, centre - reach);
  for (let k = peak; k <= Math.min(values.length - 2, centre + reach); k++)
    if ((values[k] as number) > (values[peak] as number)) peak = k;
  const lower = crossing(values, peak, -1);
  const upper = crossing(values, peak, 1);
  if (lower === undefined || upper === undefined || !(lower > 0) || upper <= lower)
    return { refusal: 'no-half-power-points' };
  return {
    dampingRatio: halfPowerDamping(lower * density.stepHz, upper * density.stepHz, 'acceleration'),
  };
}

function crossing(values: Float64Array, peak: number, step: 1 | -1): number | undefined {
  const level = (values[peak] as number) / 2;
  for (let k = peak; k > 0 && k < values.length - 1; k += step) {
    const here = values[k] as number;
    const next = values[k + step] as number;
    if (next <= level) return k + (step * (here - level)) / (here - next);
  }
  return undefined;
}
