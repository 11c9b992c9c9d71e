import { describe, expect, it } from 'vitest';
import { levelsOf } from '../../../src/core/modes/levels.ts';
import { recordingDoubts } from '../../../src/core/modes/recording-doubts.ts';
import { runningProcedure } from '../../../src/core/modes/running-procedure.ts';
import { conditioned, RUNNING } from '../../support/conditioned.ts';
import { hasMeasured, measuredRecording } from '../../support/measured-recording.ts';

function analysed(name: string) {
  const signal = conditioned(measuredRecording(name));
  const outcome = runningProcedure(signal, RUNNING);
  const { tones, modes } = outcome.ok ? outcome.value : { tones: [], modes: [] };
  const doubts = recordingDoubts(signal, modes, tones).map((d) => d.code);
  return { signal, outcome, tones, modes, doubts };
}

/** Measured recordings beside the project (licences and truth in their manifest); read where they stand. */
describe.skipIf(!hasMeasured)('running procedure on measured recordings (skipped without them)', () => {
  it('washing machine: late stamps, 203.43 Hz, 19.15 Hz and its third order at full amplitude', () => {
    const { signal, tones, modes, doubts } = analysed('washer_spin_final_oneplus3t.csv');
    expect(signal.facts.timing.model).toBe('clock');
    expect(signal.facts.rateHz).toBeCloseTo(203.43, 2);
    const third = tones.find((t) => Math.abs(t.frequencyHz - 57.454) < 0.05)!;
    const spin = tones.find((t) => Math.abs(t.frequencyHz - 19.151) < 0.02)!;
    expect([spin.familyOrder, third.familyOrder]).toEqual([1, 3]);
    // On the sample order the line is 0.59; on the stamps at face value 41 % is lost (0.35).
    expect(third.amplitudeMps2).toBeGreaterThan(0.55);
    expect(modes).toEqual([]);
    expect(doubts).toContain('late-stamps');
  });

  it('washing machine on its stamps at face value loses a sixth of that line even by least squares', () => {
    const signal = conditioned(measuredRecording('washer_spin_final_oneplus3t.csv'), 'stamps');
    const outcome = runningProcedure(signal, { procedure: 'running', timing: 'stamps' });
    const third = outcome.ok
      ? outcome.value.tones.find((t) => Math.abs(t.frequencyHz - 57.454) < 0.1)
      : undefined;
    expect(third?.amplitudeMps2 ?? 0).toBeLessThan(0.52);
  });

  it.each([
    ['walk_hand_nexus_mpu6515_199hz.csv', 2.011],
    ['walk_frontpocket_samsung_k2hh_222hz_jitter.csv', 1.837],
    ['walk_hand_samsung_k2hh_100hz.csv', 1.8442],
    ['walk_hand_s6_validation_u1_100hz.csv', 1.6977],
  ])('%s: cadence within 1 % of the foot switches, no structural mode', (name, cadenceHz) => {
    const { tones, modes } = analysed(name);
    expect(modes).toEqual([]);
    expect(tones.some((t) => Math.abs(t.frequencyHz / cadenceHz - 1) < 0.01)).toBe(true);
  });

  it('irregular sampling: repeats dropped, no fold decided without a clock', () => {
    const { signal, tones, doubts } = analysed('walk_frontpocket_samsung_k2hh_222hz_jitter.csv');
    expect(signal.facts.timing.repeatCount).toBe(1430);
    expect(doubts).toContain('repeats');
    expect(tones.every((t) => t.fold.verdict === 'undecided')).toBe(true);
  });

  it('phone at rest: no tone, no mode', () => {
    const { tones, modes } = analysed('static_phone_bmi160_asus.csv');
    expect([tones, modes]).toEqual([[], []]);
  });

  it('dropped phone: no mode; clipped, moved, in free flight', () => {
    const { modes, doubts } = analysed('fall_and_impact_bmi160_asus.csv');
    expect(modes).toEqual([]);
    expect(doubts).toEqual(expect.arrayContaining(['clipped', 'phone-moved', 'contact-loss']));
  });

  it('beam on a shaker: forced at 100, 120 and 150 Hz, no velocity from lines that may be folded', () => {
    const { signal, tones, modes } = analysed('beam_shaker_100_120_150hz_test1.csv');
    expect(tones.slice(0, 3).map((t) => Math.round(10 * t.frequencyHz) / 10)).toEqual([150, 120, 100]);
    expect(tones.slice(0, 3).every((t) => t.nature === 'forced')).toBe(true);
    expect(modes).toEqual([]);
    const levels = levelsOf(signal, tones);
    expect(levels.leftOutTones).toBe(true);
    expect(levels.velocityRmsMps).toBeUndefined();
  });
});
