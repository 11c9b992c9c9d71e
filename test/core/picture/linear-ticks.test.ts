import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { linearTicks } from '../../../src/core/picture/linear-ticks.ts';

describe('linearTicks', () => {
  it('steps in round values', () => {
    expect(linearTicks(0, 1, 0.18)).toEqual([0, 0.2, 0.4, 0.6, 0.8, 1]);
    expect(linearTicks(-30, 45, 11)).toEqual([-20, 0, 20, 40]);
    expect(linearTicks(7.3, 7.5, 0.05)).toEqual([7.3, 7.35, 7.4, 7.45, 7.5]);
  });

  it('is inside the range, ascending, and never closer than asked', () => {
    fc.assert(
      fc.property(
        fc.double({ min: -1e4, max: 1e4, noNaN: true }),
        fc.double({ min: 1e-3, max: 1e4, noNaN: true }),
        fc.integer({ min: 2, max: 40 }),
        (low, width, count) => {
          const smallest = width / count;
          const ticks = linearTicks(low, low + width, smallest);
          // relative slack of the rounding in the last digit
          const slack = 1e-6 * (Math.abs(low) + width);
          for (const [i, tick] of ticks.entries()) {
            expect(tick).toBeGreaterThanOrEqual(low - slack);
            expect(tick).toBeLessThanOrEqual(low + width + slack);
            if (i > 0) expect(tick - ticks[i - 1]!).toBeGreaterThanOrEqual(smallest * 0.999);
          }
          // steps of 1, 2, 5 are at most 2.5 times what was asked for
          expect(ticks.length).toBeGreaterThanOrEqual(Math.floor(count / 2.5) - 1);
        },
      ),
    );
  });

  it('refuses bounds that are not finite and steps that are not above zero', () => {
    expect(() => linearTicks(Number.NaN, 1, 1)).toThrow(RangeError);
    expect(() => linearTicks(0, 1, 0)).toThrow(/smallestStep/);
  });
});
