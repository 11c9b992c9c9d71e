import { describe, expect, it } from 'vitest';
import type { Source } from '../../../src/core/model/source.ts';
import { forcingsOf } from '../../../src/core/survey/forcings.ts';
import { toneMatches, toneOrigins } from '../../../src/core/survey/tone-matches.ts';
import { analysisOf, toneAt, valueOf } from '../../support/survey-analysis.ts';

const open = (frequencyHz: number) => ({
  fold: { verdict: 'undecided' as const, candidatesHz: [frequencyHz, 60 - frequencyHz] },
});
const matchesOf = (tones: ReturnType<typeof toneAt>[], sources: readonly Source[]) =>
  toneMatches(analysisOf('running', { tones }), valueOf(forcingsOf(sources)));

describe('tones against forcings', () => {
  const pump: Source = { name: 'pump', kind: 'machine', speedRpm: 1480, knownBy: 'tachometer' };
  it('match directly, and through a folded image above half the rate', () => {
    // 1480 r/min: 24.67 Hz; twice that, 49.33 Hz, shows at 10.67 Hz when sampled at 60 Hz.
    const [first, second] = matchesOf([toneAt(24.66, 1), toneAt(10.67, 0.2, open(10.67))], [pump]);
    expect(first).toMatchObject({ folded: false, forcing: { label: '1×' } });
    expect(second).toMatchObject({ folded: true, forcing: { label: '2×' } });
  });
  it('match no image when the line is known to be direct, and no direct one when it is folded', () => {
    expect(matchesOf([toneAt(10.67, 0.2)], [pump])[0]!.forcing).toBeUndefined();
    const folded = toneAt(24.66, 1, { fold: { verdict: 'folded', candidatesHz: [35.34] } });
    expect(matchesOf([folded], [pump])[0]!.forcing).toBeUndefined();
  });
  it('name what nothing explains', () => {
    expect(matchesOf([toneAt(7.3, 1)], [pump])).toEqual([{ toneIndex: 0, folded: false }]);
    expect(matchesOf([toneAt(7.3, 1)], [])).toEqual([{ toneIndex: 0, folded: false }]);
  });
  it('prefer the narrow explanation to the wide one', () => {
    const [match] = matchesOf([toneAt(24.7, 1)], [{ name: 'rail', kind: 'traffic', traffic: 'rail' }, pump]);
    expect(match!.forcing!.source).toBe('pump');
  });
  it('tell twin pumps apart: 1485 and 1479 r/min by tachometer are 0.1 Hz apart', () => {
    const twins: Source[] = [
      { name: 'pump A', kind: 'machine', speedRpm: 1485, toleranceRatio: 0.0005 },
      { name: 'pump B', kind: 'machine', speedRpm: 1479, toleranceRatio: 0.0005 },
    ];
    const [a, b] = matchesOf([toneAt(24.75, 1), toneAt(24.65, 0.8)], twins);
    expect([a!.forcing!.source, b!.forcing!.source]).toEqual(['pump A', 'pump B']);
  });
});

describe('machine running against machine off', () => {
  it('tells whose vibration a tone is', () => {
    const running = analysisOf('running', { tones: [toneAt(24.7, 1), toneAt(16.6, 0.5), toneAt(8.2, 0.4)] });
    const off = analysisOf('running', { tones: [toneAt(16.62, 0.49), toneAt(8.2, 0.2)] });
    expect(toneOrigins(running, off).map(({ whose }) => whose)).toEqual(['machine', 'elsewhere', 'both']);
    expect(toneOrigins(running, off)[2]!.remainingRatio).toBeCloseTo(0.5, 9);
  });

  it('looks for a folded image where the other sampling rate puts it', () => {
    // 49.4 Hz shows at 10.6 Hz when sampled at 60 Hz, at 0.6 Hz when sampled at 50 Hz.
    const folded = { fold: { verdict: 'folded' as const, candidatesHz: [49.4] } };
    const running = analysisOf('running', { tones: [toneAt(10.6, 1, folded)] });
    const slower = { rateHz: 50, usableBandHz: [0.3, 24] as const };
    const still = analysisOf('running', { tones: [toneAt(0.6, 0.95, folded)], recording: slower });
    const gone = analysisOf('running', { tones: [toneAt(10.6, 0.95)], recording: slower });
    expect(toneOrigins(running, still)[0]!.whose).toBe('elsewhere');
    expect(toneOrigins(running, gone)[0]!.whose).toBe('machine');
  });

  it('does not call gone what the other reading could not have shown', () => {
    const running = analysisOf('running', { tones: [toneAt(24.7, 1), toneAt(10, 0.004)] });
    const blind = analysisOf('running', { recording: { usableBandHz: [0.5, 20] } });
    expect(toneOrigins(running, blind).map(({ whose }) => whose)).toEqual(['unknown', 'unknown']);
    // A fifth of 0.004 m/s² is below what 0.002 m/s²/root Hz leave to be told in 60 s (0.001 m/s²).
    expect(toneOrigins(running, analysisOf('running'))[1]!.whose).toBe('unknown');
  });
});
