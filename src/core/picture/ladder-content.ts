import type { Interval } from '../model/interval.ts';
import type { Verdict } from '../model/judgement.ts';

/** What a ladder shows, in words and frequencies; how it is laid out is `ladderPicture`'s matter. */
export interface LadderMode {
  readonly id: string;
  readonly frequencyHz: number;
  readonly frequencySdHz: number;
  readonly dampingRatio: number;
  /** Two short lines: its frequency, its damping. */
  readonly title: string;
  readonly detail: string;
  /** True where its own frequency is only one of several it may have: drawn dashed, without a profile. */
  readonly isUnsure?: boolean;
  /** Other frequencies that it may truly have (folding). */
  readonly candidatesHz?: readonly number[];
  /** Where it was before a change that is being tried. */
  readonly beforeHz?: number;
}

export interface LadderForcing {
  readonly id: string;
  readonly label: string;
  readonly frequencyHz: Interval;
  readonly verdict?: Verdict;
  /** The mode that its verdict is about. */
  readonly modeId?: string;
  readonly beforeHz?: Interval;
}

/** A line that was measured; forced, so on the side of the forcings. */
export interface LadderTone {
  readonly id: string;
  readonly label: string;
  readonly frequencyHz: number;
}

export interface LadderPeak {
  readonly frequencyHz: number;
  readonly widthHz: number;
}

export interface LadderContent {
  readonly modes: readonly LadderMode[];
  readonly forcings: readonly LadderForcing[];
  readonly tones: readonly LadderTone[];
  readonly broadPeaks: readonly LadderPeak[];
  /** What the recording could see; absent where there is no recording (forms of sources). */
  readonly seenHz?: Interval;
  readonly rateHz?: number;
  readonly words: {
    readonly blindAbove: string;
    readonly blindBelow: string;
    /** Said on the side of the modes when there is none. */
    readonly noMode: string;
    /** Heads of the two sides, and the unit between the rails. */
    readonly structure: string;
    readonly sources: string;
    readonly unit: string;
    /** What the scale below the modes measures. */
    readonly amplification: string;
  };
}

/** The widest view worth having: people and wind below, machines above; beyond is listed, not drawn. */
const LOWEST_HZ = 0.2;
const HIGHEST_HZ = 400;
/** Free room beyond the outermost item, as a ratio. */
const MARGIN_RATIO = 1.18;
/** Never less than this ratio between the ends of the whole ladder, so that one item does not fill it. */
const SMALLEST_SPAN_RATIO = 12;
const EMPTY_RANGE_HZ: Interval = [0.5, 60];

const itemsHz = (content: LadderContent): number[] => [
  ...content.modes.flatMap((m) => [
    m.frequencyHz,
    ...(m.candidatesHz ?? []),
    ...(m.beforeHz ? [m.beforeHz] : []),
  ]),
  ...content.forcings.flatMap((f) => [...f.frequencyHz, ...(f.beforeHz ?? [])]),
  ...content.tones.map((t) => t.frequencyHz),
  ...content.broadPeaks.map((p) => p.frequencyHz),
  // a little of the blind range belongs to the picture: what cannot be seen is part of the answer
  ...(content.seenHz ? [Math.max(content.seenHz[0], 0.8), content.seenHz[1] * 1.35] : []),
];

/** The whole range of a ladder: everything in it, some of the blind ranges, round about. */
export const ladderRangeHz = (content: LadderContent): Interval => {
  const all = itemsHz(content).filter((f) => f > 0 && Number.isFinite(f));
  if (all.length === 0) return EMPTY_RANGE_HZ;
  const low = Math.min(HIGHEST_HZ / 2, Math.max(LOWEST_HZ, Math.min(...all) / MARGIN_RATIO));
  const high = Math.max(LOWEST_HZ * 2, Math.min(HIGHEST_HZ, Math.max(...all) * MARGIN_RATIO));
  const widen = Math.sqrt(Math.max(1, SMALLEST_SPAN_RATIO / (high / low)));
  return [Math.max(LOWEST_HZ, low / widen), high * widen];
};
