import { STANDARD_DEVIATIONS_95, type Interval } from '../model/interval.ts';
import type { ModalValues } from '../model/guided-pairs.ts';
import { failure, success, type Outcome } from '../model/outcome.ts';

export interface MeasuredFrequency {
  readonly frequencyHz: number;
  readonly frequencySdHz: number;
}

/** Extra stiffness and mass that a factor means. */
export const stiffnessForFactor = (modal: ModalValues, factor: number): number =>
  modal.stiffnessNPerM * (factor - 1);
export const massForFactor = (modal: ModalValues, factor: number): number => modal.massKg * (factor - 1);

/** The shift must be this many standard deviations, or modal mass is anybody's guess. Our own bound. */
export const LEAST_SHIFT_IN_SD = 3;

/**
 * Modal mass and stiffness from two taps, without and with a known mass at the spot: (f0/f1)² = 1 + m/M.
 * Intervals follow the ratio of the frequencies, so they are skewed as they should be: long towards heavy.
 * Fails with `mass-shift-unclear` when the shift is below three standard deviations.
 * @throws RangeError when the mass is not positive
 */
export function addedMassTest(
  without: MeasuredFrequency,
  withMass: MeasuredFrequency,
  addedMassKg: number,
): Outcome<ModalValues> {
  if (!(addedMassKg > 0)) throw new RangeError(`addedMassKg must be > 0, got ${addedMassKg}`);
  const square = (without.frequencyHz / withMass.frequencyHz) ** 2;
  const squareSd =
    2 *
    square *
    Math.hypot(without.frequencySdHz / without.frequencyHz, withMass.frequencySdHz / withMass.frequencyHz);
  const shift = square - 1;
  if (!(shift > LEAST_SHIFT_IN_SD * squareSd))
    return failure('mass-shift-unclear', { shift, shiftSd: squareSd });
  const massKg = addedMassKg / shift;
  const massSdKg = (massKg * squareSd) / shift;
  const reach = STANDARD_DEVIATIONS_95 * squareSd;
  const massIntervalKg: Interval = [addedMassKg / (shift + reach), addedMassKg / (shift - reach)];
  const angular = 2 * Math.PI * without.frequencyHz;
  // K = w0² m / shift: w0 enters the shift as well, so its own small part is left to the interval of the mass.
  const perMass = angular ** 2;
  return success({
    massKg,
    massSdKg,
    massIntervalKg,
    stiffnessNPerM: perMass * massKg,
    stiffnessSdNPerM: perMass * massSdKg,
    stiffnessIntervalNPerM: [perMass * massIntervalKg[0], perMass * massIntervalKg[1]],
  });
}

/** Relative change of frequency that a mass makes on a modal mass: 1/sqrt(1 + m/M) - 1, e.g. -0.032 for 0.2 kg on 3 kg. */
export const massShiftRatio = (addedMassKg: number, modalMassKg: number): number =>
  1 / Math.sqrt(1 + addedMassKg / modalMassKg) - 1;

/** Frequency without the phone, from that with the phone and the modal mass that includes it. */
export function frequencyWithoutPhoneHz(
  frequencyHz: number,
  phoneMassKg: number,
  modalMassWithPhoneKg: number,
): number {
  if (!(phoneMassKg >= 0 && phoneMassKg < modalMassWithPhoneKg))
    throw new RangeError(`phoneMassKg must be 0 to below ${modalMassWithPhoneKg}, got ${phoneMassKg}`);
  return frequencyHz / Math.sqrt(1 - phoneMassKg / modalMassWithPhoneKg);
}
