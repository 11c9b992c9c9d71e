/**
 * A phone's clock and sensor: true sampling scatter, late stamps, gaps, rate error, gravity on a tilted phone, white
 * noise, rounding. Distributions inferred from the shared cases (12 of each kind).
 */
import type { Recording } from '../../../src/core/model/recording.ts';
import type { Random } from './random.ts';
import type { DeviceTruth } from './truth.ts';

/** A sample never comes sooner after the one before than this share of the interval. */
const LEAST_INTERVAL_SHARE = 0.2;

export interface SampleTimes {
  /** When the samples were truly taken, s. */
  readonly trueS: Float64Array;
  /** What the stamps say, s. */
  readonly stampS: Float64Array;
}

export function drawDevice(
  random: Random,
  options: Partial<DeviceTruth> & { steps?: number[] } = {},
): DeviceTruth {
  const { steps = [0, 0.01], ...fixed } = options;
  const drawn = {
    fs: random.chance(0.7) ? 60 : 100,
    jit: random.uniform(1e-3, 3e-3),
    gap: random.pick([0, 0.1, 0.3]),
    stamp_sd: 0,
    rate_err: random.uniform(-0.01, 0.01),
    q: random.pick(steps),
    sigma: random.logUniform(0.01, 0.05),
  };
  return { ...drawn, ...fixed };
}

export function drawSampleTimes(random: Random, device: DeviceTruth, durationS: number): SampleTimes {
  const interval = 1 / (device.fs * (1 + device.rate_err));
  const trueS: number[] = [];
  const stampS: number[] = [];
  let skip = 0;
  for (let k = 0; k * interval < durationS; k++) {
    if (skip > 0) {
      skip--;
      continue;
    }
    const previous = trueS.at(-1) ?? -Infinity;
    const at = Math.max(
      k * interval + device.jit * random.normal(),
      previous + LEAST_INTERVAL_SHARE * interval,
    );
    const stamp = Math.max(at + device.stamp_sd * random.normal(), (stampS.at(-1) ?? -Infinity) + 1e-5);
    trueS.push(at);
    stampS.push(stamp);
    if (random.chance((device.gap * 0.75) / device.fs)) skip = random.integer(1, 2);
  }
  return { trueS: Float64Array.from(trueS), stampS: Float64Array.from(stampS) };
}

const roundTo = (value: number, step: number): number => (step > 0 ? Math.round(value / step) * step : value);

/**
 * What the phone hands over: motion plus gravity plus noise, rounded; stamps relative to the first.
 * @param motion three arrays, m/s², at the true times
 */
export function deliver(
  random: Random,
  device: DeviceTruth,
  times: SampleTimes,
  motion: readonly Float64Array[],
  name: string,
): Recording {
  const tilt = [random.uniform(-0.6, 0.6), random.uniform(-0.6, 0.6)];
  const gravity = [...tilt, random.uniform(9.73, 9.83)];
  const first = times.stampS[0] as number;
  return {
    sensor: { source: 'file', practice: false, name },
    axes: ['x', 'y', 'z'],
    timeS: times.stampS.map((t) => roundTo(t - first, 1e-6)),
    accelerationMps2: motion.map((axis, i) =>
      Float32Array.from(axis, (a) =>
        roundTo(roundTo(a + (gravity[i] as number) + device.sigma * random.normal(), device.q), 1e-5),
      ),
    ),
  };
}

/** Adds `amplitude` times a scalar motion along a direction. */
export function addAlong(
  motion: readonly Float64Array[],
  direction: readonly number[],
  value: (index: number) => number,
): void {
  const n = (motion[0] as Float64Array).length;
  for (let k = 0; k < n; k++) {
    const v = value(k);
    if (v !== 0) motion.forEach((axis, i) => (axis[k] = (axis[k] as number) + v * (direction[i] as number)));
  }
}

export const stillMotion = (n: number): Float64Array[] => [0, 1, 2].map(() => new Float64Array(n));

/** Noise variance a bound may count on: white noise plus uniform rounding error. */
export const noiseVariance = (device: DeviceTruth): number => device.sigma ** 2 + device.q ** 2 / 12;
