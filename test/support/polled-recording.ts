import type { Recording } from '../../src/core/model/recording.ts';
import { seededRandom } from './cases/random.ts';

export interface PolledOptions {
  /** Rate of the sensor's own clock, Hz. */
  readonly sensorHz: number;
  readonly pollHz?: number;
  readonly durationS?: number;
  /** Scatter of the polls (the stamps tell it truly), s. */
  readonly pollScatterS?: number;
  readonly noiseMps2?: number;
  readonly stepMps2?: number;
  readonly seed?: number;
}

/**
 * What a browser's motion event delivers: the latest reading of a sensor that runs on its own clock, stamped with the time of
 * the poll. Readings are held (and seen twice) or skipped; nothing is filtered.
 */
export function polledRecording(
  motion: (timeS: number) => readonly [number, number, number],
  options: PolledOptions,
): Recording {
  const {
    sensorHz,
    pollHz = 60,
    durationS = 30,
    pollScatterS = 1e-3,
    noiseMps2 = 0.02,
    stepMps2 = 0,
  } = options;
  const random = seededRandom(options.seed ?? 1, 77);
  const startS = random.uniform(0, 1 / sensorHz);
  const rounded = (v: number): number => (stepMps2 > 0 ? stepMps2 * Math.round(v / stepMps2) : v);
  const readings = Array.from({ length: Math.ceil((durationS + 1) * sensorHz) }, (_, k) =>
    motion(k / sensorHz - startS).map((v, a) =>
      rounded(v + [0.3, -0.2, 9.8][a]! + noiseMps2 * random.normal()),
    ),
  );
  const polls = Array.from({ length: Math.floor(durationS * pollHz) }, (_, k) =>
    Math.max(0, k / pollHz + pollScatterS * random.normal()),
  ).sort((a, b) => a - b);
  const read = polls.map((t) => readings[Math.floor((t + startS) * sensorHz)]!);
  return {
    sensor: { source: 'devicemotion', practice: false, name: 'polled' },
    axes: ['x', 'y', 'z'],
    timeS: Float64Array.from(polls, (t) => t - polls[0]!),
    accelerationMps2: [0, 1, 2].map((a) => Float32Array.from(read, (row) => row[a]!)),
  };
}
