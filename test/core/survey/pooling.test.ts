import { describe, expect, it } from 'vitest';
import { pooled } from '../../../src/core/survey/pooling.ts';
import { studentQuantile95 } from '../../../src/core/survey/student.ts';
import { uniformFrom } from '../../support/uniform-from.ts';

/** Two-sided probability beyond t, by Simpson integration of Student's density: independent of the table. */
function beyond(t: number, degrees: number): number {
  const density = (x: number) => (1 + x ** 2 / degrees) ** (-(degrees + 1) / 2);
  const simpson = (from: number, to: number, steps: number) => {
    const h = (to - from) / steps;
    let sum = density(from) + density(to);
    for (let i = 1; i < steps; i++) sum += (i % 2 ? 4 : 2) * density(from + i * h);
    return (sum * h) / 3;
  };
  // Substitution x = tan(u) covers the long tails.
  const tail = (from: number) => {
    const h = (Math.PI / 2 - Math.atan(from)) / 4000;
    let sum = 0;
    for (let i = 0; i < 4000; i++) {
      const u = Math.atan(from) + (i + 0.5) * h;
      sum += (density(Math.tan(u)) / Math.cos(u) ** 2) * h;
    }
    return sum;
  };
  return tail(t) / (simpson(0, t, 2000) + tail(t));
}

describe("Student's t", () => {
  it('has 5 % beyond its quantile, for every number of degrees of freedom', () => {
    for (const degrees of [1, 2, 3, 5, 10, 20, 30, 31, 60, 200]) {
      expect(beyond(studentQuantile95(degrees), degrees)).toBeCloseTo(0.05, 3);
    }
    expect(() => studentQuantile95(0)).toThrow(RangeError);
  });
});

describe('pooled readings', () => {
  it('average by weight when they agree, with no scatter between them', () => {
    const result = pooled([
      { value: 7.4, sd: 0.1 },
      { value: 7.42, sd: 0.05 },
    ]);
    expect(result.value).toBeCloseTo((7.4 / 0.01 + 7.42 / 0.0025) / (1 / 0.01 + 1 / 0.0025), 9);
    expect(result).toMatchObject({ betweenSd: 0, readingCount: 2 });
    expect(result.sd).toBeCloseTo(1 / Math.sqrt(1 / 0.01 + 1 / 0.0025), 9);
  });
  it('widen by the scatter between them when they disagree', () => {
    const result = pooled([7.0, 7.4, 7.8].map((value) => ({ value, sd: 0.01 })));
    expect(result.betweenSd).toBeCloseTo(0.4, 2);
    expect(result.sd).toBeCloseTo(0.4 / Math.sqrt(3), 2);
    expect(result.interval[1] - result.value).toBeCloseTo(4.303 * result.sd, 6);
  });
  it('leave a single reading as it is', () => {
    expect(pooled([{ value: 5, sd: 0.1 }])).toMatchObject({
      value: 5,
      sd: 0.1,
      betweenSd: 0,
      readingCount: 1,
    });
  });
  it('cover the truth 92 to 98 times of 100, scatter between readings included', () => {
    const random = uniformFrom(11);
    const normal = () => Math.sqrt(-2 * Math.log(1 - random())) * Math.cos(2 * Math.PI * random());
    let inside = 0;
    const trials = 2000;
    for (let trial = 0; trial < trials; trial++) {
      const values = Array.from({ length: 4 }, () => ({
        value: 10 + 0.1 * normal() + 0.05 * normal(),
        sd: 0.05,
      }));
      const { interval } = pooled(values);
      if (interval[0] <= 10 && 10 <= interval[1]) inside++;
    }
    expect(inside / trials).toBeGreaterThan(0.92);
    expect(inside / trials).toBeLessThan(0.985);
  });
  it('refuse misuse', () => {
    expect(() => pooled([])).toThrow(RangeError);
    expect(() =>
      pooled([
        { value: 1, sd: 0 },
        { value: 1, sd: 1 },
      ]),
    ).toThrow(RangeError);
  });
});
