/**
 * How a measured level is held against limits. One rule for all criteria: a measurement that sees only part of the needed band is
 * a lower bound. It can show that a limit is passed, never that it is kept.
 */
import type { Interval } from '../../model/interval.ts';
import type { LevelFinding, LevelReason } from '../../model/judgement.ts';

/** Boundaries in rising order with the name of the zone below each; the last zone has no upper boundary. */
export interface Scale {
  readonly boundaries: readonly number[];
  /** One more than boundaries. */
  readonly zones: readonly string[];
}

export interface Measured {
  readonly value: number | undefined;
  /** Band that the reading saw. */
  readonly seenHz: Interval;
  /** Folded or undecided tones were left out of the value. */
  readonly leftOutTones: boolean;
  /** Folded tones are in the value at a false frequency: no bound of any kind (acceleration). */
  readonly falseTones: boolean;
  /** The value was not limited to the criterion's band: what lies above it is in the value. */
  readonly unfiltered?: boolean;
}

type Description = Pick<
  LevelFinding,
  'criterion' | 'measure' | 'unit' | 'origin' | 'certain' | 'bandHz' | 'classOf'
>;

export interface Circumscribed {
  /** Reasons beyond the band why even a full view is no pass, e.g. the crowd that the class presumes was not there. */
  readonly noPass?: readonly LevelReason[];
}

/** Name of the zone that a value lies in; a value on a boundary still belongs below it. */
export function zoneOf(value: number, scale: Scale): string {
  const index = scale.boundaries.findIndex((boundary) => value <= boundary);
  return scale.zones[index === -1 ? scale.boundaries.length : index] as string;
}

/** Limit that matters for a value: the highest boundary passed, or the first one. */
const limitFor = (value: number, scale: Scale): number =>
  scale.boundaries.filter((boundary) => value > boundary).at(-1) ?? (scale.boundaries[0] as number);

const seesAll = (seenHz: Interval, neededHz: Interval): boolean =>
  seenHz[0] <= neededHz[0] && seenHz[1] >= neededHz[1];

/** A measurement on a scale, as a finding. */
export function graded(
  description: Description,
  scale: Scale,
  measured: Measured,
  { noPass = [] }: Circumscribed = {},
): LevelFinding {
  const { value } = measured;
  const last = scale.boundaries.at(-1) as number;
  if (value === undefined || measured.falseTones) {
    const reasons: LevelReason[] = measured.falseTones ? ['folded-in-acceleration'] : ['no-value'];
    if (measured.leftOutTones) reasons.push('folded-left-out');
    return { ...description, grade: 'not-assessed', beyondLast: false, reasons };
  }
  const reasons: LevelReason[] = [
    ...(seesAll(measured.seenHz, description.bandHz) ? [] : (['band-partly-seen'] as const)),
    ...(measured.leftOutTones ? (['folded-left-out'] as const) : []),
    ...noPass,
  ];
  const common = { ...description, value, limit: limitFor(value, scale), beyondLast: value > last };
  const passedFirst = value > (scale.boundaries[0] as number);
  const isUpperBound =
    passedFirst && measured.unfiltered === true && seesBeyond(measured.seenHz, description.bandHz);
  const told = isUpperBound ? [...reasons, 'wider-band' as const] : reasons;
  if (reasons.length === 0)
    return {
      ...common,
      reasons: told,
      zone: zoneOf(value, scale),
      grade: value > last ? 'beyond' : 'within',
    };
  // Partly too much, partly too little: no bound of either kind.
  if (isUpperBound && reasons.includes('band-partly-seen'))
    return { ...common, reasons: told, beyondLast: false, grade: 'not-assessed' };
  return passedFirst
    ? { ...common, reasons: told, zone: zoneOf(value, scale), grade: 'at-least' }
    : { ...common, reasons: told, grade: 'not-assessed' };
}

/** Motion is seen well above the needed band (a quarter beyond its end: our own bound). */
const seesBeyond = (seenHz: Interval, neededHz: Interval): boolean => seenHz[1] > 1.25 * neededHz[1];

/** A criterion whose class is not known: named, with its reason, not graded. */
export const notAssessed = (description: Description, reason: LevelReason): LevelFinding => ({
  ...description,
  grade: 'not-assessed',
  beyondLast: false,
  reasons: [reason],
});
