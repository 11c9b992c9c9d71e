import { signalGolden } from '../../support/signal-golden.ts';
import { describe, expect, it } from 'vitest';
import { weightingMagnitude } from '../../../src/core/signal/weighting.ts';

/** ISO 2631-1:1997 Table 3, factors × 1000 at third-octave frequencies (Wk seen on three pages, Wd on one and from memory .95). */
const PRINTED: readonly (readonly [exponent: number, wk: number, wd: number])[] = [
  [-3, 418, 853],
  [-2, 459, 944],
  [-1, 477, 992],
  [0, 482, 1011],
  [1, 484, 1008],
  [2, 494, 968],
  [3, 531, 890],
  [4, 631, 776],
  [5, 804, 642],
  [6, 967, 512],
  [7, 1039, 409],
  [8, 1054, 323],
  [9, 1036, 253],
  [10, 988, 212],
  [11, 902, 161],
  [12, 768, 125],
  [13, 636, 100],
  [14, 513, 80],
  [15, 405, 63.2],
  [16, 314, 49.4],
  [17, 246, 38.8],
  [18, 186, 29.5],
  [19, 132, 21.1],
];
/** The printed Wd at 10 Hz does not follow from the filter: the known misprint. */
const MISPRINT_EXPONENT = 10;

describe('weightings Wk and Wd', () => {
  it('follow from the filter parameters within 1.5 % of the printed factors', () => {
    for (const [exponent, wk, wd] of PRINTED) {
      const hz = 10 ** (exponent / 10);
      expect(Math.abs((1000 * weightingMagnitude('Wk', hz)) / wk - 1), `Wk at ${hz}`).toBeLessThan(0.015);
      if (exponent !== MISPRINT_EXPONENT)
        expect(Math.abs((1000 * weightingMagnitude('Wd', hz)) / wd - 1), `Wd at ${hz}`).toBeLessThan(0.015);
    }
  });
  it('give 201.7 where 212 is printed for Wd at 10 Hz', () => {
    expect(1000 * weightingMagnitude('Wd', 10)).toBeCloseTo(201.7, 1);
  });
  it('refuse a frequency that is none', () => {
    expect(weightingMagnitude('Wk', 0)).toBe(0);
    expect(() => weightingMagnitude('Wk', -1)).toThrow(RangeError);
    expect(() => weightingMagnitude('Wk', Number.NaN)).toThrow(RangeError);
  });
});

describe('weightingMagnitude against SciPy', () => {
  it('agrees with the filters as polynomials in s (scipy.signal.freqs)', () => {
    const { frequencyHz, Wk, Wd } = signalGolden().weighting;
    frequencyHz.forEach((f, i) => {
      expect(weightingMagnitude('Wk', f)).toBeCloseTo(Wk[i]!, 9);
      expect(weightingMagnitude('Wd', f)).toBeCloseTo(Wd[i]!, 9);
    });
  });

  it('passes nothing at rest and refuses what is no frequency', () => {
    expect(weightingMagnitude('Wk', 0)).toBe(0);
    expect(() => weightingMagnitude('Wd', -1)).toThrow(RangeError);
  });
});
