import { describe, expect, it } from 'vitest';
import { analyse } from '../../../../src/core/analyse.ts';
import type { Mode } from '../../../../src/core/model/analysis.ts';
import { withoutPollingGhosts } from '../../../../src/core/modes/tap/polled-modes.ts';
import { polledRecording } from '../../../support/polled-recording.ts';

/** Free decays of one mode after five taps. */
const rung =
  (frequencyHz: number, dampingRatio: number) =>
  (t: number): readonly [number, number, number] => {
    const w = 2 * Math.PI * frequencyHz;
    const m = [2, 8, 14, 20, 26].reduce(
      (sum, tap) =>
        t < tap ? sum : sum + 2 * Math.exp(-dampingRatio * w * (t - tap)) * Math.sin(w * (t - tap)),
      0,
    );
    return [0.48 * m, 0.6 * m, 0.64 * m];
  };

describe('withoutPollingGhosts', () => {
  it.each([2.3, 3.66, 5.48])(
    'leaves the one mode of a 50 Hz sensor polled at 60 Hz, %d Hz',
    (frequencyHz) => {
      const recording = polledRecording(rung(frequencyHz, 0.013), {
        sensorHz: 49.8,
        durationS: 34,
        stepMps2: 0.1,
        noiseMps2: 0.015,
      });
      const outcome = analyse(recording, { procedure: 'tap', timing: 'auto' });
      if (!outcome.ok) throw new Error(outcome.problem.code);
      const { modes, doubts, trust } = outcome.value.analysis;
      expect(modes).toHaveLength(1);
      expect(Math.abs(modes[0]!.frequencyHz / frequencyHz - 1)).toBeLessThan(2e-3);
      expect(doubts.map(({ code }) => code)).toContain('polled');
      expect(trust).not.toBe('good');
    },
  );

  it('keeps modes that only lie where images would', () => {
    const mode = (frequencyHz: number, dampingRatio: number, amplitudeMps2: number): Mode =>
      ({
        frequencyHz,
        dampingRatio,
        amplitudeMps2,
        doubts: [],
        fold: { verdict: 'direct', candidatesHz: [] },
      }) as unknown as Mode;
    expect(
      withoutPollingGhosts([mode(2.3, 0.01, 1), mode(12.5, 0.01, 0.5), mode(7.9, 0.01, 0.4)], 60),
    ).toBeUndefined();
    expect(withoutPollingGhosts([mode(2.3, 0.01, 1), mode(12.5, 0.01, 0.05)], 60)).toBeUndefined();
  });
});
