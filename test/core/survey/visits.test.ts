import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Circumstances } from '../../../src/core/model/fact.ts';
import { levelRatio, visitChange, type Visit } from '../../../src/core/survey/visits.ts';
import { modePairs } from '../../../src/core/survey/mode-pairs.ts';
import { changeSentence, conditionsSentence } from '../../../src/text/assets.ts';
import { analysisOf, levelsOf, modeAt } from '../../support/survey-analysis.ts';

const visit = (
  id: string,
  frequencyHz: number,
  dampingRatio = 0.01,
  circumstances: Partial<Circumstances> = {},
): Visit => ({
  id,
  recordedAt: `2031-0${id.length}-01`,
  analysis: analysisOf('tap', { modes: [modeAt(frequencyHz, dampingRatio)] }),
  circumstances,
});

describe('visit to visit', () => {
  it('calls nothing changed within what a repeat scatters (2.8 % of frequency, 55 % of damping)', () => {
    const { modes } = visitChange(visit('a', 7.4), visit('bb', 7.55, 0.014));
    expect(modes[0]!.frequency).toMatchObject({ changed: false, floor: 'practice' });
    expect(modes[0]!.damping.changed).toBe(false);
    expect(changeSentence('Frequency', modes[0]!.frequency)).toMatch(
      /^Frequency: no change shown beyond what visits usually scatter; up to \d\.\d % could hide\.$/,
    );
  });
  it('calls changed what lies beyond, with its interval', () => {
    const { frequency, damping } = visitChange(visit('a', 7.4), visit('bb', 6.9, 0.02)).modes[0]!;
    expect(frequency).toMatchObject({ changed: true });
    expect(frequency.interval[1]).toBeLessThan(1);
    expect(damping.changed).toBe(true);
    expect(changeSentence('Frequency', frequency)).toMatch(
      /^Frequency: 6\.8 % lower \(\d\.\d to \d\.\d %\), more than visits usually scatter\.$/,
    );
    expect(changeSentence('Damping', undefined)).toBe('Damping: not found in both.');
  });
  it('uses the spot’s own scatter from five visits on', () => {
    const steady = [7.4, 7.402, 7.398, 7.401, 7.399].map((hz, index) => visit('x'.repeat(index + 1), hz));
    const later = visit('later', 7.32);
    expect(visitChange(steady[4]!, later).modes[0]!.frequency).toMatchObject({
      changed: false,
      floor: 'practice',
    });
    expect(visitChange(steady[4]!, later, steady).modes[0]!.frequency).toMatchObject({
      changed: true,
      floor: 'own',
    });
    expect(visitChange(steady[4]!, later, steady.slice(1)).modes[0]!.frequency.floor).toBe('practice');
  });
  it('puts temperature and conditions beside it', () => {
    const change = visitChange(
      visit('a', 7.4, 0.01, { temperatureC: 4, mounting: 'laid', peopleOnIt: 'none' }),
      visit('bb', 7.2, 0.01, { temperatureC: 21, mounting: 'putty', peopleOnIt: 'none' }),
    );
    expect(change).toMatchObject({ conditions: ['temperatureC', 'mounting'], temperatureDifferenceC: 17 });
    expect(conditionsSentence(change)).toBe('Different this time: 17 °C warmer, how the phone was held.');
    expect(conditionsSentence(visitChange(visit('a', 7), visit('bb', 7)))).toBeUndefined();
  });
  it('names modes lost and new', () => {
    const change = visitChange(visit('a', 7.4), visit('bb', 12));
    expect(change).toMatchObject({ modes: [], lostIndexes: [0], newIndexes: [0] });
  });
  it('never shows more change with more uncertainty', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 0.8, max: 1.25, noNaN: true }),
        fc.double({ min: 0, max: 0.05, noNaN: true }),
        (ratio, spread) => {
          const at = (id: string, hz: number, sd: number): Visit => ({
            ...visit(id, hz),
            analysis: analysisOf('tap', { modes: [modeAt(hz, 0.01, { frequencySdHz: sd * hz })] }),
          });
          const sure = visitChange(at('a', 10, 0.001), at('bb', 10 * ratio, 0.001)).modes[0];
          const unsure = visitChange(at('a', 10, 0.001 + spread), at('bb', 10 * ratio, 0.001 + spread))
            .modes[0];
          if (unsure?.frequency.changed) expect(sure!.frequency.changed).toBe(true);
        },
      ),
    );
  });
});

describe('before and after a repair', () => {
  it('gives the ratio of levels, or none where one is missing', () => {
    const at = (velocityRmsMps?: number) =>
      analysisOf('running', velocityRmsMps === undefined ? {} : { levels: levelsOf({ velocityRmsMps }) });
    expect(levelRatio(at(0.006), at(0.0015))).toBeCloseTo(0.25, 9);
    expect(levelRatio(at(0.006), at())).toBeUndefined();
  });
});

describe('same mode in two readings', () => {
  it('is the nearest in frequency, each once, and not across directions', () => {
    expect(modePairs([modeAt(5, 0.01), modeAt(5.4, 0.01)], [modeAt(5.3, 0.01), modeAt(5.1, 0.01)])).toEqual([
      [1, 0],
      [0, 1],
    ]);
    expect(
      modePairs([modeAt(5, 0.01, { verticalShare: 0.95 })], [modeAt(5, 0.01, { verticalShare: 0.05 })]),
    ).toEqual([]);
  });
});
