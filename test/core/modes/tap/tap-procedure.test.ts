import { existsSync, readFileSync } from 'node:fs';
import fc from 'fast-check';
import { describe, expect, it, vi } from 'vitest';
import { analyse } from '../../../../src/core/analyse.ts';
import type { Analysis } from '../../../../src/core/model/analysis.ts';
import type { ProblemCode } from '../../../../src/core/model/problem.ts';
import type { Recording } from '../../../../src/core/model/recording.ts';
import { readCsv } from '../../../../src/core/packet/read-csv.ts';
import { seededRandom } from '../../../support/cases/random.ts';
import { generateCase } from '../../../support/cases/generate-case.ts';
import { scoreRecord } from '../../../support/cases/score-case.ts';
import { freeDecay } from '../../../support/integrated-decay.ts';
import { ringingRecording } from '../../../support/ringing-recording.ts';
import type { Ringing } from '../../../support/ringing-recording.ts';

/** Whole analyses on a machine that may be busy with other tests. */
vi.setConfig({ testTimeout: 60_000 });

const SETTINGS = { procedure: 'tap', timing: 'auto' } as const;

function analysed(recording: Recording): Analysis {
  const outcome = analyse(recording, SETTINGS);
  if (!outcome.ok) throw new Error(JSON.stringify(outcome.problem));
  return outcome.value.analysis;
}

function problemOf(recording: Recording): ProblemCode | undefined {
  const outcome = analyse(recording, SETTINGS);
  return outcome.ok ? undefined : outcome.problem.code;
}

const RAIL: Ringing = {
  frequencyHz: 7.4,
  dampingRatio: 0.012,
  tapTimesS: [2.03, 10.01, 18.02],
  durationS: 27,
  scatterS: 0.001,
};

/** Changes the samples of a recording, axis by axis. */
const changed = (
  recording: Recording,
  change: (value: number, i: number, axis: number) => number,
): Recording => ({
  ...recording,
  accelerationMps2: recording.accelerationMps2.map((axis, a) => axis.map((v, i) => change(v, i, a))),
});

describe('tapProcedure on what it must answer', () => {
  it('finds frequency within 0.05 %, damping within 5 %, direction within 3 degrees, and the taps', () => {
    const { modes, tapTimesS, tones } = analysed(ringingRecording(RAIL));
    expect(modes).toHaveLength(1);
    const [mode] = modes;
    expect(Math.abs(mode!.frequencyHz / 7.4 - 1)).toBeLessThan(5e-4);
    expect(Math.abs(mode!.dampingRatio / 0.012 - 1)).toBeLessThan(0.05);
    const cosine = mode!.direction.reduce((s, d, a) => s + d * [0.48, 0.6, 0.64][a]!, 0);
    expect(Math.abs(cosine)).toBeGreaterThan(Math.cos((3 * Math.PI) / 180));
    expect(mode!.verticalShare).toBeCloseTo(0.64 ** 2, 1);
    expect(tapTimesS).toHaveLength(3);
    tapTimesS.forEach((t, k) => expect(Math.abs(t - RAIL.tapTimesS[k]!)).toBeLessThan(0.05));
    expect(tones).toHaveLength(0);
  });

  it.each([4.889, 5.075, 6.315])(
    'reads the taps after a record that begins within the contact of another (%d Hz)',
    (frequencyHz) => {
      const ringing = {
        frequencyHz,
        dampingRatio: 0.02,
        tapTimesS: [-0.01, 8.5, 13.5, 19, 26],
        durationS: 32,
      };
      const recording = ringingRecording({ ...ringing, noiseMps2: 0.015 });
      // The hand still presses at the first sample: it reads against the ringing.
      const pressed = changed(recording, (v, i, a) => (i === 0 ? v - [0.6, 0.75, 0.8][a]! : v));
      const { modes, tapTimesS } = analysed(pressed);
      expect(modes).toHaveLength(1);
      expect(Math.abs(modes[0]!.frequencyHz / frequencyHz - 1)).toBeLessThan(1e-3);
      expect(Math.abs(modes[0]!.dampingRatio / 0.02 - 1)).toBeLessThan(0.05);
      expect(tapTimesS.filter((t) => t > 1)).toHaveLength(4);
    },
  );

  it('doubts a mode near half the rate and only that', () => {
    const codes = (frequencyHz: number): readonly string[] =>
      analysed(ringingRecording({ ...RAIL, frequencyHz })).modes[0]!.doubts;
    expect(codes(28.8)).toContain('band-edge');
    expect(codes(7.4)).not.toContain('band-edge');
  });

  it('is exact to 1e-5 where there is no noise', () => {
    const { modes } = analysed(ringingRecording({ ...RAIL, noiseMps2: 1e-6, scatterS: 0.0005 }));
    expect(Math.abs(modes[0]!.frequencyHz / 7.4 - 1)).toBeLessThan(1e-5);
    expect(Math.abs(modes[0]!.dampingRatio / 0.012 - 1)).toBeLessThan(1e-3);
  });

  it('reads the motion of an independently integrated oscillator (odex)', () => {
    const rateHz = 100;
    const decay = freeDecay({ frequencyHz: 4.2, dampingRatio: 0.03, durationS: 8, rateHz });
    const random = seededRandom(4);
    const n = 20 * rateHz;
    const axis = Float32Array.from(
      { length: n },
      (_, i) => (decay[i - 2 * rateHz] ?? 0) + (decay[i - 11 * rateHz] ?? 0) + 0.01 * random.normal(),
    );
    const recording: Recording = {
      sensor: { source: 'file', practice: false, name: 'odex' },
      axes: ['z'],
      timeS: Float64Array.from({ length: n }, (_, i) => i / rateHz),
      accelerationMps2: [axis],
    };
    const { modes } = analysed(recording);
    expect(Math.abs(modes[0]!.frequencyHz / 4.2 - 1)).toBeLessThan(1e-3);
    expect(Math.abs(modes[0]!.dampingRatio / 0.03 - 1)).toBeLessThan(0.03);
  });

  it('reads a long decay: 2 Hz at 0.5 %, time constant 16 s, two pull-and-releases', () => {
    const { modes, tapTimesS } = analysed(
      ringingRecording({
        frequencyHz: 2,
        dampingRatio: 0.005,
        tapTimesS: [3, 31],
        durationS: 60,
        amplitudeMps2: 0.5,
      }),
    );
    expect(Math.abs(modes[0]!.frequencyHz / 2 - 1)).toBeLessThan(5e-4);
    expect(Math.abs(modes[0]!.dampingRatio / 0.005 - 1)).toBeLessThan(0.05);
    expect(tapTimesS).toHaveLength(2);
  });

  it('does not care about scale, time shift or how the phone lies', () => {
    const plain = ringingRecording({ ...RAIL, seed: 9 });
    const before = analysed(plain).modes[0]!;
    fc.assert(
      fc.property(
        fc.double({ min: 0.3, max: 6, noNaN: true }),
        fc.double({ min: 0, max: 500, noNaN: true }),
        fc.double({ min: -3, max: 3, noNaN: true }),
        (scale, shiftS, angle) => {
          const [c, s] = [Math.cos(angle), Math.sin(angle)];
          const [x, y, z] = plain.accelerationMps2;
          const turned: Recording = {
            ...plain,
            timeS: plain.timeS.map((t) => t + shiftS),
            accelerationMps2: [
              x!.map((v, i) => scale * (c * v - s * z![i]!)),
              y!.map((v) => scale * v),
              z!.map((v, i) => scale * (s * x![i]! + c * v)),
            ],
          };
          const after = analysed(turned).modes[0]!;
          expect(Math.abs(after.frequencyHz - before.frequencyHz)).toBeLessThan(0.5 * before.frequencySdHz);
          expect(Math.abs(after.dampingRatio - before.dampingRatio)).toBeLessThan(
            0.5 * before.dampingRatioSd,
          );
        },
      ),
      { seed: 21, numRuns: 6 },
    );
  });

  it('calls a machine beside the structure a tone, not a mode', () => {
    const recording = changed(
      ringingRecording(RAIL),
      (v, i, a) => v + [0.2, 0, 0.1][a]! * Math.sin(2 * Math.PI * 12.3 * (i / 60)),
    );
    const { modes, tones } = analysed({ ...recording, timeS: recording.timeS.map((_, i) => i / 60) });
    expect(modes).toHaveLength(1);
    expect(tones.some((t) => Math.abs(t.frequencyHz / 12.3 - 1) < 1e-3)).toBe(true);
  });

  it('knows the rounding: a coarse step leaves damping within four of its standard deviations', () => {
    const { modes } = analysed(ringingRecording({ ...RAIL, stepMps2: 0.1, noiseMps2: 0.015 }));
    expect(modes[0]!.method).toBe('ring-down-fit-rounding-aware');
    expect(Math.abs(modes[0]!.dampingRatio - 0.012)).toBeLessThan(4 * modes[0]!.dampingRatioSd);
  });

  it('keeps seven significant digits and nothing that is not finite', () => {
    const analysis = analysed(ringingRecording(RAIL));
    const walk = (value: unknown): void => {
      if (typeof value === 'number') {
        expect(Number.isFinite(value)).toBe(true);
        expect(Number(value.toPrecision(7))).toBe(value);
      } else if (typeof value === 'object' && value !== null) Object.values(value).forEach(walk);
    };
    walk(analysis);
  });

  it('draws every ring-down with its fit', () => {
    const outcome = analyse(ringingRecording(RAIL), SETTINGS);
    const { ringDowns } = outcome.ok ? outcome.value.pictures : { ringDowns: [] };
    expect(ringDowns.length).toBeGreaterThanOrEqual(3);
    for (const { timeS, measuredMps2, fittedMps2 } of ringDowns) {
      expect(measuredMps2).toHaveLength(timeS.length);
      expect(fittedMps2).toHaveLength(timeS.length);
      const left = measuredMps2.map((v, i) => v - fittedMps2[i]!);
      expect(Math.sqrt(left.reduce((s, v) => s + v * v, 0) / left.length)).toBeLessThan(0.03);
    }
  });
});

describe('tapProcedure on generated records (seed 90)', () => {
  it.each([
    ['A1', 6],
    ['A2', 3],
    ['A2c', 2],
    ['A3', 3],
  ] as const)('%s: no mode missed or invented in %i records, all within five bounds', (kind, count) => {
    for (let index = 0; index < count; index++) {
      const { name, truth, recording } = generateCase(kind, 90, index);
      const score = scoreRecord(name, truth, analysed(recording));
      expect(score.spuriousCount, name).toBe(0);
      for (const { mode, found, failure } of score.modes) {
        expect(failure, name).toBeUndefined();
        expect(Math.abs(found!.frequencyHz - mode.f_hz) / mode.crlb_f!, name).toBeLessThan(5);
      }
    }
  });
});

describe('tapProcedure on what once was missed', () => {
  const generated = (kind: 'A1' | 'A1F', seed: number, index: number) => {
    const { truth, recording } = generateCase(kind, seed, index);
    return { truth: truth.modes![0]!, analysis: analysed(recording) };
  };

  it('a weak mode dead within a few cycles', () => {
    const { truth, analysis } = generated('A1', 6202, 29);
    const [mode] = analysis.modes;
    expect(Math.abs(mode!.frequencyHz - truth.f_hz)).toBeLessThan(4 * truth.crlb_f!);
    expect(Math.abs(mode!.dampingRatio - truth.zeta)).toBeLessThan(4 * truth.crlb_zeta!);
  });

  it('true stamps that the noise of a coarse record made look late: the ring-downs decide', () => {
    const { truth, analysis } = generated('A1', 6201, 118);
    expect(analysis.recording.timing.trueShare).toBeGreaterThan(0.9);
    expect(Math.abs(analysis.modes[0]!.frequencyHz - truth.f_hz)).toBeLessThan(4 * truth.crlb_f!);
  });

  it('late stamps of a steady clock: the ring-downs keep to the clock', () => {
    const steady = ringingRecording({ ...RAIL, frequencyHz: 17.4 });
    const random = seededRandom(8);
    const late = { ...steady, timeS: steady.timeS.map((t) => t + 0.002 * random.normal()) };
    const { modes, recording } = analysed(late);
    expect(recording.timing.trueShare).toBeLessThan(0.4);
    expect(Math.abs(modes[0]!.frequencyHz - 17.4)).toBeLessThan(4 * modes[0]!.frequencySdHz);
    expect(modes[0]!.frequencySdHz).toBeLessThan(0.005);
  });

  it('an image whose phase noise hides it at its apparent frequency', () => {
    const { truth, analysis } = generated('A1F', 7301, 51);
    const { fold } = analysis.modes[0]!;
    expect(fold.verdict).toBe('folded');
    expect(Math.abs(fold.candidatesHz[0]! / truth.f_hz - 1)).toBeLessThan(0.01);
  });

  it('a record of four minutes, searched by its busiest part, is read in full', () => {
    const tapTimesS = Array.from({ length: 20 }, (_, k) => 3.1 + 11.7 * k);
    const { modes, tapTimesS: found } = analysed(ringingRecording({ ...RAIL, tapTimesS, durationS: 240 }));
    expect(modes).toHaveLength(1);
    expect(found).toHaveLength(20);
    expect(Math.abs(modes[0]!.frequencyHz - 7.4)).toBeLessThan(4 * modes[0]!.frequencySdHz);
  });

  it('thirty knocks, each into the ring of the one before', () => {
    const tapTimesS = Array.from({ length: 30 }, (_, k) => 2 + 0.9 * k + 0.13 * Math.sin(5 * k));
    const { modes } = analysed(ringingRecording({ ...RAIL, tapTimesS, durationS: 32 }));
    expect(Math.abs(modes[0]!.frequencyHz - 7.4)).toBeLessThan(4 * modes[0]!.frequencySdHz);
    expect(Math.abs(modes[0]!.dampingRatio - 0.012)).toBeLessThan(4 * modes[0]!.dampingRatioSd);
  });

  it.each([
    ['one release, no contact', { frequencyHz: 2, dampingRatio: 0.005, tapTimesS: [4], durationS: 50 }],
    [
      'the first sample already rings',
      { frequencyHz: 2, dampingRatio: 0.005, tapTimesS: [-1], durationS: 40 },
    ],
    ['three taps on a very quiet sensor', { ...RAIL, noiseMps2: 2e-4 }],
    ['one axis', { ...RAIL, direction: [1] }],
    ['500 Hz', { ...RAIL, frequencyHz: 61, rateHz: 500, tapTimesS: [0.5, 2.5], durationS: 5 }],
    ['two seconds', { ...RAIL, frequencyHz: 11, dampingRatio: 0.02, tapTimesS: [0.3], durationS: 2 }],
  ])('%s', (_, ringing) => {
    const { modes } = analysed(ringingRecording(ringing));
    expect(modes).toHaveLength(1);
    const [mode] = modes;
    expect(Math.abs(mode!.frequencyHz - ringing.frequencyHz)).toBeLessThan(4 * mode!.frequencySdHz);
    expect(Math.abs(mode!.dampingRatio - ringing.dampingRatio)).toBeLessThan(4 * mode!.dampingRatioSd);
  });
});

describe('tapProcedure on what it must refuse or doubt', () => {
  const still = (noise: number): Recording => ringingRecording({ ...RAIL, tapTimesS: [], noiseMps2: noise });

  it.each([1, 2, 3, 4])('a phone at rest has no mode (seed %i)', (seed) => {
    expect(problemOf(ringingRecording({ ...RAIL, tapTimesS: [], seed }))).toMatch(/no-(taps|decay|motion)/);
  });

  it('a phone at rest whose rounding hides everything has no mode', () => {
    expect(problemOf(changed(still(0), (v) => Math.round(v)))).toMatch(/no-(taps|decay|motion)/);
  });

  it('a second and a half of samples is too short', () => {
    expect(problemOf(ringingRecording({ ...RAIL, durationS: 0.9 }))).toBe('too-short');
  });

  it('clipped throughout', () => {
    const loud = ringingRecording({ ...RAIL, amplitudeMps2: 200, dampingRatio: 0.001 });
    expect(problemOf(changed(loud, (v) => Math.max(-19.6, Math.min(19.6, v))))).toBe('clipped-throughout');
  });

  it('a steady machine alone has tones but no decay', () => {
    const running = changed(still(0.02), (v, i) => v + Math.sin(2 * Math.PI * 11.3 * (i / 60)));
    expect(problemOf(running)).toMatch(/no-(taps|decay)/);
  });

  it('white shocks without ringing are no mode', () => {
    const shocks = changed(still(0.02), (v, i) => v + (i % 300 === 150 ? 3 : 0));
    expect(problemOf(shocks)).toMatch(/no-(taps|decay)/);
  });

  it('fewer than three taps is said', () => {
    const { doubts } = analysed(ringingRecording({ ...RAIL, tapTimesS: [2] }));
    expect(doubts.map((d) => d.code)).toContain('few-taps');
  });

  it('taps that disagree widen the interval and are said', () => {
    const parts = [7.39, 7.41, 7.402, 7.398].map((frequencyHz, k) =>
      ringingRecording({
        ...RAIL,
        frequencyHz,
        tapTimesS: [1 + 8 * k],
        durationS: 33,
        noiseMps2: 0.005,
        seed: k,
      }),
    );
    const mixed = changed(parts[0]!, (_, i, a) => {
      const part = parts[Math.min(Math.floor(i / (8 * 60)), 3)]!;
      return part.accelerationMps2[a]![i]!;
    });
    const { modes } = analysed({ ...mixed, timeS: mixed.timeS.map((_, i) => i / 60) });
    expect(modes[0]!.doubts).toContain('tap-scatter');
    expect(modes[0]!.frequencySdHz).toBeGreaterThan(0.003);
    expect(Math.abs(modes[0]!.frequencyHz - 7.4)).toBeLessThan(2 * modes[0]!.frequencySdHz);
  });

  it('a ring-down cut short of its width refuses half-power', () => {
    const { modes } = analysed(
      ringingRecording({ ...RAIL, dampingRatio: 0.004, tapTimesS: [2, 4.5, 7], durationS: 9.5 }),
    );
    expect(modes[0]!.halfPower).toEqual({ refusal: 'below-resolution' });
    expect(modes[0]!.doubts).toContain('half-power-refused');
  });
});

const DATA = '../shared/data';
const hasData = existsSync(`${DATA}/manifest.json`);

describe.skipIf(!hasData)('tapProcedure on measured data (skipped where the shared folder is absent)', () => {
  const measured = (name: string): Recording => {
    const read = readCsv(readFileSync(`${DATA}/${name}`, 'utf8'), { name });
    if (!read.ok) throw new Error(JSON.stringify(read.problem));
    return read.value;
  };

  it.each([
    ['beam_ringdown_26p2hz.csv', 26.2271, 0.00775],
    ['beam_ringdown_30p8hz.csv', 30.8066, 0.00134],
    ['beam_ringdown_42p0hz.csv', 41.9859, 0.0012],
  ])(
    '%s: %f Hz within 0.05 %, damping %f within 15 %, half-power refused',
    (name, frequencyHz, dampingRatio) => {
      const [mode] = analysed(measured(name)).modes;
      expect(Math.abs(mode!.frequencyHz / frequencyHz - 1)).toBeLessThan(5e-4);
      expect(Math.abs(mode!.dampingRatio / dampingRatio - 1)).toBeLessThan(0.15);
      expect(mode!.halfPower).toEqual({ refusal: 'below-resolution' });
    },
  );

  it.each(['static_phone_bmi160_asus.csv', 'fall_and_impact_bmi160_asus.csv'])('%s: no mode', (name) => {
    expect(problemOf(measured(name))).toMatch(/no-(taps|decay|motion)/);
  });
});
