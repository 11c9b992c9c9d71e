import { describe, expect, it } from 'vitest';
import type { Levels } from '../../../src/core/model/analysis.ts';
import type { LevelFinding } from '../../../src/core/model/judgement.ts';
import type { Place } from '../../../src/core/model/place.ts';
import {
  BS_7385_2,
  DIN_4150_3_FOUNDATION,
  DIN_4150_3_LONG_TERM_MPS,
  DIN_4150_3_TOP_FLOOR_MPS,
  guideValueMps,
} from '../../../src/core/survey/criteria/buildings.ts';
import { FOOTBRIDGES } from '../../../src/core/survey/criteria/footbridges.ts';
import { graded } from '../../../src/core/survey/criteria/grading.ts';
import {
  ISO_10816_1,
  ISO_10816_7,
  ISO_20816_3,
  tableFor,
} from '../../../src/core/survey/criteria/machines.ts';
import { baseCurveMps2, comfortWords } from '../../../src/core/survey/criteria/people.ts';
import { levelFindings } from '../../../src/core/survey/level-findings.ts';
import { analysisOf, levelsOf, toneAt } from '../../support/survey-analysis.ts';

const mmps = (values: readonly number[]) => values.map((value) => Number((1000 * value).toFixed(3)));
const um = (values: readonly number[] = []) => values.map((value) => Math.round(1e6 * value));

describe('zone tables, cell by cell', () => {
  it('of ISO 20816-3:2022 / ISO 10816-3:2009 Annex A', () => {
    expect(mmps(ISO_20816_3[1].rigid.velocityMps)).toEqual([2.3, 4.5, 7.1]);
    expect(mmps(ISO_20816_3[1].flexible.velocityMps)).toEqual([3.5, 7.1, 11]);
    expect(mmps(ISO_20816_3[2].rigid.velocityMps)).toEqual([1.4, 2.8, 4.5]);
    expect(mmps(ISO_20816_3[2].flexible.velocityMps)).toEqual([2.3, 4.5, 7.1]);
    expect(um(ISO_20816_3[1].rigid.displacementM)).toEqual([29, 57, 90]);
    expect(um(ISO_20816_3[1].flexible.displacementM)).toEqual([45, 90, 140]);
    expect(um(ISO_20816_3[2].rigid.displacementM)).toEqual([22, 45, 71]);
    expect(um(ISO_20816_3[2].flexible.displacementM)).toEqual([37, 71, 113]);
  });
  it('of ISO 10816-1 Annex B / ISO 2372', () => {
    expect(mmps(ISO_10816_1.I.velocityMps)).toEqual([0.71, 1.8, 4.5]);
    expect(mmps(ISO_10816_1.II.velocityMps)).toEqual([1.12, 2.8, 7.1]);
    expect(mmps(ISO_10816_1.III.velocityMps)).toEqual([1.8, 4.5, 11.2]);
    expect(mmps(ISO_10816_1.IV.velocityMps)).toEqual([2.8, 7.1, 18]);
  });
  it('of ISO 10816-7 (one page, and from memory .9)', () => {
    expect(ISO_10816_7[1].map((table) => mmps(table.velocityMps))).toEqual([
      [2.5, 4, 6.6],
      [3.5, 5, 7.6],
    ]);
    expect(ISO_10816_7[2].map((table) => mmps(table.velocityMps))).toEqual([
      [3.2, 5.1, 8.5],
      [4.2, 6.1, 9.5],
    ]);
  });
  it('of DIN 4150-3:2016 Table 1, top floor and long-term', () => {
    const at = (use: 'commercial' | 'dwelling' | 'sensitive') =>
      mmps([1, 10, 50, 100, 120].map((hz) => guideValueMps(DIN_4150_3_FOUNDATION[use], hz)));
    expect(at('commercial')).toEqual([20, 20, 40, 50, 50]);
    expect(at('dwelling')).toEqual([5, 5, 15, 20, 20]);
    expect(at('sensitive')).toEqual([3, 3, 8, 10, 10]);
    expect(mmps(Object.values(DIN_4150_3_TOP_FLOOR_MPS))).toEqual([40, 15, 8]);
    expect(mmps(Object.values(DIN_4150_3_LONG_TERM_MPS))).toEqual([10, 5, 2.5]);
    expect(mmps([guideValueMps(DIN_4150_3_FOUNDATION.dwelling, 35)])).toEqual([11.25]);
  });
  it('of BS 7385-2:1993 Table 1', () => {
    expect(mmps([4, 15, 40, 100].map((hz) => guideValueMps(BS_7385_2.light, hz)))).toEqual([15, 20, 50, 50]);
    expect(mmps([4, 100].map((hz) => guideValueMps(BS_7385_2.framed, hz)))).toEqual([50, 50]);
  });
  it('of EN 1990 A2.4.3.2, HIVOSS and Setra (the last from memory, flagged)', () => {
    const table = Object.fromEntries(FOOTBRIDGES.map(({ criterion, scale }) => [criterion, scale]));
    expect(table['en-1990']!.vertical.boundaries).toEqual([0.7]);
    expect(table['en-1990']!.horizontal.boundaries).toEqual([0.2]);
    expect(table['hivoss']!.vertical.boundaries).toEqual([0.5, 1, 2.5]);
    expect(table['hivoss']!.horizontal.boundaries).toEqual([0.1, 0.3, 0.8]);
    expect(table['setra']!.horizontal.boundaries).toEqual([0.15, 0.3, 0.8]);
    expect(FOOTBRIDGES.map(({ certain }) => certain.vertical)).toEqual([true, true, false]);
  });
  it('of ISO 2631-1 comfort words, which overlap by design', () => {
    expect([0.2, 0.4, 0.55, 0.7, 0.9, 1.3, 1.8, 2.2, 3].map(comfortWords)).toEqual([
      'not uncomfortable',
      'a little uncomfortable',
      'a little uncomfortable to fairly uncomfortable',
      'fairly uncomfortable',
      'fairly uncomfortable to uncomfortable',
      'uncomfortable to very uncomfortable',
      'very uncomfortable',
      'very uncomfortable to extremely uncomfortable',
      'extremely uncomfortable',
    ]);
  });
  it('of the base curve (ISO 10137:2007 Annex C, BS 6472:1992), continuous at its corners', () => {
    expect([1, 4, 6, 8, 16].map(baseCurveMps2)).toEqual(
      [0.01, 0.005, 0.005, 0.005, 0.01].map((v) => expect.closeTo(v, 9)),
    );
  });
});

const whole = { bandHz: [0.1, 2000] as const };
const find = (
  place: Place,
  levels: Partial<Levels>,
  criterion: string,
  procedure: 'running' | 'ambient' | 'tap' = 'running',
) =>
  levelFindings(analysisOf(procedure, { levels: levelsOf(levels), tones: [toneAt(20, 1)] }), place).find(
    (finding) => finding.criterion === criterion,
  ) as LevelFinding;

const housing: Place = { kind: 'bearing-housing', machine: { ratedPowerW: 45_000, support: 'rigid' } };

describe('machines', () => {
  it('are graded by zone on a bearing housing, with class, source and band', () => {
    const seen = find(housing, { ...whole, velocityRmsFrom10HzMps: 0.003 }, 'iso-20816-3');
    expect(seen).toMatchObject({
      grade: 'within',
      zone: 'C',
      classOf: 'group 2, rigid support',
      beyondLast: false,
      bandHz: [10, 1000],
    });
    expect(find(housing, { ...whole, velocityRmsFrom10HzMps: 0.005 }, 'iso-20816-3')).toMatchObject({
      grade: 'beyond',
      zone: 'D',
      beyondLast: true,
    });
  });
  it('read "at least" or nothing where the phone sees only part of the band, never a pass', () => {
    expect(find(housing, { velocityRmsFrom10HzMps: 0.003 }, 'iso-20816-3')).toMatchObject({
      grade: 'at-least',
      zone: 'C',
      reasons: ['band-partly-seen'],
    });
    expect(find(housing, { velocityRmsFrom10HzMps: 0.001 }, 'iso-20816-3')).toMatchObject({
      grade: 'not-assessed',
      value: 0.001,
    });
    expect(find(housing, { velocityRmsFrom10HzMps: 0.005 }, 'iso-20816-3')).toMatchObject({
      grade: 'at-least',
      zone: 'D',
      beyondLast: true,
    });
  });
  it('go by the lines above 10 Hz when that is all there is: a lower bound, without what sways below', () => {
    // Two lines along a slanting direction, and a sway at 2 Hz that alone would be 56 mm/s.
    const lines = [
      toneAt(2, 1),
      toneAt(25, 1, { direction: [0.6, 0, 0.8] }),
      toneAt(20, 0.5, { direction: [0.6, 0, 0.8] }),
    ];
    const [finding] = levelFindings(
      analysisOf('running', { levels: levelsOf({ bandHz: [0.1, 2000] }), tones: lines }),
      housing,
    );
    const axis = Math.hypot(0.8 / (2 * Math.PI * 25), 0.4 / (2 * Math.PI * 20)) / Math.SQRT2;
    expect(finding).toMatchObject({ grade: 'at-least', zone: 'C', reasons: ['lines-only'] });
    expect(finding!.value).toBeCloseTo(axis, 9);
    const none = levelFindings(analysisOf('running', { levels: levelsOf(), tones: [toneAt(2, 1)] }), housing);
    expect(none[0]).toMatchObject({ grade: 'not-assessed', reasons: ['no-value'] });
  });
  it('apply nowhere but on a bearing housing', () => {
    expect(
      levelFindings(analysisOf('running', { levels: levelsOf({ velocityRmsFrom10HzMps: 0.02 }) }), {
        kind: 'machine-base',
      }),
    ).toEqual([]);
  });
  it('ask for the class when it is not known', () => {
    expect(find({ kind: 'bearing-housing' }, { velocityRmsFrom10HzMps: 0.02 }, 'iso-20816-3')).toMatchObject({
      grade: 'not-assessed',
      reasons: ['class-unknown'],
    });
  });
  it('need the band from 2 Hz below 600 r/min', () => {
    const slow: Place = { kind: 'bearing-housing', machine: { ...housing.machine, speedRpm: 480 } };
    expect(find(slow, { ...whole, velocityRmsFrom10HzMps: 0.001 }, 'iso-20816-3').bandHz).toEqual([2, 1000]);
  });
  it('choose group by power, small machines and pumps their own table', () => {
    expect(tableFor({ ratedPowerW: 500_000, support: 'flexible' })!.classOf).toBe(
      'group 1, flexible support',
    );
    expect(tableFor({ ratedPowerW: 300_000, support: 'flexible' })!.classOf).toBe(
      'group 2, flexible support',
    );
    expect(tableFor({ ratedPowerW: 11_000 })!.criterion).toBe('iso-10816-1');
    expect(tableFor({ type: 'pump', pumpCategory: 2, ratedPowerW: 250_000 })!.table).toBe(ISO_10816_7[2][1]);
    expect(tableFor({ ratedPowerW: 50_000 })).toBeUndefined();
  });
  it('say that folded tones were left out', () => {
    expect(
      find(housing, { ...whole, velocityRmsFrom10HzMps: 0.003, leftOutTones: true }, 'iso-20816-3'),
    ).toMatchObject({
      grade: 'at-least',
      reasons: ['folded-left-out'],
    });
  });
});

describe('buildings', () => {
  const foundation: Place = { kind: 'foundation', building: 'dwelling' };
  it('are held at the dominant frequency of the velocity', () => {
    // 20 Hz: 7.5 mm/s in line 2; half the 28 % point of BS 7385-2 for steady running.
    const din = find(foundation, { ...whole, largestAxisVelocityPeakMps: 0.008 }, 'din-4150-3');
    expect(din).toMatchObject({ grade: 'beyond', limit: expect.closeTo(0.0075, 9) as number });
    const bs = find(foundation, { ...whole, largestAxisVelocityPeakMps: 0.008 }, 'bs-7385-2');
    expect(bs).toMatchObject({ grade: 'within', limit: expect.closeTo(0.013, 9) as number });
  });
  it('use the long-term values on a top floor beside a running machine', () => {
    const top: Place = { kind: 'top-floor', building: 'sensitive' };
    expect(find(top, { ...whole, horizontalVelocityPeakMps: 0.003 }, 'din-4150-3-long-term')).toMatchObject({
      grade: 'beyond',
    });
    expect(find(top, { ...whole, horizontalVelocityPeakMps: 0.003 }, 'din-4150-3', 'ambient')).toMatchObject({
      grade: 'within',
    });
  });
  it('are not assessed without a class, a value or a frequency', () => {
    expect(find({ kind: 'foundation' }, { largestAxisVelocityPeakMps: 1 }, 'din-4150-3').reasons).toEqual([
      'class-unknown',
    ]);
    expect(find(foundation, {}, 'din-4150-3').reasons).toContain('no-value');
    const silent = levelFindings(
      analysisOf('ambient', { levels: levelsOf({ largestAxisVelocityPeakMps: 1 }) }),
      foundation,
    );
    expect(silent[0]!.reasons).toEqual(['no-dominant-frequency']);
  });
});

describe('people', () => {
  it('get comfort words from the vector sum of the weighted axes', () => {
    const comfort = find(
      { kind: 'stair' },
      { ...whole, weightedVerticalRmsMps2: 0.3, weightedHorizontalRmsMps2: 0.4 },
      'iso-2631-1',
    );
    expect(comfort).toMatchObject({
      value: 0.5,
      grade: 'within',
      zone: 'a little uncomfortable to fairly uncomfortable',
    });
  });
  it('are told when shocks make the rms too mild', () => {
    const shocks = find(
      { kind: 'stair' },
      { ...whole, weightedVerticalRmsMps2: 0.2, crestFactorRatio: 12 },
      'iso-2631-1',
    );
    expect(shocks).toMatchObject({ grade: 'not-assessed', reasons: ['crest-factor'] });
  });
  it('get no acceleration measure when folded tones are in it', () => {
    const comfort = find(
      { kind: 'stair' },
      { ...whole, weightedVerticalRmsMps2: 3, leftOutTones: true },
      'iso-2631-1',
    );
    expect(comfort).toMatchObject({
      grade: 'not-assessed',
      reasons: ['folded-in-acceleration'],
      beyondLast: false,
    });
  });
  const office: Place = { kind: 'floor', floorUse: 'office', presumedLoading: true };
  it('on an office floor: AISC 0.5 % of gravity by the equivalent sine, response factor 4 flagged', () => {
    const levels = { equivalentSinePeakMps2: 0.04, weightedVerticalRmsMps2: 0.03 };
    expect(find(office, levels, 'aisc-dg11')).toMatchObject({
      grade: 'within',
      limit: expect.closeTo(0.049, 3) as number,
      bandHz: [1, 20],
    });
    expect(find(office, levels, 'iso-10137')).toMatchObject({
      certain: false,
      value: 6,
      limit: 4,
      grade: 'at-least',
      beyondLast: true,
    });
  });
  it('fall back on the running rms for the equivalent sine', () => {
    expect(find(office, { runningRmsMaxMps2: 0.03 }, 'aisc-dg11').value).toBeCloseTo(0.0424, 4);
  });
  it('on a footbridge: no pass without the crowd that the class presumes', () => {
    const levels = { verticalPeakMps2: 0.6, horizontalPeakMps2: 0.05, bandHz: [0.25, 28] as const };
    expect(find({ kind: 'footbridge' }, levels, 'en-1990', 'ambient')).toMatchObject({
      grade: 'not-assessed',
      reasons: ['loading-not-presumed'],
    });
    expect(find({ kind: 'footbridge', presumedLoading: true }, levels, 'en-1990', 'ambient')).toMatchObject({
      grade: 'within',
      zone: 'within',
    });
    const loud = { ...levels, verticalPeakMps2: 0.9 };
    expect(find({ kind: 'footbridge', presumedLoading: true }, loud, 'en-1990', 'ambient')).toMatchObject({
      grade: 'beyond',
      reasons: ['wider-band'],
    });
    // The phone misses the slowest lateral motion and holds what lies above: no bound of either kind.
    const lateral = levelFindings(
      analysisOf('ambient', { levels: levelsOf({ horizontalPeakMps2: 0.9, bandHz: [0.5, 28] }) }),
      { kind: 'footbridge', presumedLoading: true },
    ).find(({ measure }) => measure === 'acceleration-peak-horizontal');
    expect(lateral).toMatchObject({
      grade: 'not-assessed',
      beyondLast: false,
      reasons: ['band-partly-seen', 'wider-band'],
    });
    expect(find({ kind: 'footbridge' }, levels, 'hivoss', 'ambient')).toMatchObject({
      grade: 'at-least',
      zone: 'CL2',
    });
  });
});

describe('levels as such', () => {
  it('are given for running and ambient readings only: a tap measures the inspector’s hand', () => {
    for (const procedure of ['tap', 'coastdown'] as const)
      expect(
        levelFindings(analysisOf(procedure, { levels: levelsOf({ velocityRmsMps: 1 }) }), housing),
      ).toEqual([]);
  });
  it('have no criterion without a spot, on a rail or on a pipe', () => {
    const analysis = analysisOf('running', { levels: levelsOf() });
    expect(levelFindings(analysis, undefined)).toEqual([]);
    for (const kind of ['handrail', 'pipe', 'fan-frame', 'other'] as const)
      expect(levelFindings(analysis, { kind })).toEqual([]);
  });
  it('put a value on the boundary below it', () => {
    const on = graded(
      {
        criterion: 'en-1990',
        measure: 'acceleration-peak-vertical',
        unit: 'm/s²',
        origin: '',
        certain: true,
        bandHz: [1, 5],
      },
      { boundaries: [1], zones: ['within', 'beyond'] },
      { value: 1, seenHz: [1, 5], leftOutTones: false, falseTones: false },
    );
    expect(on.grade).toBe('within');
  });
});
