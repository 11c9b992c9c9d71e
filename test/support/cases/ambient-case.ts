/** Kind B: one mode under random excitation. */
import { addAlong, deliver, drawDevice, drawSampleTimes, noiseVariance, stillMotion } from './device.ts';
import { whittleBounds } from './cramer-rao.ts';
import { accelerationPower, randomModeMotion, sensorPower } from './random-motion.ts';
import type { Random } from './random.ts';
import type { GeneratedCase } from './truth.ts';

export interface AmbientChoice {
  readonly frequencyHz?: number;
  readonly dampingRatio?: number;
  readonly durationS?: number;
  readonly rmsMps2?: number;
}

export function ambientCase(
  random: Random,
  seed: number,
  index: number,
  choice: AmbientChoice = {},
): GeneratedCase {
  const name = `B_${String(index).padStart(4, '0')}`;
  const device = drawDevice(random, { stamp_sd: random.chance(0.3) ? 1e-3 : 0 });
  const durationS = choice.durationS ?? random.pick([60, 120, 300]);
  const frequencyHz = choice.frequencyHz ?? random.logUniform(2, 20);
  const dampingRatio = choice.dampingRatio ?? random.logUniform(0.005, 0.04);
  const rmsMps2 = choice.rmsMps2 ?? random.logUniform(0.02, 0.3);
  const times = drawSampleTimes(random, device, durationS);
  const source = randomModeMotion(random, { frequencyHz, dampingRatio }, rmsMps2, device.fs, durationS);
  const motion = stillMotion(times.trueS.length);
  addAlong(motion, random.direction(), (k) => source.at(times.trueS[k] as number));
  const bounds = ambientBounds(
    { frequencyHz, dampingRatio },
    source.tailDensity,
    noiseVariance(device),
    device.fs,
    durationS,
  );
  return {
    name,
    truth: {
      kind: 'B',
      index,
      seed,
      device,
      modes: [{ f_hz: frequencyHz, zeta: dampingRatio, ...bounds, rms_mps2: rmsMps2 }],
      t0_s: times.stampS[0] as number,
    },
    recording: deliver(random, device, times, motion, `${name}.csv`),
  };
}

/** Whittle bounds over the whole band with strength and floor free. */
export function ambientBounds(
  mode: { frequencyHz: number; dampingRatio: number },
  tailDensity: number,
  varianceOfNoise: number,
  rateHz: number,
  durationS: number,
): { crlb_f: number; crlb_zeta: number } {
  const floor = (2 * varianceOfNoise) / rateHz;
  const parameters = [mode.frequencyHz, mode.dampingRatio, tailDensity, floor];
  const logDensity = (f: number, p: readonly number[]): number =>
    Math.log(
      (p[2] as number) * accelerationPower(f, p[0] as number, p[1] as number) * sensorPower(f, rateHz) +
        (p[3] as number),
    );
  const stepHz = Math.min(1 / durationS, (mode.dampingRatio * mode.frequencyHz) / 8);
  const half = 5 * 2 * mode.dampingRatio * mode.frequencyHz;
  const bandHz: [number, number] = [
    Math.max(mode.frequencyHz - Math.max(half, 0.5), 0.2),
    Math.min(mode.frequencyHz + Math.max(half, 0.5), 0.45 * rateHz),
  ];
  const [f, z] = whittleBounds(logDensity, parameters, bandHz, durationS, stepHz) as [number, number];
  return { crlb_f: f, crlb_zeta: z };
}
