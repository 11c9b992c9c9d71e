import type { Doubt, Trust } from './doubt.ts';
import type { Interval } from './interval.ts';
import type { AmplificationKind, Forcing } from './source.ts';

export const VERDICTS = ['coincident', 'close', 'apart', 'undecided', 'blind'] as const;
export type Verdict = (typeof VERDICTS)[number];

/** A mode held against a forcing. */
export interface Separation {
  readonly source: string;
  readonly forcing: string;
  /** Index into Judgement.forcings. */
  readonly forcingIndex: number;
  readonly forcingHz: Interval;
  readonly modeIndex: number;
  /** Frequency of the mode that was held against it: for a folded mode the candidate nearest to the forcing. */
  readonly modeHz: number;
  /** Forcing frequency / natural frequency with both uncertainties. */
  readonly ratio: Interval;
  /** The ratio nearest to 1 at the values themselves, uncertainties aside. */
  readonly nearestRatio: number;
  readonly amplification: { readonly kind: AmplificationKind; readonly interval: Interval };
  readonly verdict: Verdict;
  /** Where the fold of the mode is undecided: the verdict if what is seen is no folded image. */
  readonly atFaceValue?: Verdict;
  /** True when the build-up was limited by the cycles there are. */
  readonly buildUpLimited?: boolean;
  /** True when a mode found at rest is held against a running machine (widened by the model uncertainty). */
  readonly stoppedAgainstRunning?: boolean;
  /** Load factor times build-up, for ranking footfall. */
  readonly effectRatio?: number;
  /** Wind speed at which vortices shed at this mode's frequency, and Scruton number where the mass is known. */
  readonly wind?: { readonly criticalSpeedMps: Interval; readonly scrutonRatio?: Interval };
}

export const CRITERIA = [
  'iso-20816-3',
  'iso-10816-1',
  'iso-10816-7',
  'din-4150-3',
  'din-4150-3-long-term',
  'bs-7385-2',
  'iso-2631-1',
  'iso-10137',
  'en-1990',
  'hivoss',
  'setra',
  'aisc-dg11',
] as const;
export type Criterion = (typeof CRITERIA)[number];

export const MEASURES = [
  'velocity-rms',
  'displacement-rms',
  'velocity-peak',
  'velocity-peak-horizontal',
  'acceleration-peak-vertical',
  'acceleration-peak-horizontal',
  'equivalent-sine-peak',
  'weighted-rms',
  'response-factor',
] as const;
export type Measure = (typeof MEASURES)[number];

/** `within` needs the whole band; a part of it gives `at-least` or `not-assessed`, never a pass. */
export const LEVEL_GRADES = ['within', 'beyond', 'at-least', 'not-assessed'] as const;
export type LevelGrade = (typeof LEVEL_GRADES)[number];

/** Why a level is only a lower bound or not assessed. Sentences: src/text/levels.ts. */
export const LEVEL_REASONS = [
  'band-partly-seen',
  'folded-left-out',
  'folded-in-acceleration',
  'no-value',
  'class-unknown',
  'loading-not-presumed',
  'crest-factor',
  'no-dominant-frequency',
  'lines-only',
  'wider-band',
] as const;
export type LevelReason = (typeof LEVEL_REASONS)[number];

export interface LevelFinding {
  readonly criterion: Criterion;
  readonly measure: Measure;
  /** In the SI unit that `unit` says. */
  readonly value?: number;
  readonly unit: 'm/s²' | 'm/s' | 'm' | '1';
  readonly grade: LevelGrade;
  /** Zone, class or comfort word of the criterion. */
  readonly zone?: string;
  /** What the class is for, e.g. "group 2, rigid" or "line 2". */
  readonly classOf?: string;
  /** The limit that the grade was held against, same unit. */
  readonly limit?: number;
  /** True when the value, even as a lower bound, lies beyond the last boundary. */
  readonly beyondLast: boolean;
  readonly origin: string;
  readonly certain: boolean;
  /** Band that the criterion needs. */
  readonly bandHz: Interval;
  readonly reasons: readonly LevelReason[];
}

export const WAY_OUT_KINDS = ['speed', 'stiffness', 'mass', 'damping', 'isolation'] as const;
export type WayOutKind = (typeof WAY_OUT_KINDS)[number];
export interface WayOut {
  readonly kind: WayOutKind;
  readonly separationIndex: number;
  /** Factor on modal stiffness or mass at the spot, target damping ratio, or transmissibility of the isolation, as its kind says. */
  readonly factor?: Interval;
  /** Natural frequency after the change, or of the mounts (isolation). */
  readonly targetHz?: Interval;
  readonly staticDeflectionM?: number;
  /** False where the change is beyond what is commonly built (constants in core/survey/ways-out.ts). */
  readonly practical: boolean;
  readonly keepOutRpm?: readonly Interval[];
  readonly keepOutHz?: readonly Interval[];
  readonly nearestSpeedRpm?: number;
  readonly amplificationAfter?: Interval;
  readonly verdictAfter: Verdict;
  /** Isolation: forcings that the mounts themselves would sit near (indexes into forcings). */
  readonly mountsNearIndex?: readonly number[];
  /** Other pairs that this change would make worse: indexes into separations. */
  readonly sideEffects: readonly number[];
}

export const SPECIALIST_REASONS = [
  'visible-sway',
  'level-beyond',
  'coincident-people',
  'coincident-machine',
  'cracks-or-loose',
  'poor-trust-serious',
] as const;
export type SpecialistReason = (typeof SPECIALIST_REASONS)[number];

/** Cautions where hands or lives are near. Sentences: src/text/cautions.ts. */
export const CAUTION_CODES = [
  'local-rules-first',
  'isolate-and-lock-out',
  'stand-by-may-start',
  'no-loose-phone-near-moving-parts',
  'live-parts',
  'no-tapping-pressurised-pipe',
  'do-not-lean-on-rail',
  'heights',
  'leave-when-it-sways',
  'stay-clear-while-slowing',
] as const;
export type CautionCode = (typeof CAUTION_CODES)[number];

export interface ToneMatch {
  readonly toneIndex: number;
  readonly forcing?: Forcing;
  readonly forcingIndex?: number;
  /** True when the match is with a folded image of the forcing. */
  readonly folded: boolean;
}

/**
 * `none-near`: no mode found near it in this reading (never "clear"); `blind`: the recording could not see there;
 * `not-sought`: this procedure does not look for modes.
 */
export const UNPAIRED_VERDICTS = ['none-near', 'blind', 'not-sought'] as const;
export type UnpairedVerdict = (typeof UNPAIRED_VERDICTS)[number];

/** Derived when a reading is opened, from its analysis and the sources valid for it; never stored with the reading. */
export interface Judgement {
  readonly forcings: readonly Forcing[];
  /** Worst first. */
  readonly separations: readonly Separation[];
  readonly unpaired: readonly {
    readonly forcing: Forcing;
    readonly forcingIndex: number;
    readonly verdict: UnpairedVerdict;
  }[];
  /** Modes above the range where steps build up a response: each step is a blow, a resonance verdict does not apply. */
  readonly impulsive: readonly { readonly modeIndex: number; readonly source: string }[];
  readonly toneMatches: readonly ToneMatch[];
  readonly levels: readonly LevelFinding[];
  readonly waysOut: readonly WayOut[];
  readonly specialist: readonly SpecialistReason[];
  readonly cautions: readonly CautionCode[];
  readonly doubts: readonly Doubt[];
  readonly trust: Trust;
}
