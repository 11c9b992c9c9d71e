import { describe, expect, it } from 'vitest';
import {
  dampingFromDecrement,
  logDecrementOfDecay,
  logarithmicDecrement,
} from '../../../../src/core/modes/tap/log-decrement.ts';

describe('logarithmic decrement, worked examples', () => {
  it('Thomson & Dahleh, Theory of Vibration 5th ed., example 2.7-1: zeta 0.0681, decrement 0.429, ratio 1.54', () => {
    const mass = 10 / 386;
    const zeta = 0.12 / (2 * Math.sqrt(30 * mass));
    const decrement = (2 * Math.PI * zeta) / Math.sqrt(1 - zeta ** 2);
    expect(zeta).toBeCloseTo(0.0681, 4);
    expect(decrement).toBeCloseTo(0.429, 3);
    expect(Math.exp(decrement)).toBeCloseTo(1.54, 2);
    expect(logarithmicDecrement(Math.exp(decrement), 1, 1)).toBeCloseTo(decrement, 12);
    expect(dampingFromDecrement(decrement)).toBeCloseTo(zeta, 12);
  });

  it('Thomson & Dahleh, example 2.7-2: cycles to half amplitude times zeta is 0.110 (answer from memory)', () => {
    const cycles = 11;
    expect(dampingFromDecrement(logarithmicDecrement(2, 1, cycles)) * cycles).toBeCloseTo(0.11, 3);
  });

  it('Rao, Mechanical Vibrations, shock absorber: quarter amplitude in half a cycle, decrement 2.7726, zeta 0.4037', () => {
    const decrement = logarithmicDecrement(16, 1, 1);
    expect(decrement).toBeCloseTo(2.7726, 4);
    expect(dampingFromDecrement(decrement)).toBeCloseTo(0.4037, 4);
  });

  it('Chopra, Dynamics of Structures, plexiglass frame: 0.915 g to 0.076 g in ten cycles, 3.96 % (from memory)', () => {
    expect(dampingFromDecrement(logarithmicDecrement(0.915, 0.076, 10))).toBeCloseTo(0.0396, 4);
  });

  it('overestimates as decrement over two pi by the tabled share (reference values 1.4)', () => {
    for (const [zeta, share] of [
      [0.01, 0.00005],
      [0.05, 0.00125],
      [0.1, 0.00504],
      [0.2, 0.0206],
    ] as const) {
      const decrement = (2 * Math.PI * zeta) / Math.sqrt(1 - zeta ** 2);
      expect(decrement / (2 * Math.PI) / zeta - 1).toBeCloseTo(share, 4);
      expect(dampingFromDecrement(decrement)).toBeCloseTo(zeta, 12);
    }
  });

  it('throws on amplitudes or cycles that are not positive', () => {
    expect(() => logarithmicDecrement(0, 1, 1)).toThrow(RangeError);
    expect(() => logarithmicDecrement(1, 1, 0)).toThrow(RangeError);
  });
});

describe('logDecrementOfDecay', () => {
  const timeS = Float64Array.from({ length: 1200 }, (_, i) => i / 60);
  const decay = (zeta: number): Float64Array =>
    timeS.map((t) => Math.exp(-zeta * 2 * Math.PI * 5 * t) * Math.cos(2 * Math.PI * 5 * t));

  it('reads the damping of an exact decay within 1 %', () => {
    const check = logDecrementOfDecay(timeS, decay(0.01), 5, 1e-4);
    expect(Math.abs((check as { dampingRatio: number }).dampingRatio / 0.01 - 1)).toBeLessThan(0.01);
  });

  it('refuses noise and growth', () => {
    expect(logDecrementOfDecay(timeS, new Float64Array(1200), 5, 0.01)).toEqual({ refusal: 'too-noisy' });
    expect(logDecrementOfDecay(timeS, decay(-0.005), 5, 1e-4)).toEqual({ refusal: 'too-noisy' });
  });
});
