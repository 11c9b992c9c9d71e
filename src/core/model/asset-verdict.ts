import type { Trust } from './doubt.ts';
import type { Interval } from './interval.ts';
import type { Separation, UnpairedVerdict, Verdict } from './judgement.ts';
import type { Forcing } from './source.ts';

/** A forcing against the whole asset. */
export interface PooledPair {
  readonly forcing: Forcing;
  readonly forcingIndex: number;
  readonly verdict: Verdict | UnpairedVerdict;
  /** The reading and pair that give the verdict; absent where no reading had a mode near it. */
  readonly reading?: string;
  readonly separation?: Separation;
}

/** One mode of the asset, found in one or more readings. */
export interface PooledMode {
  readonly frequencyHz: number;
  readonly frequencySdHz: number;
  readonly frequencyIntervalHz: Interval;
  /** Scatter between the readings beyond their own uncertainties, standard deviation. */
  readonly frequencyBetweenHz: number;
  readonly dampingRatio: number;
  readonly dampingRatioSd: number;
  readonly dampingIntervalRatio: Interval;
  readonly readings: readonly string[];
  readonly spots: readonly string[];
  /** Spot at which it moved most. */
  readonly strongestSpot?: string;
}

export interface Coverage {
  readonly spotsRead: readonly string[];
  readonly spotsMissing: readonly string[];
  /** Directions named by the person, over all spots. */
  readonly directions: readonly string[];
  readonly tapCount: number;
  readonly hasRunning: boolean;
  readonly hasStopped: boolean;
}

/** What to do next on an asset. Sentences: src/text/assets.ts. */
export const NEXT_STEP_KINDS = [
  'tap-first',
  'read-spot',
  'repeat-poor',
  'settle-undecided',
  'add-spot',
  'other-direction',
  'read-running',
  'tap-stopped',
] as const;
export type NextStepKind = (typeof NEXT_STEP_KINDS)[number];
export interface NextStep {
  readonly kind: NextStepKind;
  /** Id of the spot it is about. */
  readonly spot?: string;
  /** Id of the reading it is about. */
  readonly reading?: string;
}

export interface AssetVerdict {
  /** Worst first. */
  readonly pairs: readonly PooledPair[];
  /** By rising frequency. */
  readonly modes: readonly PooledMode[];
  readonly coverage: Coverage;
  /** Most useful first. */
  readonly next: readonly NextStep[];
  /** The worst trust among the readings that give the pairs; of all readings where none does. */
  readonly trust: Trust;
}
