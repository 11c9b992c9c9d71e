import type { Analysis } from '../model/analysis.ts';
import type { SpeedPoint, SpeedSeries } from '../model/guided-pairs.ts';
import { failure, success, type Outcome } from '../model/outcome.ts';
import type { Interval } from '../model/interval.ts';

export interface SpeedReading {
  readonly speedRpm: number;
  readonly analysis: Analysis;
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
  // An entered speed below half the rate settles what the time stamps alone left undecided.
  const visible = wanted < analysis.recording.rateHz / 2;
  const near = analysis.tones.filter(
    (tone) => visible && tone.fold.verdict !== 'folded' && Math.abs(tone.frequencyHz - wanted) <= reach,
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
