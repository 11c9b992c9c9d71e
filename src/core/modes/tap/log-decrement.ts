import type { DampingCheck } from '../../model/analysis.ts';

/**
 * Damping ratio from the logarithmic decrement per cycle: delta / sqrt(4 pi² + delta²) (exact, viscous damping).
 * @param decrement natural logarithm of the ratio of successive amplitudes
 */
export function dampingFromDecrement(decrement: number): number {
  return decrement / Math.hypot(2 * Math.PI, decrement);
}

/** Decrement per cycle from two amplitudes `cycles` apart. */
export function logarithmicDecrement(first: number, last: number, cycles: number): number {
  if (!(first > 0) || !(last > 0)) throw new RangeError(`amplitudes must be > 0, got ${first}, ${last}`);
  if (!(cycles > 0)) throw new RangeError(`cycles must be > 0, got ${cycles}`);
  return Math.log(first / last) / cycles;
}

/** Cycles per amplitude value: two average the double-frequency ripple away. */
const CYCLES_PER_VALUE = 2;
/** Amplitudes below this many standard deviations of their noise are not used. */
const LEAST_AMPLITUDE_SDS = 4;
const FEWEST_VALUES = 3;

/**
 * Logarithmic decrement of one free decay by demodulation: amplitude over every two cycles, straight line through the
 * logarithms weighted by squared amplitude. A cross-check: reads wrong where another mode beats with this one.
 * @param timeS, samples the decay along its direction, other modes removed
 * @param noiseSd standard deviation of a sample, m/s²
 */
export function logDecrementOfDecay(
  timeS: Float64Array,
  samples: Float64Array,
  frequencyHz: number,
  noiseSd: number,
): DampingCheck {
  const blockS = CYCLES_PER_VALUE / frequencyHz;
  const w = 2 * Math.PI * frequencyHz;
  let [sw, st, sl, stt, stl] = [0, 0, 0, 0, 0];
  let values = 0;
  for (let first = 0; first < timeS.length;) {
    const start = timeS[first]!;
    let [re, im, count, end] = [0, 0, 0, first];
    while (end < timeS.length && timeS[end]! < start + blockS) {
      re += samples[end]! * Math.cos(w * timeS[end]!);
      im += samples[end]! * Math.sin(w * timeS[end]!);
      count++;
      end++;
    }
    if (end >= timeS.length) break;
    const amplitude = (2 * Math.hypot(re, im)) / count;
    if (amplitude < LEAST_AMPLITUDE_SDS * noiseSd * Math.sqrt(2 / count)) break;
    const weight = amplitude * amplitude;
    const t = start + blockS / 2;
    const l = Math.log(amplitude);
    sw += weight;
    st += weight * t;
    sl += weight * l;
    stt += weight * t * t;
    stl += weight * t * l;
    values++;
    first = end;
  }
  if (values < FEWEST_VALUES) return { refusal: 'too-noisy' };
  const slope = (sw * stl - st * sl) / (sw * stt - st * st);
  if (!(slope < 0)) return { refusal: 'too-noisy' };
  return { dampingRatio: dampingFromDecrement(-slope / frequencyHz) };
}
