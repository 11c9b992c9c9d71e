import { describe, expect, it } from 'vitest';
import { addedMassTest } from '../../../src/core/survey/added-mass.ts';
import { belongsToMode, parseModalValues } from '../../../src/core/survey/parse-modal-values.ts';
import { valueOf } from '../../support/survey-analysis.ts';

const at = (frequencyHz: number) => ({ frequencyHz, frequencySdHz: 0.005 });
// A rail of 6.3 kg modal mass at 14.9 Hz, 0.5 kg on top: 3.8 % lower.
const modal = valueOf(addedMassTest(at(14.9), at(14.34), 0.5));

describe('modal values kept with a spot', () => {
  it('come back as they were, through JSON', () => {
    expect(parseModalValues(JSON.parse(JSON.stringify(modal)))).toEqual(modal);
  });

  it.each([undefined, null, 7, {}, { ...modal, massKg: -1 }, { ...modal, massIntervalKg: [3, 2] }])(
    'are left out when not sound: %j',
    (kept) => expect(parseModalValues(kept)).toBeUndefined(),
  );

  it('belong to the mode that was tested, not to another', () => {
    expect([14.9, 14.3, 15.8].every((hz) => belongsToMode(modal, hz))).toBe(true);
    expect([11.9, 29.8].some((hz) => belongsToMode(modal, hz))).toBe(false);
  });
});
