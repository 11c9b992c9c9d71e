import { describe, expect, it } from 'vitest';
import { expectedModeDensity, modeDensity } from '../../../../src/core/modes/ambient/expected-density.ts';

/** Expected periodogram the long way: autocorrelation by numerical integration of the density, then the weighted sum. */
function byIntegration(
  frequencyHz: number,
  dampingRatio: number,
  n: number,
  periodS: number,
  bin: number,
): number {
  // Autocorrelation of density - plateau, which falls off fast enough to integrate to 40 times the resonance.
  const plateau = (2 * dampingRatio) ** 2;
  const step = (dampingRatio * frequencyHz) / 40;
  const count = Math.ceil((40 * frequencyHz) / step);
  const excess = Float64Array.from(
    { length: count },
    (_, i) => modeDensity((i + 0.5) * step, frequencyHz, dampingRatio) - plateau,
  );
  let sum = 0;
  for (let lag = 0; lag < n; lag++) {
    // Rotation instead of a cosine per term keeps this quick.
    let correlation = 0;
    const turn = 2 * Math.PI * step * lag * periodS;
    for (let i = 0; i < count; i++) correlation += (excess[i] as number) * Math.cos(turn * (i + 0.5)) * step;
    sum += (lag ? 2 : 1) * (1 - lag / n) * correlation * Math.cos((2 * Math.PI * bin * lag) / n);
  }
  return plateau + 2 * periodS * sum;
}

describe('expectedModeDensity', () => {
  it('agrees with the autocorrelation integrated numerically (Sykulski et al. 2019, eq. 9 in other words)', () => {
    const [frequencyHz, dampingRatio, n, periodS] = [5, 0.03, 100, 1 / 50];
    const out = new Float64Array(n / 2 + 1);
    const piece = { periodS, pieceSamples: n, stepHz: 1 / (n * periodS) };
    expectedModeDensity(frequencyHz, dampingRatio, piece, 0, n / 2, out);
    // 0.5 % of the peak: the integral is cut off and the plateau above half the rate is not folded.
    for (const bin of [6, 9, 10, 11, 15])
      expect(
        Math.abs((out[bin] as number) - byIntegration(frequencyHz, dampingRatio, n, periodS, bin)),
      ).toBeLessThan(0.005);
  });

  it('tends to the true density when the record is long', () => {
    // A fine clock keeps what folds back from above half the rate out of the comparison.
    const piece = { periodS: 0.0005, pieceSamples: 4_000_000, stepHz: 1 / 2000 };
    const first = 15_000;
    const last = 25_000;
    const out = new Float64Array(last - first + 1);
    expectedModeDensity(10, 0.02, piece, first, last, out);
    for (let k = first; k <= last; k += 500)
      expect((out[k - first] as number) / modeDensity(k * piece.stepHz, 10, 0.02)).toBeCloseTo(1, 2);
  });

  it('shows a peak lower and wider when the record is short', () => {
    const [short, long] = [600, 60_000].map((n) => {
      const piece = { periodS: 0.01, pieceSamples: n, stepHz: 100 / n };
      const out = new Float64Array(1);
      expectedModeDensity(10, 0.005, piece, n / 10, n / 10, out);
      return out[0] as number;
    }) as [number, number];
    expect(short).toBeLessThan(0.6 * long);
    expect(long).toBeCloseTo(1, 1);
  });
});
