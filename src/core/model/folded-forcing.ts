import type { Interval } from './interval.ts';
import type { Forcing } from './source.ts';

/** A forcing that a phone would see folded, told before recording. */
export interface FoldedForcing {
  readonly forcing: Forcing;
  /** Where this phone would show it. */
  readonly imageHz: Interval;
  /** At half the rate or at zero: its amplitude cannot be read at all. */
  readonly edge: 'half-rate' | 'zero' | 'none';
}
