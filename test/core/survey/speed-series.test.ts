import { describe, expect, it } from 'vitest';
import { unbalanceResponse } from '../../../src/core/survey/amplification.ts';
import { speedSeries, type SpeedReading } from '../../../src/core/survey/speed-series.ts';
import { speedSeriesSentence } from '../../../src/text/assets.ts';
import { analysisOf, toneAt, valueOf } from '../../support/survey-analysis.ts';

/** A machine with unbalance on a mode at 20 Hz, damping 3 %: acceleration of the line at each speed. */
const readings = (speedsRpm: readonly number[]): SpeedReading[] =>
  speedsRpm.map((speedRpm) => {
    const hz = speedRpm / 60;
    const displacement = unbalanceResponse(hz / 20, 0.03);
    return { speedRpm, analysis: analysisOf('running', { tones: [toneAt(hz, displacement * hz ** 2)] }) };
  });

describe('speed series', () => {
  it('proves a resonance by a peak with two sides', () => {
    const series = valueOf(speedSeries(readings([1500, 900, 1050, 1200, 1350])));
    expect(series).toMatchObject({ finding: 'resonance', peakRpm: [1050, 1350] });
    expect(series.peakHz).toEqual([17.5, 22.5]);
    expect(series.points.map(({ speedRpm }) => speedRpm)).toEqual([900, 1050, 1200, 1350, 1500]);
    expect(speedSeriesSentence(series)).toBe(
      'The response peaks between 1050 and 1350 r/min (17.5 to 22.5 Hz) and falls on both sides: a resonance.',
    );
  });
  it('does not take the rise of unbalance with speed for a resonance', () => {
    const far = [240, 300, 360, 420].map((speedRpm) => {
      const hz = speedRpm / 60;
      return { speedRpm, analysis: analysisOf('running', { tones: [toneAt(hz, hz ** 4)] }) };
    });
    expect(valueOf(speedSeries(far)).finding).toBe('flat');
  });
  it('says when the peak lies beyond the speeds taken', () => {
    expect(valueOf(speedSeries(readings([700, 850, 1000, 1150]))).finding).toBe('rising');
    expect(valueOf(speedSeries(readings([1250, 1400, 1550, 1700]))).finding).toBe('falling');
  });
  it('needs four speeds at which the line was found, unfolded', () => {
    const folded = readings([900, 1050, 1200]).concat(readings([2400]));
    expect(speedSeries(folded)).toMatchObject({
      ok: false,
      problem: { code: 'too-few-readings', facts: { count: 3, needed: 4 } },
    });
  });
  it('names the speeds at which the line was not found', () => {
    const silent = { speedRpm: 1100, analysis: analysisOf('running') };
    expect(valueOf(speedSeries([...readings([900, 1050, 1200, 1350]), silent])).missingRpm).toEqual([1100]);
  });
});
