import { describe, expect, it } from 'vitest';
import {
  bandEnvelope,
  bandSource,
  envelopeAlong,
  envelopeDirection,
  principalOrbit,
} from '../../../src/core/modes/narrow-band.ts';
import { conditioned } from '../../support/conditioned.ts';
import { steadyRecording, tone } from '../../support/steady-recording.ts';

const sourceOf = (motion: Parameters<typeof steadyRecording>[0]) =>
  bandSource(conditioned(steadyRecording(motion, { durationS: 60, noiseMps2: 0 })).grid);

describe('bandEnvelope', () => {
  it('has the amplitude of a line as its modulus, away from the ends of the record', () => {
    const envelope = bandEnvelope(sourceOf(tone(9.2, 0.4)), 9, 1);
    const { re, im } = envelopeAlong(envelope, [0, 0, 1]);
    const moduli = Array.from(re, (r, i) => Math.hypot(r, im[i]!)).slice(5, -5);
    for (const m of moduli) expect(Math.abs(m - 0.4)).toBeLessThan(0.01);
  });

  it('does not see a line outside of the band', () => {
    const { re, im } = envelopeAlong(bandEnvelope(sourceOf(tone(9.2, 0.4)), 14, 1), [0, 0, 1]);
    expect(Math.max(...Array.from(re, (r, i) => Math.hypot(r, im[i]!)).slice(5, -5))).toBeLessThan(0.004);
  });
});

describe('envelopeDirection and principalOrbit', () => {
  it('finds the direction of straight motion, with nothing across', () => {
    const envelope = bandEnvelope(sourceOf(tone(9.2, 0.4, [0.48, 0.6, 0.64])), 9.2, 1);
    expect(envelopeDirection(envelope)).toEqual([0.48, 0.6, 0.64].map((v) => expect.closeTo(v, 2)));
    expect(principalOrbit(envelope).acrossPower).toBeLessThan(1e-4);
  });

  it('takes an orbit (axes a quarter turn apart) as one coherent motion', () => {
    const orbit = (t: number): [number, number, number] => [
      0.3 * Math.cos(2 * Math.PI * 9.2 * t),
      0.3 * Math.sin(2 * Math.PI * 9.2 * t),
      0,
    ];
    const found = principalOrbit(bandEnvelope(sourceOf(orbit), 9.2, 1));
    expect(found.weights.map((w) => Math.round(10 * w) / 10)).toEqual([0.5, 0.5, 0]);
    expect(found.acrossPower).toBeLessThan(1e-4);
  });
});
