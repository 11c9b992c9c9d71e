import { describe, expect, it } from 'vitest';
import { findPeaks, lineSpectrum, peakThreshold } from '../../../src/core/modes/line-search.ts';
import { conditioned } from '../../support/conditioned.ts';
import { steadyRecording, still, tone } from '../../support/steady-recording.ts';

const spectrumOf = (motion: Parameters<typeof steadyRecording>[0], seed = 1) =>
  lineSpectrum(
    conditioned(steadyRecording(motion, { durationS: 60, noiseMps2: 0.02, jitterS: 0.001, seed })).grid,
  );

describe('lineSpectrum', () => {
  it('is one where there is only noise, whatever its level', () => {
    const { height, floorPerHz } = spectrumOf(still);
    const inner = height.slice(100, -200);
    expect(inner.reduce((s, v) => s + v, 0) / inner.length).toBeCloseTo(1, 1);
    // White noise, one-sided: 2·sigma²/rate.
    expect(floorPerHz[0]![600]! / ((2 * 0.02 ** 2) / 60)).toBeCloseTo(1, 0);
  });
});

describe('findPeaks', () => {
  it('finds a line of a tenth of the noise in a minute', () => {
    // Study, section 8: at 0.02 m/s² noise a tone of 0.007 is found; 0.004 is well above the threshold in power here.
    const peaks = findPeaks(spectrumOf(tone(17.3, 0.007)), [0.3, 29]);
    expect(peaks[0]!.frequencyHz).toBeCloseTo(17.3, 1);
  });

  it.each([1, 2, 3, 4, 5, 6, 7, 8])('finds nothing in noise (seed %i)', (seed) => {
    expect(findPeaks(spectrumOf(still, seed), [0.5, 28])).toEqual([]);
  });

  it('asks more of a single ordinate than of many', () => {
    expect(peakThreshold(3)).toBeGreaterThan(peakThreshold(30));
    expect(peakThreshold(3000)).toBeCloseTo(1, 0);
  });
});
