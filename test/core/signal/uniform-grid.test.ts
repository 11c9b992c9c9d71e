import { describe, expect, it } from 'vitest';
import { conditionRecording } from '../../../src/core/signal/condition-recording.ts';
import { derivative } from '../../../src/core/signal/uniform-grid.ts';
import { steadyRecording, tone } from '../../support/steady-recording.ts';

describe('derivative', () => {
  it.each([1, 10, 20, 25])('is right to half a percent at %i Hz of 60', (f) => {
    const x = Float64Array.from({ length: 400 }, (_, i) => Math.sin((2 * Math.PI * f * i) / 60));
    const d = derivative(x, 1 / 60);
    for (let i = 100; i < 300; i++)
      expect(Math.abs(d[i]! / (2 * Math.PI * f) - Math.cos((2 * Math.PI * f * i) / 60))).toBeLessThan(0.006);
  });
});

describe('uniformSignal', () => {
  it('moves scattered samples to the clock: what is left is noise', () => {
    const recording = steadyRecording(tone(12, 1), { jitterS: 0.002, noiseMps2: 0, lost: [500] });
    const outcome = conditionRecording(recording, 'stamps');
    if (!outcome.ok) throw new Error('conditioned');
    const { grid } = outcome.value;
    const z = grid.accelerationMps2[2]!;
    expect(grid.present[500]).toBe(0);
    let cc = 0;
    let best = 0;
    for (let k = 60; k < z.length - 60; k++) cc += z[k]! ** 2;
    for (let k = 60; k < z.length - 60; k++) {
      const ahead = 2 * Math.cos(2 * Math.PI * 12 * grid.periodS) * z[k]! - z[k - 1]!;
      if (Math.abs(k - 500) > 30) best += (z[k + 1]! - ahead) ** 2;
    }
    // A pure sine obeys x(k+1) = 2cos(ωT)x(k) - x(k-1); untouched jitter would leave (2π·12·0.002)² ≈ 2 % and more.
    expect(best / cc).toBeLessThan(2e-3);
  });
});
