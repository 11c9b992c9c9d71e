import type { AxisName } from '../model/recording.ts';
import { parseAccelerationUnit, parseTimeUnit, type AccelerationUnit, type TimeUnit } from './csv-units.ts';

export interface CsvAxisColumn {
  readonly axis: AxisName;
  readonly columnIndex: number;
  /** From the header; absent where the header names none. */
  readonly unit?: AccelerationUnit;
}

export interface CsvHeader {
  readonly time: { readonly columnIndex: number; readonly unit?: TimeUnit };
  readonly axes: readonly CsvAxisColumn[];
}

/** Why a line is no header: what is missing, or the unit that is not understood. */
export type CsvHeaderFault =
  { readonly missing: 'time' | 'acceleration' } | { readonly unit: string; readonly column: string };

interface NamedColumn {
  readonly name: string;
  readonly words: readonly string[];
  readonly unitText: string | undefined;
  readonly columnIndex: number;
}

interface AxisCandidate extends NamedColumn {
  readonly axis: AxisName;
  readonly stem: string;
  readonly rank: number;
}

const AXES: readonly AxisName[] = ['x', 'y', 'z'];
const ACCELERATION_WORD = /^(a|acc|accel|acceleration|accelerometer)$/;
/** Gravity already removed by the phone's own fusion: taken only where nothing rawer stands beside it. */
const FUSED_WORD = /^(linear|lin|user|dynamic)$/;
const OTHER_QUANTITY =
  /^(gyro\w*|rot\w*|omega|mag\w*|compass|orient\w*|angle|angular|velocity|vel|speed|disp\w*|position|pos|quat\w*|rate|gravity|abs\w*|total|norm|sd|std|error)$/;
const TIME_WORD = /^(t|time|times|timestamp|ts|elapsed|date|datetime|iso|iso8601)$/;

/**
 * Finds the time column and one to three acceleration columns among header names.
 * Understood: `t`, `time`, `t_s`, `time_ms`, `seconds_elapsed`, `timestamp [ns]`, `ax_mps2`, `acc_x`, `x`,
 * `Acceleration Y (m/s^2)`, `accelZ [g]` and the like; other columns are ignored.
 */
export function parseCsvHeader(names: readonly string[]): CsvHeader | CsvHeaderFault {
  const columns = names.map(parseColumn);
  const time = findTime(columns);
  if (!time) return { missing: 'time' };
  const axes = findAxes(columns.filter((c) => c.columnIndex !== time.columnIndex));
  if (axes.length === 0) return { missing: 'acceleration' };
  const found: CsvAxisColumn[] = [];
  for (const { axis, columnIndex, unitText, name } of axes) {
    const unit = unitText === undefined ? undefined : parseAccelerationUnit(unitText);
    if (unitText !== undefined && unit === undefined) return { unit: unitText, column: name };
    found.push(unit === undefined ? { axis, columnIndex } : { axis, columnIndex, unit });
  }
  return { time, axes: found };
}

/** Splits "Acceleration x (m/s^2)" into words and unit; "ax_mps2" too, where the last word is a unit. */
function parseColumn(name: string, columnIndex: number): NamedColumn {
  const bracket = /[([]([^)\]]*)[)\]]\s*$/.exec(name);
  const bare = bracket ? name.slice(0, bracket.index) : name;
  const words = bare
    .replace(/([a-z])([A-Z])/g, '$1 $2')
    .toLowerCase()
    .split(/[^\p{L}\p{N}²/^]+/u)
    .filter((word) => word !== '');
  if (bracket) return { name, words, unitText: (bracket[1] ?? '').trim(), columnIndex };
  for (const count of [2, 1]) {
    if (words.length <= count) continue;
    const tail = words.slice(-count).join(count === 2 ? '/' : '');
    if (parseAccelerationUnit(tail) ?? parseTimeUnit(tail))
      return { name, words: words.slice(0, -count), unitText: tail, columnIndex };
  }
  return { name, words, unitText: undefined, columnIndex };
}

function findTime(columns: readonly NamedColumn[]): CsvHeader['time'] | undefined {
  const ranked = columns
    .map((column) => ({ column, unit: timeUnitOf(column), rank: timeRank(column) }))
    .filter((entry) => entry.rank > 0)
    .sort((a, b) => b.rank - a.rank || a.column.columnIndex - b.column.columnIndex);
  const best = ranked[0];
  if (!best) return undefined;
  const { columnIndex } = best.column;
  return best.unit === undefined ? { columnIndex } : { columnIndex, unit: best.unit };
}

function timeUnitOf(column: NamedColumn): TimeUnit | undefined {
  if (column.unitText !== undefined) return parseTimeUnit(column.unitText);
  return column.words.map(parseTimeUnit).find((unit) => unit !== undefined);
}

/** Elapsed time before a stamp with a unit, before any stamp; 0: no time at all. */
function timeRank(column: NamedColumn): number {
  const isNamed = column.words.some((word) => TIME_WORD.test(word));
  const isBareUnit = column.words.some((word) => word.length > 2 && parseTimeUnit(word) !== undefined);
  if (!isNamed && !isBareUnit) return 0;
  if (column.words.includes('elapsed')) return 3;
  return timeUnitOf(column) === undefined ? 1 : 2;
}

function findAxes(columns: readonly NamedColumn[]): readonly AxisCandidate[] {
  const candidates = columns.map(axisCandidate).filter((c) => c !== undefined);
  const bestRank = Math.max(0, ...candidates.map((c) => c.rank));
  const first = candidates.find((c) => c.rank === bestRank);
  if (!first) return [];
  const sameStem = candidates.filter((c) => c.stem === first.stem && c.rank === bestRank);
  return AXES.flatMap((axis) => sameStem.filter((c) => c.axis === axis).slice(0, 1));
}

/** The axis a column may hold, or undefined. A single "acceleration" without a letter counts as x. */
function axisCandidate(column: NamedColumn): AxisCandidate | undefined {
  const words = column.words.filter((word) => word !== 'axis');
  const last = words.at(-1);
  if (last === undefined || words.some((word) => OTHER_QUANTITY.test(word))) return undefined;
  const letter = AXES.find((axis) => last.endsWith(axis));
  const stemWords = letter ? [...words.slice(0, -1), last.slice(0, -1)].filter((word) => word !== '') : words;
  const isAcceleration = stemWords.some((word) => ACCELERATION_WORD.test(word));
  if (stemWords.length > 0 && !isAcceleration) return undefined;
  if (letter === undefined && !isAcceleration) return undefined;
  const isFused = stemWords.some((word) => FUSED_WORD.test(word));
  const rank = (isAcceleration ? 4 : 2) + (isFused ? 0 : 1);
  return {
    ...column,
    axis: letter ?? 'x',
    stem: `${stemWords.join(' ')}:${letter ? 'axis' : 'single'}`,
    rank,
  };
}
