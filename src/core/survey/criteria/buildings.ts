import type { Analysis, Levels } from '../../model/analysis.ts';
import type { Interval } from '../../model/interval.ts';
import type { LevelFinding } from '../../model/judgement.ts';
import type { BuildingUse } from '../../model/place.ts';
import { graded, notAssessed, type Scale } from './grading.ts';

/** Piecewise linear guide value: points [Hz, m/s], held beyond both ends. */
type Line = readonly (readonly [frequencyHz: number, limitMps: number])[];
const line = (...points: [number, number][]): Line => points.map(([hz, mmps]) => [hz, mmps / 1e3]);

/** DIN 4150-3:2016 Table 1, foundation, short-term: whole table seen on one page, line 1 on two, values up to 10 Hz on three. */
export const DIN_4150_3_FOUNDATION: Readonly<Record<BuildingUse, Line>> = {
  commercial: line([10, 20], [50, 40], [100, 50]),
  dwelling: line([10, 5], [50, 15], [100, 20]),
  sensitive: line([10, 3], [50, 8], [100, 10]),
};
/** The same, top floor, horizontal, all frequencies, m/s: short-term and long-term. */
export const DIN_4150_3_TOP_FLOOR_MPS: Readonly<Record<BuildingUse, number>> = {
  commercial: 0.04,
  dwelling: 0.015,
  sensitive: 0.008,
};
export const DIN_4150_3_LONG_TERM_MPS: Readonly<Record<BuildingUse, number>> = {
  commercial: 0.01,
  dwelling: 0.005,
  sensitive: 0.0025,
};
const DIN_LINE: Readonly<Record<BuildingUse, string>> = {
  commercial: 'line 1, commercial and industrial',
  dwelling: 'line 2, dwellings',
  sensitive: 'line 3, sensitive buildings',
};

/** BS 7385-2:1993 Table 1, foundation, cosmetic damage: line 2 (seen on one page, and in its Brazilian derivative) and line 1. */
export const BS_7385_2: Readonly<Record<'framed' | 'light', Line>> = {
  framed: line([4, 50]),
  light: line([4, 15], [15, 20], [40, 50]),
};
/** Continuous vibration with resonance: guide values down by up to a half (BS 7385-2). The half is used. */
export const CONTINUOUS_FACTOR = 0.5;

/** DIN 45669-1 measures 1 to 80 Hz; BS 7385-2 asks for 4 to 250 Hz (from memory, .9). */
export const DIN_BAND_HZ: Interval = [1, 80];
export const BS_BAND_HZ: Interval = [4, 250];

/** Guide value at a frequency, m/s: linear between the points. */
export function guideValueMps(points: Line, frequencyHz: number): number {
  const first = points[0] as readonly [number, number];
  if (frequencyHz <= first[0]) return first[1];
  for (let index = 1; index < points.length; index++) {
    const [x0, y0] = points[index - 1] as readonly [number, number];
    const [x1, y1] = points[index] as readonly [number, number];
    if (frequencyHz <= x1) return y0 + ((frequencyHz - x0) / (x1 - x0)) * (y1 - y0);
  }
  return (points.at(-1) as readonly [number, number])[1];
}

/** Frequency that dominates the velocity: of the direct tones the one with the largest amplitude over frequency. */
export function dominantFrequencyHz(analysis: Analysis): number | undefined {
  const direct = analysis.tones.filter((tone) => tone.fold.verdict === 'direct');
  const first = direct[0];
  if (!first) return analysis.modes.find((mode) => mode.fold.verdict === 'direct')?.frequencyHz;
  const speed = (tone: typeof first): number => tone.amplitudeMps2 / tone.frequencyHz;
  return direct.reduce((best, next) => (speed(next) > speed(best) ? next : best), first).frequencyHz;
}

const single = (limit: number): Scale => ({ boundaries: [limit], zones: ['within', 'beyond'] });

/** Findings at a foundation: largest single axis against the guide value at the dominant frequency. */
export function foundationFindings(
  analysis: Analysis,
  levels: Levels,
  use: BuildingUse | undefined,
): LevelFinding[] {
  const din = {
    criterion: 'din-4150-3',
    measure: 'velocity-peak',
    unit: 'm/s',
    origin: 'DIN 4150-3:2016 Table 1',
    certain: true,
    bandHz: DIN_BAND_HZ,
  } as const;
  if (!use) return [notAssessed(din, 'class-unknown')];
  const frequencyHz = dominantFrequencyHz(analysis);
  const bs = {
    ...din,
    criterion: 'bs-7385-2',
    origin: 'BS 7385-2:1993 Table 1',
    bandHz: BS_BAND_HZ,
  } as const;
  const dinClassed = { ...din, classOf: DIN_LINE[use] };
  if (frequencyHz === undefined) return [notAssessed(dinClassed, 'no-dominant-frequency')];
  const measured = {
    value: levels.largestAxisVelocityPeakMps,
    seenHz: levels.bandHz,
    leftOutTones: levels.leftOutTones,
    falseTones: false,
  };
  const continuous = analysis.procedure === 'running' ? CONTINUOUS_FACTOR : 1;
  const bsLine = use === 'commercial' ? 'framed' : 'light';
  return [
    graded(dinClassed, single(guideValueMps(DIN_4150_3_FOUNDATION[use], frequencyHz)), measured),
    graded(
      { ...bs, classOf: bsLine === 'framed' ? 'line 1, framed or industrial' : 'line 2, unframed or light' },
      single(continuous * guideValueMps(BS_7385_2[bsLine], frequencyHz)),
      measured,
    ),
  ];
}

/** Findings on a top floor: horizontal peak velocity, short-term, and long-term for steady operation. */
export function topFloorFindings(
  analysis: Analysis,
  levels: Levels,
  use: BuildingUse | undefined,
): LevelFinding[] {
  const longTerm = analysis.procedure === 'running';
  const description = {
    criterion: longTerm ? 'din-4150-3-long-term' : 'din-4150-3',
    measure: 'velocity-peak-horizontal',
    unit: 'm/s',
    origin: longTerm ? 'DIN 4150-3:2016, long-term' : 'DIN 4150-3:2016 Table 1',
    certain: true,
    bandHz: DIN_BAND_HZ,
  } as const;
  if (!use) return [notAssessed(description, 'class-unknown')];
  const limits = longTerm ? DIN_4150_3_LONG_TERM_MPS : DIN_4150_3_TOP_FLOOR_MPS;
  const measured = {
    value: levels.horizontalVelocityPeakMps,
    seenHz: levels.bandHz,
    leftOutTones: levels.leftOutTones,
    falseTones: false,
  };
  return [graded({ ...description, classOf: DIN_LINE[use] }, single(limits[use]), measured)];
}
