import { describe, expect, it } from 'vitest';
import {
  coherentGain,
  noiseBandwidthBins,
  windowSamples,
  type WindowKind,
} from '../../../src/core/signal/window.ts';
import { signalGolden } from '../../support/signal-golden.ts';

/** Harris, Proc. IEEE 66 (1978), table 1; flat-top: SciPy's coefficients, computed. ENBW bins, scalloping dB, gain, overlap 50 %. */
const TABLE: readonly (readonly [WindowKind, number, number, number, number])[] = [
  ['rectangular', 1, 3.922, 1, 0.5],
  ['hann', 1.5, 1.424, 0.5, 1 / 6],
  ['hamming', 1.363, 1.751, 0.54, 0.234],
  ['blackman', 1.727, 1.099, 0.42, 0.09],
  ['blackman-harris', 2.004, 0.826, 0.3588, 0.038],
  ['flat-top', 3.77, 0.0098, 0.2156, -0.015],
];
const N = 4096;

describe('windowSamples', () => {
  it.each(TABLE)('%s has its published constants', (kind, bandwidth, scallopDb, gain, overlap) => {
    const w = windowSamples(kind, N);
    const sum = w.reduce((s, v) => s + v, 0);
    const energy = w.reduce((s, v) => s + v * v, 0);
    let re = 0;
    let im = 0;
    let shifted = 0;
    for (let i = 0; i < N; i++) {
      re += w[i]! * Math.cos((Math.PI * i) / N);
      im += w[i]! * Math.sin((Math.PI * i) / N);
      if (i + N / 2 < N) shifted += w[i]! * w[i + N / 2]!;
    }
    // The tables are printed to three or four digits.
    expect((N * energy) / sum ** 2).toBeCloseTo(bandwidth, 2);
    expect(noiseBandwidthBins(kind)).toBeCloseTo((N * energy) / sum ** 2, 9);
    expect(-20 * Math.log10(Math.hypot(re, im) / sum)).toBeCloseTo(scallopDb, 2);
    expect(coherentGain(kind)).toBeCloseTo(gain, 3);
    expect(shifted / energy).toBeCloseTo(overlap, 2);
  });

  it.each(Object.entries(signalGolden().windows))('%s agrees with SciPy', (kind, expected) => {
    const w = windowSamples(kind as WindowKind, 16);
    expected.forEach((value, i) => expect(w[i]).toBeCloseTo(value, 9));
  });

  it('refuses a length that is none', () => {
    expect(() => windowSamples('hann', 0)).toThrow(RangeError);
  });
});
