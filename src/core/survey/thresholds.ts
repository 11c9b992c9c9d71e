import type { Interval } from '../model/interval.ts';
import type { Thresholds } from '../model/thresholds.ts';

export const DEFAULT_THRESHOLDS: Thresholds = {
  /** Common practice, no source: what a speed, a load or a season moves by itself. */
  coincidentRatio: 0.05,
  /** DIN 4024-1 (machine foundations; from memory, .8): a steady force is amplified 2.8 times at most at damping 1 %. */
  apartBelowRatio: 0.8,
  /** DIN 4024-1 as above; the same 1.25 makes a support rigid in ISO 20816-3. */
  apartAboveRatio: 1.25,
  /** Common practice, no source: bearing film, preload, temperature and fill move a machine's mode by a few per cent. */
  stoppedRunningRatio: 0.05,
  /** Common practice, no source: five times the static effect is past what tidy operation hides. */
  specialistAmplificationRatio: 5,
  /** As above: below it the pair is a nuisance at most. */
  wantedAmplificationRatio: 5,
  /** Mounts at a third of the forcing frequency, undamped: 1/8 (derived). */
  wantedTransmissibilityRatio: 0.125,
};

/** What each may be set to. */
export const THRESHOLD_BOUNDS: Readonly<Record<keyof Thresholds, Interval>> = {
  coincidentRatio: [0, 0.2],
  apartBelowRatio: [0.3, 0.95],
  apartAboveRatio: [1.05, 3],
  stoppedRunningRatio: [0, 0.3],
  specialistAmplificationRatio: [1, 100],
  wantedAmplificationRatio: [1, 100],
  wantedTransmissibilityRatio: [0.01, 0.9],
};

export const THRESHOLD_KEYS = Object.keys(THRESHOLD_BOUNDS) as readonly (keyof Thresholds)[];

const isWithin = (key: keyof Thresholds, value: unknown): value is number =>
  typeof value === 'number' && value >= THRESHOLD_BOUNDS[key][0] && value <= THRESHOLD_BOUNDS[key][1];

const reachesIntoApart = ({ coincidentRatio, apartBelowRatio, apartAboveRatio }: Thresholds): boolean =>
  coincidentRatio > 1 - apartBelowRatio || coincidentRatio > apartAboveRatio - 1;

/**
 * Defaults with what the person set.
 * @throws RangeError when a threshold makes no sense, naming it
 */
export function thresholdsWith(own: Partial<Thresholds> = {}): Thresholds {
  const all = { ...DEFAULT_THRESHOLDS, ...own };
  for (const key of THRESHOLD_KEYS) {
    const [low, high] = THRESHOLD_BOUNDS[key];
    const value: unknown = all[key];
    if (!isWithin(key, value)) throw new RangeError(`${key} must be ${low} to ${high}, got ${String(value)}`);
  }
  if (reachesIntoApart(all))
    throw new RangeError(`coincidentRatio ${all.coincidentRatio} reaches into apart`);
  return all;
}

/** Of what was kept as the person's own thresholds, what can be used: a kept setting must never keep a reading from opening. */
export function sensibleThresholds(kept: Readonly<Record<string, unknown>>): Partial<Thresholds> {
  const own: Partial<Thresholds> = Object.fromEntries(
    THRESHOLD_KEYS.filter((key) => isWithin(key, kept[key])).map((key) => [key, kept[key]]),
  );
  return reachesIntoApart({ ...DEFAULT_THRESHOLDS, ...own }) ? {} : own;
}
