import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { CLOSEST_SHARE, movedRange, rangeShare } from '../../../src/core/picture/moved-range.ts';

describe('movedRange', () => {
  it('zooms about a value that stays where it is', () => {
    expect(movedRange([0, 10], [0, 10], { factor: 2, about: 2 })).toEqual([1, 6]);
    expect(movedRange([1, 6], [0, 10], { factor: 0.01 })).toEqual([0, 10]);
    expect(movedRange([2, 4], [0, 10], { shift: 0.5 })).toEqual([3, 5]);
  });

  it('never leaves the whole and never comes closer than allowed', () => {
    const change = fc.record({
      factor: fc.double({ min: 0.1, max: 50, noNaN: true }),
      shift: fc.double({ min: -3, max: 3, noNaN: true }),
    });
    fc.assert(
      fc.property(fc.array(change, { maxLength: 10 }), (changes) => {
        let view: readonly [number, number] = [0, 32];
        for (const one of changes) view = movedRange(view, [0, 32], one);
        expect(view[0]).toBeGreaterThanOrEqual(-1e-9);
        expect(view[1]).toBeLessThanOrEqual(32 + 1e-9);
        expect(rangeShare(view, [0, 32])).toBeGreaterThanOrEqual(CLOSEST_SHARE * 0.999);
      }),
    );
  });
});
