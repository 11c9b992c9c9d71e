import { describe, expect, it } from 'vitest';
import { guardedDeviation, likelihoodAt, slopeProfile } from '../../../src/core/signal/jitter-slope.ts';
import { seededRandom } from '../../support/cases/random.ts';

const periodS = 1 / 60;

function lineAt(trueHz: number, options: { scatterS: number; noise: number; seed: number }) {
  const random = seededRandom(options.seed);
  const clockS = Float64Array.from({ length: 3600 }, (_, k) => k * periodS);
  const deviationS = clockS.map(() => options.scatterS * random.normal());
  const samples = clockS.map(
    (t, k) => Math.cos(2 * Math.PI * trueHz * (t + deviationS[k]!)) + options.noise * random.normal(),
  );
  return { clockS, deviationS, periodS, samples };
}

describe('slopeProfile', () => {
  it.each([
    [11.3, 11.3],
    [48.7, -48.7],
    [100, -100],
  ])('finds the true signed frequency of a line at %d Hz', (trueHz, signedHz) => {
    const apparentHz = trueHz === 100 ? 20 : 11.3;
    const found = slopeProfile(lineAt(trueHz, { scatterS: 0.002, noise: 0.2, seed: 1 }), apparentHz, 1, 123);
    expect(Math.abs(found.bestHz - signedHz)).toBeLessThan(4 * found.sdHz);
  });

  it('knows its own uncertainty: 1/(2π·s·sqrt(2·SNR)·sqrt(N/2)) by the study, 0.84 Hz at 1 ms, 10 dB, 60 s', () => {
    const noise = Math.sqrt(0.5 / 10);
    const found = Array.from({ length: 12 }, (_, seed) =>
      slopeProfile(lineAt(11.3, { scatterS: 0.001, noise, seed }), 11.3, 1, 123),
    );
    const expected = 1 / (2 * Math.PI * 0.001 * Math.sqrt(20) * Math.sqrt(1800));
    for (const { sdHz } of found) expect(Math.abs(sdHz / expected - 1)).toBeLessThan(0.25);
    const pulls = found.map(({ bestHz }) => (bestHz - 11.3) / expected);
    // 12 pulls: their rms is within 1 ± 0.6 in all but a thousandth of the cases.
    expect(Math.sqrt(pulls.reduce((s, v) => s + v * v, 0) / pulls.length)).toBeLessThan(1.6);
  });

  it('interpolates between trial slopes and gives its least value outside', () => {
    const profile = slopeProfile(lineAt(11.3, { scatterS: 0.002, noise: 0.2, seed: 2 }), 11.3, 1, 123);
    expect(likelihoodAt(profile, profile.slopesHz[300]!)).toBeCloseTo(profile.logLikelihood[300]!, 6);
    expect(likelihoodAt(profile, 1e4)).toBe(Math.min(...profile.logLikelihood));
  });
});

describe('guardedDeviation', () => {
  it('takes a counting slip (a step of one period) for no scatter', () => {
    const deviationS = Float64Array.from({ length: 2000 }, (_, i) => (i < 1000 ? 0 : periodS));
    const { fastS, use } = guardedDeviation(deviationS, periodS);
    expect(Math.abs(fastS[100]!)).toBeLessThan(1e-12);
    expect(Math.abs(fastS[1900]!)).toBeLessThan(1e-12);
    expect(use[1000]).toBe(0);
  });
});
