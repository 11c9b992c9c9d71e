/**
 * Numbers as people read them. What is kept is a standard deviation; what is shown after ± is the half-width of a 95 % interval
 * (1.96 standard deviations), so that the truth lies inside 19 times out of 20.
 */
import { STANDARD_DEVIATIONS_95, type Interval } from '../core/model/interval.ts';

/** Said once on every screen and report that shows a ±. */
export const PLUS_MINUS_NOTE = 'The value after ± is the half-width of a 95 % interval.';

/** A digit may be dropped from ± when that makes it at most this much too small. Our own rule. */
const LARGEST_UNDERSTATEMENT = 0.05;

/**
 * Figures of a value that are shown at most; ± is then rounded up to the last of them. Our own rule: a frequency drifts by more
 * than the fifth figure with an hour's sun, so digits beyond would promise what the next reading does not keep.
 */
const MOST_FIGURES = 4;

/** Decimal places at which ± has one digit (two when it begins with 1), rounded so that it hardly understates. */
function roundedHalfWidth(halfWidth: number): { readonly value: number; readonly places: number } {
  // By the figure that two digits would show: 0.196 is 0.20 and begins with 2.
  const twoDigits = Number(halfWidth.toPrecision(2));
  const exponent = Math.floor(Math.log10(twoDigits) + 1e-12);
  const leading = Math.floor(twoDigits / 10 ** exponent + 1e-9);
  const places = leading === 1 ? 1 - exponent : -exponent;
  const step = 10 ** -places;
  const nearest = Math.round(halfWidth / step) * step;
  const value = nearest < halfWidth * (1 - LARGEST_UNDERSTATEMENT) ? nearest + step : nearest;
  return { value, places };
}

/** Fixed-point text with so many decimals; negative places round to tens, hundreds. */
function fixed(value: number, places: number): string {
  const text =
    places >= 0
      ? value.toFixed(Math.min(places, 12))
      : String(Math.round(value / 10 ** -places) * 10 ** -places);
  return Number(text) === 0 ? text.replace('-', '') : text.replace('-', '−');
}

/** A plain number with so many significant digits, without exponent: 7.42, 0.0031, 1480. */
export function formatNumber(value: number, significantDigits = 3): string {
  if (value === 0) return '0';
  const exponent = Math.floor(Math.log10(Math.abs(value)) + 1e-12);
  return fixed(value, significantDigits - 1 - exponent);
}

export interface NumberText {
  readonly value: string;
  /** Absent when the uncertainty is not known. */
  readonly plusMinus?: string;
}

/** Value and ± cut to the same decimals by the uncertainty, four figures at most; without one, three significant digits. */
export function numberText(value: number, standardDeviation?: number): NumberText {
  if (standardDeviation === undefined || !(standardDeviation > 0)) return { value: formatNumber(value) };
  const halfWidth = STANDARD_DEVIATIONS_95 * standardDeviation;
  const { value: rounded, places } = roundedHalfWidth(halfWidth);
  const mostPlaces = MOST_FIGURES - 1 - Math.floor(Math.log10(Math.abs(value)) + 1e-12);
  if (!(places > mostPlaces)) return { value: fixed(value, places), plusMinus: fixed(rounded, places) };
  const step = 10 ** -mostPlaces;
  return {
    value: fixed(value, mostPlaces),
    plusMinus: fixed(Math.ceil((halfWidth * (1 - LARGEST_UNDERSTATEMENT)) / step) * step, mostPlaces),
  };
}

/** "7.42 Hz ± 0.03"; the unit follows the value, as it is said aloud. */
export function withUncertainty(value: number, standardDeviation?: number, unit = ''): string {
  const text = numberText(value, standardDeviation);
  const head = unit === '' ? text.value : `${text.value} ${unit}`;
  return text.plusMinus === undefined ? head : `${head} ± ${text.plusMinus}`;
}

/** "4.8 to 7.2", or one number where both ends read the same. */
export function formatInterval([low, high]: Interval, significantDigits = 2): string {
  const a = formatNumber(low, significantDigits);
  const b = Number.isFinite(high) ? formatNumber(high, significantDigits) : 'no limit';
  return a === b ? a : `${a} to ${b}`;
}
