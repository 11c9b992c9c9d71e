import { describe, expect, it } from 'vitest';
import type { Mode } from '../../../../src/core/model/analysis.ts';
import type { Outcome } from '../../../../src/core/model/outcome.ts';
import type { Recording } from '../../../../src/core/model/recording.ts';
import { ambientProcedure } from '../../../../src/core/modes/ambient.ts';
import type { ProcedureAnswer } from '../../../../src/core/modes/procedure-answer.ts';
import { conditionRecording } from '../../../../src/core/signal/condition-recording.ts';
import { ambientCase } from '../../../support/cases/ambient-case.ts';
import { generateCase } from '../../../support/cases/generate-case.ts';
import { seededRandom } from '../../../support/cases/random.ts';
import { randomModeMotion } from '../../../support/cases/random-motion.ts';
import type { ModeTruth } from '../../../support/cases/truth.ts';
import { simpleRecording } from '../../../support/simple-recording.ts';

const settings = { procedure: 'ambient', timing: 'auto' } as const;

function answer(recording: Recording): Outcome<ProcedureAnswer> {
  const conditioned = conditionRecording(recording, 'auto');
  if (!conditioned.ok) throw new Error(conditioned.problem.code);
  return ambientProcedure(conditioned.value, settings);
}

function modesOf(recording: Recording): readonly Mode[] {
  const outcome = answer(recording);
  if (!outcome.ok) throw new Error(outcome.problem.code);
  return outcome.value.modes;
}

const only = (recording: Recording): Mode => {
  const modes = modesOf(recording);
  expect(modes).toHaveLength(1);
  return modes[0] as Mode;
};

/** Two modes at right angles, shaken independently. */
function twoModes(seed: number, shares: readonly [number, number] = [1, 0.7]): Recording {
  const random = seededRandom(seed);
  const first = randomModeMotion(random, { frequencyHz: 6, dampingRatio: 0.01 }, 0.1 * shares[0], 100, 120);
  const second = randomModeMotion(
    random,
    { frequencyHz: 6.6, dampingRatio: 0.015 },
    0.1 * shares[1],
    100,
    120,
  );
  return simpleRecording(random, {
    durationS: 120,
    rateHz: 100,
    noiseMps2: 0.01,
    motion: (t) => [0.6 * first.at(t), 0.8 * first.at(t), second.at(t)],
  });
}

describe('ambientProcedure', () => {
  it('has intervals that hold the truth (12 seeded records, 95 % intervals)', () => {
    let frequency = 0;
    let damping = 0;
    for (let index = 0; index < 12; index++) {
      const { recording, truth } = ambientCase(seededRandom(41, index), 41, index, {
        durationS: 60,
        dampingRatio: 0.025,
        frequencyHz: 4 + index,
      });
      const mode = only(recording);
      const real = truth.modes?.[0] as ModeTruth;
      if (Math.abs(mode.frequencyHz - real.f_hz) < 1.96 * mode.frequencySdHz) frequency++;
      if (Math.abs(mode.dampingRatio - real.zeta) < 1.96 * mode.dampingRatioSd) damping++;
    }
    // 9 of 12 or fewer would be a chance of 2 % for an honest 95 % interval.
    expect(frequency).toBeGreaterThanOrEqual(10);
    expect(damping).toBeGreaterThanOrEqual(10);
  });

  it('is near the Whittle bound: said standard deviations within 0.7 to 1.6 of it', () => {
    const { recording, truth } = generateCase('B', 12, 3);
    const mode = only(recording);
    const real = truth.modes?.[0] as ModeTruth;
    const ratio = mode.dampingRatioSd / (real.crlb_zeta as number);
    expect(ratio).toBeGreaterThan(0.7);
    expect(ratio).toBeLessThan(1.6);
  });

  it('finds two modes with their directions and their share along gravity', () => {
    const modes = [...modesOf(twoModes(5))].sort((a, b) => a.frequencyHz - b.frequencyHz);
    expect(modes.map((m) => m.frequencyHz.toFixed(0))).toEqual(['6', '7']);
    const along = (modes[0] as Mode).direction;
    expect(Math.abs(0.6 * (along[0] as number) + 0.8 * (along[1] as number))).toBeGreaterThan(0.98);
    expect(modes[0]?.verticalShare).toBeLessThan(0.05);
    expect(modes[1]?.verticalShare).toBeGreaterThan(0.95);
    expect(modes[0]?.amplitudeMps2).toBeGreaterThan(0.05);
    expect(modes[0]?.amplitudeMps2).toBeLessThan(0.2);
  });

  it('turns with the phone: exchanged axes give the same modes with exchanged directions', () => {
    const recording = twoModes(6);
    const [x, y, z] = recording.accelerationMps2 as [Float32Array, Float32Array, Float32Array];
    const turned = modesOf({ ...recording, accelerationMps2: [z, x, y] });
    modesOf(recording).forEach((mode, i) => {
      const other = turned[i] as Mode;
      expect(other.frequencyHz).toBeCloseTo(mode.frequencyHz, 3);
      expect(other.dampingRatio).toBeCloseTo(mode.dampingRatio, 4);
      expect(Math.abs(other.direction[0] as number)).toBeCloseTo(Math.abs(mode.direction[2] as number), 2);
    });
  });

  it('does not depend on when the clock started or how strong the shaking is', () => {
    const recording = twoModes(7);
    const later = { ...recording, timeS: recording.timeS.map((t) => t + 1000) };
    const stronger = {
      ...recording,
      accelerationMps2: recording.accelerationMps2.map((axis) => axis.map((v) => 4 * v)),
    };
    const plain = modesOf(recording);
    const shift = (modesOf(later)[0]?.frequencyHz as number) - (plain[0]?.frequencyHz as number);
    expect(Math.abs(shift)).toBeLessThan(0.15 * (plain[0]?.frequencySdHz as number));
    const ratio = (modesOf(stronger)[0]?.dampingRatio as number) / (plain[0]?.dampingRatio as number);
    expect(ratio).toBeCloseTo(1, 1);
    expect((modesOf(stronger)[0]?.amplitudeMps2 as number) / (plain[0]?.amplitudeMps2 as number)).toBeCloseTo(
      4,
      0,
    );
  });

  it('calls a steady line a tone, with its amplitude, not a mode', () => {
    const random = seededRandom(8);
    const mode = randomModeMotion(random, { frequencyHz: 5, dampingRatio: 0.02 }, 0.08, 100, 120);
    const recording = simpleRecording(random, {
      durationS: 120,
      rateHz: 100,
      noiseMps2: 0.01,
      motion: (t) => [0.25 * Math.sin(2 * Math.PI * 12.3 * t), 0, mode.at(t)],
    });
    const outcome = answer(recording);
    if (!outcome.ok) throw new Error(outcome.problem.code);
    expect(outcome.value.modes.map((m) => Math.round(m.frequencyHz))).toEqual([5]);
    expect(outcome.value.tones).toHaveLength(1);
    expect(outcome.value.tones[0]?.frequencyHz).toBeCloseTo(12.3, 2);
    expect((outcome.value.tones[0]?.amplitudeMps2 as number) / 0.25).toBeCloseTo(1, 1);
  });

  it('finds nothing in a sensor at rest: no-mode, on each of 10 records', () => {
    for (let seed = 0; seed < 10; seed++) {
      const quiet = simpleRecording(seededRandom(seed), { durationS: 120, rateHz: 60, noiseMps2: 0.02 });
      const outcome = answer(quiet);
      expect(outcome.ok ? 'answered' : outcome.problem.code).toBe('no-mode');
    }
  });

  it('gives no damping where the record is too short for any, and says how long it would take', () => {
    const outcomes = [0, 1, 2, 3, 4, 5].map((index) =>
      answer(
        ambientCase(seededRandom(3, index), 3, index, {
          frequencyHz: 2.2,
          dampingRatio: 0.0025,
          durationS: 60,
          rmsMps2: 0.3,
        }).recording,
      ),
    );
    const refused = outcomes.flatMap((o) => (o.ok ? [] : [o.problem]));
    expect(refused.length).toBeGreaterThan(0);
    for (const problem of refused) {
      expect(problem.code).toBe('too-short');
      expect(problem.facts.neededS).toBeGreaterThan(120);
    }
    for (const outcome of outcomes)
      for (const mode of outcome.ok ? outcome.value.modes : [])
        expect(mode.doubts).toContain('near-resolution');
  });

  it('refuses ten seconds outright', () => {
    const outcome = answer(simpleRecording(seededRandom(4), { durationS: 10, rateHz: 60, noiseMps2: 0.02 }));
    expect(outcome.ok ? 'answered' : outcome.problem.code).toBe('too-short');
  });

  it('doubts a damping from few bandwidths: short, near-resolution, half-power refused', () => {
    const { recording } = ambientCase(seededRandom(11), 11, 0, {
      frequencyHz: 3,
      dampingRatio: 0.008,
      durationS: 60,
      rmsMps2: 0.3,
    });
    const outcome = answer(recording);
    if (!outcome.ok) throw new Error(outcome.problem.code);
    expect(outcome.value.doubts.map((d) => d.code)).toContain('short');
    expect(outcome.value.modes[0]?.doubts).toContain('near-resolution');
    expect(outcome.value.modes[0]?.doubts).toContain('half-power-refused');
    expect(outcome.value.modes[0]?.halfPower).toEqual({ refusal: 'below-resolution' });
  });

  it('doubts a mode that hardly stands out (low-signal) and one at the edge of the band (band-edge)', () => {
    // Density at the peak rms²/(pi·zeta·f) over the floor 2·sigma²/rate: about 4.
    const weak = ambientCase(seededRandom(23), 23, 0, {
      frequencyHz: 6,
      dampingRatio: 0.04,
      durationS: 300,
      rmsMps2: 0.013,
    });
    const edge = ambientCase(seededRandom(22), 22, 0, {
      frequencyHz: 24,
      dampingRatio: 0.01,
      durationS: 120,
      rmsMps2: 0.3,
    });
    expect(modesOf(weak.recording)[0]?.doubts).toContain('low-signal');
    expect(edge.truth.device.fs).toBe(60);
    expect(modesOf(edge.recording)[0]?.doubts).toContain('band-edge');
  });

  it('agrees with half power where that is possible, and says so when it is far off', () => {
    const { recording } = ambientCase(seededRandom(31), 31, 0, {
      frequencyHz: 12,
      dampingRatio: 0.03,
      durationS: 300,
      rmsMps2: 0.3,
    });
    const mode = only(recording);
    if ('refusal' in mode.halfPower) throw new Error(mode.halfPower.refusal);
    expect(mode.halfPower.dampingRatio / mode.dampingRatio).toBeGreaterThan(0.6);
    expect(mode.halfPower.dampingRatio / mode.dampingRatio).toBeLessThan(1.7);
  });
});
