import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { expectedModeDensity } from '../../../../src/core/modes/ambient/expected-density.ts';
import { fitRandomModes } from '../../../../src/core/modes/ambient/fit-random-modes.ts';

const piece = { periodS: 1 / 60, pieceSamples: 7200, stepHz: 1 / 120 };

/** A periodogram that is exactly its expectation: the noise-free limit of the method. */
function expected(
  modes: { frequencyHz: number; dampingRatio: number; peakPerHz: number }[],
  floor: number,
): Float64Array {
  const last = 3000;
  const total = new Float64Array(last + 1).fill(floor);
  const shape = new Float64Array(last + 1);
  for (const mode of modes) {
    expectedModeDensity(mode.frequencyHz, mode.dampingRatio, piece, 0, last, shape);
    for (let k = 0; k <= last; k++) total[k] = (total[k] as number) + mode.peakPerHz * (shape[k] as number);
  }
  return total;
}
const band = { piece, pieceCount: 1, first: 600, last: 1400, slopePriorSd: 0 };

describe('fitRandomModes', () => {
  it('finds frequency, damping and height of a noise-free spectrum', () => {
    const mode = { frequencyHz: 8.3, dampingRatio: 0.012, peakPerHz: 1e-3 };
    const periodogram = expected([mode], 1e-6);
    const fit = fitRandomModes(
      { ...band, periodogram },
      [{ frequencyHz: 8.25, dampingRatio: 0.02, peakPerHz: 3e-4 }],
      1e-5,
    );
    expect(fit.modes[0]?.frequencyHz).toBeCloseTo(8.3, 4);
    expect(fit.modes[0]?.dampingRatio).toBeCloseTo(0.012, 5);
    expect((fit.modes[0]?.peakPerHz as number) / 1e-3).toBeCloseTo(1, 3);
    expect(fit.floorPerHz / 1e-6).toBeCloseTo(1, 1);
  });

  it('separates two modes whose half-power bands touch', () => {
    const modes = [
      { frequencyHz: 8, dampingRatio: 0.01, peakPerHz: 1e-3 },
      { frequencyHz: 8.3, dampingRatio: 0.015, peakPerHz: 4e-4 },
    ];
    const starts = modes.map((m) => ({ ...m, dampingRatio: 0.02, peakPerHz: 5e-4 }));
    const fit = fitRandomModes({ ...band, periodogram: expected(modes, 1e-6) }, starts, 1e-6);
    fit.modes.forEach((found, i) => {
      expect(found.frequencyHz).toBeCloseTo(modes[i]?.frequencyHz as number, 3);
      expect(found.dampingRatio).toBeCloseTo(modes[i]?.dampingRatio as number, 4);
    });
  });

  it('does not care for the unit: scaling the spectrum changes only heights', () => {
    const base = expected([{ frequencyHz: 8.3, dampingRatio: 0.02, peakPerHz: 1e-3 }], 1e-5);
    const ragged = base.map((v, k) => v * (0.3 + ((k * 7919) % 13) / 9));
    const start = { frequencyHz: 8.3, dampingRatio: 0.02, peakPerHz: 1e-3 };
    const plain = fitRandomModes({ ...band, periodogram: ragged }, [start], 1e-5);
    fc.assert(
      fc.property(fc.double({ min: -6, max: 6, noNaN: true }), (exponent) => {
        const scale = 10 ** exponent;
        const scaled = fitRandomModes(
          { ...band, periodogram: ragged.map((v) => v * scale) },
          [{ ...start, peakPerHz: 1e-3 * scale }],
          1e-5 * scale,
        );
        expect(scaled.modes[0]?.frequencyHz).toBeCloseTo(plain.modes[0]?.frequencyHz as number, 4);
        expect(scaled.modes[0]?.dampingRatio).toBeCloseTo(plain.modes[0]?.dampingRatio as number, 4);
        expect(
          (scaled.modes[0]?.peakPerHz as number) / scale / (plain.modes[0]?.peakPerHz as number),
        ).toBeCloseTo(1, 2);
      }),
      { numRuns: 12 },
    );
  });

  it('knows more from more pieces: standard deviations fall as one over root of their count', () => {
    const periodogram = expected([{ frequencyHz: 8.3, dampingRatio: 0.02, peakPerHz: 1e-3 }], 1e-6);
    const start = { frequencyHz: 8.3, dampingRatio: 0.02, peakPerHz: 1e-3 };
    const [one, nine] = [1, 9].map((pieceCount) =>
      fitRandomModes({ ...band, periodogram, pieceCount }, [start], 1e-6),
    );
    const ratio = (one?.modes[0]?.dampingLogSd as number) / (nine?.modes[0]?.dampingLogSd as number);
    // A little below 3: the prior of the floor's slope counts once, however many pieces.
    expect(ratio).toBeGreaterThan(2.8);
    expect(ratio).toBeLessThanOrEqual(3.001);
  });

  it('has the spread of a resonance fully resolved: sd(ln zeta) about 1/sqrt(2·pi·zeta·f·T) (Whittle 1953, high signal)', () => {
    const periodogram = expected([{ frequencyHz: 8.3, dampingRatio: 0.02, peakPerHz: 1 }], 1e-7);
    const wide = { ...band, first: 200, last: 2400, periodogram };
    const fit = fitRandomModes(wide, [{ frequencyHz: 8.3, dampingRatio: 0.02, peakPerHz: 1 }], 1e-7);
    // Height unknown as well: numeric Fisher information of a Lorentzian gives 1/sqrt(pi·B·T/2), B = 2·zeta·f.
    const durationS = piece.pieceSamples * piece.periodS;
    const theory = 1 / Math.sqrt((Math.PI * 2 * 0.02 * 8.3 * durationS) / 2);
    expect((fit.modes[0]?.dampingLogSd as number) / theory).toBeGreaterThan(0.7);
    expect((fit.modes[0]?.dampingLogSd as number) / theory).toBeLessThan(1.3);
  });
});
