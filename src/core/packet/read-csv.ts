import type { Outcome } from '../model/outcome.ts';
import { failure, success } from '../model/outcome.ts';
import type { Recording } from '../model/recording.ts';
import { findCsvHeaderLine, MAX_COLUMNS, quotedPiece, type CsvHeaderLine } from './csv-header-line.ts';
import { emptyCsvRow, scanCsvRow, scanDecimal, type CsvRow, type DecimalSign } from './csv-scan.ts';
import { isoClock, isoSeconds, timesOfNumbers, type IsoClock, type StampTimes } from './csv-stamps.ts';
import { MPS2_PER_UNIT, type AccelerationUnit } from './csv-units.ts';

export interface ReadCsvOptions {
  /** File name, kept with the recording. */
  readonly name: string;
  /** Overrides whatever unit the header names. */
  readonly unit?: AccelerationUnit;
}

/** 8 h at 200 Hz: beyond it the analysis would not fit into a phone's memory. Our choice. */
const MAX_SAMPLES = 6_000_000;
const LINE_FEED = 10;
const CARRIAGE_RETURN = 13;

interface Samples {
  readonly stamps: Float64Array;
  readonly accelerationMps2: readonly Float32Array[];
  readonly iso: IsoClock | undefined;
}

/**
 * Reads a recording from CSV or TSV text with a header.
 * Comma, semicolon or tab; decimal point or comma; time in s, ms, µs, ns or ISO stamps; one to three axes in m/s²,
 * g or mg (m/s² where neither header nor `unit` says); other columns ignored. Nothing is guessed past a fault: the
 * first row that cannot be read refuses the file with its row number (1 = first line of the file).
 * Misleads where the header gives a time without a unit: the unit is then taken from the median step.
 */
export function readCsv(text: string, options: ReadCsvOptions): Outcome<Recording> {
  const found = findCsvHeaderLine(text);
  if (!found.ok) return found;
  const { header, practice } = found.value;
  const samples = readSamples(text, found.value, options.unit);
  if (!samples.ok) return samples;
  const { stamps, accelerationMps2, iso } = samples.value;
  if (stamps.length === 0) return failure('no-samples');
  const times: StampTimes = iso ? isoTimes(stamps, iso) : timesOfNumbers(stamps, header.time.unit);
  return success({
    ...(times.startedAt === undefined ? {} : { startedAt: times.startedAt }),
    sensor: { source: 'file', practice, name: options.name },
    axes: header.axes.map((column) => column.axis),
    timeS: times.timeS,
    accelerationMps2,
  });
}

function isoTimes(stamps: Float64Array, iso: IsoClock): StampTimes {
  const first = stamps[0]!;
  const timeS = stamps.map((stamp) => stamp - first);
  return iso.startedAt === undefined ? { timeS } : { timeS, startedAt: iso.startedAt };
}

function readSamples(
  text: string,
  line: CsvHeaderLine,
  unit: AccelerationUnit | undefined,
): Outcome<Samples> {
  const roomCount = countLines(text, line.bodyStart);
  if (roomCount > MAX_SAMPLES) return failure('too-large', { sampleCount: roomCount, maxCount: MAX_SAMPLES });
  const axes = line.header.axes.map((column) => ({
    columnIndex: column.columnIndex,
    factor: MPS2_PER_UNIT[unit ?? column.unit ?? 'mps2'],
    values: new Float32Array(roomCount),
  }));
  const timeIndex = line.header.time.columnIndex;
  const stamps = new Float64Array(roomCount);
  const sign: DecimalSign = { code: 0 };
  const row = emptyCsvRow(MAX_COLUMNS);
  let iso: IsoClock | undefined;
  let count = 0;
  let rowNumber = line.bodyRow;
  for (let at = line.bodyStart; at < text.length; at = row.next, rowNumber += row.lineEndCount) {
    scanCsvRow(text, at, line.delimiter, row);
    if (isBlank(text, row)) continue;
    if (hasSurplus(row, line.columnCount))
      return badRow(text, row, rowNumber, line.columnCount, 'surplus-cell');
    if (count === 0) iso = isoClock(cellText(text, row, timeIndex));
    const stamp = iso
      ? isoSeconds(cellText(text, row, timeIndex), iso)
      : decimalCell(text, row, timeIndex, sign);
    if (!Number.isFinite(stamp)) return badRow(text, row, rowNumber, timeIndex, 'not-a-time');
    if (count > 0 && stamp < stamps[count - 1]!) return failure('time-not-increasing', { row: rowNumber });
    stamps[count] = stamp;
    for (const { columnIndex, factor, values } of axes) {
      const value = Math.fround(decimalCell(text, row, columnIndex, sign) * factor);
      if (!Number.isFinite(value)) return badRow(text, row, rowNumber, columnIndex, 'not-a-number');
      values[count] = value;
    }
    count++;
  }
  return success({
    stamps: stamps.slice(0, count),
    accelerationMps2: axes.map(({ values }) => values.slice(0, count)),
    iso,
  });
}

function decimalCell(text: string, row: CsvRow, index: number, sign: DecimalSign): number {
  return index < row.cellCount ? scanDecimal(text, row.starts[index]!, row.ends[index]!, sign) : Number.NaN;
}

function cellText(text: string, row: CsvRow, index: number): string {
  return index < row.cellCount ? text.slice(row.starts[index], row.ends[index]) : '';
}

/** `reason`: not-a-number, not-a-time, surplus-cell, or missing-cell when there is nothing to read. */
function badRow(text: string, row: CsvRow, rowNumber: number, index: number, reason: string): Outcome<never> {
  const found = quotedPiece(cellText(text, row, index));
  return failure('bad-row', {
    row: rowNumber,
    column: index + 1,
    reason: found === '' ? 'missing-cell' : reason,
    found,
  });
}

/** Nothing but blanks in every cell. */
function isBlank(text: string, row: CsvRow): boolean {
  for (let i = 0; i < row.cellCount; i++) {
    for (let at = row.starts[i]!; at < row.ends[i]!; at++) if (text.charCodeAt(at) > 32) return false;
  }
  return true;
}

/** More cells than the header has names, as decimal commas between comma delimiters make. A trailing delimiter may be. */
function hasSurplus(row: CsvRow, columnCount: number): boolean {
  for (let i = columnCount; i < row.cellCount; i++) if (row.ends[i]! > row.starts[i]!) return true;
  return false;
}

function countLines(text: string, from: number): number {
  let count = 1;
  for (let at = from; at < text.length; at++) {
    const code = text.charCodeAt(at);
    if (code === LINE_FEED || (code === CARRIAGE_RETURN && text.charCodeAt(at + 1) !== LINE_FEED)) count++;
  }
  return count;
}
