import { describe, expect, it } from 'vitest';
import { generateCase } from './generate-case.ts';
import { seededRandom } from './random.ts';
import { accelerationPower, randomModeMotion, sensorPower } from './random-motion.ts';
import { CASE_KINDS } from './truth.ts';

describe('generateCase', () => {
  it.each(CASE_KINDS)('gives the same %s for the same seed and another for another', (kind) => {
    const [first, again, other] = [7, 7, 8].map((seed) => generateCase(kind, seed, 2));
    expect(again?.recording).toEqual(first?.recording);
    expect(again?.truth).toEqual(first?.truth);
    expect(other?.recording.accelerationMps2).not.toEqual(first?.recording.accelerationMps2);
  });

  it('has rounded samples on the step, increasing stamps, and gravity', () => {
    const coarse = [0, 1, 2, 3, 4, 5, 6, 7]
      .map((i) => generateCase('A1', 7, i))
      .find((c) => c.truth.device.q === 0.1);
    if (!coarse) throw new Error('no coarse record among the first eight');
    const { recording } = coarse;
    const off = recording.accelerationMps2.flatMap((axis) =>
      Array.from(axis, (v) => Math.abs(v - 0.1 * Math.round(v / 0.1))),
    );
    expect(Math.max(...off)).toBeLessThan(1e-5);
    expect(recording.timeS.every((t, k) => k === 0 || t > (recording.timeS[k - 1] as number))).toBe(true);
  });
});

describe('randomModeMotion', () => {
  it('has the variance of its density (mean of 6 records)', () => {
    const mode = { frequencyHz: 8, dampingRatio: 0.03 };
    let variance = 0;
    let tailDensity = 0;
    for (let seed = 0; seed < 6; seed++) {
      const motion = randomModeMotion(seededRandom(seed), mode, 0.1, 60, 120);
      tailDensity = motion.tailDensity;
      for (let k = 0; k < 7200; k++) variance += motion.at(k / 60) ** 2 / (6 * 7200);
    }
    let expected = 0;
    for (let f = 0.01; f < 240; f += 0.02)
      expected += tailDensity * accelerationPower(f, 8, 0.03) * sensorPower(f, 60) * 0.02;
    expect(variance / expected).toBeGreaterThan(0.85);
    expect(variance / expected).toBeLessThan(1.15);
  });
});
