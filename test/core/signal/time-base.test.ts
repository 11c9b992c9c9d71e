import { describe, expect, it } from 'vitest';
import { estimateTimeBase } from '../../../src/core/signal/time-base.ts';
import { seededRandom } from '../../support/cases/random.ts';
import { steadyRecording, still, tone, type SteadyOptions } from '../../support/steady-recording.ts';

const baseOf = (
  motion: Parameters<typeof steadyRecording>[0],
  options: SteadyOptions,
  timing: 'auto' | 'stamps' | 'clock' = 'auto',
) => {
  const recording = steadyRecording(motion, options);
  return estimateTimeBase(recording.timeS, recording.accelerationMps2, timing);
};

describe('estimateTimeBase', () => {
  it('takes scatter of the sampling as true', () => {
    const base = baseOf(tone(14, 0.5), { jitterS: 0.002 });
    expect(base.timing.model).toBe('stamps');
    expect(base.timing.scatterSdS).toBeCloseTo(0.002, 4);
    expect(base.isDecided).toBe(true);
  });

  it('takes scatter of the delivery as late stamps', () => {
    const base = baseOf(tone(14, 0.5), { latenessS: 0.002 });
    expect(base.timing.model).toBe('clock');
    expect(base.timing.trueShare).toBe(0);
    const steps = base.timeS.slice(1).map((t, i) => t - base.timeS[i]!);
    expect(Math.max(...steps) - Math.min(...steps)).toBeLessThan(1e-9);
  });

  it('finds the share of a mixture (1 and 1 ms: one half)', () => {
    const base = baseOf(tone(14, 0.5), { jitterS: 0.001, latenessS: 0.001, durationS: 60 });
    expect(base.timing.model).toBe('mixed');
    expect(base.timing.trueShare).toBeGreaterThan(0.4);
    expect(base.timing.trueShare).toBeLessThan(0.6);
  });

  it('decides on a folded line as well', () => {
    expect(baseOf(tone(47, 0.5), { jitterS: 0.002 }).timing.model).toBe('stamps');
    expect(baseOf(tone(47, 0.5), { latenessS: 0.002 }).timing.model).toBe('clock');
  });

  it('says that a record without motion does not tell', () => {
    const base = baseOf(still, { jitterS: 0.002 });
    expect(base.isDecided).toBe(false);
    expect(base.timing.model).toBe('stamps');
  });

  it('does what it is told', () => {
    expect(baseOf(tone(14, 0.5), { jitterS: 0.002 }, 'clock').timing.trueShare).toBe(0);
    expect(baseOf(tone(14, 0.5), { latenessS: 0.002 }, 'stamps').timing.trueShare).toBe(1);
  });

  it('finds the true rate, not the nominal one, with samples missing', () => {
    const lost = Array.from({ length: 40 }, (_, i) => 37 * (i + 1));
    const base = baseOf(tone(7, 0.5), { rateHz: 58.7, jitterS: 0.002, lost });
    expect(1 / base.periodS).toBeCloseTo(58.7, 3);
    expect(base.losses).toHaveLength(40);
  });

  it('knows no clock where there is none', () => {
    // Each interval drawn afresh: what is early stays early (a renewal process).
    const random = seededRandom(9);
    let t = 0;
    const stampsS = Float64Array.from({ length: 4000 }, () => (t += random.uniform(0.002, 0.008)));
    const base = estimateTimeBase(stampsS, [new Float32Array(4000)], 'auto');
    expect(base.hasClock).toBe(false);
    expect([...base.timeS]).toEqual([...stampsS].map((s) => expect.closeTo(s, 9)));
  });
});
