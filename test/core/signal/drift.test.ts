import { describe, expect, it } from 'vitest';
import { slowPart, straightLine } from '../../../src/core/signal/drift.ts';
import { congruential, signalGolden } from '../../support/signal-golden.ts';

const rateHz = 50;
const wave = (f: number, n = 60 * rateHz): Float64Array =>
  Float64Array.from({ length: n }, (_, i) => Math.sin((2 * Math.PI * f * i) / rateHz));
const largest = (v: Float64Array): number => v.reduce((m, x) => Math.max(m, Math.abs(x)), 0);
const inner = (v: Float64Array): Float64Array => v.subarray(6 * rateHz, v.length - 6 * rateHz);

describe('slowPart', () => {
  it('is the constant of a constant and the ramp of a ramp', () => {
    const ramp = Float64Array.from({ length: 2000 }, (_, i) => 9.8 + 0.001 * i);
    const left = slowPart(ramp, rateHz).map((v, i) => v - ramp[i]!);
    expect(largest(left)).toBeLessThan(1e-9);
  });

  it('takes nothing of motion above 0.5 Hz and all of motion at 0.01 Hz', () => {
    // sinc²: 3 % at 0.5 Hz at most, zero at multiples of 1/6 Hz.
    expect(largest(inner(slowPart(wave(1.05), rateHz)))).toBeLessThan(0.005);
    expect(largest(inner(slowPart(wave(0.53), rateHz)))).toBeLessThan(0.03);
    const slow = wave(0.01);
    expect(largest(inner(slowPart(slow, rateHz).map((v, i) => v - slow[i]!)))).toBeLessThan(0.02);
  });

  it('falls back to a straight line for a short record, as SciPy detrends', () => {
    const { count, seed, left } = signalGolden().line;
    const x = congruential(count, seed);
    const line = straightLine(x);
    left.forEach((value, i) => expect(x[i]! - line[i]!).toBeCloseTo(value, 9));
    expect([...slowPart(x, 100)]).toEqual([...line]);
    expect(() => slowPart(x, 0)).toThrow(RangeError);
  });
});
