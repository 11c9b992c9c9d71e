import type { Interval } from '../model/interval.ts';
import type { KnownBy, Source } from '../model/source.ts';

/**
 * Relative half-width (95 %) of a speed by how it was known; common practice, no source.
 * A nameplate gives full-load speed and the machine rarely runs at full load; a strobe or tachometer reads the shaft itself.
 */
export const TOLERANCE_RATIO_BY_KNOWN: Readonly<Record<KnownBy, number>> = {
  nameplate: 0.02,
  'drive-display': 0.01,
  tachometer: 0.003,
  strobe: 0.003,
  counted: 0.02,
  estimate: 0.1,
  unknown: 0.05,
};
/** Used when nothing says how it was known: as for a nameplate, the usual case. */
export const TOLERANCE_RATIO_UNSTATED = TOLERANCE_RATIO_BY_KNOWN.nameplate;

/** Relative half-width (95 %) of what a source's speed or frequency is known to. */
export function toleranceOf(source: Source): number {
  if (source.toleranceRatio !== undefined) return source.toleranceRatio;
  return source.knownBy === undefined ? TOLERANCE_RATIO_UNSTATED : TOLERANCE_RATIO_BY_KNOWN[source.knownBy];
}

/** Where a person's number came from, as an origin. */
export const originOf = (source: Source): string => source.knownBy ?? 'as entered';

export const asInterval = (value: number | Interval): Interval =>
  typeof value === 'number' ? [value, value] : value;

export const scaled = (range: Interval, factor: number): Interval => [range[0] * factor, range[1] * factor];

/** A range widened on both ends by a relative tolerance. */
export const widened = (range: Interval, toleranceRatio: number): Interval => [
  range[0] * (1 - toleranceRatio),
  range[1] * (1 + toleranceRatio),
];
