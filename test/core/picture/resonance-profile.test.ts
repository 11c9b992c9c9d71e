import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { FADING_SDS, modeBandHz } from '../../../src/core/picture/mode-band.ts';
import { forceAmplification, resonanceProfile } from '../../../src/core/picture/resonance-profile.ts';
import { separationZones } from '../../../src/core/picture/separation-zones.ts';

describe('forceAmplification', () => {
  it('is 1/(2 zeta) at resonance and 1/(1 - r²) far below (Thomson & Dahleh, Theory of Vibration, ch. 3)', () => {
    expect(forceAmplification(10, { frequencyHz: 10, dampingRatio: 0.01 })).toBeCloseTo(50, 9);
    // r = 0.8, zeta = 1 %: 2.78 and r = 1.25: 1.78 (design's table of amplification at the verdict's bounds)
    expect(forceAmplification(8, { frequencyHz: 10, dampingRatio: 0.01 })).toBeCloseTo(2.78, 2);
    expect(forceAmplification(12.5, { frequencyHz: 10, dampingRatio: 0.01 })).toBeCloseTo(1.78, 2);
  });
});

describe('resonanceProfile', () => {
  it('ascends in frequency, stays in range and reaches every peak, however sharp', () => {
    const mode = fc.record({
      frequencyHz: fc.double({ min: 1, max: 50, noNaN: true }),
      dampingRatio: fc.double({ min: 0.001, max: 0.3, noNaN: true }),
    });
    fc.assert(
      fc.property(fc.array(mode, { minLength: 1, maxLength: 4 }), (modes) => {
        const points = resonanceProfile(modes, [0.5, 60]);
        for (const [i, point] of points.entries()) {
          expect(point.frequencyHz).toBeGreaterThanOrEqual(0.5);
          expect(point.frequencyHz).toBeLessThanOrEqual(60 * (1 + 1e-12));
          if (i > 0) expect(point.frequencyHz).toBeGreaterThanOrEqual(points[i - 1]!.frequencyHz);
        }
        const highest = Math.max(...points.map((p) => p.amplificationRatio));
        const sharpest = Math.min(...modes.map((m) => m.dampingRatio));
        expect(highest).toBeGreaterThanOrEqual(1 / (2 * sharpest) - 1e-6);
      }),
    );
  });

  it('is empty without modes', () => {
    expect(resonanceProfile([], [1, 10])).toEqual([]);
  });
});

describe('modeBandHz', () => {
  it('nests from the widest to the half-power bandwidth f (1 ± zeta)', () => {
    const bands = modeBandHz({ frequencyHz: 10, frequencySdHz: 0.1, dampingRatio: 0.02 });
    expect(bands).toHaveLength(FADING_SDS.length);
    expect(bands[0]![1]).toBeCloseTo(10.2 + 1.96 * 0.1, 9);
    expect(bands.at(-1)).toEqual([9.8, 10.2]);
    for (const [i, band] of bands.entries())
      if (i > 0) expect(band[1] - band[0]).toBeLessThan(bands[i - 1]![1] - bands[i - 1]![0]);
  });
});

describe('separationZones', () => {
  it('is 5 % or the damping ratio about the mode, and 0.8 to 1.25 of it', () => {
    expect(separationZones({ frequencyHz: 10, dampingRatio: 0.01 })).toEqual({
      coincidentHz: [9.5, 10.5],
      closeHz: [8, 12.5],
    });
    expect(separationZones({ frequencyHz: 10, dampingRatio: 0.1 }).coincidentHz[1]).toBeCloseTo(11, 9);
  });
});
