import { describe, expect, it } from 'vitest';
import { lineSpectrum } from '../../../src/core/modes/line-search.ts';
import { bandSource } from '../../../src/core/modes/narrow-band.ts';
import { bandNature } from '../../../src/core/modes/tone-nature.ts';
import { randomModeMotion } from '../../support/cases/random-motion.ts';
import { seededRandom } from '../../support/cases/random.ts';
import { conditioned } from '../../support/conditioned.ts';
import { steadyRecording, tone } from '../../support/steady-recording.ts';

const natureAt = (centreHz: number, motion: Parameters<typeof steadyRecording>[0]) => {
  const { grid } = conditioned(steadyRecording(motion, { durationS: 60, jitterS: 0.001, noiseMps2: 0.01 }));
  return bandNature(bandSource(grid), lineSpectrum(grid), centreHz);
};
const randomAt = (frequencyHz: number, dampingRatio: number, rms: number, seed: number) =>
  randomModeMotion(seededRandom(seed), { frequencyHz, dampingRatio }, rms, 60, 61);

describe('bandNature', () => {
  it('steady: all the power in a line', () => {
    const found = natureAt(12.3, tone(12.3, 0.3));
    expect(found.kind).toBe('steady');
    expect(found.envelopeVariation).toBeLessThan(0.05);
    expect(found.lineShare).toBeCloseTo(1, 2);
  });

  it.each([1, 2, 3, 4])(
    'random: the envelope of a resonance varies by about 0.52 (Rayleigh; seed %i)',
    (seed) => {
      const mode = randomAt(12, 0.02, 0.3, seed);
      const found = natureAt(12, (t) => [0, 0, mode.at(Math.max(0, t))]);
      expect(found.kind).toBe('random');
      expect(found.envelopeVariation).toBeGreaterThan(0.38);
      expect(found.envelopeVariation).toBeLessThan(0.66);
    },
  );

  it.each([
    ['in its own direction', [0, 0, 1]],
    ['across it', [1, 0, 0]],
  ] as const)('mixed: a line over a resonance of 30 %% of its rms, %s', (_, d) => {
    const mode = randomAt(12.2, 0.02, (0.3 * 0.3) / Math.SQRT2, 7);
    const found = natureAt(12, (t) => {
      const v = mode.at(Math.max(0, t));
      const line = tone(12, 0.3)(t)[2];
      return [v * d[0], v * d[1], line + v * d[2]];
    });
    expect(found.kind).toBe('mixed');
  });

  it('weak: a band that a stronger neighbour leaves no room for', () => {
    const mode = randomAt(12, 0.02, 0.3, 5);
    const { grid } = conditioned(steadyRecording((t) => [0, 0, mode.at(Math.max(0, t))], { durationS: 60 }));
    expect(bandNature(bandSource(grid), lineSpectrum(grid), 13.2, 0.1).kind).toBe('weak');
  });
});
