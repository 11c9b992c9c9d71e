import { describe, expect, it } from 'vitest';
import { thinnedTrace, TRACE_POINTS } from '../../../src/core/signal/trace.ts';

describe('thinnedTrace', () => {
  it('keeps a spike that one sample wide in an hour', () => {
    const n = 360_000;
    const axis = new Float64Array(n);
    axis[123_457] = 5;
    axis[123_458] = -4;
    const { timeS, accelerationMps2 } = thinnedTrace(
      Float64Array.from({ length: n }, (_, i) => i / 100),
      [axis],
    );
    expect(timeS).toHaveLength(TRACE_POINTS);
    expect(Math.max(...accelerationMps2[0]!)).toBe(5);
    expect(Math.min(...accelerationMps2[0]!)).toBe(-4);
    expect(timeS.every((t, i) => i === 0 || t >= timeS[i - 1]!)).toBe(true);
  });

  it('leaves a short record as it is', () => {
    const axis = Float64Array.of(1, 2);
    expect(thinnedTrace(Float64Array.of(0, 1), [axis]).accelerationMps2[0]).toBe(axis);
  });
});
