import { describe, expect, it } from 'vitest';
import type { Source } from '../../../src/core/model/source.ts';
import { foldedForcings, imageBandHz, imageHz } from '../../../src/core/survey/folded-images.ts';
import { forcingsOf } from '../../../src/core/survey/forcings.ts';
import { rectangleStrouhal } from '../../../src/core/survey/wind.ts';
import { valueOf } from '../../support/survey-analysis.ts';

const forcings = (source: Source) => valueOf(forcingsOf([source]));
const table = (source: Source) =>
  Object.fromEntries(
    forcings(source).map(({ label, rangeHz }) => [label, rangeHz.map((hz) => Number(hz.toFixed(4)))]),
  );

describe('forcings of a machine', () => {
  it('are its orders, blades, teeth and firing at the shaft speed in turns per second', () => {
    const fan: Source = {
      name: 'roof fan',
      kind: 'machine',
      speedRpm: 1470,
      bladeCount: 7,
      toothCount: 21,
      cylinders: 4,
    };
    expect(table(fan)).toEqual({
      '1×': [24.5, 24.5],
      '2×': [49, 49],
      'blade pass 7×': [171.5, 171.5],
      'gear mesh 21×': [514.5, 514.5],
      'firing 2×': [49, 49],
    });
  });
  it('are 1× unbalance, others a force; own orders replace the usual ones', () => {
    const kinds = forcings({ name: 'm', kind: 'machine', speedRpm: 600, orders: [0.5, 1, 3] });
    expect(kinds.map(({ order, amplificationKind }) => [order, amplificationKind])).toEqual([
      [0.5, 'force'],
      [1, 'unbalance'],
      [3, 'force'],
    ]);
  });
  it('keep what is visited apart from what is not known', () => {
    const [first] = forcings({
      name: 'd',
      kind: 'machine',
      speedRpm: [600, 1500],
      variableSpeed: true,
      knownBy: 'drive-display',
    });
    expect(first).toMatchObject({
      rangeHz: [10, 25],
      toleranceRatio: 0.01,
      adjustable: true,
      origin: 'drive-display',
    });
    expect(first!.frequencyHz).toEqual([expect.closeTo(9.9, 9), expect.closeTo(25.25, 9)]);
  });
  it('have bearing frequencies that add up: outer plus inner is the number of balls (kinematics)', () => {
    const list = forcings({
      name: 'b',
      kind: 'machine',
      speedRpm: 60,
      bearing: { ballCount: 9, diameterRatio: 0.2034 },
    });
    const at = (role: string) => list.find((forcing) => forcing.role === role)!.order;
    expect(at('bearing-outer') + at('bearing-inner')).toBeCloseTo(9, 12);
    // Case Western Reserve University, 6205: outer race 3.5848 orders.
    expect(at('bearing-outer')).toBeCloseTo(3.5848, 3);
  });
  it('double the firing order of a two-stroke engine', () => {
    const of = (twoStroke: boolean) =>
      table({ name: 'e', kind: 'machine', speedRpm: 1800, cylinders: 4, twoStroke });
    expect(of(true)['firing 4×']).toEqual([120, 120]);
    expect(of(false)['firing 2×']).toEqual([60, 60]);
  });
});

describe('forcings of the mains', () => {
  it('are shaft, pole pass and twice line at a known speed (definition; 4 poles, 50 Hz, 1450 r/min)', () => {
    const list = forcings({
      name: 'motor',
      kind: 'mains',
      supplyHz: 50,
      poles: 4,
      speedRpm: 1450,
      knownBy: 'tachometer',
    });
    expect(list.map(({ label }) => label)).toEqual(['motor 1×', 'pole pass', 'twice line']);
    expect(list[0]!.rangeHz[0]).toBeCloseTo(24.1667, 4);
    // Pole pass 3.333 Hz, with the tachometer's 0.3 % of 1450 r/min in it: 4 × 4.35 / 60 = 0.29 Hz either way.
    expect(list[1]!.rangeHz).toEqual([expect.closeTo(3.3333 - 0.29, 3), expect.closeTo(3.3333 + 0.29, 3)]);
    expect(list[2]!.frequencyHz).toEqual([expect.closeTo(99, 9), expect.closeTo(101, 9)]);
  });
  it('span the typical slip when the speed is not known, and say so', () => {
    const [shaft, pole] = forcings({ name: 'motor', kind: 'mains', supplyHz: 60, poles: 2 });
    expect(shaft!.frequencyHz).toEqual([expect.closeTo(57, 1), expect.closeTo(60, 1)]);
    expect(pole!.rangeHz).toEqual([0, expect.closeTo(6, 9)]);
    expect(shaft!).toMatchObject({ certain: false, origin: 'typical slip of 1 to 5 %' });
  });
});

describe('forcings of people, belt, wind, traffic, bands', () => {
  it('have walking harmonics with the load factors of CCIP-016 (0.4305, 0.0914, 0.0714, 0.065 at 2.0 Hz)', () => {
    const walking = forcings({
      name: 'p',
      kind: 'footfall',
      activity: 'walking',
      paceHz: 2,
      knownBy: 'counted',
    });
    expect(walking.map(({ order }) => order)).toEqual([0.5, 1, 2, 3, 4]);
    expect(walking.slice(1).map(({ loadFactorRatio }) => loadFactorRatio![0])).toEqual(
      [0.4305, 0.0914, 0.0714, 0.065].map((value) => expect.closeTo(value, 4)),
    );
    expect(walking[1]).toMatchObject({ certain: true, origin: 'pace: counted; load: CCIP-016' });
  });
  it('use the published pace range, flagged, when no pace is given (third harmonic 4.8 to 7.2 Hz)', () => {
    const third = forcings({ name: 'p', kind: 'footfall', activity: 'walking' })[3]!;
    expect(third).toMatchObject({ certain: false, label: 'walking 3rd', toleranceRatio: 0 });
    expect(third.rangeHz).toEqual([expect.closeTo(4.8, 9), expect.closeTo(7.2, 9)]);
  });
  it('interpolate jumping between its published paces (1.8 at 2 Hz, 1.7 at 3 Hz)', () => {
    const at = (paceHz: number) =>
      forcings({ name: 'p', kind: 'footfall', activity: 'jumping', paceHz })[0]!.loadFactorRatio![0];
    expect([at(2), at(2.5), at(3), at(3.4)]).toEqual(
      [1.8, 1.75, 1.7, 1.7].map((value) => expect.closeTo(value, 9)),
    );
  });
  it('count the cycles there are per harmonic', () => {
    const list = forcings({ name: 'p', kind: 'footfall', activity: 'stairs', stepCount: 14 });
    expect(list.map(({ cycleCount }) => cycleCount)).toEqual([14, 28]);
  });
  it('have a belt at its own speed and twice (150 mm, 2 m, 1450 r/min: 5.694 Hz)', () => {
    expect(table({ name: 'b', kind: 'belt', speedRpm: 1450, pulleyDiameterM: 0.15, beltLengthM: 2 })).toEqual(
      {
        'belt 1×': [5.6941, 5.6941],
        'belt 2×': [11.3883, 11.3883],
      },
    );
  });
  it('have vortex shedding f = St v / b, with the doubtful rectangle flagged', () => {
    const [circle] = forcings({
      name: 'w',
      kind: 'wind',
      widthM: 0.5,
      speedMps: [5, 10],
      strouhalRatio: 0.2,
    });
    expect(circle!.rangeHz).toEqual([2, 4]);
    const [square] = forcings({ name: 'w', kind: 'wind', widthM: 0.5, speedMps: 5, shape: 'square' });
    expect(square).toMatchObject({ certain: false, origin: 'EN 1991-1-4 Fig. E.1' });
    // Figure E.1 from memory (.7): 0.12, 0.06, 0.06, 0.15, 0.11, 0.09 at depth/width 1, 2, 3, 3.5, 5, 10.
    expect([0.5, 1, 2, 3.25, 3.5, 5, 10, 12].map(rectangleStrouhal)).toEqual(
      [0.12, 0.12, 0.06, 0.105, 0.15, 0.11, 0.09, 0.09].map((value) => expect.closeTo(value, 9)),
    );
  });
  it('shake through the ground where it is traffic', () => {
    expect(forcings({ name: 't', kind: 'traffic', traffic: 'rail' })[0]).toMatchObject({
      amplificationKind: 'base',
      rangeHz: [6, 40],
      certain: false,
    });
  });
  it('repeat a band with its harmonics', () => {
    expect(table({ name: 'x', kind: 'band', frequencyHz: [3, 4], harmonics: 3 })).toEqual({
      band: [3, 4],
      'band 2nd': [6, 8],
      'band 3rd': [9, 12],
    });
  });
});

describe('folded images', () => {
  it('fold about multiples of the rate', () => {
    // A 2-pole motor at 3550 r/min, sampled at 60 Hz, shows at 0.83 Hz.
    expect(imageHz(3550 / 60, 60)).toBeCloseTo(0.8333, 4);
    expect(imageHz(45, 60)).toBe(15);
    expect(imageHz(75, 60)).toBe(15);
  });
  it('reach the edge where a band crosses it', () => {
    expect(imageBandHz([28, 33], 60)).toEqual([27, 30]);
    expect(imageBandHz([55, 62], 60)).toEqual([0, 5]);
    expect(imageBandHz([40, 50], 60)).toEqual([10, 20]);
    expect(imageBandHz([10, 70], 60)).toEqual([0, 30]);
  });
  it('are named before recording: a 4-pole motor on a 60 Hz supply sits at half the rate', () => {
    const list = valueOf(forcingsOf([{ name: 'pump', kind: 'mains', supplyHz: 60, poles: 4 }]));
    const named = foldedForcings(list, 60);
    expect(named.map(({ forcing, edge }) => [forcing.label, edge])).toEqual([
      ['motor 1×', 'half-rate'],
      ['twice line', 'zero'],
    ]);
  });
});
