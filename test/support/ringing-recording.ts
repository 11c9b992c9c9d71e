import type { Recording } from '../../src/core/model/recording.ts';
import { seededRandom } from './cases/random.ts';

export interface Ringing {
  readonly frequencyHz: number;
  readonly dampingRatio: number;
  readonly tapTimesS: readonly number[];
  readonly durationS: number;
  readonly rateHz?: number;
  readonly amplitudeMps2?: number;
  readonly noiseMps2?: number;
  readonly scatterS?: number;
  readonly stepMps2?: number;
  readonly direction?: readonly number[];
  readonly seed?: number;
}

/** A structure with one mode, tapped at given times: exact free decays, superposed, gravity on z. */
export function ringingRecording(ringing: Ringing): Recording {
  const { frequencyHz, dampingRatio, tapTimesS, durationS } = ringing;
  const { rateHz = 60, amplitudeMps2 = 1, noiseMps2 = 0.02, scatterS = 0, stepMps2 = 0, seed = 1 } = ringing;
  const { direction = [0.48, 0.6, 0.64] } = ringing;
  const random = seededRandom(seed);
  const n = Math.floor(durationS * rateHz);
  const timeS = Float64Array.from({ length: n }, (_, i) => i / rateHz + scatterS * random.normal());
  const wn = 2 * Math.PI * frequencyHz;
  const wd = wn * Math.sqrt(1 - dampingRatio ** 2);
  const motion = timeS.map((t) =>
    tapTimesS.reduce(
      (sum, tap) =>
        t < tap
          ? sum
          : sum + amplitudeMps2 * Math.exp(-dampingRatio * wn * (t - tap)) * Math.sin(wd * (t - tap)),
      0,
    ),
  );
  const rest = [0, 0, 9.81];
  const accelerationMps2 = direction.map((d, a) =>
    Float32Array.from(motion, (m) => {
      const value = rest[a]! + d * m + noiseMps2 * random.normal();
      return stepMps2 > 0 ? Math.round(value / stepMps2) * stepMps2 : value;
    }),
  );
  return {
    sensor: { source: 'file', practice: false, name: 'ringing.csv' },
    axes: (['x', 'y', 'z'] as const).slice(0, direction.length),
    timeS,
    accelerationMps2,
  };
}
