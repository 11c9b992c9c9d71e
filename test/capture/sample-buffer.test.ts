import { describe, it, expect } from 'vitest';
import fc from 'fast-check';
import { SampleBuffer } from '../../src/capture/sample-buffer.ts';

function filled(count: number): SampleBuffer {
  const buffer = new SampleBuffer();
  for (let i = 0; i < count; i += 1) buffer.push(i / 60, i, 2 * i, -i);
  return buffer;
}

describe('SampleBuffer', () => {
  it('gives any slice as it was pushed, over block borders (property)', () => {
    const buffer = filled(10_000);
    fc.assert(
      fc.property(fc.integer({ min: 3900, max: 4300 }), fc.integer({ min: 3900, max: 4300 }), (a, b) => {
        const [from, to] = [Math.min(a, b), Math.max(a, b)];
        const { timeS, accelerationMps2 } = buffer.slice(from, to, 1);
        expect(timeS).toEqual(Float64Array.from({ length: to - from }, (_, i) => (from + i) / 60 - 1));
        expect(accelerationMps2[1]).toEqual(
          Float32Array.from({ length: to - from }, (_, i) => 2 * (from + i)),
        );
      }),
      { numRuns: 50 },
    );
  });

  it('finds the first sample at or after a time', () => {
    const buffer = filled(600);
    expect(buffer.indexAt(5)).toBe(300);
    expect(buffer.indexAt(5.001)).toBe(301);
    expect(buffer.indexAt(-1)).toBe(0);
    expect(buffer.indexAt(100)).toBe(600);
  });

  it('keeps the newest', () => {
    const buffer = filled(5000);
    expect(buffer.keepNewest(100)).toBe(4900);
    expect(buffer.keepNewest(100)).toBe(0);
    expect([buffer.count, buffer.timeAt(0), buffer.timeAt(99)]).toEqual([100, 4900 / 60, 4999 / 60]);
  });
});
