import { describe, it, expect } from 'vitest';
import { createLiveView } from '../../src/capture/live-view.ts';
import { MotionObserver, type Observed } from '../../src/capture/motion-observer.ts';
import { SampleBuffer } from '../../src/capture/sample-buffer.ts';
import { seededChance } from '../../src/capture/seeded-chance.ts';

type Motion = (t: number) => readonly [number, number, number];

/** Watches `motion` plus noise for some seconds; the recording begins at 5 s. */
function observe(motion: Motion, durationS: number, { step = 0, noise = 0.02 } = {}) {
  const buffer = new SampleBuffer();
  const observer = new MotionObserver(buffer);
  const chance = seededChance(5);
  const rounded = (value: number) => (step > 0 ? Math.round(value / step) * step : value);
  let observed: Observed = observer.advance();
  const settledAtS: number[] = [];
  for (let i = 0; i < durationS * 60; i += 1) {
    if (i === 300) observer.restart(0);
    const [x, y, z] = motion(i / 60).map((value) => rounded(value + noise * chance.normal())) as [
      number,
      number,
      number,
    ];
    buffer.push(i / 60, x, y, z);
    while (observer.isBehind) observed = observer.advance();
    if (observed.isSettled) settledAtS.push(i / 60);
  }
  return { observed, buffer, settledAtS };
}
const ring = (at: number, strength: number) => (t: number) =>
  t < at ? 0 : strength * Math.exp(-(t - at) / 1.5) * Math.sin(46.5 * (t - at));
const lying: Motion = () => [0, 0, 9.81];

describe('MotionObserver', () => {
  it('is at rest after three quiet seconds, also beside a steady machine, not while a ring dies out', () => {
    expect(observe(lying, 5).settledAtS[0]).toBeCloseTo(3, 0);
    expect(observe((t) => [0, 0, 9.81 + 2 * Math.sin(100 * t)], 5).settledAtS[0]).toBeCloseTo(3, 0);
    const dying = observe((t) => [0, 0, 9.81 + ring(0, 3)(t)], 12).settledAtS[0]!;
    expect(dying).toBeGreaterThan(5);
  });

  it('is not at rest while the phone is being turned', () => {
    const turning = observe((t) => [9.81 * Math.sin(0.05 * t), 0, 9.81 * Math.cos(0.05 * t)], 8);
    expect(turning.settledAtS).toEqual([]);
  });

  it('stays at rest when it gets still quieter, and leaves it when shaken', () => {
    const { settledAtS } = observe(
      (t) => [0, 0, 9.81 + (t > 12 ? Math.sin(40 * t) : 0.3 * Math.exp(-t / 6) * Math.sin(40 * t))],
      16,
    );
    const first = settledAtS[0]!;
    expect(settledAtS.filter((t) => t > first && t < 12).length).toBeGreaterThan((12 - first) * 60 - 5);
    expect(settledAtS.some((t) => t > 13.1 && t < 14)).toBe(false);
  });

  it('counts taps and says which were too weak for the rounding', () => {
    const taps = [6, 9, 12];
    const tapped =
      (strength: number): Motion =>
      (t) => [0, 0, 9.81 + taps.reduce((sum, at) => sum + ring(at, strength)(t), 0)];
    expect(observe(tapped(1.5), 14, { step: 0.1 }).observed).toMatchObject({ tapCount: 3, isWeak: false });
    expect(observe(tapped(0.6), 14, { step: 0.1 }).observed).toMatchObject({ tapCount: 3, isWeak: true });
    expect(observe(tapped(0.6), 14).observed).toMatchObject({ tapCount: 3, isWeak: false });
    expect(observe(lying, 60).observed.tapCount).toBe(0);
  });

  it('sees clipping, the rounding step and a phone that moved', () => {
    const clipped = observe((t) => [0, 0, t > 6 && t < 6.1 ? 19.6133 : 9.81], 8, { noise: 0 });
    expect(clipped.observed.isClipped).toBe(true);
    expect(observe(lying, 8, { step: 0.1, noise: 0.1 }).observed.stepMps2).toBeCloseTo(0.1, 5);
    const moved = observe((t) => [t > 7 ? 1.2 : 0, 0, 9.74], 10).observed;
    expect(moved.hasMoved).toBe(true);
    expect(observe(lying, 10).observed.hasMoved).toBe(false);
  });
});

describe('createLiveView', () => {
  it('hints by phase', () => {
    const { buffer } = observe(lying, 6);
    const view = createLiveView(buffer);
    const seen: Observed = {
      levelMps2: 0.1,
      isSettled: true,
      tapCount: 1,
      tapAtS: 1,
      isClipped: false,
      isWeak: false,
      hasMoved: false,
      stepMps2: 0.1,
    };
    const hint = (over: Partial<Observed>, phase: 'settling' | 'recording' | 'checking') =>
      view({ ...seen, ...over }, phase, 0).hint;
    expect(hint({ isSettled: false }, 'settling')).toBe('wait-to-settle');
    expect(hint({}, 'settling')).toBeUndefined();
    expect(hint({ isSettled: false }, 'checking')).toBe('keep-still');
    expect(hint({ isClipped: true, isWeak: true }, 'recording')).toBe('too-strong');
    expect(hint({ hasMoved: true }, 'recording')).toBe('keep-still');
    expect(hint({ isWeak: true }, 'recording')).toBe('tap-harder');
    expect(hint({}, 'recording')).toBeUndefined();
  });
});
