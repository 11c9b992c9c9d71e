import { describe, expect, it } from 'vitest';
import { countSamples, median } from '../../../src/core/signal/sample-counter.ts';
import { seededRandom } from '../../support/cases/random.ts';

function stamps(options: {
  n: number;
  periodS: number;
  scatterS: number;
  lost?: readonly number[];
  seed: number;
}) {
  const random = seededRandom(options.seed);
  const kept = Array.from({ length: options.n }, (_, k) => k).filter((k) => !options.lost?.includes(k));
  const timeS = Float64Array.from(
    kept,
    (k) => k * options.periodS + options.scatterS * random.normal(),
  ).sort();
  return { kept, timeS };
}

describe('countSamples', () => {
  it('counts a steady sensor without a slip though stamps scatter by a quarter of the period', () => {
    // Rounding each stamp to the grid would slip in 5 % of the samples here.
    const { timeS } = stamps({ n: 6000, periodS: 0.01, scatterS: 0.0025, seed: 1 });
    const counted = countSamples(timeS);
    expect(counted.losses).toEqual([]);
    expect(counted.count[5999]).toBe(5999);
    // Least-squares period: sd·sqrt(12/n³).
    expect(Math.abs(counted.periodS - 0.01)).toBeLessThan((4 * 0.0025 * Math.sqrt(12)) / 6000 ** 1.5);
  });

  it.each([1, 2, 3, 4, 5])('finds where samples were lost (seed %i)', (seed) => {
    const lost = [300, 301, 900, 1500, 1512, 2400, 2401, 2402];
    const { kept, timeS } = stamps({ n: 3600, periodS: 1 / 60, scatterS: 0.002, lost, seed });
    const counted = countSamples(timeS);
    expect([...counted.count].map((k, i) => k - kept[i]!).filter((d) => d !== 0)).toEqual([]);
    expect(counted.losses.reduce((sum, l) => sum + l.lostCount, 0)).toBe(lost.length);
  });

  it.each([3, 7, 12, 20])('finds a loss after the first %i samples', (at) => {
    const lost = [at, at + 1, at + 70];
    const { kept, timeS } = stamps({ n: 1200, periodS: 1 / 60, scatterS: 0.001, lost, seed: at });
    const counted = countSamples(timeS);
    expect([...counted.count].map((k, i) => k - kept[i]!).filter((d) => d !== 0)).toEqual([]);
    expect(counted.losses.map((l) => [l.index, l.lostCount])).toEqual([
      [at, 2],
      [at + 68, 1],
    ]);
  });

  it('does not take a late burst for a loss', () => {
    // Five samples held up and delivered together: nothing is missing afterwards.
    const timeS = Float64Array.from(
      { length: 1000 },
      (_, k) => k * 0.005 + (k >= 400 && k < 405 ? (405 - k) * 0.005 : 0),
    );
    expect(countSamples(timeS).losses).toEqual([]);
  });

  it('needs four stamps', () => {
    expect(() => countSamples(Float64Array.of(0, 1, 2))).toThrow(RangeError);
    expect(median([3, 1, 2, 10])).toBe(2.5);
    expect(() => median([])).toThrow(RangeError);
  });
});
