import { UNITS_PER_SECOND, type TimeUnit } from './csv-units.ts';
import { parseIsoStamp, secondsToIso } from './iso-time.ts';

/** Wall-clock stamps lie between 2001 and 2103 in seconds since 1970; anything else counts from an unknown zero. */
const EPOCH_FLOOR_S = 1e9;
const EPOCH_CEILING_S = 4.2e9;
/**
 * Largest plausible median step when the header names no time unit, per unit: 1 s of seconds, 1 s of milliseconds,
 * 1 s of microseconds; beyond that nanoseconds. Our choice: a vibration recording has at least one sample a second.
 */
const LARGEST_STEP: readonly (readonly [TimeUnit, number])[] = [
  ['s', 1],
  ['ms', 1e3],
  ['us', 1e6],
];

export interface StampTimes {
  /** s, relative to the first stamp. */
  readonly timeS: Float64Array;
  /** ISO instant of the first stamp, where the stamps tell it. */
  readonly startedAt?: string;
}

/** Times of numeric stamps. Without a unit it follows from the median step (misleads below one sample a second). */
export function timesOfNumbers(stamps: Float64Array, unit: TimeUnit | undefined): StampTimes {
  const perSecond = UNITS_PER_SECOND[unit ?? likelyUnit(stamps)];
  const first = stamps[0] ?? 0;
  const timeS = stamps.map((stamp) => (stamp - first) / perSecond);
  const epochS = first / perSecond;
  const isWallClock = epochS > EPOCH_FLOOR_S && epochS < EPOCH_CEILING_S;
  return isWallClock ? { timeS, startedAt: secondsToIso(epochS) } : { timeS };
}

/** ISO stamps become seconds since the first stamp's whole second, so that microseconds survive in a double. */
export interface IsoClock {
  readonly firstWholeS: number;
  readonly startedAt?: string;
}

export function isoClock(firstCell: string): IsoClock | undefined {
  const stamp = parseIsoStamp(firstCell);
  if (!stamp) return undefined;
  return {
    firstWholeS: stamp.wholeS,
    ...(stamp.isInstant ? { startedAt: secondsToIso(stamp.wholeS + stamp.fractionS) } : {}),
  };
}

/** NaN when the cell is no ISO stamp. */
export function isoSeconds(cell: string, clock: IsoClock): number {
  const stamp = parseIsoStamp(cell);
  return stamp ? stamp.wholeS - clock.firstWholeS + stamp.fractionS : Number.NaN;
}

function likelyUnit(stamps: Float64Array): TimeUnit {
  const steps = stamps
    .slice(1)
    .map((stamp, i) => stamp - stamps[i]!)
    .filter((step) => step > 0)
    .sort();
  const median = steps[Math.floor(steps.length / 2)] ?? 0;
  return LARGEST_STEP.find(([, largest]) => median <= largest)?.[0] ?? 'ns';
}
