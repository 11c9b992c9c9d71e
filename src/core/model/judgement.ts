import type { Doubt, Trust } from './doubt.ts';
import type { Interval } from './interval.ts';
import type { AmplificationKind, Forcing } from './source.ts';

export type Verdict = 'coincident' | 'close' | 'apart' | 'undecided' | 'blind';

export interface Separation {
  readonly source: string;
  readonly forcing: string;
  readonly forcingHz: Interval;
  readonly modeIndex: number;
  /** Forcing frequency / natural frequency with both uncertainties. */
  readonly ratio: Interval;
  readonly amplification: { readonly kind: AmplificationKind; readonly interval: Interval };
  readonly verdict: Verdict;
  /** True when the build-up was limited by the cycles there are. */
  readonly buildUpLimited?: boolean;
  /** Load factor times build-up, for ranking footfall. */
  readonly effectRatio?: number;
}

export type LevelGrade = 'within' | 'beyond' | 'at-least' | 'not-assessed';
export interface LevelFinding {
  readonly criterion: string;
  readonly measure: string;
  readonly value?: number;
  readonly unit: string;
  readonly grade: LevelGrade;
  /** Zone, class or comfort word of the criterion. */
  readonly zone?: string;
  readonly limit?: number;
  readonly origin: string;
  readonly certain: boolean;
  readonly bandHz: Interval;
  readonly reason?: string;
}

export type WayOutKind = 'speed' | 'stiffness' | 'mass' | 'damping' | 'isolation';
export interface WayOut {
  readonly kind: WayOutKind;
  readonly separationIndex: number;
  /** Factor on stiffness or mass, target damping ratio, or isolation ratio, as its kind says. */
  readonly factor?: Interval;
  readonly targetHz?: Interval;
  readonly keepOutRpm?: readonly Interval[];
  readonly nearestSpeedRpm?: number;
  readonly amplificationAfter?: Interval;
  readonly verdictAfter: Verdict;
  /** Other pairs that this change would make worse: indexes into separations. */
  readonly sideEffects: readonly number[];
}

export type SpecialistReason =
  | 'visible-sway'
  | 'level-beyond'
  | 'coincident-people'
  | 'coincident-machine'
  | 'cracks-or-loose'
  | 'poor-trust-serious';

export interface ToneMatch {
  readonly toneIndex: number;
  readonly forcing?: Forcing;
  /** True when the match is with a folded image of the forcing. */
  readonly folded: boolean;
}

/** Derived when a reading is opened, from its analysis and the sources valid for it; never stored with the reading. */
export interface Judgement {
  readonly forcings: readonly Forcing[];
  readonly separations: readonly Separation[];
  /** Forcings with no mode near them in this reading (never "clear"), and those this recording could not see. */
  readonly unpaired: readonly { readonly forcing: Forcing; readonly verdict: 'none-near' | 'blind' }[];
  readonly toneMatches: readonly ToneMatch[];
  readonly levels: readonly LevelFinding[];
  readonly waysOut: readonly WayOut[];
  readonly specialist: readonly SpecialistReason[];
  readonly cautions: readonly string[];
  readonly doubts: readonly Doubt[];
  readonly trust: Trust;
}
