import { describe, expect, it } from 'vitest';
import type { Source } from '../../../src/core/model/source.ts';
import { assetVerdict, currentReadings } from '../../../src/core/survey/asset.ts';
import type { AssetReading } from '../../../src/core/survey/asset-reading.ts';
import { assetSentence, nextStepSentence } from '../../../src/text/assets.ts';
import { analysisOf, modeAt, toneAt } from '../../support/survey-analysis.ts';

const tap = (
  id: string,
  spot: string,
  hz: readonly number[],
  part: Partial<AssetReading> = {},
): AssetReading => ({
  id,
  spot,
  recordedAt: '2031-05-01T08:00:00Z',
  analysis: analysisOf('tap', { modes: hz.map((frequencyHz) => modeAt(frequencyHz, 0.02)) }),
  circumstances: { machineState: 'off', direction: 'across' },
  ...part,
});
const fan: Source = { name: 'fan', kind: 'machine', speedRpm: 1200, orders: [1], toleranceRatio: 0.003 };
const spots = ['left', 'middle', 'right'].map((id) => ({ id, name: `Spot ${id}` }));

describe('an asset', () => {
  it('is coincident when any of its spots is, and says which reading shows it', () => {
    const verdict = assetVerdict([tap('r1', 'left', [9]), tap('r2', 'middle', [9.05, 20])], [fan], spots);
    expect(verdict.pairs[0]).toMatchObject({ verdict: 'coincident', reading: 'r2' });
    expect(assetSentence(verdict)).toBe('The running speed of fan: coincident. 1 spot has no reading yet.');
  });
  it('says none found near, never clear, and blind only where every reading was blind', () => {
    const seen = assetVerdict([tap('r1', 'left', [9])], [fan], spots);
    expect(seen.pairs[0]).toMatchObject({ verdict: 'none-near' });
    expect(assetSentence(seen)).toBe(
      'No mode found near any source in the readings so far. 2 spots have no reading yet.',
    );
    const narrow = tap('r1', 'left', [9], {
      analysis: analysisOf('tap', { modes: [modeAt(9, 0.02)], recording: { usableBandHz: [0.5, 15] } }),
    });
    expect(assetVerdict([narrow], [fan]).pairs[0]!.verdict).toBe('blind');
    expect(assetVerdict([narrow, tap('r2', 'middle', [9])], [fan]).pairs[0]!.verdict).toBe('none-near');
    const running = { ...tap('r3', 'left', []), analysis: analysisOf('running', { tones: [toneAt(20, 1)] }) };
    expect(assetVerdict([running], [fan]).pairs[0]!.verdict).toBe('not-sought');
  });
  it('pools a mode over its spots with the scatter between them', () => {
    const { modes } = assetVerdict(
      [tap('r1', 'left', [9]), tap('r2', 'middle', [9.3]), tap('r3', 'right', [15])],
      [],
      spots,
    );
    expect(modes).toHaveLength(2);
    expect(modes[0]).toMatchObject({ readings: ['r1', 'r2'], spots: ['left', 'middle'] });
    expect(modes[0]!.frequencyHz).toBeCloseTo(9.15, 1);
    expect(modes[0]!.frequencyBetweenHz).toBeGreaterThan(0.1);
  });
  it('keeps two modes of one reading apart, however near', () => {
    expect(assetVerdict([tap('r1', 'left', [9, 9.4])], [], spots).modes).toHaveLength(2);
  });
  it('counts only the newest reading of a spot, direction and state', () => {
    const old = tap('old', 'left', [20], { recordedAt: '2030-01-01T00:00:00Z' });
    expect(currentReadings([old, tap('new', 'left', [9])]).map(({ id }) => id)).toEqual(['new']);
    expect(
      currentReadings([old, tap('along', 'left', [9], { circumstances: { direction: 'along' } })]),
    ).toHaveLength(2);
  });
  it('says where to tap next, most useful first', () => {
    const poor = tap('r1', 'left', [9], {
      analysis: analysisOf('tap', { modes: [modeAt(9, 0.02, { doubts: ['poor-fit'] })] }),
    });
    const steps = assetVerdict([poor], [fan], spots).next;
    expect(steps.map(({ kind, spot }) => [kind, spot])).toEqual([
      ['repeat-poor', 'left'],
      ['read-spot', 'middle'],
      ['read-spot', 'right'],
      ['other-direction', 'left'],
      ['read-running', undefined],
    ]);
    expect(nextStepSentence(steps[1]!, 'Spot middle')).toBe(
      'Spot middle: Take a reading at this spot: it has none yet.',
    );
    expect(assetVerdict([], [], []).next.map(({ kind }) => kind)).toEqual(['tap-first', 'add-spot']);
    const running = { ...tap('r3', 'left', []), analysis: analysisOf('running', { tones: [toneAt(20, 1)] }) };
    expect(assetVerdict([running], [fan], spots).next[0]!.kind).toBe('tap-stopped');
  });
  it('asks for more where the uncertainty leaves the verdict open', () => {
    const wide = tap('r1', 'left', [], {
      analysis: analysisOf('tap', {
        modes: [modeAt(18.5, 0.02, { fold: { verdict: 'undecided', candidatesHz: [18.5, 41.5] } })],
      }),
      circumstances: { machineState: 'running' },
    });
    const verdict = assetVerdict([wide], [{ ...fan, speedRpm: 1110 }], spots);
    expect(verdict.pairs[0]!.verdict).toBe('undecided');
    expect(verdict.next[0]).toEqual({ kind: 'settle-undecided', reading: 'r1', spot: 'left' });
  });
  it('is trusted as its worst deciding reading', () => {
    expect(assetVerdict([], [fan], spots).trust).toBe('poor');
    expect(assetVerdict([tap('r1', 'left', [20])], [fan], spots).trust).toBe('good');
  });
});
