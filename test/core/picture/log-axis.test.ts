import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  hzToY,
  logAxis,
  NARROWEST_VIEW_RATIO,
  pannedRange,
  yToHz,
  zoomedRange,
} from '../../../src/core/picture/log-axis.ts';
import { logTicks } from '../../../src/core/picture/log-ticks.ts';

const range = fc
  .tuple(fc.double({ min: 0.1, max: 200, noNaN: true }), fc.double({ min: 1.03, max: 3000, noNaN: true }))
  .map(([low, ratio]) => [low, low * ratio] as const);

describe('logAxis', () => {
  it('puts the ends at the ends and the geometric mean in the middle', () => {
    const axis = logAxis([1, 100], 10, 210);
    expect(hzToY(axis, 1)).toBeCloseTo(210, 9);
    expect(hzToY(axis, 100)).toBeCloseTo(10, 9);
    expect(hzToY(axis, 10)).toBeCloseTo(110, 9);
  });

  it('is monotone and inverted by yToHz', () => {
    fc.assert(
      fc.property(range, fc.double({ min: 0, max: 1, noNaN: true }), ([low, high], share) => {
        const axis = logAxis([low, high], 0, 400);
        const hz = low * (high / low) ** share;
        expect(yToHz(axis, hzToY(axis, hz)) / hz).toBeCloseTo(1, 9);
        expect(hzToY(axis, hz * 1.01)).toBeLessThan(hzToY(axis, hz));
      }),
    );
  });

  it('refuses empty and negative ranges', () => {
    expect(() => logAxis([0, 10], 0, 100)).toThrow(/rangeHz/);
    expect(() => logAxis([10, 10], 0, 100)).toThrow(RangeError);
    expect(() => logAxis([1, 10], 100, 100)).toThrow(/bottomPx/);
  });
});

describe('zoomedRange and pannedRange', () => {
  it('keep the frequency under the finger where it is, inside the bounds', () => {
    const zoomed = zoomedRange([1, 100], [1, 100], 2, 10);
    expect(zoomed[0]).toBeCloseTo(Math.sqrt(10), 9);
    expect(zoomed[1]).toBeCloseTo(10 * Math.sqrt(10), 9);
    expect(zoomedRange(zoomed, [1, 100], 0.1, 10)).toEqual([1, 100]);
  });

  it('never leave the bounds and never turn round, whatever is done', () => {
    const step = fc.record({
      factor: fc.double({ min: 0.2, max: 8, noNaN: true }),
      share: fc.double({ min: 0, max: 1, noNaN: true }),
      byRatio: fc.double({ min: 0.2, max: 5, noNaN: true }),
    });
    fc.assert(
      fc.property(range, fc.array(step, { maxLength: 12 }), (bounds, steps) => {
        let view: readonly [number, number] = bounds;
        for (const { factor, share, byRatio } of steps) {
          view = zoomedRange(view, bounds, factor, view[0] * (view[1] / view[0]) ** share);
          view = pannedRange(view, bounds, byRatio);
          expect(view[0]).toBeGreaterThanOrEqual(bounds[0] * (1 - 1e-9));
          expect(view[1]).toBeLessThanOrEqual(bounds[1] * (1 + 1e-9));
          expect(view[1] / view[0]).toBeGreaterThan(
            Math.min(NARROWEST_VIEW_RATIO, bounds[1] / bounds[0]) - 1e-6,
          );
        }
      }),
    );
  });
});

describe('logTicks', () => {
  it('counts in decades while the view is wide', () => {
    const axis = logAxis([0.8, 60], 0, 400);
    expect(logTicks(axis, 16).map((t) => t.label)).toEqual([
      '1', '2', '3', '5', '7', '10', '20', '30', '50',
    ]); // prettier-ignore
  });

  it('counts evenly once zoomed in, and in r/min when asked', () => {
    const close = logTicks(logAxis([7.2, 7.7], 0, 400), 30).map((t) => t.shown);
    expect(close).toContain(7.4);
    expect(close.length).toBeGreaterThan(4);
    const speeds = logTicks(logAxis([10, 60], 0, 400), 40, 60);
    expect(speeds.map((t) => t.shown)).toContain(1000);
    expect(speeds.find((t) => t.shown === 1200)?.frequencyHz ?? 20).toBeCloseTo(20, 9);
  });

  it('is monotone, inside the axis and never closer than asked', () => {
    fc.assert(
      fc.property(range, fc.integer({ min: 14, max: 60 }), ([low, high], gapPx) => {
        const ticks = logTicks(logAxis([low, high], 20, 420), gapPx);
        for (const [i, tick] of ticks.entries()) {
          expect(tick.yPx).toBeGreaterThanOrEqual(20 - 1e-6);
          expect(tick.yPx).toBeLessThanOrEqual(420 + 1e-6);
          // values rounded to the last digit shown may move by a hair
          if (i > 0) expect(ticks[i - 1]!.yPx - tick.yPx).toBeGreaterThanOrEqual(gapPx * 0.99);
        }
      }),
    );
  });
});
