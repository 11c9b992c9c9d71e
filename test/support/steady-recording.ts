import type { Recording } from '../../src/core/model/recording.ts';
import { seededRandom } from './cases/random.ts';

export interface SteadyOptions {
  readonly durationS?: number;
  readonly rateHz?: number;
  /** True sampling scatter and lateness of the stamps alone, s (standard deviations). */
  readonly jitterS?: number;
  readonly latenessS?: number;
  readonly noiseMps2?: number;
  readonly stepMps2?: number;
  /** Indexes of samples lost. */
  readonly lost?: readonly number[];
  readonly gravityMps2?: readonly [number, number, number];
  readonly seed?: number;
  readonly sensor?: Partial<Recording['sensor']>;
}

/** A recording of a known motion by a phone of known faults. The motion is given at the true sampling times. */
export function steadyRecording(
  motion: (timeS: number) => readonly [number, number, number],
  options: SteadyOptions = {},
): Recording {
  const { durationS = 30, rateHz = 60, jitterS = 0, latenessS = 0, noiseMps2 = 0.01, stepMps2 = 0 } = options;
  const random = seededRandom(options.seed ?? 1);
  const lost = new Set(options.lost);
  const gravity = options.gravityMps2 ?? [0.3, -0.2, 9.8];
  const rows: { t: number; a: number[] }[] = [];
  for (let k = 0; k < durationS * rateHz; k++) {
    const trueS = k / rateHz + jitterS * random.normal();
    const stampS = trueS + latenessS * random.normal();
    const moved = motion(trueS);
    const a = moved.map((v, axis) => {
      const value = v + (gravity[axis] as number) + noiseMps2 * random.normal();
      return stepMps2 > 0 ? stepMps2 * Math.round(value / stepMps2) : value;
    });
    if (!lost.has(k)) rows.push({ t: stampS, a });
  }
  rows.sort((p, q) => p.t - q.t);
  const start = rows[0]!.t;
  return {
    sensor: { source: 'file', practice: false, name: 'steady', ...options.sensor },
    axes: ['x', 'y', 'z'],
    timeS: Float64Array.from(rows, (row) => row.t - start),
    accelerationMps2: [0, 1, 2].map((axis) => Float32Array.from(rows, (row) => row.a[axis] as number)),
  };
}

/** Steady line along an axis direction: amplitude in m/s² peak. */
export const tone =
  (
    frequencyHz: number,
    amplitudeMps2: number,
    direction: readonly [number, number, number] = [0, 0, 1],
  ): ((timeS: number) => [number, number, number]) =>
  (timeS) => {
    const v = amplitudeMps2 * Math.cos(2 * Math.PI * frequencyHz * timeS + 0.4);
    return [v * direction[0], v * direction[1], v * direction[2]];
  };

export const still = (): [number, number, number] => [0, 0, 0];
