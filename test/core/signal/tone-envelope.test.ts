import { describe, expect, it } from 'vitest';
import { phaseTrack, toneEnvelope, withoutTone } from '../../../src/core/signal/tone-envelope.ts';
import { rms } from '../../../src/core/signal/running-rms.ts';
import { seededRandom } from '../../support/cases/random.ts';

const random = seededRandom(4);
const clockS = Float64Array.from({ length: 3600 }, (_, k) => k / 60);
const timeS = clockS.map((t) => t + 0.002 * random.normal());
const signalAt = (
  f: number,
): { timeS: Float64Array; clockS: Float64Array; accelerationMps2: Float64Array[] } => ({
  timeS,
  clockS,
  accelerationMps2: [timeS.map((t) => 0.5 * Math.cos(2 * Math.PI * f * t + 1))],
});

describe('toneEnvelope', () => {
  it('reads amplitude and phase on scattered times, block by block', () => {
    const { re, im } = toneEnvelope(signalAt(13), 13, 13, 0.5);
    re[0]!.forEach((r, i) => {
      expect(Math.hypot(r, im[0]![i]!)).toBeCloseTo(0.5, 6);
      expect(Math.atan2(im[0]![i]!, r)).toBeCloseTo(1, 5);
    });
  });

  it('reads an image whole when its true frequency is given, and low when not', () => {
    const whole = toneEnvelope(signalAt(47), 13, 13 - 60, 0.5);
    const low = toneEnvelope(signalAt(47), 13, 13, 0.5);
    const mean = (e: typeof whole): number =>
      rms(Float64Array.from(e.re[0]!, (r, i) => Math.hypot(r, e.im[0]![i]!)));
    expect(mean(whole)).toBeCloseTo(0.5, 6);
    // Phase left over: 2π·60·2 ms = 0.75 rad, factor exp(-0.75²/2) = 0.75.
    expect(mean(low) / 0.5).toBeCloseTo(0.75, 1);
  });
});

describe('withoutTone', () => {
  it('takes a line out and leaves another', () => {
    const signal = signalAt(13);
    const other = timeS.map((t) => 0.1 * Math.cos(2 * Math.PI * 21 * t));
    const [rest] = withoutTone(
      { ...signal, accelerationMps2: [signal.accelerationMps2[0]!.map((v, i) => v + other[i]!)] },
      13,
      13,
      1,
    );
    expect(rms(rest!.map((v, i) => v - other[i]!))).toBeLessThan(0.01);
  });
});

describe('phaseTrack', () => {
  it('gives offset and deviation of a wandering line, and undefined for too few blocks', () => {
    const blocks = Float64Array.from({ length: 200 }, (_, i) => 0.3 * i);
    const phase = blocks.map((t) => 2 * Math.PI * 0.05 * t + 3 * Math.sin((2 * Math.PI * t) / 60));
    const track = phaseTrack(blocks, phase.map(Math.cos), phase.map(Math.sin), 0)!;
    // The ends are averaged over a tenth each, where the wander has turned by ±0.9 rad: 0.0055 Hz.
    expect(Math.abs(track.offsetHz - 0.05)).toBeLessThan(0.006);
    // 3 rad over a minute: 3/60 Hz peak.
    expect(track.deviationHz).toBeCloseTo(0.05 / Math.SQRT2, 3);
    expect(phaseTrack(blocks.slice(0, 3), phase.slice(0, 3), phase.slice(0, 3), 0)).toBeUndefined();
  });
});
