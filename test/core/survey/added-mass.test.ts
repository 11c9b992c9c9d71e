import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { addedMassTest, frequencyWithoutPhoneHz } from '../../../src/core/survey/added-mass.ts';
import { uniformFrom } from '../../support/uniform-from.ts';
import { valueOf } from '../../support/survey-analysis.ts';

describe('added-mass test', () => {
  it('recovers mass and stiffness of any oscillator', () => {
    const positive = (max: number) => fc.double({ min: 0.05, max, noNaN: true });
    fc.assert(
      fc.property(
        positive(5000),
        positive(1e7),
        fc.double({ min: 0.02, max: 1, noNaN: true }),
        (mass, stiffness, share) => {
          const hz = (total: number) => ({
            frequencyHz: Math.sqrt(stiffness / total) / (2 * Math.PI),
            frequencySdHz: 0,
          });
          const modal = valueOf(addedMassTest(hz(mass), hz(mass * (1 + share)), mass * share));
          expect(modal.massKg / mass).toBeCloseTo(1, 6);
          expect(modal.stiffnessNPerM / stiffness).toBeCloseTo(1, 6);
        },
      ),
    );
  });

  it('holds the true mass in its 95 % interval 19 times out of 20', () => {
    const random = uniformFrom(7);
    const normal = () => Math.sqrt(-2 * Math.log(1 - random())) * Math.cos(2 * Math.PI * random());
    const sd = 0.02;
    let inside = 0;
    const trials = 2000;
    for (let trial = 0; trial < trials; trial++) {
      const measured = (mass: number) => ({
        frequencyHz: 10 / Math.sqrt(mass / 6) + sd * normal(),
        frequencySdHz: sd,
      });
      const [low, high] = valueOf(addedMassTest(measured(6), measured(6.5), 0.5)).massIntervalKg;
      if (low <= 6 && 6 <= high) inside++;
    }
    // 95 % of 2000 with three standard errors of 0.5 %.
    expect(inside / trials).toBeGreaterThan(0.935);
    expect(inside / trials).toBeLessThan(0.965);
  });

  it('refuses misuse', () => {
    const at = { frequencyHz: 10, frequencySdHz: 0.01 };
    expect(() => addedMassTest(at, at, 0)).toThrow('addedMassKg must be > 0, got 0');
    expect(() => frequencyWithoutPhoneHz(10, 3, 2)).toThrow(RangeError);
  });
});
