import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  amplification,
  amplificationInterval,
  buildUpShare,
  dampingForAmplification,
  magnification,
  peakRatio,
  transmissibility,
  unbalanceResponse,
} from '../../../src/core/survey/amplification.ts';
import type { AmplificationKind } from '../../../src/core/model/source.ts';
import { largestWithin, steadyAmplitude } from '../../support/integrated-oscillator.ts';

const KINDS: readonly AmplificationKind[] = ['force', 'base', 'unbalance'];
const kinds = fc.constantFrom(...KINDS);
const ratios = fc.double({ min: 0.02, max: 6, noNaN: true });
const dampings = fc.double({ min: 0.001, max: 0.6, noNaN: true });

describe('amplification', () => {
  it('agrees with the integrated equation of motion, for each kind', () => {
    // Tolerance 1e-6: the transient left after e^-20 is 2e-9 of an amplitude of up to 25.
    for (const kind of KINDS)
      for (const ratio of [0.3, 0.8, 0.99, 1, 1.25, 2.5])
        for (const damping of [0.02, 0.1, 0.4])
          expect(amplification(kind, ratio, damping)).toBeCloseTo(steadyAmplitude(kind, ratio, damping), 6);
  });

  it('has the limits of theory: 1 at rest, 0 far above, unbounded at 1 without damping', () => {
    expect(magnification(0, 0.05)).toBe(1);
    expect(magnification(1000, 0.05)).toBeLessThan(2e-6);
    expect(magnification(1, 0)).toBe(Infinity);
    expect(transmissibility(0, 0.05)).toBe(1);
    expect(unbalanceResponse(0, 0.05)).toBe(0);
    expect(unbalanceResponse(1000, 0.05)).toBeCloseTo(1, 5);
  });

  it('peaks at 5.03 at ratio 0.990 for damping ratio 0.1 (identity 1/(2z sqrt(1-z²)), Thomson & Dahleh)', () => {
    expect(peakRatio('force', 0.1)).toBeCloseTo(0.98995, 5);
    expect(magnification(peakRatio('force', 0.1), 0.1)).toBeCloseTo(5.02519, 5);
    expect(peakRatio('unbalance', 0.1)).toBeCloseTo(1 / 0.98995, 4);
    expect(unbalanceResponse(peakRatio('unbalance', 0.1), 0.1)).toBeCloseTo(5.02519, 5);
  });

  it('has the printed peaks of transmissibility, and 1 at the square root of 2 for any damping (reference 1.3)', () => {
    const printed = [
      [0.05, 10.0622],
      [0.1, 5.12277],
      [0.2, 2.73392],
      [0.5, 1.46789],
    ] as const;
    for (const [damping, peak] of printed) {
      expect(transmissibility(peakRatio('base', damping), damping)).toBeCloseTo(peak, 4);
      expect(transmissibility(Math.SQRT2, damping)).toBeCloseTo(1, 12);
    }
  });

  it('gives the printed amplifications of separation at damping 1 % (reference section 4)', () => {
    const printed = [
      [0.7, 1.96],
      [0.8, 2.78],
      [0.9, 5.24],
      [1.1, 4.74],
      [1.25, 1.78],
    ] as const;
    for (const [ratio, value] of printed) expect(magnification(ratio, 0.01)).toBeCloseTo(value, 1);
  });
});

describe('build-up', () => {
  it('agrees at resonance with 1 - exp(-2 pi z N) (CCIP-016)', () => {
    for (const damping of [0.005, 0.02, 0.05])
      for (const cycles of [3, 10, 30])
        expect(buildUpShare(1, damping, cycles)).toBeCloseTo(
          1 - Math.exp(-2 * Math.PI * damping * cycles),
          2,
        );
  });

  it('agrees with the integrated build-up from rest on and beside resonance', () => {
    // Within 6 %: the envelope leaves out the ripple within a cycle, which fades as cycles are counted.
    for (const [ratio, damping, cycles] of [
      [1, 0.01, 8],
      [1, 0.03, 20],
      [0.97, 0.01, 6],
      [1.03, 0.01, 6],
    ] as const) {
      const integrated = largestWithin('force', ratio, damping, cycles);
      const ours = amplification('force', ratio, damping, cycles);
      expect(ours / integrated).toBeGreaterThan(0.94);
      expect(ours / integrated).toBeLessThan(1.06);
    }
  });

  it('stays finite without damping: n cycles give pi n', () => {
    expect(amplification('force', 1, 0, 4)).toBeCloseTo(4 * Math.PI, 12);
    expect(amplification('force', 1 - 1e-6, 0, 4)).toBeCloseTo(4 * Math.PI, 3);
  });

  it('never exceeds the steady value and grows with the cycles there are', () => {
    fc.assert(
      fc.property(
        ratios,
        dampings,
        fc.double({ min: 0.5, max: 200, noNaN: true }),
        (ratio, damping, cycles) => {
          const share = buildUpShare(ratio, damping, cycles);
          expect(share).toBeLessThanOrEqual(1);
          // 2 %: the envelope is looked at in 48 instants.
          expect(buildUpShare(ratio, damping, 2 * cycles)).toBeGreaterThanOrEqual(share - 0.02);
        },
      ),
    );
  });
});

describe('amplification interval', () => {
  it('holds every value of its box, the inner maximum included', () => {
    fc.assert(
      fc.property(
        kinds,
        fc.tuple(ratios, ratios),
        fc.tuple(dampings, dampings),
        fc.double({ min: 0, max: 1, noNaN: true }),
        fc.double({ min: 0, max: 1, noNaN: true }),
        (kind, [a, b], [c, d], u, v) => {
          const ratio = [Math.min(a, b), Math.max(a, b)] as const;
          const damping = [Math.min(c, d), Math.max(c, d)] as const;
          const [low, high] = amplificationInterval(kind, ratio, damping);
          const value = amplification(
            kind,
            ratio[0] + u * (ratio[1] - ratio[0]),
            damping[0] + v * (damping[1] - damping[0]),
          );
          expect(value).toBeGreaterThanOrEqual(low * (1 - 1e-9));
          expect(value).toBeLessThanOrEqual(high * (1 + 1e-9));
        },
      ),
    );
  });

  it('finds the resonance inside, not the ends', () => {
    const [low, high] = amplificationInterval('force', [0.9, 1.1], [0.01, 0.02]);
    expect(high).toBeCloseTo(1 / (2 * 0.01 * Math.sqrt(1 - 0.01 ** 2)), 6);
    expect(low).toBeCloseTo(Math.min(magnification(0.9, 0.02), magnification(1.1, 0.02)), 9);
  });

  it('ranks high damping on resonance against low damping beside it by what they do', () => {
    const onResonance = amplificationInterval('force', [1, 1], [0.15, 0.15])[1];
    const beside = amplificationInterval('force', [0.9, 0.9], [0.005, 0.005])[1];
    expect(onResonance).toBeCloseTo(3.33, 2);
    expect(beside).toBeGreaterThan(onResonance);
  });
});

describe('damping for an amplification', () => {
  it('holds the largest amplification to the wanted value', () => {
    fc.assert(
      fc.property(kinds, fc.double({ min: 1.5, max: 20, noNaN: true }), (kind, wanted) => {
        const needed = dampingForAmplification(kind, [0.95, 1.05], wanted);
        if (needed === undefined) return;
        expect(amplificationInterval(kind, [0.95, 1.05], [needed, needed])[1]).toBeLessThanOrEqual(
          wanted * (1 + 1e-6),
        );
      }),
    );
  });
  it('says when no damping does it: unbalance far above resonance never falls below 1', () => {
    expect(dampingForAmplification('unbalance', [3, 3], 0.5)).toBeUndefined();
  });
});
