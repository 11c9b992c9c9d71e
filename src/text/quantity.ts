/** Quantities in the units people choose. Inside the program everything is SI; only here it is turned. */
import type { Interval } from '../core/model/interval.ts';
import { formatInterval, formatNumber, withUncertainty } from './number.ts';

export type FrequencyUnit = 'Hz' | 'r/min';
export type AccelerationUnit = 'm/s²' | 'g' | 'mg';
export type VelocityUnit = 'mm/s' | 'm/s' | 'in/s';
export type DisplacementUnit = 'µm' | 'mm' | 'mil';

/** How many of the unit make one SI unit. Standard gravity 9.80665 m/s² and the inch of 25.4 mm by definition. */
const PER_SI: Readonly<Record<FrequencyUnit | AccelerationUnit | VelocityUnit | DisplacementUnit, number>> = {
  Hz: 1,
  'r/min': 60,
  'm/s²': 1,
  g: 1 / 9.80665,
  mg: 1000 / 9.80665,
  'mm/s': 1000,
  'm/s': 1,
  'in/s': 1 / 0.0254,
  µm: 1e6,
  mm: 1000,
  mil: 1000 / 0.0254,
};
type Unit = keyof typeof PER_SI;

export const toUnit = (si: number, unit: Unit): number => si * PER_SI[unit];
export const fromUnit = (value: number, unit: Unit): number => value / PER_SI[unit];

const shown = (si: number, sd: number | undefined, unit: Unit): string =>
  withUncertainty(toUnit(si, unit), sd === undefined ? undefined : toUnit(sd, unit), unit);

export const formatFrequency = (frequencyHz: number, sdHz?: number, unit: FrequencyUnit = 'Hz'): string =>
  shown(frequencyHz, sdHz, unit);
export const formatAcceleration = (mps2: number, sdMps2?: number, unit: AccelerationUnit = 'm/s²'): string =>
  shown(mps2, sdMps2, unit);
export const formatVelocity = (mps: number, sdMps?: number, unit: VelocityUnit = 'mm/s'): string =>
  shown(mps, sdMps, unit);
export const formatDisplacement = (metres: number, sdM?: number, unit: DisplacementUnit = 'µm'): string =>
  shown(metres, sdM, unit);

/** "1.1 % ± 0.2": damping ratio in per cent of critical. */
export const formatDamping = (dampingRatio: number, sd?: number): string =>
  withUncertainty(100 * dampingRatio, sd === undefined ? undefined : 100 * sd, '%');

export const formatFrequencyRange = (bandHz: Interval, unit: FrequencyUnit = 'Hz', digits = 3): string =>
  `${formatInterval([toUnit(bandHz[0], unit), toUnit(bandHz[1], unit)], digits)} ${unit}`;

/** Share as per cent, e.g. 0.034 -> "3.4 %". */
export const formatPercent = (share: number, significantDigits = 2): string =>
  `${formatNumber(100 * share, significantDigits)} %`;

/** Speed in r/min, whole turns. */
export const formatSpeed = (speedRpm: number): string => `${Math.round(speedRpm)} r/min`;
