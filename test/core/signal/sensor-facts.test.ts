import { describe, expect, it } from 'vitest';
import { clippedCount, gravityOf, roundingStep } from '../../../src/core/signal/sensor-facts.ts';
import { steadyRecording, tone } from '../../support/steady-recording.ts';

describe('roundingStep', () => {
  it.each([0.1, 0.01, 0.0012])('finds a step of %d m/s²', (step) => {
    const [, , z] = steadyRecording(tone(3, 0.5), { stepMps2: step, noiseMps2: 0.02 }).accelerationMps2;
    expect(roundingStep(z!)).toBeCloseTo(step, 5);
  });

  it('finds none in unrounded samples, in one value, in two', () => {
    const [, , z] = steadyRecording(tone(3, 0.5)).accelerationMps2;
    expect(roundingStep(z!)).toBe(0);
    expect(roundingStep(Float32Array.of(1, 1, 1))).toBe(0);
    expect(roundingStep(Float32Array.of(9.7, 9.8, 9.7))).toBeCloseTo(0.1, 5);
  });
});

describe('clippedCount', () => {
  it('counts samples on a full scale of 2 g', () => {
    const axis = Float32Array.from({ length: 400 }, (_, i) =>
      Math.max(-19.61, Math.min(19.61, 30 * Math.sin(0.3 * i))),
    );
    const flat = axis.filter((v) => Math.abs(v) > 19.6).length;
    expect(clippedCount([axis], [0])).toBe(flat);
  });

  it('counts a flat top that stands far out, whatever its height', () => {
    const axis = Float32Array.from({ length: 2000 }, (_, i) =>
      i > 1000 && i < 1005 ? 13 : 0.01 * Math.sin(i),
    );
    expect(clippedCount([axis], [0])).toBe(4);
  });

  it('does not count an axis that never moves', () => {
    expect(clippedCount([new Float32Array(500).fill(9.81), new Float32Array(500)], [0, 0])).toBe(0);
  });

  it('does not count the crests of a sine, nor a coarse step', () => {
    const [x, y, z] = steadyRecording(tone(3, 2), { stepMps2: 0.1, noiseMps2: 0 }).accelerationMps2;
    expect(clippedCount([x!, y!, z!], [0.1, 0.1, 0.1])).toBe(0);
  });
});

describe('gravityOf', () => {
  it('tells size and direction, and that gravity was taken out before', () => {
    const found = gravityOf([Float32Array.of(0, 0), Float32Array.of(6, 6), Float32Array.of(8, 8)]);
    expect(found?.gravityMps2).toBeCloseTo(10, 6);
    expect(found?.up).toEqual([0, expect.closeTo(0.6, 6), expect.closeTo(0.8, 6)]);
    expect(gravityOf([Float32Array.of(0), Float32Array.of(0), Float32Array.of(0.2)])).toBeUndefined();
    expect(gravityOf([Float32Array.of(9.8)])).toBeUndefined();
  });
});
