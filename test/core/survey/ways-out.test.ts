import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Judgement, WayOut, WayOutKind } from '../../../src/core/model/judgement.ts';
import type { Source } from '../../../src/core/model/source.ts';
import { transmissibility } from '../../../src/core/survey/amplification.ts';
import {
  frequencyFromDeflectionHz,
  mountFrequencyHz,
  staticDeflectionM,
} from '../../../src/core/survey/isolation.ts';
import { judge } from '../../../src/core/survey/judge.ts';
import { joined, nearestOutside } from '../../../src/core/survey/speed-range.ts';
import { changedAnalysis } from '../../../src/core/survey/structural-change.ts';
import { analysisOf, modeAt } from '../../support/survey-analysis.ts';

const exact = { frequencySdHz: 0, dampingRatioSd: 0 };
const wayOf = (judgement: Judgement, kind: WayOutKind, forcing?: string): WayOut | undefined =>
  judgement.waysOut.find(
    (way) =>
      way.kind === kind &&
      (forcing ? judgement.separations[way.separationIndex]!.forcing === forcing : way.separationIndex === 0),
  );
const walking: Source = {
  name: 'visitors',
  kind: 'footfall',
  activity: 'walking',
  paceHz: [1.6, 2.4],
  toleranceRatio: 0,
};

describe('ways out of a footfall pair', () => {
  const judgement = judge(analysisOf('tap', { modes: [modeAt(7.42, 0.011, exact)] }), [walking]);
  it('stiffen to 9.0 Hz, stiffness times 1.47 (design, sketch of a reading)', () => {
    const way = wayOf(judgement, 'stiffness', 'walking 3rd')!;
    expect(way.targetHz![0]).toBeCloseTo(9.02, 2);
    expect(way.factor![0]).toBeCloseTo(1.478, 2);
    expect(way).toMatchObject({ verdictAfter: 'apart', practical: true });
  });
  it('add mass to come below the band, with what that does to the other harmonics', () => {
    const way = wayOf(judgement, 'mass', 'walking 3rd')!;
    // 4.8 Hz / 1.25 = 3.84 Hz, right on the second harmonic (3.2 to 4.8 Hz): a side effect.
    expect(way.targetHz![0]).toBeCloseTo(3.83, 2);
    expect(way.factor![0]).toBeCloseTo((7.42 / 3.83232) ** 2, 2);
    expect(way.practical).toBe(false);
    expect(way.sideEffects.map((index) => judgement.separations[index]!.forcing)).toContain('walking 2nd');
  });
  it('damp to the wanted amplification; the pair stays as near as it was', () => {
    const way = wayOf(judgement, 'damping', 'walking 3rd')!;
    expect(way.amplificationAfter![1]).toBeCloseTo(5, 6);
    expect(way.verdictAfter).not.toBe('apart');
  });
  it('offer neither speed nor isolation for people', () => {
    expect(wayOf(judgement, 'speed')).toBeUndefined();
    expect(wayOf(judgement, 'isolation')).toBeUndefined();
  });
});

describe('ways out for a variable-speed drive', () => {
  const fan: Source = {
    name: 'fan',
    kind: 'machine',
    speedRpm: [600, 1500],
    variableSpeed: true,
    orders: [1, 2],
    toleranceRatio: 0.01,
  };
  const judgement = judge(analysisOf('tap', { modes: [modeAt(20, 0.02, exact)] }), [fan], {
    machineState: 'off',
  });
  const way = wayOf(judgement, 'speed')!;
  it('keep out of the bands of every order, in r/min and in Hz, clipped to its range', () => {
    // 2×: 600 × (0.8 … 1.25), 1×: 1200 × (0.8 … 1.25), widened by 5 % (stopped, running) and 1 % (display).
    expect(way.keepOutRpm).toEqual([
      [600, expect.closeTo(795.5, 0)],
      [expect.closeTo(905.2, 0), 1500],
    ]);
    expect(way.keepOutHz![0]).toEqual([10, expect.closeTo(13.26, 1)]);
  });
  it('name the nearest speed at which every order is apart', () => {
    expect(way.nearestSpeedRpm).toBeGreaterThan(795);
    expect(way.nearestSpeedRpm).toBeLessThan(906);
    expect(way.verdictAfter).toBe('apart');
    const there = judge(
      analysisOf('tap', { modes: [modeAt(20, 0.02, exact)] }),
      [{ ...fan, speedRpm: way.nearestSpeedRpm!, variableSpeed: false }],
      { machineState: 'off' },
    );
    expect(there.separations.map(({ verdict }) => verdict).filter((verdict) => verdict !== 'apart')).toEqual([
      'blind',
    ]);
  });
  it('say when no speed in the range is apart', () => {
    const narrow = judge(analysisOf('tap', { modes: [modeAt(20, 0.02, exact)] }), [
      { ...fan, speedRpm: [1100, 1300] },
    ]);
    expect(wayOf(narrow, 'speed')).toMatchObject({ practical: false, verdictAfter: 'coincident' });
    expect(wayOf(narrow, 'speed')!.nearestSpeedRpm).toBeUndefined();
  });
});

describe('isolation', () => {
  it('sets mounts at a third of the forcing for an eighth through (derived), with its static deflection', () => {
    expect(mountFrequencyHz(24, 0.125)).toBeCloseTo(8, 9);
    expect(transmissibility(3, 0)).toBeCloseTo(0.125, 9);
    // Thomson & Dahleh, Example 2.2-1: 3.941 Hz sinks 16 mm; SI constant 15.76/sqrt(mm).
    expect(staticDeflectionM(3.941) * 1000).toBeCloseTo(16, 1);
    expect(frequencyFromDeflectionHz(0.001)).toBeCloseTo(15.76, 1);
  });
  it('is offered for a machine, with the range over mounts from springs to rubber, and what the mounts sit near', () => {
    const sources: Source[] = [
      { name: 'compressor', kind: 'machine', speedRpm: 1440, orders: [1], toleranceRatio: 0 },
      { name: 'fan', kind: 'machine', speedRpm: 480, orders: [1], toleranceRatio: 0 },
    ];
    const judgement = judge(analysisOf('tap', { modes: [modeAt(24, 0.02, exact)] }), sources, {
      machineState: 'running',
    });
    const way = wayOf(judgement, 'isolation')!;
    expect(way.targetHz![0]).toBeCloseTo(8, 6);
    expect(way.factor![0]).toBeCloseTo(0.125, 3);
    expect(way.factor![1]).toBeGreaterThan(0.14);
    expect(way.staticDeflectionM! * 1000).toBeCloseTo(3.88, 1);
    expect(way.mountsNearIndex).toEqual([1]);
    expect(way.verdictAfter).toBe('coincident');
    expect(way.amplificationAfter![1]).toBeLessThan(
      judgement.separations[0]!.amplification.interval[1] * 0.2,
    );
  });
  it('is marked as impractical when the mounts would have to sink too far', () => {
    const slow: Source = { name: 'mixer', kind: 'machine', speedRpm: 180, orders: [1], toleranceRatio: 0 };
    const judgement = judge(analysisOf('tap', { modes: [modeAt(3, 0.02, exact)] }), [slow], {
      machineState: 'running',
    });
    expect(wayOf(judgement, 'isolation')).toMatchObject({ practical: false });
  });
});

describe('ways out in general', () => {
  it('end apart when they promise to move the pair, whatever the pair', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 0.75, max: 1.3, noNaN: true }),
        fc.double({ min: 0.003, max: 0.12, noNaN: true }),
        fc.double({ min: 0, max: 0.01, noNaN: true }),
        (ratio, dampingRatio, spread) => {
          const mode = modeAt(12, dampingRatio, { frequencySdHz: 12 * spread });
          const source: Source = { name: 'x', kind: 'band', frequencyHz: 12 * ratio, toleranceRatio: 0.01 };
          const judgement = judge(
            analysisOf('tap', { modes: [mode], recording: { usableBandHz: [0.1, 100] } }),
            [source],
          );
          for (const way of judgement.waysOut.filter(({ kind }) => kind === 'stiffness' || kind === 'mass'))
            expect(way.verdictAfter).toBe('apart');
        },
      ),
    );
  });
  it('are only offered for coincident and close pairs', () => {
    const apart = judge(analysisOf('tap', { modes: [modeAt(12, 0.01)] }), [
      { name: 'x', kind: 'band', frequencyHz: 4 },
    ]);
    expect(apart.waysOut).toEqual([]);
  });
  it('make a mode heavier as Chopra, Example 3.4: frequency and damping ratio fall with the square root of the mass', () => {
    const before = analysisOf('tap', { modes: [modeAt(2.8, 0.1)] });
    const [mode] = changedAnalysis(before, { modeIndex: 0, massFactor: 2.5 }).modes;
    expect(mode!.frequencyHz).toBeCloseTo(2.8 / Math.sqrt(2.5), 9);
    expect(mode!.dampingRatio).toBeCloseTo(0.0632, 4);
  });
});

describe('speed bands', () => {
  it('join where they overlap', () => {
    expect(
      joined([
        [5, 7],
        [1, 2],
        [6, 9],
        [9, 10],
      ]),
    ).toEqual([
      [1, 2],
      [5, 10],
    ]);
  });
  it('leave the nearest free speed, never one inside a band', () => {
    expect(nearestOutside(100, [[90, 120]], [50, 200])).toBeCloseTo(90 * 0.998, 6);
    expect(nearestOutside(100, [[40, 210]], [50, 200])).toBeUndefined();
    expect(nearestOutside(100, [], [50, 200])).toBe(100);
  });
});
