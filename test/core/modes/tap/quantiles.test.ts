import { describe, expect, it } from 'vitest';
import { chiSquaredQuantile, studentQuantile95 } from '../../../../src/core/modes/tap/quantiles.ts';

describe('studentQuantile95', () => {
  it.each([
    [1, 12.7062],
    [2, 4.3027],
    [5, 2.5706],
    [6, 2.4469],
    [10, 2.2281],
    [30, 2.0423],
    [120, 1.9799],
  ])('of %i degrees of freedom is %f (Abramowitz & Stegun, table 26.10)', (freedom, t) => {
    expect(studentQuantile95(freedom)).toBeCloseTo(t, 2);
  });

  it('throws below one degree of freedom', () => {
    expect(() => studentQuantile95(0)).toThrow(RangeError);
  });
});

describe('chiSquaredQuantile', () => {
  it.each([
    [1, 3.841],
    [2, 5.991],
    [5, 11.07],
    [10, 18.307],
  ])('95 % of %i degrees of freedom is %f within 3 % (standard table)', (freedom, value) => {
    expect(Math.abs(chiSquaredQuantile(freedom, 1.6449) / value - 1)).toBeLessThan(0.03);
  });

  it('throws without freedom', () => {
    expect(() => chiSquaredQuantile(0, 1)).toThrow(RangeError);
  });
});
