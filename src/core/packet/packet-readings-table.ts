import type { Analysis, Mode } from '../model/analysis.ts';
import type { ReadingFact } from '../model/fact.ts';
import { csvLine, type CsvCell } from './packet-csv.ts';

export interface TableReading {
  readonly reading: ReadingFact;
  /** The newest kept analysis. */
  readonly analysis: Analysis;
  readonly site?: string;
  readonly asset?: string;
  readonly spot?: string;
  readonly label?: string;
  readonly notes?: string;
}

/** Modes and tones that have columns, strongest first. */
const MODE_COUNT = 3;
const TONE_COUNT = 3;

type Column = readonly [name: string, unit: string, cell: (of: TableReading) => CsvCell];

const words = (name: string, cell: (of: TableReading) => string): Column => [
  name,
  '',
  (of) => ({ word: cell(of) }),
];
const free = (name: string, cell: (of: TableReading) => string | undefined): Column => [
  name,
  '',
  (of) => ({ text: cell(of) ?? '' }),
];
const figure = (name: string, unit: string, cell: (of: TableReading) => number | undefined): Column => [
  name,
  unit,
  (of) => ({ number: cell(of) }),
];

const modeColumns = (index: number): Column[] => {
  const of = (read: (mode: Mode) => number) => (row: TableReading) => {
    const mode = row.analysis.modes[index];
    return mode && read(mode);
  };
  const name = `mode${index + 1}`;
  return [
    figure(
      `${name}_frequency`,
      'Hz',
      of((mode) => mode.frequencyHz),
    ),
    figure(
      `${name}_frequency_sd`,
      'Hz',
      of((mode) => mode.frequencySdHz),
    ),
    figure(
      `${name}_damping_ratio`,
      '1',
      of((mode) => mode.dampingRatio),
    ),
    figure(
      `${name}_damping_ratio_sd`,
      '1',
      of((mode) => mode.dampingRatioSd),
    ),
    figure(
      `${name}_amplitude`,
      'm/s2',
      of((mode) => mode.amplitudeMps2),
    ),
    words(`${name}_fold`, (row) => row.analysis.modes[index]?.fold.verdict ?? ''),
  ];
};

const toneColumns = (index: number): Column[] => {
  const name = `tone${index + 1}`;
  return [
    figure(`${name}_frequency`, 'Hz', (row) => row.analysis.tones[index]?.frequencyHz),
    figure(`${name}_frequency_sd`, 'Hz', (row) => row.analysis.tones[index]?.frequencySdHz),
    figure(`${name}_amplitude`, 'm/s2', (row) => row.analysis.tones[index]?.amplitudeMps2),
    words(`${name}_fold`, (row) => row.analysis.tones[index]?.fold.verdict ?? ''),
  ];
};

const upTo = (count: number): readonly number[] => Array.from({ length: count }, (_, i) => i);

const COLUMNS: readonly Column[] = [
  words('reading', ({ reading }) => reading._id),
  words('recorded_at', ({ reading }) => reading.recordedAt),
  words('time_zone', ({ reading }) => reading.timeZone),
  free('site', ({ site }) => site),
  free('asset', ({ asset }) => asset),
  free('spot', ({ spot }) => spot),
  free('name', ({ label }) => label),
  words('procedure', ({ analysis }) => analysis.procedure),
  words('practice', ({ reading }) => (reading.practice ? 'yes' : 'no')),
  words('trust', ({ analysis }) => analysis.trust),
  words('doubts', ({ analysis }) => analysis.doubts.map(({ code }) => code).join(' ')),
  ...upTo(MODE_COUNT).flatMap(modeColumns),
  ...upTo(TONE_COUNT).flatMap(toneColumns),
  figure('acceleration_peak', 'm/s2', ({ analysis }) => analysis.levels?.peakMps2),
  figure('acceleration_rms', 'm/s2', ({ analysis }) => analysis.levels?.rmsMps2),
  figure('velocity_rms', 'm/s', ({ analysis }) => analysis.levels?.velocityRmsMps),
  figure('duration', 's', ({ analysis }) => analysis.recording.durationS),
  figure('rate', 'Hz', ({ analysis }) => analysis.recording.rateHz),
  figure('sees_from', 'Hz', ({ analysis }) => analysis.recording.usableBandHz[0]),
  figure('sees_to', 'Hz', ({ analysis }) => analysis.recording.usableBandHz[1]),
  words('mounting', ({ reading }) => reading.circumstances.mounting),
  words('excitation', ({ reading }) => reading.circumstances.excitation),
  figure('machine_speed', 'r/min', ({ reading }) => reading.circumstances.speedRpm),
  free('notes', ({ notes }) => notes),
  figure('analysis_version', '', ({ analysis }) => analysis.version),
  words('app_version', ({ reading }) => reading.app.version),
  words('samples_sha256', ({ reading }) => reading.rawSha256),
];

/** Heading and unit row; the last column holds a remark on every row. */
export const readingsTableHead = (): string =>
  csvLine([...COLUMNS.map(([name]) => ({ word: name })), { word: 'remark' }]) +
  csvLine([...COLUMNS.map(([, unit]) => ({ word: unit })), { word: '' }]);

/** One row a reading; standard deviations, not ±; frequencies where they appear. */
export const readingsTableRow = (row: TableReading, remark: string): string =>
  csvLine([...COLUMNS.map(([, , cell]) => cell(row)), { word: remark }]);
