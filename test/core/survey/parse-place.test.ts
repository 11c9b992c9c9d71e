import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { judge } from '../../../src/core/survey/judge.ts';
import { parsePlace } from '../../../src/core/survey/parse-place.ts';
import { analysisOf, levelsOf } from '../../support/survey-analysis.ts';

describe('a spot as stored', () => {
  it('is read with what it holds', () => {
    const machine = { type: 'pump', ratedPowerW: 45e3, support: 'rigid', pumpCategory: 2, speedRpm: 1480 };
    expect(parsePlace({ kind: 'bearing-housing', name: 'B1', asset: 'asset:1', machine })).toEqual({
      kind: 'bearing-housing',
      machine,
    });
    expect(parsePlace({ kind: 'floor', floorUse: 'office', presumedLoading: false })).toEqual({
      kind: 'floor',
      floorUse: 'office',
      presumedLoading: false,
    });
  });
  it('leaves out what cannot be understood', () => {
    expect(parsePlace({ kind: 'rocket', machine: { ratedPowerW: '45', support: 7 }, building: 1 })).toEqual({
      kind: 'other',
    });
    expect(parsePlace(undefined)).toEqual({ kind: 'other' });
  });
  it('is judged whatever it holds, with finite numbers', () => {
    const analysis = analysisOf('running', {
      levels: levelsOf({
        velocityRmsFrom10HzMps: 0.003,
        weightedVerticalRmsMps2: 0.1,
        verticalPeakMps2: 1,
        equivalentSinePeakMps2: 0.1,
      }),
    });
    const kind = fc.constantFrom(
      'bearing-housing',
      'floor',
      'footbridge',
      'foundation',
      'top-floor',
      'stair',
      3,
    );
    fc.assert(
      fc.property(
        fc.record({
          kind,
          machine: fc.object(),
          building: fc.anything(),
          floorUse: fc.constantFrom('office', 'mall', null, {}),
        }),
        (fields) => {
          for (const { value } of judge(analysis, [], {}, { place: parsePlace(fields) }).levels)
            expect(Number.isFinite(value ?? 0)).toBe(true);
        },
      ),
    );
  });
});
