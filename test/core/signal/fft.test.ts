import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  complexTransform,
  inverseRealTransform,
  inverseTwoReal,
  nextPowerOfTwo,
  realTransform,
} from '../../../src/core/signal/fft.ts';
import { congruential, signalGolden } from '../../support/signal-golden.ts';

/** Double rounding grows with the size of the sums. */
const ROUNDING = 1e-9;
const samples = fc.array(fc.double({ min: -100, max: 100, noNaN: true }), { minLength: 2, maxLength: 70 });

describe('realTransform', () => {
  it.each(signalGolden().fft)('agrees with SciPy at size $size', ({ size, seed, re, im }) => {
    const found = realTransform(congruential(size, seed));
    re.forEach((value, k) => expect(found.re[k]).toBeCloseTo(value, 9));
    im.forEach((value, k) => expect(found.im[k]).toBeCloseTo(value, 9));
  });

  it('spreads an impulse evenly', () => {
    expect([...realTransform([1, 0, 0, 0, 0, 0]).re]).toEqual([1, 1, 1, 1].map((v) => expect.closeTo(v, 12)));
  });

  it('keeps energy (Parseval) at any size', () => {
    fc.assert(
      fc.property(samples, (x) => {
        const { re, im, size } = realTransform(x);
        const energy = x.reduce((s, v) => s + v * v, 0);
        let seen = 0;
        for (let k = 0; k < re.length; k++) {
          const twice = k === 0 || 2 * k === size ? 1 : 2;
          seen += (twice * (re[k]! ** 2 + im[k]! ** 2)) / size;
        }
        expect(Math.abs(seen - energy)).toBeLessThan(ROUNDING * (1 + energy));
      }),
    );
  });

  it('comes back from its inverse at any size', () => {
    fc.assert(
      fc.property(samples, (x) => {
        const back = inverseRealTransform(realTransform(x));
        x.forEach((value, i) => expect(Math.abs(back[i]! - value)).toBeLessThan(1e-8));
      }),
    );
  });

  it('pads with zeros and refuses sizes that are none', () => {
    expect(realTransform([1, 1], 8).re[0]).toBeCloseTo(2, 12);
    expect(() => realTransform([1], 1)).toThrow(RangeError);
    expect(nextPowerOfTwo(1000)).toBe(1024);
  });
});

describe('inverseTwoReal', () => {
  it('brings two signals back by one transform', () => {
    const a = congruential(64, 1);
    const b = congruential(64, 2);
    const [first, second] = inverseTwoReal(realTransform(a), realTransform(b));
    a.forEach((value, i) => expect(first[i]).toBeCloseTo(value, 10));
    b.forEach((value, i) => expect(second[i]).toBeCloseTo(value, 10));
    expect(() => inverseTwoReal(realTransform(a), realTransform(b, 32))).toThrow(RangeError);
  });
});

describe('complexTransform', () => {
  it('turns a rotating phasor into one bin, at a size that is no power of two', () => {
    const size = 15;
    const data = new Float64Array(2 * size);
    for (let i = 0; i < size; i++) {
      data[2 * i] = Math.cos((2 * Math.PI * 4 * i) / size);
      data[2 * i + 1] = Math.sin((2 * Math.PI * 4 * i) / size);
    }
    const out = complexTransform(data);
    for (let k = 0; k < size; k++)
      expect(Math.hypot(out[2 * k]!, out[2 * k + 1]!)).toBeCloseTo(k === 4 ? size : 0, 9);
  });
});
