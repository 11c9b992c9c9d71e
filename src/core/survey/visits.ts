/** Visit to visit: what changed at a spot, beyond what repeating a reading changes by itself. */
import type { Analysis, Mode } from '../model/analysis.ts';
import type { Circumstances } from '../model/fact.ts';
import { STANDARD_DEVIATIONS_95 } from '../model/interval.ts';
import type { Condition, ModeChange, QuantityChange, VisitChange } from '../model/visit-change.ts';
import { modePairs } from './mode-pairs.ts';
import { studentQuantile95 } from './student.ts';

/**
 * Repeatability of a visit, relative standard deviation: common practice says frequency 1-3 %, damping 20-50 % between visits
 * (no source); these make a change count from 2.8 % and 55 % on.
 */
export const VISIT_FREQUENCY_SD_RATIO = 0.01;
export const VISIT_DAMPING_SD_RATIO = 0.2;
/** From so many earlier visits on, the spot's own scatter takes the place of the above. */
export const OWN_SCATTER_FROM_COUNT = 5;

export interface Visit {
  readonly id: string;
  readonly recordedAt: string;
  readonly analysis: Analysis;
  readonly circumstances: Partial<Circumstances>;
}

const CONDITIONS: readonly Condition[] = [
  'mounting',
  'surface',
  'excitation',
  'machineState',
  'peopleOnIt',
  'load',
  'direction',
  'phoneMassKg',
  'speedRpm',
];
/** A difference in temperature below this is not worth a word, degrees (our own bound). */
export const TEMPERATURE_STEP_C = 5;

/** Scatter of a quantity over earlier visits, relative; undefined below five. */
function ownScatter(logs: readonly number[]): { readonly sd: number; readonly quantile: number } | undefined {
  if (logs.length < OWN_SCATTER_FROM_COUNT) return undefined;
  const mean = logs.reduce((sum, value) => sum + value, 0) / logs.length;
  const squares = logs.reduce((sum, value) => sum + (value - mean) ** 2, 0);
  return { sd: Math.sqrt(squares / (logs.length - 1)), quantile: studentQuantile95(logs.length - 1) };
}

function quantityChange(
  earlier: number,
  later: number,
  relativeSds: readonly [number, number],
  floorSd: number,
  history: readonly number[],
): QuantityChange {
  const own = ownScatter(history.map(Math.log));
  const scatter = own?.sd ?? floorSd;
  const quantile = own?.quantile ?? STANDARD_DEVIATIONS_95;
  // The own scatter holds the uncertainty of the readings already; the larger of both is taken.
  const reading = Math.hypot(...relativeSds);
  const sd = own ? Math.max(scatter * Math.SQRT2, reading) : Math.hypot(reading, scatter * Math.SQRT2);
  const log = Math.log(later / earlier);
  const reach = quantile * sd;
  return {
    ratio: later / earlier,
    interval: [Math.exp(log - reach), Math.exp(log + reach)],
    changed: Math.abs(log) > reach,
    floor: own ? 'own' : 'practice',
  };
}

/** The same mode in earlier visits, by frequency. */
const historyOf = (mode: Mode, history: readonly Visit[]): readonly Mode[] =>
  history.flatMap(({ analysis }) => {
    const pair = modePairs([mode], analysis.modes)[0];
    return pair ? [analysis.modes[pair[1]] as Mode] : [];
  });

const relative = (sd: number, value: number): number => sd / value;

/**
 * Change between two visits to one spot, for every mode found in both. `changed` only beyond the repeatability floor.
 * @param history earlier visits to the same spot (the two themselves may be among them); from five on their scatter is used
 */
export function visitChange(earlier: Visit, later: Visit, history: readonly Visit[] = []): VisitChange {
  const before = earlier.analysis.modes;
  const after = later.analysis.modes;
  const pairs = modePairs(before, after);
  const past = history.filter(({ id }) => id !== later.id);
  const modes = pairs.map(([earlierIndex, laterIndex]): ModeChange => {
    const a = before[earlierIndex] as Mode;
    const b = after[laterIndex] as Mode;
    const same = historyOf(a, past);
    return {
      earlierIndex,
      laterIndex,
      frequency: quantityChange(
        a.frequencyHz,
        b.frequencyHz,
        [relative(a.frequencySdHz, a.frequencyHz), relative(b.frequencySdHz, b.frequencyHz)],
        VISIT_FREQUENCY_SD_RATIO,
        same.map((mode) => mode.frequencyHz),
      ),
      damping: quantityChange(
        a.dampingRatio,
        b.dampingRatio,
        [relative(a.dampingRatioSd, a.dampingRatio), relative(b.dampingRatioSd, b.dampingRatio)],
        VISIT_DAMPING_SD_RATIO,
        same.map((mode) => mode.dampingRatio),
      ),
    };
  });
  return {
    earlier: earlier.id,
    later: later.id,
    modes,
    lostIndexes: unpaired(
      before.length,
      pairs.map(([index]) => index),
    ),
    newIndexes: unpaired(
      after.length,
      pairs.map(([, index]) => index),
    ),
    ...differences(earlier.circumstances, later.circumstances),
  };
}

const unpaired = (count: number, paired: readonly number[]): number[] =>
  Array.from({ length: count }, (_, index) => index).filter((index) => !paired.includes(index));

function differences(a: Partial<Circumstances>, b: Partial<Circumstances>) {
  const conditions = CONDITIONS.filter((key) => a[key] !== b[key]);
  if (a.temperatureC === undefined || b.temperatureC === undefined) return { conditions };
  const temperatureDifferenceC = b.temperatureC - a.temperatureC;
  const warm: Condition[] = Math.abs(temperatureDifferenceC) >= TEMPERATURE_STEP_C ? ['temperatureC'] : [];
  return { conditions: [...warm, ...conditions], temperatureDifferenceC };
}

/** Level of the later reading over that of the earlier, before and after a repair; undefined where one has no velocity. */
export function levelRatio(before: Analysis, after: Analysis): number | undefined {
  const a = before.levels?.velocityRmsMps;
  const b = after.levels?.velocityRmsMps;
  return a === undefined || b === undefined || a === 0 ? undefined : b / a;
}
