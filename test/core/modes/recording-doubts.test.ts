import { describe, expect, it } from 'vitest';
import type { Tone } from '../../../src/core/model/analysis.ts';
import type { DoubtCode } from '../../../src/core/model/doubt.ts';
import type { Recording } from '../../../src/core/model/recording.ts';
import { recordingDoubts } from '../../../src/core/modes/recording-doubts.ts';
import { conditioned } from '../../support/conditioned.ts';
import { steadyRecording, still, tone, type SteadyOptions } from '../../support/steady-recording.ts';

const codes = (recording: Recording, tones: readonly Tone[] = []): DoubtCode[] =>
  recordingDoubts(conditioned(recording), [], tones).map((d) => d.code);
const codesOf = (motion: Parameters<typeof steadyRecording>[0], options: SteadyOptions = {}): DoubtCode[] =>
  codes(steadyRecording(motion, options));
const toneAt = (frequencyHz: number, verdict: Tone['fold']['verdict'], direction = [0, 0, 1]): Tone => ({
  frequencyHz,
  frequencySdHz: 0.001,
  amplitudeMps2: 1,
  amplitudeSdMps2: 0.01,
  direction,
  nature: 'forced',
  fold: { verdict, candidatesHz: [60 - frequencyHz, frequencyHz] },
});

describe('recordingDoubts', () => {
  it('has none for a good recording', () => {
    expect(codesOf(tone(9, 0.5), { jitterS: 0.001 })).toEqual([]);
    expect(codesOf(still, { jitterS: 0.001 })).toEqual([]);
  });

  it('late-stamps', () => {
    expect(codesOf(tone(9, 0.5), { latenessS: 0.002 })).toEqual(['late-stamps']);
  });

  it('gaps and stalled: one long gap is both, many short ones are gaps', () => {
    const long = Array.from({ length: 40 }, (_, i) => 700 + i);
    const short = Array.from({ length: 30 }, (_, i) => 55 * (i + 1));
    expect(codesOf(tone(9, 0.5), { lost: long })).toEqual(['gaps', 'stalled']);
    expect(codesOf(tone(9, 0.5), { lost: short })).toEqual(['gaps']);
  });

  it('interrupted, stalled and practice, from what the capture noted', () => {
    expect(codesOf(tone(9, 0.5), { sensor: { interruption: 'hidden' } })).toEqual(['interrupted']);
    expect(codesOf(tone(9, 0.5), { sensor: { interruption: 'main-thread-stall' } })).toEqual(['stalled']);
    expect(codesOf(tone(9, 0.5), { sensor: { practice: true } })).toEqual(['practice']);
  });

  it('repeats', () => {
    const once = steadyRecording(tone(5, 1), { rateHz: 100 });
    const order = [...once.timeS.keys()].flatMap((i) => (i % 8 ? [i] : [i, i]));
    const twice: Recording = {
      ...once,
      timeS: Float64Array.from(order, (i, k) => once.timeS[i]! + (order[k - 1] === i ? 0.003 : 0)),
      accelerationMps2: once.accelerationMps2
        .map((axis) => Float64Array.from(order, (i) => axis[i]!))
        .map((a) => Float32Array.from(a)),
    };
    expect(codes(twice)).toEqual(['repeats']);
  });

  it('coarse-step: a step of 0.1 without noise to dither it, under weak motion; not with noise, nor under strong motion', () => {
    const options = { stepMps2: 0.1, noiseMps2: 0.005 };
    expect(codesOf(tone(9, 0.15), options)).toEqual(['coarse-step']);
    expect(codesOf(tone(9, 0.15), { ...options, noiseMps2: 0.05 })).toEqual([]);
    expect(codesOf(tone(9, 3), options)).toEqual([]);
  });

  it('clipped', () => {
    expect(codesOf((t) => [0, 0, Math.min(9.81, 14 * Math.cos(56 * t))], { noiseMps2: 0 })).toContain(
      'clipped',
    );
  });

  it('gravity-scale: 8 % off', () => {
    expect(codesOf(tone(9, 0.5), { gravityMps2: [0, 0, 9.04] })).toEqual(['gravity-scale']);
  });

  it('phone-moved: turned by four degrees half-way', () => {
    expect(codesOf((t) => [t > 15 ? 0.7 : 0, 0, 0])).toEqual(['phone-moved']);
  });

  it('contact-loss: thrown up by more than gravity', () => {
    expect(codesOf((t) => [0, 0, -11 * Math.exp(-(((t - 10) / 0.05) ** 2))])).toContain('contact-loss');
  });

  it('rocking: the phone tips between two rests', () => {
    expect(codesOf((t) => [t % 10 > 5 ? 0.12 : 0, 0, 0])).toEqual(['rocking']);
  });

  it('folded, fold-undecided, band-edge and tilt-leak, from the tones', () => {
    const recording = steadyRecording(tone(9, 0.5), { jitterS: 0.001, gravityMps2: [0, 0, 9.81] });
    expect(codes(recording, [toneAt(9, 'folded')])).toEqual(['folded']);
    expect(codes(recording, [toneAt(9, 'undecided')])).toEqual(['fold-undecided']);
    expect(codes(recording, [toneAt(28, 'direct')])).toEqual(['band-edge']);
    expect(codes(recording, [toneAt(0.6, 'direct', [1, 0, 0])])).toEqual(['tilt-leak']);
    expect(codes(recording, [toneAt(0.6, 'direct')])).toEqual([]);
  });
});
