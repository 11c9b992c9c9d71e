import { describe, expect, it } from 'vitest';
import { tapScatter } from '../../../../src/core/modes/tap/tap-scatter.ts';
import { seededRandom } from '../../../support/cases/random.ts';

describe('tapScatter', () => {
  it('equal variances: mean, and Student interval of the mean, by hand', () => {
    // 5.0, 5.2, 5.4: mean 5.2, sd 0.2, standard error 0.11547; t(2) = 4.3027 against 1.96.
    const combined = tapScatter([5, 5.2, 5.4].map((value) => ({ value, variance: 1e-4 })))!;
    expect(combined.value).toBeCloseTo(5.2, 9);
    expect(combined.sd).toBeCloseTo((0.2 / Math.sqrt(3)) * (4.3027 / 1.959964), 4);
    expect(combined.betweenSd).toBeCloseTo(Math.sqrt(0.04 - 1e-4), 6);
  });

  it('says nothing for one tap, or for taps that agree', () => {
    expect(tapScatter([{ value: 5, variance: 1 }])).toBeUndefined();
    expect(tapScatter([5, 5.001].map((value) => ({ value, variance: 1e-2 })))).toBeUndefined();
  });

  it('does not let a tap that knows nothing speak', () => {
    const taps = [5, 5, 9].map((value, i) => ({ value, variance: i === 2 ? 1 : 1e-4 }));
    expect(tapScatter(taps)).toBeUndefined();
  });

  it('covers the truth 90 to 99 % of the time when taps scatter (seed 3, 400 draws of 5 taps)', () => {
    const random = seededRandom(3);
    let covered = 0;
    for (let k = 0; k < 400; k++) {
      const taps = Array.from({ length: 5 }, () => ({ value: 1 + 0.05 * random.normal(), variance: 1e-4 }));
      const { value, sd } = tapScatter(taps) ?? { value: 1 + 1, sd: 0 };
      if (Math.abs(value - 1) < 1.96 * sd) covered++;
    }
    expect(covered).toBeGreaterThan(360);
    expect(covered).toBeLessThan(399);
  });
});
