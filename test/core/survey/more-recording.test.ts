import { describe, it, expect } from 'vitest';
import type { Analysis } from '../../../src/core/model/analysis.ts';
import { moreToHalve } from '../../../src/core/survey/more-recording.ts';
import { sampleAnalysis } from '../../support/reading-draft.ts';

const analysis = (over: Partial<Analysis>): Analysis => ({
  ...sampleAnalysis(),
  recording: { ...sampleAnalysis().recording, durationS: 100 },
  ...over,
});
const tone: Analysis['tones'][number] = {
  frequencyHz: 16,
  frequencySdHz: 0.01,
  amplitudeMps2: 1,
  amplitudeSdMps2: 0.1,
  direction: [0, 0, 1],
  nature: 'forced',
  fold: { verdict: 'direct', candidatesHz: [16] },
};

describe('moreToHalve', () => {
  it('wants four times the taps: the spread of a mean of n falls with the root of n', () => {
    expect(moreToHalve(analysis({}))).toEqual({ kind: 'taps', extraTapCount: 9 });
  });

  it('wants four times the length under random excitation', () => {
    expect(moreToHalve(analysis({ procedure: 'ambient' }))).toEqual({ kind: 'seconds', extraS: 300 });
  });

  it('wants 2^(2/3) times the length for a line (Rife & Boorstyn 1974), rounded up to 10 s', () => {
    expect(moreToHalve(analysis({ procedure: 'running', tones: [tone] }))).toEqual({
      kind: 'seconds',
      extraS: 60,
    });
    expect(1.6 ** 1.5).toBeGreaterThan(2);
  });

  it('has nothing to suggest for a pass, or where nothing was found', () => {
    expect(moreToHalve(analysis({ procedure: 'coastdown' }))).toBeUndefined();
    expect(moreToHalve(analysis({ modes: [] }))).toBeUndefined();
    expect(moreToHalve(analysis({ procedure: 'running' }))).toBeUndefined();
  });
});
