import type { Circumstances } from './fact.ts';
import type { Interval } from './interval.ts';

export interface QuantityChange {
  /** Later over earlier, with its 95 % interval; beyond the floor when 1 lies outside. */
  readonly ratio: number;
  readonly interval: Interval;
  readonly changed: boolean;
  /** Whose repeatability was used: common practice, or the spot's own scatter (from five earlier visits on). */
  readonly floor: 'practice' | 'own';
}

export interface ModeChange {
  readonly earlierIndex: number;
  readonly laterIndex: number;
  readonly frequency: QuantityChange;
  readonly damping: QuantityChange;
}

/** Conditions that differ between two visits and may explain a change. */
export type Condition = keyof Circumstances;

export interface VisitChange {
  readonly earlier: string;
  readonly later: string;
  readonly modes: readonly ModeChange[];
  /** Modes of one visit that the other did not find. */
  readonly lostIndexes: readonly number[];
  readonly newIndexes: readonly number[];
  readonly conditions: readonly Condition[];
  readonly temperatureDifferenceC?: number;
}
