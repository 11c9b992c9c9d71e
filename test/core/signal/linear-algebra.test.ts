import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  backSubstitute,
  choleskyInPlace,
  forwardSubstitute,
  principalDirection,
  symmetricInverse,
} from '../../../src/core/signal/linear-algebra.ts';

describe('choleskyInPlace', () => {
  it('factors a matrix worked by hand: [[4,2],[2,5]] = L Lt with L = [[2,0],[1,2]]', () => {
    const a = Float64Array.of(4, 2, 2, 5);
    expect(choleskyInPlace(a, 2)).toBe(2);
    expect([a[0], a[2], a[3]]).toEqual([2, 1, 2]);
  });

  it('solves a system by forward and back substitution', () => {
    const a = Float64Array.of(4, 2, 2, 5);
    choleskyInPlace(a, 2);
    const x = Float64Array.of(8, 12); // 4x+2y=8, 2x+5y=12 gives x=1, y=2
    forwardSubstitute(a, 2, x);
    backSubstitute(a, 2, x);
    expect(x[0]).toBeCloseTo(1, 12);
    expect(x[1]).toBeCloseTo(2, 12);
  });

  it('leaves dependent columns out instead of dividing by nothing', () => {
    const a = Float64Array.of(1, 2, 2, 4);
    expect(choleskyInPlace(a, 2)).toBe(1);
    const x = Float64Array.of(3, 6);
    forwardSubstitute(a, 2, x);
    backSubstitute(a, 2, x);
    expect([...x]).toEqual([3, 0]);
  });
});

describe('symmetricInverse', () => {
  it('times the matrix gives one, for random positive definite matrices', () => {
    fc.assert(
      fc.property(
        fc.array(fc.double({ min: -1, max: 1, noNaN: true }), { minLength: 9, maxLength: 9 }),
        (b) => {
          const a = new Float64Array(9);
          for (let i = 0; i < 3; i++)
            for (let j = 0; j < 3; j++)
              a[3 * i + j] =
                (i === j ? 0.5 : 0) + [0, 1, 2].reduce((s, k) => s + b[3 * i + k]! * b[3 * j + k]!, 0);
          const inverse = symmetricInverse(a, 3)!;
          for (let i = 0; i < 3; i++)
            for (let j = 0; j < 3; j++)
              expect([0, 1, 2].reduce((s, k) => s + a[3 * i + k]! * inverse[3 * k + j]!, 0)).toBeCloseTo(
                i === j ? 1 : 0,
                9,
              );
        },
      ),
      { seed: 11 },
    );
  });

  it('is undefined for a singular matrix', () => {
    expect(symmetricInverse(Float64Array.of(1, 2, 2, 4), 2)).toBeUndefined();
  });
});

describe('principalDirection', () => {
  it('finds the axis of a rank-one matrix, largest component positive', () => {
    const v = [0.36, -0.48, -0.8];
    const direction = principalDirection(v.map((a) => v.map((b) => a * b)));
    direction.forEach((d, i) => expect(d).toBeCloseTo(-v[i]!, 10));
  });

  it('of one axis is that axis', () => {
    expect(principalDirection([[2]])).toEqual([1]);
  });
});
