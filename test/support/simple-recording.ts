import type { Recording } from '../../src/core/model/recording.ts';
import type { Random } from './cases/random.ts';

/** A recording of given motion on a steady clock: gravity along z, white noise, three axes. */
export function simpleRecording(
  random: Random,
  wanted: {
    readonly durationS: number;
    readonly rateHz: number;
    readonly noiseMps2: number;
    /** Motion of each axis at a time, m/s². */
    readonly motion?: (timeS: number) => readonly number[];
  },
): Recording {
  const { durationS, rateHz, noiseMps2, motion } = wanted;
  const timeS = Float64Array.from({ length: Math.floor(durationS * rateHz) }, (_, k) => k / rateHz);
  const rows = Array.from(timeS, (t) => motion?.(t) ?? [0, 0, 0]);
  return {
    sensor: { source: 'file', practice: false, name: 'made.csv' },
    axes: ['x', 'y', 'z'],
    timeS,
    accelerationMps2: [0, 1, 2].map((axis) =>
      Float32Array.from(
        rows,
        (row) => (row[axis] as number) + (axis === 2 ? 9.8 : 0) + noiseMps2 * random.normal(),
      ),
    ),
  };
}
