import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { halfPowerDamping, halfPowerOfDecay } from '../../../../src/core/modes/tap/half-power.ts';

/** Half-power frequencies of a steady response by bisection on its own formula (r = f/fn, fn = 1). */
function halfPowerPoints(zeta: number, power: 0 | 1 | 2): [number, number] {
  const response = (r: number): number => r ** power / Math.hypot(1 - r * r, 2 * zeta * r);
  const peak =
    power === 0 ? Math.sqrt(1 - 2 * zeta ** 2) : power === 1 ? 1 : 1 / Math.sqrt(1 - 2 * zeta ** 2);
  const level = response(peak) / Math.SQRT2;
  const solve = (low: number, high: number): number => {
    let [a, b] = [low, high];
    for (let i = 0; i < 200; i++) {
      const middle = (a + b) / 2;
      if (response(middle) > level === response(a) > level) a = middle;
      else b = middle;
    }
    return (a + b) / 2;
  };
  return [solve(1e-9, peak), solve(peak, 50)];
}

describe('halfPowerDamping (reference values 1.7)', () => {
  it.each([
    ['displacement', 0],
    ['velocity', 1],
    ['acceleration', 2],
  ] as const)('is exact for the %s response up to zeta 0.3', (kind, power) => {
    fc.assert(
      fc.property(fc.double({ min: 0.001, max: 0.3, noNaN: true }), (zeta) => {
        const [f1, f2] = halfPowerPoints(zeta, power);
        expect(halfPowerDamping(f1, f2, kind) / zeta).toBeCloseTo(1, 6);
      }),
      { seed: 5, numRuns: 60 },
    );
  });

  it('gives 0.01 for the exact half-power points of reference example exact-halfpower-acc-z0.01', () => {
    expect(halfPowerDamping(9.902451160647459, 10.10255121567958, 'acceleration')).toBeCloseTo(0.01, 10);
    expect(halfPowerDamping(9.898489783926642, 10.098509790929544, 'displacement')).toBeCloseTo(0.01, 10);
    expect(halfPowerDamping(9.900499987500623, 10.100499987500624, 'velocity')).toBeCloseTo(0.01, 10);
  });

  it('agrees with Clough & Penzien, half-power example with Fig. E3-2 (19.55 and 20.42 Hz: 2.18 %, from memory)', () => {
    expect(halfPowerDamping(19.55, 20.42, 'displacement')).toBeCloseTo(0.0218, 3);
  });

  it('agrees with Chopra, plexiglass frame (3.44 and 3.74 Hz: 4.2 %, from memory)', () => {
    expect(halfPowerDamping(3.44, 3.74, 'acceleration')).toBeCloseTo(0.042, 3);
  });

  it('throws on frequencies that do not rise', () => {
    expect(() => halfPowerDamping(3, 3, 'velocity')).toThrow(RangeError);
    expect(() => halfPowerDamping(0, 3, 'velocity')).toThrow(RangeError);
  });
});

describe('halfPowerOfDecay', () => {
  const rateHz = 400;
  const frequencyHz = 40;
  const decay = (alphaT: number, zeta: number): Float64Array => {
    const alpha = zeta * 2 * Math.PI * frequencyHz;
    const n = Math.round((alphaT / alpha) * rateHz);
    return Float64Array.from({ length: n }, (_, i) => {
      const t = i / rateHz;
      return Math.exp(-alpha * t) * Math.sin(2 * Math.PI * frequencyHz * t);
    });
  };

  it.each([
    [4.001, 1.055],
    [5, 1.009],
    [6, 1.0],
    [8, 1.001],
    [10, 1.0],
  ])(
    'reads the tabled share of the true damping at decay rate times length %f (reference values 1.8)',
    (alphaT, ratio) => {
      const zeta = 0.004;
      const alpha = zeta * 2 * Math.PI * frequencyHz;
      const check = halfPowerOfDecay(decay(alphaT, zeta), rateHz, frequencyHz, alpha);
      expect(check).toHaveProperty('dampingRatio');
      // 1.5 %: bins of an eighth of the resolution, straight lines between them.
      expect((check as { dampingRatio: number }).dampingRatio / zeta / ratio).toBeCloseTo(1, 1.8);
    },
  );

  it('refuses below the resolution and where the length dominates', () => {
    const alpha = 0.004 * 2 * Math.PI * frequencyHz;
    expect(halfPowerOfDecay(decay(2, 0.004), rateHz, frequencyHz, alpha)).toEqual({
      refusal: 'below-resolution',
    });
    expect(halfPowerOfDecay(decay(3.5, 0.004), rateHz, frequencyHz, alpha)).toEqual({
      refusal: 'window-dominates',
    });
  });

  it('refuses when the power never falls to half beside the peak', () => {
    const flat = new Float64Array(4000);
    flat[0] = 1;
    expect(halfPowerOfDecay(flat, rateHz, frequencyHz, 1)).toEqual({ refusal: 'no-half-power-points' });
  });
});
