import type { Doubt, DoubtCode, RefusalCode, Trust } from './doubt.ts';

/** Raised whenever a number could change. */
export const ANALYSIS_VERSION = 1;

export type Procedure = 'tap' | 'running' | 'ambient' | 'coastdown';
export const PROCEDURES: readonly Procedure[] = ['tap', 'running', 'ambient', 'coastdown'];

export interface AnalysisSettings {
  readonly procedure: Procedure | 'auto';
  /** `stamps`: take the time stamps as true; `clock`: a steady clock behind late stamps; `auto`: decide by residual. */
  readonly timing: 'auto' | 'stamps' | 'clock';
}

export interface TimingFacts {
  readonly model: 'stamps' | 'clock' | 'mixed';
  /** Share rho of the stamp scatter that is true sampling scatter, 0..1. */
  readonly trueShare: number;
  /** Standard deviation of the stamps about a steady clock, s. */
  readonly scatterSdS: number;
  readonly gapCount: number;
  readonly repeatCount: number;
}

export interface RecordingFacts {
  readonly sampleCount: number;
  readonly durationS: number;
  readonly rateHz: number;
  readonly timing: TimingFacts;
  /** Rounding step per axis, 0 where none was found. */
  readonly stepMps2: readonly number[];
  readonly noiseMps2PerRootHz: readonly number[];
  readonly clippedCount: number;
  readonly usableBandHz: readonly [number, number];
  /** Norm of the mean acceleration; absent when gravity was removed before. */
  readonly gravityMps2?: number;
  /** Unit vector of gravity in sensor axes ("up" as the sensor at rest reads it); absent as above. */
  readonly up?: readonly number[];
}

export type FoldVerdict = 'direct' | 'folded' | 'undecided';
export interface Fold {
  readonly verdict: FoldVerdict;
  /** True-frequency candidates, most likely first (see design: `direct` holds the frequency itself). */
  readonly candidatesHz: readonly number[];
}

export type DampingCheck =
  { readonly dampingRatio: number; readonly biasNote?: string } | { readonly refusal: RefusalCode };

export interface Softening {
  /** Relative change of frequency per m/s² of amplitude (negative: softening). */
  readonly frequencySlopePerMps2: number;
  /** Change of damping ratio per m/s² of amplitude. */
  readonly dampingSlopePerMps2: number;
}

export interface Mode {
  /** Undamped natural frequency where it appears, 0 to half the rate. */
  readonly frequencyHz: number;
  readonly frequencySdHz: number;
  /** Fraction of critical. */
  readonly dampingRatio: number;
  readonly dampingRatioSd: number;
  /** Largest amplitude after a tap (tap), or rms (ambient), m/s². */
  readonly amplitudeMps2: number;
  /** Unit vector in sensor axes. */
  readonly direction: readonly number[];
  /** Share of the motion along gravity, 0..1; absent where gravity is unknown. */
  readonly verticalShare?: number;
  readonly method:
    | 'ring-down-fit'
    | 'ring-down-fit-rounding-aware'
    | 'ambient-likelihood'
    | 'ambient-likelihood-debiased'
    | 'coastdown-fit';
  readonly eventCount: number;
  readonly halfPower: DampingCheck;
  readonly logDecrement?: DampingCheck;
  readonly softening?: Softening;
  readonly fold: Fold;
  readonly doubts: readonly DoubtCode[];
}

export interface Tone {
  readonly frequencyHz: number;
  readonly frequencySdHz: number;
  /** Standard deviation of the line's frequency about its mean during the record (speed variation), Hz; absent when too weak to follow. */
  readonly frequencyDeviationHz?: number;
  /** Peak amplitude of the line along its direction, m/s². */
  readonly amplitudeMps2: number;
  readonly amplitudeSdMps2: number;
  readonly direction: readonly number[];
  readonly nature: 'forced' | 'mixed';
  readonly fold: Fold;
  /** Fundamental of the harmonic family it belongs to, and its order in it. */
  readonly familyHz?: number;
  readonly familyOrder?: number;
}

/** Broad peak between tones of a running machine: never called a mode without a tap or ambient reading. */
export interface BroadPeak {
  readonly frequencyHz: number;
  readonly widthHz: number;
  readonly rmsMps2: number;
}

export interface Levels {
  readonly peakMps2: number;
  readonly rmsMps2: number;
  /** Rms velocity in the usable band, without folded or undecided tones; absent when nothing trustworthy is left. */
  readonly velocityRmsMps?: number;
  readonly velocityPeakMps?: number;
  readonly displacementPeakM?: number;
  readonly displacementRmsM?: number;
  readonly bandHz: readonly [number, number];
  /** Largest running rms over 1 s (MTVV, ISO 2631-1), unweighted and weighted. */
  readonly runningRmsMaxMps2?: number;
  /** Frequency-weighted rms of the axis that is vertical (Wk) and of the horizontal axes (Wd); ISO 2631-1, band seen only. */
  readonly weightedVerticalRmsMps2?: number;
  readonly weightedHorizontalRmsMps2?: number;
  readonly weightedRunningRmsMaxMps2?: number;
  readonly crestFactorRatio?: number;
  /** Vertical and horizontal peak acceleration and velocity where gravity is known. */
  readonly verticalPeakMps2?: number;
  readonly horizontalPeakMps2?: number;
  readonly largestAxisVelocityPeakMps?: number;
  /** Largest axis, from 10 Hz up (the band of ISO 20816-3, as far as seen). */
  readonly velocityRmsFrom10HzMps?: number;
  readonly displacementRmsFrom10HzM?: number;
  /** Larger of the two horizontal axes (DIN 4150-3, top floor). */
  readonly horizontalVelocityPeakMps?: number;
  /** Vertical: square root of 2 times the largest running rms over 2 s (AISC design guide 11, 2nd ed.). */
  readonly equivalentSinePeakMps2?: number;
  /** True when folded or undecided tones were left out of velocity and displacement. */
  readonly leftOutTones: boolean;
}

export interface CoastdownFacts {
  readonly startHz: number;
  readonly endHz: number;
  readonly sweepRateHzPerS: number;
  /** Sweep rate over (2 zeta f)²: above 1 the resonance had no time to build up fully. */
  readonly sweepSeverityRatio: number;
}

/** The measurement part: derived from a recording alone, kept with the reading. */
export interface Analysis {
  readonly version: number;
  readonly procedure: Procedure;
  readonly procedureFrom: 'person' | 'data';
  readonly settings: AnalysisSettings;
  readonly recording: RecordingFacts;
  /** Sorted by strength. */
  readonly modes: readonly Mode[];
  /** Sorted by strength. */
  readonly tones: readonly Tone[];
  readonly broadPeaks: readonly BroadPeak[];
  readonly levels?: Levels;
  readonly coastdown?: CoastdownFacts;
  /** Times of the taps used, s on the recording's time axis. */
  readonly tapTimesS: readonly number[];
  readonly doubts: readonly Doubt[];
  readonly trust: Trust;
}
