import { describe, expect, it } from 'vitest';
import { clockLine, spread } from '../../../src/core/signal/clock-line.ts';
import { seededRandom } from '../../support/cases/random.ts';

const count = Int32Array.from({ length: 6000 }, (_, k) => k);

describe('clockLine', () => {
  it('finds a steady clock under stamps with a long tail', () => {
    const random = seededRandom(2);
    const timeS = Float64Array.from(
      count,
      (k) => 5 + 0.01 * k + 0.001 * random.normal() + (k % 50 === 0 ? 0.02 : 0),
    );
    const { clockS } = clockLine(timeS, count, 0.0101);
    const rate = (clockS[5999]! - clockS[0]!) / 5999;
    expect(Math.abs(rate - 0.01)).toBeLessThan(1e-7);
  });

  it('follows a clock that wanders by 30 ms over a minute', () => {
    const random = seededRandom(3);
    const wander = (k: number): number => 0.03 * Math.sin((2 * Math.PI * k) / 6000);
    const timeS = Float64Array.from(count, (k) => 0.01 * k + wander(k) + 0.001 * random.normal());
    const { deviationS } = clockLine(timeS, count, 0.01);
    // Straight pieces of 5 s leave (2π/60)²·0.03·5²/8 of curvature: 1 ms at most, 0.5 ms rms.
    expect(spread(deviationS)).toBeLessThan(0.0016);
  });

  it('keeps a straight line where pieces differ no more than scatter explains', () => {
    const random = seededRandom(4);
    const timeS = Float64Array.from(count, (k) => 0.01 * k + 0.002 * random.normal());
    const { clockS, scatterSdS } = clockLine(timeS, count, 0.01);
    const second = clockS[3000]! - (clockS[0]! + clockS[5999]!) / 2 - 0.005;
    // Rounding of 60 s; a bend would be tens of microseconds.
    expect(Math.abs(second)).toBeLessThan(1e-8);
    expect(scatterSdS).toBeCloseTo(0.002, 4);
  });
});
