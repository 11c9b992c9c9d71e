import { describe, expect, it } from 'vitest';
import { bandMotion, weightedSamples } from '../../../src/core/signal/integration.ts';
import { peak, rms } from '../../../src/core/signal/running-rms.ts';
import { seededRandom } from '../../support/cases/random.ts';

const rateHz = 100;
const n = 6000;
const sine = (f: number, a: number): Float64Array =>
  Float64Array.from({ length: n }, (_, i) => a * Math.sin((2 * Math.PI * f * i) / rateHz));
const inner = (v: Float64Array): Float64Array => v.subarray(300, n - 300);

describe('bandMotion', () => {
  it('divides a sine by 2πf once and twice', () => {
    const motion = bandMotion(sine(8, 1), 1 / rateHz, [0.5, 42], 1e-8, []);
    const w = 2 * Math.PI * 8;
    // The record's ends ring by a little: 1 to 2 % inside.
    expect(rms(inner(motion.accelerationMps2)) * Math.SQRT2).toBeCloseTo(1, 2);
    expect(peak(inner(motion.velocityMps)) * w).toBeCloseTo(1, 1);
    expect(rms(inner(motion.velocityMps)) * w * Math.SQRT2).toBeCloseTo(1, 2);
    expect(Math.abs(rms(inner(motion.displacementM)) * w * w * Math.SQRT2 - 1)).toBeLessThan(0.02);
  });

  it('leaves out what it is told to, in velocity and displacement only', () => {
    const motion = bandMotion(sine(8, 1), 1 / rateHz, [0.5, 42], 1e-8, [[7.5, 8.5]]);
    expect(rms(inner(motion.accelerationMps2)) * Math.SQRT2).toBeCloseTo(1, 2);
    expect(rms(inner(motion.velocityMps))).toBeLessThan(2e-4);
  });

  it('sees nothing outside its band', () => {
    expect(
      rms(inner(bandMotion(sine(48, 1), 1 / rateHz, [0.5, 40], 1e-8, []).accelerationMps2)),
    ).toBeLessThan(0.01);
  });

  it('does not integrate the noise of the sensor', () => {
    const random = seededRandom(5);
    const sigma = 0.02;
    const noise = Float64Array.from({ length: n }, () => sigma * random.normal());
    const motion = bandMotion(noise, 1 / rateHz, [0.3, 42], (2 * sigma * sigma) / rateHz, []);
    expect(rms(motion.velocityMps)).toBeLessThan(1e-15);
  });
});

describe('weightedSamples', () => {
  it('applies a gain of frequency', () => {
    const { spectrum } = bandMotion(sine(8, 1), 1 / rateHz, [0.5, 42], 1e-8, []);
    const half = weightedSamples(spectrum, 1 / rateHz, n, () => 0.5);
    expect(rms(half) * Math.SQRT2).toBeCloseTo(0.5, 6);
  });
});
