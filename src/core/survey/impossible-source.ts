import type { Interval } from '../model/interval.ts';
import type { Source } from '../model/source.ts';
import { synchronousSpeedRpm } from './rotating.ts';
import { asInterval } from './tolerance.ts';

/** Why a source cannot be; sentences in src/text/problems.ts. */
export const IMPOSSIBLE_REASONS = [
  'not-positive',
  'too-large',
  'range-reversed',
  'not-whole',
  'pace-impossible',
  'above-synchronous',
  'tolerance-out-of-range',
  'belt-shorter-than-pulley',
  'ratio-out-of-range',
  'strouhal-needed',
] as const;
export type ImpossibleReason = (typeof IMPOSSIBLE_REASONS)[number];
export interface Impossibility {
  readonly field: string;
  readonly reason: ImpossibleReason;
  readonly bound?: number;
}

/** Above any machine a phone could be laid on (high-speed spindles and small turbines reach it), r/min. Our own bound. */
export const LARGEST_SPEED_RPM = 100_000;
/** Largest frequency that a forcing may be given, Hz. Our own bound: far above what matters to a structure. */
export const LARGEST_FREQUENCY_HZ = 10_000;
/** People's pace, Hz: nobody steps, jumps or sways outside. Our own bound around the published ranges (0.4 to 4.5 Hz). */
export const PACE_HZ: Interval = [0.2, 6];
/** Largest wind speed, m/s (a strong tropical storm). Our own bound. */
export const LARGEST_WIND_MPS = 90;
/** A tolerance above a half says nothing. Our own bound. */
export const LARGEST_TOLERANCE_RATIO = 0.5;
/** Orders and counts beyond this are slips of the pen. Our own bound. */
export const LARGEST_COUNT = 1000;
/** Shortest belt in pulley diameters: half way round, then over a vanishing second pulley that touches it (geometry: pi/2 + 1). */
const SHORTEST_BELT_DIAMETERS = Math.PI / 2 + 1;
/** Shaft speed of a motor may read this much above synchronous by the error of a display; more is a generator or a mistake. */
const SYNCHRONOUS_SLACK_RATIO = 0.005;

function range(field: string, value: number | Interval, largest: number): Impossibility | undefined {
  const [low, high] = asInterval(value);
  if (!(low > 0)) return { field, reason: 'not-positive' };
  if (!(high <= largest)) return { field, reason: 'too-large', bound: largest };
  return low > high ? { field, reason: 'range-reversed' } : undefined;
}

function count(field: string, value: number | undefined, whole = true): Impossibility | undefined {
  if (value === undefined) return undefined;
  if (!(value > 0)) return { field, reason: 'not-positive' };
  if (value > LARGEST_COUNT) return { field, reason: 'too-large', bound: LARGEST_COUNT };
  return whole && !Number.isInteger(value) ? { field, reason: 'not-whole' } : undefined;
}

const positive = (field: string, value: number | undefined): Impossibility | undefined =>
  value === undefined || (value > 0 && Number.isFinite(value))
    ? undefined
    : { field, reason: 'not-positive' };

function ofKind(source: Source): Impossibility | undefined {
  switch (source.kind) {
    case 'machine':
      return (
        range('speedRpm', source.speedRpm, LARGEST_SPEED_RPM) ??
        count('bladeCount', source.bladeCount) ??
        count('toothCount', source.toothCount) ??
        count('cylinders', source.cylinders) ??
        (source.orders ?? []).map((order) => count('orders', order, false)).find(Boolean) ??
        ofBearing(source.bearing)
      );
    case 'belt':
      return (
        range('speedRpm', source.speedRpm, LARGEST_SPEED_RPM) ??
        positive('pulleyDiameterM', source.pulleyDiameterM) ??
        positive('beltLengthM', source.beltLengthM) ??
        (source.beltLengthM < SHORTEST_BELT_DIAMETERS * source.pulleyDiameterM
          ? { field: 'beltLengthM', reason: 'belt-shorter-than-pulley' }
          : undefined)
      );
    case 'mains': {
      if (source.speedRpm === undefined) return undefined;
      const bound = source.poles && synchronousSpeedRpm(source.supplyHz, source.poles);
      const above = bound && asInterval(source.speedRpm)[1] > bound * (1 + SYNCHRONOUS_SLACK_RATIO);
      return (
        range('speedRpm', source.speedRpm, LARGEST_SPEED_RPM) ??
        (above ? { field: 'speedRpm', reason: 'above-synchronous', bound } : undefined)
      );
    }
    case 'footfall':
      return (
        ofPace(source.paceHz) ??
        count('stepCount', source.stepCount) ??
        count('peopleCount', source.peopleCount)
      );
    case 'wind':
      return (
        range('speedMps', source.speedMps, LARGEST_WIND_MPS) ??
        positive('widthM', source.widthM) ??
        positive('depthM', source.depthM) ??
        positive('massPerLengthKgPerM', source.massPerLengthKgPerM) ??
        ofStrouhal(source.shape, source.strouhalRatio)
      );
    case 'traffic':
      return undefined;
    case 'band':
      return (
        range('frequencyHz', source.frequencyHz, LARGEST_FREQUENCY_HZ) ?? count('harmonics', source.harmonics)
      );
  }
}

function ofPace(paceHz: number | Interval | undefined): Impossibility | undefined {
  if (paceHz === undefined) return undefined;
  const [low, high] = asInterval(paceHz);
  if (!(low >= PACE_HZ[0] && high <= PACE_HZ[1])) return { field: 'paceHz', reason: 'pace-impossible' };
  return low > high ? { field: 'paceHz', reason: 'range-reversed' } : undefined;
}

function ofStrouhal(shape: string | undefined, strouhalRatio: number | undefined): Impossibility | undefined {
  if (strouhalRatio === undefined)
    return shape === 'custom' ? { field: 'strouhalRatio', reason: 'strouhal-needed' } : undefined;
  return strouhalRatio > 0 && strouhalRatio <= 1
    ? undefined
    : { field: 'strouhalRatio', reason: 'ratio-out-of-range' };
}

function ofBearing(
  bearing: { ballCount: number; diameterRatio: number } | undefined,
): Impossibility | undefined {
  if (!bearing) return undefined;
  const inside = bearing.diameterRatio > 0 && bearing.diameterRatio < 1;
  return (
    count('ballCount', bearing.ballCount) ??
    (inside ? undefined : { field: 'diameterRatio', reason: 'ratio-out-of-range' })
  );
}

/** What makes a source impossible: the field, the reason and the bound; undefined when it can be. */
export function impossibilityOf(source: Source): Impossibility | undefined {
  const tolerance = source.toleranceRatio;
  if (tolerance !== undefined && !(tolerance >= 0 && tolerance <= LARGEST_TOLERANCE_RATIO))
    return { field: 'toleranceRatio', reason: 'tolerance-out-of-range', bound: LARGEST_TOLERANCE_RATIO };
  return ofKind(source);
}
