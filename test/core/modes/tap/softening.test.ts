import { describe, expect, it, vi } from 'vitest';
import { analyse } from '../../../../src/core/analyse.ts';
import type { Recording } from '../../../../src/core/model/recording.ts';
import { seededRandom } from '../../../support/cases/random.ts';

/** Whole analyses on a machine that may be busy with other tests. */
vi.setConfig({ testTimeout: 60_000 });

/** Ring-downs whose frequency falls by 1 % and damping rises by 30 % of itself per m/s², integrated cycle by cycle. */
function softeningRecording(seed: number, frequencySlope: number, dampingSlope: number): Recording {
  const random = seededRandom(seed);
  const rateHz = 60;
  const timeS = Float64Array.from({ length: 50 * rateHz }, (_, i) => i / rateHz + 0.001 * random.normal());
  const [f0, z0] = [6, 0.01];
  const taps = [2, 11, 20, 29, 38].map((t) => ({ t, amplitude: random.uniform(0.4, 1.2) }));
  const motion = new Float64Array(timeS.length);
  for (let k = 0; k < taps.length; k++) {
    let [t, a, phase] = [taps[k]!.t, taps[k]!.amplitude, 0.2];
    const next = taps[k + 1]?.t ?? Infinity;
    for (let i = 0; i < timeS.length; i++) {
      if (timeS[i]! < taps[k]!.t || timeS[i]! >= next) continue;
      const steps = 20;
      const h = (timeS[i]! - t) / steps;
      for (let s = 0; s < steps; s++) {
        const w = 2 * Math.PI * f0;
        phase += h * w * (1 + frequencySlope * a);
        a *= Math.exp(-h * w * z0 * (1 + dampingSlope * a));
      }
      t = timeS[i]!;
      motion[i] = a * Math.sin(phase);
    }
  }
  return {
    sensor: { source: 'file', practice: false, name: 'softening' },
    axes: ['x', 'y', 'z'],
    timeS,
    accelerationMps2: [0.6, 0.48, 0.64].map((d, axis) =>
      Float32Array.from(motion, (m) => (axis === 2 ? 9.8 : 0) + d * m + 0.015 * random.normal()),
    ),
  };
}

describe('softenedFit', () => {
  it('gives frequency and damping of small motion, and the slopes, where they change with amplitude', () => {
    const outcome = analyse(softeningRecording(1, -0.01, 0.3), { procedure: 'tap', timing: 'auto' });
    const [mode] = outcome.ok ? outcome.value.analysis.modes : [];
    expect(mode!.doubts).toContain('amplitude-dependent');
    expect(Math.abs(mode!.frequencyHz / 6 - 1)).toBeLessThan(1e-3);
    expect(Math.abs(mode!.dampingRatio / 0.01 - 1)).toBeLessThan(0.1);
    expect(mode!.softening!.frequencySlopePerMps2).toBeCloseTo(-0.01, 2);
    expect(mode!.softening!.dampingSlopePerMps2).toBeCloseTo(0.003, 2.5);
  });

  it.each([2, 3, 4])('says nothing of a linear structure (seed %i)', (seed) => {
    const outcome = analyse(softeningRecording(seed, 0, 0), { procedure: 'tap', timing: 'auto' });
    const [mode] = outcome.ok ? outcome.value.analysis.modes : [];
    expect(mode!.softening).toBeUndefined();
    expect(Math.abs(mode!.frequencyHz / 6 - 1)).toBeLessThan(5e-4);
  });
});
