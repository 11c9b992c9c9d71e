import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { Mode } from '../../../src/core/model/analysis.ts';
import type { Separation, Verdict } from '../../../src/core/model/judgement.ts';
import type { AmplificationKind, Forcing } from '../../../src/core/model/source.ts';
import { judge } from '../../../src/core/survey/judge.ts';
import { forcingsOf } from '../../../src/core/survey/forcings.ts';
import { separationOf } from '../../../src/core/survey/separation.ts';
import { DEFAULT_THRESHOLDS, thresholdsWith } from '../../../src/core/survey/thresholds.ts';
import { displacementHalfPower, velocityHalfPower, zonesFor } from '../../../src/core/survey/zones.ts';
import { analysisOf, modeAt, valueOf, type AnalysisPart } from '../../support/survey-analysis.ts';

function forcingOf(rangeHz: readonly [number, number], part: Partial<Forcing> = {}): Forcing {
  const toleranceRatio = part.toleranceRatio ?? 0;
  return {
    source: 'test source',
    sourceKind: 'band',
    label: 'band',
    role: 'band',
    frequencyHz: [rangeHz[0] * (1 - toleranceRatio), rangeHz[1] * (1 + toleranceRatio)],
    rangeHz,
    toleranceRatio,
    order: 1,
    origin: 'test',
    certain: true,
    amplificationKind: 'force',
    ...part,
  };
}

function against(mode: Mode, forcing: Forcing, part: AnalysisPart = {}, machineState?: string): Separation {
  const analysis = analysisOf('tap', { modes: [mode], ...part });
  return separationOf(0, 0, forcing, { analysis, machineState, thresholds: DEFAULT_THRESHOLDS });
}

const exact = { frequencySdHz: 0, dampingRatioSd: 0 };
const verdictAt = (ratio: number, dampingRatio = 0.01): Verdict =>
  against(modeAt(10, dampingRatio, exact), forcingOf([10 * ratio, 10 * ratio])).verdict;

describe('verdict', () => {
  it('has the boundaries of the design at light damping: 5 %, 0.8, 1.25', () => {
    expect([0.951, 1.049].map((ratio) => verdictAt(ratio))).toEqual(['coincident', 'coincident']);
    expect([0.949, 1.051, 0.801, 1.249].map((ratio) => verdictAt(ratio))).toEqual(Array(4).fill('close'));
    expect([0.8, 1.25, 0.5, 2.4].map((ratio) => verdictAt(ratio))).toEqual(Array(4).fill('apart'));
  });

  it('widens to the half-power band of a well damped mode', () => {
    expect(verdictAt(0.92, 0.1)).toBe('coincident');
    expect(verdictAt(0.92, 0.05)).toBe('close');
  });

  it('is undecided when the interval spans from coincident to apart', () => {
    const wide = modeAt(10, 0.01, { frequencySdHz: 1.2 });
    const separation = against(wide, forcingOf([8.8, 8.8]));
    expect(separation.verdict).toBe('undecided');
    expect(separation.ratio[0]).toBeLessThan(0.8);
    expect(separation.ratio[1]).toBeGreaterThan(0.95);
  });

  it('takes the nearest point of a range that is really visited, not its whole width, as near', () => {
    // Walking paces 1.6-2.4 Hz, third harmonic 4.8-7.2 Hz, mode 7.42 Hz: the design's own example.
    const separation = against(modeAt(7.42, 0.011, { frequencySdHz: 0.015 }), forcingOf([4.8, 7.2]));
    expect(separation.verdict).toBe('coincident');
    expect(separation.nearestRatio).toBeCloseTo(7.2 / 7.42, 6);
  });

  it('takes a tolerance as unknown: the same width may then be undecided', () => {
    expect(against(modeAt(7.42, 0.011), forcingOf([6, 6], { toleranceRatio: 0.2 })).verdict).toBe(
      'undecided',
    );
  });

  it('holds a mode found at rest against a running machine with a model uncertainty, and says so', () => {
    const machine = forcingOf([9.2, 9.2], { sourceKind: 'machine', role: 'shaft' });
    const stopped = against(modeAt(10, 0.01, exact), machine, {}, 'off');
    const running = against(modeAt(10, 0.01, exact), machine, {}, 'running');
    expect(stopped).toMatchObject({ verdict: 'coincident', stoppedAgainstRunning: true });
    expect(running.verdict).toBe('close');
    expect(running.stoppedAgainstRunning).toBeUndefined();
    expect(stopped.ratio[1]).toBeCloseTo(0.92 * 1.05, 6);
  });
});

describe('blind', () => {
  it('stands where the forcing lies outside the band that the recording saw', () => {
    expect(against(modeAt(7, 0.01), forcingOf([100, 100])).verdict).toBe('blind');
    expect(against(modeAt(7, 0.01), forcingOf([0.2, 0.3])).verdict).toBe('blind');
    expect(against(modeAt(7, 0.01), forcingOf([20, 20])).verdict).toBe('apart');
  });

  it('stands for a mode that is folded and nowhere near', () => {
    const folded = modeAt(15, 0.03, { fold: { verdict: 'folded', candidatesHz: [45] } });
    expect(against(folded, forcingOf([10, 10])).verdict).toBe('blind');
    expect(against(folded, forcingOf([45, 45]))).toMatchObject({ verdict: 'coincident', modeHz: 45 });
  });

  it('gives way to undecided when one possible frequency is near and another is not', () => {
    const open = modeAt(15, 0.03, { fold: { verdict: 'undecided', candidatesHz: [15, 45] } });
    expect(against(open, forcingOf([15, 15]))).toMatchObject({ verdict: 'undecided', modeHz: 15 });
    expect(against(open, forcingOf([45, 45]))).toMatchObject({ verdict: 'undecided', modeHz: 45 });
  });

  it('is told at face value as well, which ways out and the call for a specialist go by', () => {
    const open = modeAt(2, 0.01, { fold: { verdict: 'undecided', candidatesHz: [2, 58] } });
    const walking = { name: 'visitors', kind: 'footfall', activity: 'walking' } as const;
    const judgement = judge(analysisOf('tap', { modes: [open] }), [walking]);
    expect(judgement.separations[0]).toMatchObject({ verdict: 'undecided', atFaceValue: 'coincident' });
    expect(judgement.specialist).toEqual(['coincident-people']);
    expect(judgement.waysOut.find(({ kind }) => kind === 'stiffness')).toMatchObject({
      verdictAfter: 'apart',
    });
    expect(judgement.trust).toBe('fair');
    expect(against(open, forcingOf([58, 58]))).toMatchObject({ verdict: 'undecided', atFaceValue: 'blind' });
    expect(against(modeAt(2, 0.01), forcingOf([2, 2])).atFaceValue).toBeUndefined();
  });

  it('takes the damping of a folded mode at the frequency it is held at', () => {
    const folded = modeAt(15, 0.03, { ...exact, fold: { verdict: 'folded', candidatesHz: [45] } });
    expect(against(folded, forcingOf([45, 45])).amplification.interval[1]).toBeCloseTo(1 / (2 * 0.01), 0);
  });

  it('limits a coast-down to what the machine swept', () => {
    const part: AnalysisPart = {
      procedure: 'coastdown',
      coastdown: { startHz: 25, endHz: 5, sweepRateHzPerS: -1, sweepSeverityRatio: 0.1 },
    };
    expect(against(modeAt(10, 0.01), forcingOf([3, 3]), part).verdict).toBe('blind');
  });

  it('never reads as good news: nothing unseen is ever apart', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 1, max: 28, noNaN: true }),
        fc.double({ min: 0.1, max: 200, noNaN: true }),
        fc.constantFrom('direct', 'folded', 'undecided' as const),
        (modeHz, forcingHz, verdict) => {
          const fold = {
            verdict: verdict as 'direct',
            candidatesHz: verdict === 'direct' ? [modeHz] : [60 - modeHz, modeHz],
          };
          const separation = against(modeAt(modeHz, 0.02, { fold }), forcingOf([forcingHz, forcingHz]));
          const seen = verdict === 'direct' && forcingHz >= 0.5 && forcingHz <= 28;
          if (!seen) expect(separation.verdict).not.toBe('apart');
        },
      ),
    );
  });
});

/** What may follow when an uncertainty grows: undecided always, otherwise only the same or worse; of undecided only coincident. */
function isNoMilder(before: Verdict, after: Verdict): boolean {
  if (after === 'undecided') return true;
  if (before === 'undecided') return after === 'coincident';
  // Blind and apart are alike here: which of the two depends on the band alone.
  const rank = { apart: 0, blind: 0, close: 1, coincident: 2 };
  return rank[after] >= rank[before];
}

describe('verdict properties', () => {
  const kinds = fc.constantFrom<AmplificationKind>('force', 'base', 'unbalance');
  const unit = fc.double({ min: 0, max: 1, noNaN: true });

  it('never gets milder when an uncertainty grows', () => {
    fc.assert(
      fc.property(
        fc.record({
          ratio: fc.double({ min: 0.4, max: 2.5, noNaN: true }),
          width: fc.double({ min: 0, max: 0.6, noNaN: true }),
          damping: fc.double({ min: 0.002, max: 0.5, noNaN: true }),
          kind: kinds,
          small: fc.tuple(unit, unit, unit),
          more: fc.tuple(unit, unit, unit),
        }),
        ({ ratio, width, damping, kind, small, more }) => {
          const verdictWith = (f: number, z: number, t: number): Verdict =>
            against(
              modeAt(10, damping, { frequencySdHz: f, dampingRatioSd: z * damping }),
              forcingOf([10 * ratio, 10 * ratio * (1 + width)], {
                toleranceRatio: 0.2 * t,
                amplificationKind: kind,
              }),
            ).verdict;
          const before = verdictWith(small[0], small[1], small[2]);
          const after = verdictWith(small[0] + more[0], small[1] + more[1], Math.min(1, small[2] + more[2]));
          expect(isNoMilder(before, after), `${before} became ${after}`).toBe(true);
        },
      ),
      { numRuns: 1000 },
    );
  });

  it('never calls a forcing inside the half-power band apart, for any damping and kind', () => {
    fc.assert(
      fc.property(fc.double({ min: 0.001, max: 0.7, noNaN: true }), unit, kinds, (damping, share, kind) => {
        const edges = kind === 'unbalance' ? accelerance(damping) : displacementHalfPower(damping);
        for (const [low, high] of [edges, velocityHalfPower(damping)]) {
          const ratio = low + share * (Math.min(high, 20) - low);
          if (ratio <= 0) continue;
          const hz = 10 * ratio;
          const verdict = against(
            modeAt(10, damping, exact),
            forcingOf([hz, hz], { amplificationKind: kind }),
            { recording: { usableBandHz: [0, 500] } },
          ).verdict;
          expect(verdict).not.toBe('apart');
          expect(verdict).not.toBe('blind');
        }
      }),
    );
  });
  const accelerance = (damping: number): readonly [number, number] => {
    const [low, high] = displacementHalfPower(damping);
    return [1 / high, low > 0 ? 1 / low : Infinity];
  };

  it('gives half-power edges that are at half power (reference 1.7)', () => {
    const power = (ratio: number, damping: number) =>
      1 / ((1 - ratio ** 2) ** 2 + (2 * damping * ratio) ** 2);
    for (const damping of [0.01, 0.1, 0.3]) {
      const peak = power(Math.sqrt(1 - 2 * damping ** 2), damping);
      for (const edge of displacementHalfPower(damping))
        expect(power(edge, damping) / peak).toBeCloseTo(0.5, 9);
      for (const edge of velocityHalfPower(damping))
        expect((edge ** 2 * power(edge, damping)) / power(1, damping)).toBeCloseTo(0.5, 9);
    }
  });

  it('keeps coincident inside apart for every damping', () => {
    for (let damping = 0; damping <= 1; damping += 0.01) {
      const { coincident, apart } = zonesFor('base', damping, DEFAULT_THRESHOLDS);
      expect(apart[0]).toBeLessThanOrEqual(coincident[0]);
      expect(apart[1]).toBeGreaterThanOrEqual(coincident[1]);
    }
  });
});

describe('thresholds', () => {
  it('are the person’s to set, within reason', () => {
    expect(thresholdsWith({ apartBelowRatio: 0.7 }).apartBelowRatio).toBe(0.7);
    expect(() => thresholdsWith({ apartBelowRatio: 1.2 })).toThrow(
      /apartBelowRatio must be 0.3 to 0.95, got 1.2/,
    );
    expect(() => thresholdsWith({ coincidentRatio: 0.15, apartBelowRatio: 0.9 })).toThrow(
      /reaches into apart/,
    );
    expect(() => thresholdsWith({ wantedAmplificationRatio: Number.NaN })).toThrow(RangeError);
  });
});

describe('footfall', () => {
  const walking = { name: 'visitors', kind: 'footfall', activity: 'walking' } as const;

  it('is ranked by load factor times build-up', () => {
    // First harmonic on one mode, fourth on another: like coincidence, five times the load.
    const analysis = analysisOf('tap', { modes: [modeAt(8, 0.02), modeAt(2, 0.02)] });
    const [first] = judge(analysis, [walking]).separations;
    expect(first).toMatchObject({ modeIndex: 1, forcing: 'walking 1st', verdict: 'coincident' });
    expect(first!.effectRatio).toBeGreaterThan(8);
  });

  it('is limited by the steps there are', () => {
    const analysis = analysisOf('tap', { modes: [modeAt(2, 0.005)] });
    const [endless] = judge(analysis, [walking]).separations;
    const [ten] = judge(analysis, [{ ...walking, stepCount: 10 }]).separations;
    expect(endless!.amplification.interval[1]).toBeCloseTo(110, -1);
    expect(ten!.buildUpLimited).toBe(true);
    // 10 cycles at resonance: (1 - exp(-2 pi z N)) / (2 z), at the low end of the damping.
    expect(ten!.amplification.interval[1]).toBeCloseTo(27.3, 0);
  });

  it('gives a stiff floor as blows, not as a resonance verdict', () => {
    const judgement = judge(analysisOf('tap', { modes: [modeAt(14, 0.03)] }), [walking]);
    expect(judgement.separations).toEqual([]);
    expect(judgement.impulsive).toEqual([{ modeIndex: 0, source: 'visitors' }]);
    expect(judgement.unpaired.every(({ verdict }) => verdict === 'none-near')).toBe(true);
  });

  it('still calls a harmonic that reaches the mode coincident, above the limit too', () => {
    const jumping = { name: 'class', kind: 'footfall', activity: 'jumping' } as const;
    const judgement = judge(analysisOf('tap', { modes: [modeAt(10.1, 0.02)] }), [jumping]);
    expect(judgement.separations[0]).toMatchObject({ verdict: 'coincident', forcing: 'jumping 3rd' });
  });
});

describe('wind', () => {
  it('gives the critical wind speed and the Scruton number (EN 1991-1-4 E.1.3)', () => {
    const source = {
      name: 'mast',
      kind: 'wind',
      widthM: 1,
      speedMps: [4, 7],
      strouhalRatio: 0.18,
      massPerLengthKgPerM: 200,
    } as const;
    // Log decrement 0.02 is damping ratio 0.318 % (reference 1.6); Sc 6.4 and v 5.56 m/s as in the worked examples.
    const mode = modeAt(1, 0.02 / (2 * Math.PI), { ...exact });
    const [separation] = judge(analysisOf('ambient', { modes: [mode] }), [source]).separations;
    expect(separation!.verdict).toBe('coincident');
    expect(separation!.wind!.criticalSpeedMps[0]).toBeCloseTo(5.5556, 4);
    expect(separation!.wind!.scrutonRatio![0]).toBeCloseTo(6.4, 4);
  });
});

describe('unpaired', () => {
  const band = { name: 'press', kind: 'band', frequencyHz: 20 } as const;
  it('says none found near, blind or not looked for; never clear', () => {
    const tap = analysisOf('tap', { modes: [modeAt(5, 0.02)] });
    expect(judge(tap, [band]).unpaired[0]).toMatchObject({ verdict: 'none-near' });
    expect(judge(tap, [{ ...band, frequencyHz: 90 }]).unpaired[0]).toMatchObject({ verdict: 'blind' });
    expect(judge(analysisOf('running'), [band]).unpaired[0]).toMatchObject({ verdict: 'not-sought' });
    expect(judge(analysisOf('tap', { modes: [modeAt(20, 0.02)] }), [band]).unpaired).toEqual([]);
  });
});

describe('a judgement', () => {
  it('gives finite numbers only', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 0.3, max: 29, noNaN: true }),
        fc.double({ min: 0, max: 0.5, noNaN: true }),
        fc.double({ min: 0, max: 3, noNaN: true }),
        (frequencyHz, dampingRatio, spread) => {
          const mode = modeAt(frequencyHz, dampingRatio, {
            frequencySdHz: spread * 0.1 * frequencyHz,
            dampingRatioSd: spread * dampingRatio,
          });
          const sources = [
            { name: 'a', kind: 'machine', speedRpm: [300, 3000], variableSpeed: true, bladeCount: 6 },
            { name: 'b', kind: 'footfall', activity: 'walking', stepCount: 12 },
            { name: 'c', kind: 'traffic' },
          ] as const;
          const judgement = judge(analysisOf('tap', { modes: [mode] }), sources);
          const numbers = JSON.stringify(judgement, (_, value: unknown) => {
            if (typeof value === 'number' && !Number.isFinite(value)) throw new Error(`not finite: ${value}`);
            return value;
          });
          expect(numbers.length).toBeGreaterThan(0);
        },
      ),
    );
  });
});

it('keeps forcings and sources in step', () => {
  const forcings = valueOf(forcingsOf([{ name: 'x', kind: 'band', frequencyHz: [3, 4] }]));
  expect(forcings[0]!.frequencyHz).toEqual([3 * 0.98, 4 * 1.02]);
});
