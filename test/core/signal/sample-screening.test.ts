import { describe, expect, it } from 'vitest';
import { screenSamples } from '../../../src/core/signal/sample-screening.ts';
import { steadyRecording, still, tone } from '../../support/steady-recording.ts';
import type { Recording } from '../../../src/core/model/recording.ts';

type Rows = Pick<Recording, 'timeS' | 'accelerationMps2'>;
const withRows = (recording: Rows, order: readonly number[], timeS: readonly number[]): Rows => ({
  timeS: Float64Array.from(timeS),
  accelerationMps2: recording.accelerationMps2.map((axis) => Float32Array.from(order, (i) => axis[i]!)),
});

describe('screenSamples', () => {
  it('drops a leading row of zeros and rows that are not finite', () => {
    const recording = steadyRecording(tone(5, 1), { durationS: 2 });
    const axes = recording.accelerationMps2.map((axis) => Float32Array.from(axis));
    axes.forEach((axis) => (axis[0] = 0));
    axes[1]![7] = Number.NaN;
    const found = screenSamples({ ...recording, accelerationMps2: axes });
    expect(found.leadingZeroCount).toBe(1);
    expect(found.kept).toHaveLength(118);
    expect([...found.kept]).not.toContain(7);
  });

  it('drops readings delivered twice within a short interval', () => {
    const recording = steadyRecording(tone(5, 1), { durationS: 10, rateHz: 200 });
    const order: number[] = [];
    const times: number[] = [];
    for (let i = 0; i < 2000; i++) {
      order.push(i);
      times.push(i * 0.005);
      if (i % 6 === 0) {
        order.push(i);
        times.push(i * 0.005 + 0.0024);
      }
    }
    const found = screenSamples(withRows(recording, order, times));
    expect(found.repeatCount).toBe(Math.ceil(2000 / 6));
    expect(found.kept).toHaveLength(2000);
  });

  it('drops held readings of a polled sensor (60 polls a second of a 50 Hz sensor)', () => {
    const recording = steadyRecording(tone(5, 1), { durationS: 20, rateHz: 50 });
    const polls = Array.from({ length: 1190 }, (_, k) => k / 60);
    const found = screenSamples(
      withRows(
        recording,
        polls.map((t) => Math.floor(t * 50 + 1e-9)),
        polls,
      ),
    );
    expect(found.isPolled).toBe(true);
    expect(found.kept.length).toBeGreaterThan(985);
    expect(found.kept.length).toBeLessThan(1000);
  });

  it('keeps equal readings of a phone at rest with a coarse step: they are chance', () => {
    const recording = steadyRecording(still, { stepMps2: 0.1, noiseMps2: 0.02 });
    expect(screenSamples(recording).repeatCount).toBe(0);
    const moving = steadyRecording(tone(4, 0.4), {
      stepMps2: 0.1,
      noiseMps2: 0.02,
      jitterS: 0.003,
      rateHz: 100,
    });
    expect(screenSamples(moving).repeatCount).toBe(0);
  });

  it.each([
    [10, 60, 3],
    [20, 60, 3],
    [12.5, 50, 3],
    [25, 100, 3],
    [10, 60, 1],
    [15, 60, 1],
  ])(
    'keeps all of a noise-free %d Hz sine at %d Hz (%d axes): equal neighbours at a turning point are no repeats',
    (frequencyHz, rateHz, axisCount) => {
      const timeS = Float64Array.from({ length: 20 * rateHz }, (_, k) => k / rateHz);
      for (const phase of [0, Math.PI / 4, Math.PI / 2]) {
        const sine = Float32Array.from(timeS, (t) => Math.sin(2 * Math.PI * frequencyHz * t + phase));
        for (const step of [0, 0.01, 0.1]) {
          const rounded = step ? sine.map((v) => step * Math.round(v / step)) : sine;
          const accelerationMps2 = Array.from({ length: axisCount }, (_, a) =>
            a ? new Float32Array(timeS.length).fill(9.8) : rounded,
          );
          expect(screenSamples({ timeS, accelerationMps2 }).repeatCount).toBe(0);
        }
      }
    },
  );
});
