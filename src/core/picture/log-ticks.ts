import { hzToY, yToHz, type LogAxis } from './log-axis.ts';
import { linearTicks } from './linear-ticks.ts';

export interface AxisTick {
  /** In the unit shown: frequency times `shownPerHz`. */
  readonly shown: number;
  readonly frequencyHz: number;
  readonly yPx: number;
  readonly label: string;
}

/** From dense to sparse; a decade of the first row has nine ticks, of the last one. */
const MANTISSAS = [[1, 2, 3, 4, 5, 6, 7, 8, 9], [1, 2, 3, 5, 7], [1, 2, 5], [1, 3], [1]] as const;

/** Plain decimal without trailing zeros: 0.5, 20, 7.42. */
const plain = (value: number): string => String(Number(value.toPrecision(6)));

const logarithmicValues = (low: number, high: number, mantissas: readonly number[]): number[] => {
  const firstDecade = Math.floor(Math.log10(low));
  const lastDecade = Math.floor(Math.log10(high));
  const values: number[] = [];
  for (let decade = firstDecade; decade <= lastDecade; decade += 1)
    for (const mantissa of mantissas) {
      const value = decade < 0 ? mantissa / 10 ** -decade : mantissa * 10 ** decade;
      if (value >= low && value <= high) values.push(value);
    }
  return values;
};

const smallestGap = (ticks: readonly AxisTick[]): number =>
  ticks.reduce(
    (gap, tick, i) => (i === 0 ? gap : Math.min(gap, Math.abs(tick.yPx - ticks[i - 1]!.yPx))),
    Infinity,
  );

/**
 * Ticks of a logarithmic axis, ascending, labels at least `smallestGapPx` apart: 1-2-3... per decade while the view is
 * wide, evenly spaced round values once it is so narrow that decades no longer help.
 * @param shownPerHz 1 for Hz, 60 for r/min.
 */
export const logTicks = (axis: LogAxis, smallestGapPx: number, shownPerHz = 1): AxisTick[] => {
  const [low, high] = axis.rangeHz;
  const tick = (shown: number): AxisTick => {
    const frequencyHz = shown / shownPerHz;
    return { shown, frequencyHz, yPx: hzToY(axis, frequencyHz), label: plain(shown) };
  };
  // The tightest place of evenly spaced values on a log axis is its top.
  const topStep = (high - yToHz(axis, axis.topPx + smallestGapPx)) * shownPerHz;
  const even = linearTicks(low * shownPerHz, high * shownPerHz, topStep).map(tick);
  for (const mantissas of MANTISSAS) {
    const ticks = logarithmicValues(low * shownPerHz, high * shownPerHz, mantissas).map(tick);
    if (smallestGap(ticks) >= smallestGapPx) return ticks.length >= even.length ? ticks : even;
  }
  return even;
};
