import type { Analysis } from '../model/analysis.ts';
import { failure, success, type Outcome } from '../model/outcome.ts';
import type { Interval } from '../model/interval.ts';

export interface SpeedReading {
  readonly speedRpm: number;
  readonly analysis: Analysis;
}

export interface SpeedPoint {
  readonly speedRpm: number;
  readonly amplitudeMps2: number;
  /** Displacement of the line over speed squared, relative to the largest: what a constant unbalance force would give. */
  readonly perForceRatio: number;
}

/**
 * `resonance`: response to a like force rises to a peak inside the range and falls again on both sides; `rising`, `falling`: it is
 * largest at an end, the peak lies beyond; `flat`: no peak that stands out.
 */
export type SpeedFinding = 'resonance' | 'rising' | 'falling' | 'flat';

export interface SpeedSeries {
  readonly order: number;
  /** By rising speed. */
  readonly points: readonly SpeedPoint[];
  /** Speeds at which the line was not found. */
  readonly missingRpm: readonly number[];
  readonly finding: SpeedFinding;
  /** Speeds between which the peak lies (neighbours of the largest point), and the frequency of the line there. */
  readonly peakRpm?: Interval;
  readonly peakHz?: Interval;
}

/** Fewest speeds for a peak with two sides. */
export const FEWEST_SPEEDS = 4;
/** The peak must stand above both ends by this factor (our own bound; half power is 1.41). */
export const PEAK_FACTOR = 1.5;
/** The line is looked for within this of order times entered speed (a display error of 2 %). */
export const SPEED_REACH_RATIO = 0.02;

function pointAt(
  { speedRpm, analysis }: SpeedReading,
  order: number,
): { speedRpm: number; amplitudeMps2: number } | undefined {
  const wanted = (order * speedRpm) / 60;
  const reach = SPEED_REACH_RATIO * wanted + 0.5 / analysis.recording.durationS;
  const near = analysis.tones.filter(
    (tone) => tone.fold.verdict === 'direct' && Math.abs(tone.frequencyHz - wanted) <= reach,
  );
  if (near.length === 0) return undefined;
  return { speedRpm, amplitudeMps2: Math.max(...near.map((tone) => tone.amplitudeMps2)) };
}

/**
 * Running readings at entered speeds as amplitude against speed: the field proof of resonance. Each amplitude is turned to displacement
 * and divided by speed squared (acceleration over speed to the fourth), so that a rise of the unbalance force is not taken for a peak.
 * Fails with `too-few-readings` below four speeds at which the line was found unfolded.
 */
export function speedSeries(readings: readonly SpeedReading[], order = 1): Outcome<SpeedSeries> {
  const found = readings
    .flatMap((reading) => pointAt(reading, order) ?? [])
    .sort((a, b) => a.speedRpm - b.speedRpm);
  const missingRpm = readings
    .map(({ speedRpm }) => speedRpm)
    .filter((speedRpm) => !found.some((point) => point.speedRpm === speedRpm));
  if (found.length < FEWEST_SPEEDS)
    return failure('too-few-readings', { count: found.length, needed: FEWEST_SPEEDS });
  const perForce = found.map(({ speedRpm, amplitudeMps2 }) => amplitudeMps2 / speedRpm ** 4);
  const largest = Math.max(...perForce);
  const points = found.map((point, index) => ({
    ...point,
    perForceRatio: (perForce[index] as number) / largest,
  }));
  return success({ order, points, missingRpm, ...findingOf(points, order) });
}

function findingOf(points: readonly SpeedPoint[], order: number) {
  const peak = points.findIndex(({ perForceRatio }) => perForceRatio === 1);
  const first = points[0] as SpeedPoint;
  const last = points.at(-1) as SpeedPoint;
  const stands = (end: SpeedPoint): boolean => end.perForceRatio < 1 / PEAK_FACTOR;
  if (peak === points.length - 1) return { finding: stands(first) ? ('rising' as const) : ('flat' as const) };
  if (peak === 0) return { finding: stands(last) ? ('falling' as const) : ('flat' as const) };
  if (!stands(first) || !stands(last)) return { finding: 'flat' as const };
  const peakRpm: Interval = [
    (points[peak - 1] as SpeedPoint).speedRpm,
    (points[peak + 1] as SpeedPoint).speedRpm,
  ];
  const peakHz: Interval = [(peakRpm[0] * order) / 60, (peakRpm[1] * order) / 60];
  return { finding: 'resonance' as const, peakRpm, peakHz };
}
