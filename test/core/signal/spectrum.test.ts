import { describe, expect, it } from 'vitest';
import { amplitudeSpectrum, averagedDensity, effectiveAverages } from '../../../src/core/signal/spectrum.ts';
import { congruential, signalGolden } from '../../support/signal-golden.ts';
import { seededRandom } from '../../support/cases/random.ts';

describe('averagedDensity', () => {
  it('agrees with SciPy (Welch, Hann, half overlap)', () => {
    const { seed, count, rateHz, segment, density } = signalGolden().welch;
    const x = congruential(count, seed).map((v, i) => v + 3 * Math.sin(2 * Math.PI * 0.11 * i));
    const found = averagedDensity([x], 1 / rateHz, segment);
    density.forEach((value, k) => expect(found.densityPerHz[0]![k]).toBeCloseTo(value, 9));
    expect(found.stepHz).toBeCloseTo(rateHz / segment, 12);
    expect(found.resolutionHz).toBeCloseTo((1.5 * rateHz) / segment, 12);
  });

  it('holds the variance of noise, with the random error it states (Bendat & Piersol: 1/sqrt(n))', () => {
    const random = seededRandom(8);
    const x = Float64Array.from({ length: 40000 }, () => random.normal());
    const { densityPerHz, stepHz, averageCount } = averagedDensity([x], 0.01, 512);
    const values = densityPerHz[0]!.slice(2, -2);
    const mean = values.reduce((s, v) => s + v, 0) / values.length;
    const sd = Math.sqrt(values.reduce((s, v) => s + (v - mean) ** 2, 0) / values.length);
    expect(mean * stepHz * 256).toBeCloseTo(1, 1);
    // 250 values: the spread of a spread is 1/sqrt(500).
    expect(Math.abs((sd / mean) * Math.sqrt(averageCount) - 1)).toBeLessThan(0.15);
  });

  it.each([
    [4, 6.68],
    [8, 14.26],
    [16, 29.42],
    [32, 59.73],
  ])(
    'counts effective averages of half-overlapping Hann segments (Welch 1967): record of %i segments',
    (length, expected) => {
      expect(effectiveAverages(2 * length - 1, 1 / 6)).toBeCloseTo(expected, 1);
    },
  );
});

describe('amplitudeSpectrum', () => {
  it('reads the amplitude of a sine on a bin and states resolution and averages', () => {
    const n = 4096;
    const axis = Float64Array.from({ length: n }, (_, i) => 0.7 * Math.cos((2 * Math.PI * 300 * i) / n));
    const spectrum = amplitudeSpectrum({
      periodS: 0.01,
      startS: 0,
      accelerationMps2: [axis],
      present: new Uint8Array(n).fill(1),
    });
    expect(spectrum.amplitudeMps2[0]![300]).toBeCloseTo(0.7, 9);
    expect(spectrum.resolutionHz).toBeCloseTo(0.125, 3);
    expect(spectrum.randomErrorRatio).toBeCloseTo(1 / Math.sqrt(spectrum.averageCount), 12);
    expect(spectrum.densityMps4PerHz[0]).toHaveLength(spectrum.amplitudeMps2[0]!.length);
  });
});
