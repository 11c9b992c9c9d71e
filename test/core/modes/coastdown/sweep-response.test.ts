import { describe, expect, it } from 'vitest';
import {
  speedAt,
  speedRateAt,
  sweepColumns,
  sweepPhase,
} from '../../../../src/core/modes/coastdown/sweep-response.ts';
import { integratedSweep } from '../../../support/integrated-sweep.ts';

const [start, rate, curve, durationS] = [16, 0.7, 0.006, 20];
const centreS = durationS / 2;
const sweep = {
  centreS,
  halfS: centreS,
  speedHz: [
    start - rate * centreS + curve * centreS ** 2,
    (-rate + 2 * curve * centreS) * centreS,
    curve * centreS ** 2,
  ],
};
const timeS = Float64Array.from({ length: 60 * durationS }, (_, k) => k / 60 + 0.002 * Math.sin(9 * k));

/** Least-squares share of the columns in a signal, and the largest error left. */
function leftOver(signal: Float64Array, columns: readonly Float64Array[]): number {
  const size = columns.length;
  const rows = columns.map((a) => [
    ...columns.map((b) => a.reduce((s, v, k) => s + v * (b[k] as number), 0)),
    a.reduce((s, v, k) => s + v * (signal[k] as number), 0),
  ]);
  for (let c = 0; c < size; c++)
    for (let r = 0; r < size; r++) {
      if (r === c) continue;
      const factor = ((rows[r] as number[])[c] as number) / ((rows[c] as number[])[c] as number);
      rows[r] = (rows[r] as number[]).map((v, k) => v - factor * ((rows[c] as number[])[k] as number));
    }
  const weights = rows.map((row, c) => (row[size] as number) / (row[c] as number));
  return signal.reduce(
    (most, v, k) =>
      Math.max(
        most,
        Math.abs(v - columns.reduce((s, col, c) => s + (weights[c] as number) * (col[k] as number), 0)),
      ),
    0,
  );
}

describe('sweepColumns', () => {
  it.each([
    [9, 0.02],
    [11, 0.005],
    [8, 0.06],
  ])('agrees with an ODE package (odex) at %d Hz, damping %d, from rest', (frequencyHz, dampingRatio) => {
    const times = timeS.map((t) => Math.max(0, t));
    const truth = integratedSweep({ frequencyHz, dampingRatio, start, rate, curve }, times);
    const { re, im, decayRe, decayIm } = sweepColumns(times, sweep, frequencyHz, dampingRatio);
    const largest = truth.reduce((most, v) => Math.max(most, Math.abs(v)), 0);
    expect(leftOver(truth, [re, im, decayRe, decayIm]) / largest).toBeLessThan(2e-5);
  });

  it('gives the steady response where the sweep stands still: f²·r²/sqrt((1-r²)²+(2·zeta·r)²) over r²', () => {
    const still = { centreS: 10, halfS: 10, speedHz: [7, 0] };
    const { re, im } = sweepColumns(timeS, still, 9, 0.03);
    const r = 7 / 9;
    const gain = r ** 2 / Math.hypot(1 - r * r, 2 * 0.03 * r);
    for (const k of [0, 300, 1100])
      expect(Math.hypot(re[k] as number, im[k] as number) / (49 * gain)).toBeCloseTo(1, 5);
  });

  it('has speed, its rate and its angle in step', () => {
    expect(speedAt(sweep, 4)).toBeCloseTo(start - rate * 4 + curve * 16, 10);
    expect(speedRateAt(sweep, 4)).toBeCloseTo(-rate + 2 * curve * 4, 10);
    const turned = (sweepPhase(sweep, 4.001) - sweepPhase(sweep, 3.999)) / (2 * Math.PI * 0.002);
    expect(turned).toBeCloseTo(speedAt(sweep, 4), 5);
  });
});
