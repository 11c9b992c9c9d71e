import type { AccelerationUnit, DisplacementUnit, FrequencyUnit, VelocityUnit } from './quantity.ts';
import { formatAcceleration, formatFrequency } from './quantity.ts';

/** Units the person chose; everything inside is SI. */
export interface ReadingUnits {
  readonly frequency: FrequencyUnit;
  readonly acceleration: AccelerationUnit;
  readonly velocity: VelocityUnit;
  readonly displacement: DisplacementUnit;
}

export const saidHz = (units: ReadingUnits, frequencyHz: number, sdHz?: number): string =>
  formatFrequency(frequencyHz, sdHz, units.frequency);
export const saidMps2 = (units: ReadingUnits, mps2: number, sdMps2?: number): string =>
  formatAcceleration(mps2, sdMps2, units.acceleration);
