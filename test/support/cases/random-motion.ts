/** Gaussian motion of a lightly damped mode under white force, seen through a sensor's second-order low-pass. */
import { complexTransform, nextPowerOfTwo } from '../../../src/core/signal/fft.ts';
import type { Random } from './random.ts';

/** Grid of the synthesis, points per nominal sample interval; the spectrum reaches a quarter of it. */
const OVERSAMPLING = 16;
/** Low-pass corner over the nominal rate: inferred from the tails of the shared ambient cases. */
export const SENSOR_CORNER_SHARE = 0.5;

/** Power response of acceleration to white force, 1 far above the resonance. */
export function accelerationPower(frequencyHz: number, naturalHz: number, dampingRatio: number): number {
  const r = frequencyHz / naturalHz;
  return r ** 4 / ((1 - r * r) ** 2 + (2 * dampingRatio * r) ** 2);
}

/** Butterworth, second order, power. */
export const sensorPower = (frequencyHz: number, rateHz: number): number =>
  1 / (1 + (frequencyHz / (SENSOR_CORNER_SHARE * rateHz)) ** 4);

export interface RandomMotion {
  /** Motion at any time of the record, m/s². */
  at(timeS: number): number;
  /** Density far above the resonance before the low-pass, (m/s²)²/Hz, one-sided. */
  readonly tailDensity: number;
}

/**
 * @param rmsMps2 of the resonance alone (one-sided density at the peak times pi·zeta·f), without its flat tail
 */
export function randomModeMotion(
  random: Random,
  mode: { frequencyHz: number; dampingRatio: number },
  rmsMps2: number,
  rateHz: number,
  durationS: number,
): RandomMotion {
  const gridHz = OVERSAMPLING * rateHz;
  const size = nextPowerOfTwo((durationS + 2) * gridHz);
  const tailDensity = (rmsMps2 ** 2 * 4 * mode.dampingRatio) / (Math.PI * mode.frequencyHz);
  const data = new Float64Array(2 * size);
  const stepHz = gridHz / size;
  for (let k = 1; k < size / 4; k++) {
    const f = k * stepHz;
    const density =
      tailDensity * accelerationPower(f, mode.frequencyHz, mode.dampingRatio) * sensorPower(f, rateHz);
    // Only positive frequencies are filled; the real part carries the motion.
    const scale = Math.sqrt(density * stepHz);
    data[2 * k] = scale * random.normal();
    data[2 * k + 1] = scale * random.normal();
  }
  const grid = complexTransform(data, true);
  for (let i = 0; i < grid.length; i++) grid[i] = (grid[i] as number) * size;
  return {
    tailDensity,
    at: (timeS) => {
      const x = (timeS + 1) * gridHz;
      const i = Math.floor(x);
      const u = x - i;
      const y = (k: number): number => grid[2 * (((i + k) % size) + (i + k < 0 ? size : 0))] as number;
      return lagrangeCubic(y(-1), y(0), y(1), y(2), u);
    },
  };
}

function lagrangeCubic(a: number, b: number, c: number, d: number, u: number): number {
  return (
    (-u * (u - 1) * (u - 2) * a) / 6 +
    ((u + 1) * (u - 1) * (u - 2) * b) / 2 -
    ((u + 1) * u * (u - 2) * c) / 2 +
    ((u + 1) * u * (u - 1) * d) / 6
  );
}
