import type { DampingCheck } from '../../model/analysis.ts';
import { nextPowerOfTwo, realTransform } from '../../signal/fft.ts';

export type ResponseKind = 'displacement' | 'velocity' | 'acceleration';

/**
 * Damping ratio from the two half-power frequencies of a steady response, exact for zeta <= sin(22.5 deg).
 * Displacement and acceleration: zeta = sin(atan((f2²-f1²)/(f1²+f2²))/2); velocity: (f2-f1)/(2 sqrt(f1 f2)).
 * @param lowerHz f1, upperHz f2, 0 < f1 < f2
 */
export function halfPowerDamping(lowerHz: number, upperHz: number, response: ResponseKind): number {
  if (!(lowerHz > 0) || !(upperHz > lowerHz))
    throw new RangeError(`half-power frequencies must rise from above 0, got ${lowerHz}, ${upperHz}`);
  if (response === 'velocity') return (upperHz - lowerHz) / (2 * Math.sqrt(lowerHz * upperHz));
  const [a, b] = [lowerHz ** 2, upperHz ** 2];
  return Math.sin(0.5 * Math.atan((b - a) / (a + b)));
}

/** Below this product of decay rate and length the record's own width outweighs the mode's: width < resolution. */
const RESOLVED_DECAYS = Math.PI;
/** Below this the width still reads more than 5 % too wide (reference values 1.8, no window). */
const UNBIASED_DECAYS = 4;
/** Zero padding of the transform: bins per resolution. */
const PADDING = 8;

/**
 * Half-power damping of one free decay, for comparison with the fit only. No window: a Hann window on a decay reads
 * up to half too low (reference values 1.8). Refused where the record is too short for the width it should show.
 * @param samples uniform to within stamp scatter, along the mode's direction, other modes removed; m/s²
 * @param decayPerS the fit's decay rate, for the refusal alone
 */
export function halfPowerOfDecay(
  samples: Float64Array,
  rateHz: number,
  frequencyHz: number,
  decayPerS: number,
): DampingCheck {
  const durationS = samples.length / rateHz;
  if (decayPerS * durationS < RESOLVED_DECAYS) return { refusal: 'below-resolution' };
  if (decayPerS * durationS < UNBIASED_DECAYS) return { refusal: 'window-dominates' };
  const size = nextPowerOfTwo(PADDING * samples.length);
  const { re, im } = realTransform(samples, size);
  const power = re.map((x, k) => x * x + im[k]! * im[k]!);
  const stepHz = rateHz / size;
  const centre = frequencyHz / stepHz;
  const reach = Math.max(PADDING, (2 * decayPerS) / (2 * Math.PI * stepHz));
  let peak = Math.max(1, Math.round(centre - reach));
  for (let k = peak; k <= Math.min(centre + reach, power.length - 2); k++)
    if (power[k]! > power[peak]!) peak = k;
  const half = power[peak]! / 2;
  const lower = crossing(power, peak, half, -1);
  const upper = crossing(power, peak, half, 1);
  if (lower === undefined || upper === undefined || !(lower > 0)) return { refusal: 'no-half-power-points' };
  return { dampingRatio: halfPowerDamping(lower * stepHz, upper * stepHz, 'acceleration') };
}

/** Where the power falls through `level`, in bins, by a straight line between bins. */
function crossing(power: Float64Array, peak: number, level: number, step: 1 | -1): number | undefined {
  for (let k = peak; k > 0 && k < power.length - 1; k += step) {
    const [here, next] = [power[k]!, power[k + step]!];
    if (next <= level) return k + step * ((here - level) / (here - next));
  }
  return undefined;
}
