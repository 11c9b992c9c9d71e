/** Measured records (kept outside the project; skipped with a word where they are absent). */
import { existsSync, readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { describe, expect, it } from 'vitest';
import type { Analysis } from '../../../../src/core/model/analysis.ts';
import { analyse } from '../../../../src/core/analyse.ts';
import { readCsv } from '../../../../src/core/packet/read-csv.ts';

const folder = fileURLToPath(new URL('../../../../../shared/data/', import.meta.url));
const present = existsSync(`${folder}bridge_loadtest_ambient_acc01z.csv`);

function ambient(file: string): Analysis {
  const read = readCsv(readFileSync(folder + file, 'utf8'), { name: file });
  if (!read.ok) throw new Error(read.problem.code);
  const outcome = analyse(read.value, { procedure: 'ambient', timing: 'auto' });
  if (!outcome.ok) throw new Error(outcome.problem.code);
  return outcome.value.analysis;
}

describe.skipIf(!present)('ambient procedure on measured records (shared data absent: skipped)', () => {
  it('finds lightly damped modes of a bridge between 8 and 14 Hz', () => {
    // Published operational modal analysis of the unloaded state: 9.3 to 12.6 Hz, 0.7 to 1.8 %; this record is a loaded one.
    const { modes, tones } = ambient('bridge_loadtest_ambient_acc01z.csv');
    const within = modes.filter((m) => m.frequencyHz > 8 && m.frequencyHz < 14);
    expect(within.length).toBeGreaterThanOrEqual(1);
    for (const mode of within) {
      expect(mode.dampingRatio).toBeGreaterThan(0.002);
      expect(mode.dampingRatio).toBeLessThan(0.03);
    }
    expect(tones.every((t) => t.frequencyHz < 8 || t.frequencyHz > 14)).toBe(true);
  });

  it.each([
    ['walk_hand_nexus_mpu6515_199hz.csv', 2.011],
    ['walk_frontpocket_samsung_k2hh_222hz_jitter.csv', 1.837],
    ['walk_hand_samsung_k2hh_100hz.csv', 1.8442],
    ['walk_hand_s6_validation_u1_100hz.csv', 1.6977],
  ])('calls no part of a walk a mode: %s (foot switches: %d steps a second)', (file, stepHz) => {
    const { modes, tones } = ambient(file);
    expect(modes).toHaveLength(0);
    expect(tones.some((t) => Math.abs(t.frequencyHz / stepHz - 1) < 0.01)).toBe(true);
  });

  it.each([
    ['washer_spin_final_oneplus3t.csv', [19.15, 57.45]],
    ['washer_after_spin_oneplus3t.csv', [49.96]],
  ] as const)('takes the lines of a washing machine for tones: %s', (file, linesHz) => {
    const { modes, tones } = ambient(file);
    for (const hz of linesHz) {
      expect(tones.some((t) => Math.abs(t.frequencyHz / hz - 1) < 0.003)).toBe(true);
      expect(modes.some((m) => Math.abs(m.frequencyHz / hz - 1) < 0.03)).toBe(false);
    }
  });
});
