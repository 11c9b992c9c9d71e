import type { Analysis } from './analysis.ts';

/** Amplitude spectrum (per axis) with what is needed to read it honestly. Uniform grid: f = i * stepHz. */
export interface Spectrum {
  readonly stepHz: number;
  readonly window: 'rectangular' | 'hann' | 'flat-top' | 'exponential';
  readonly resolutionHz: number;
  readonly averageCount: number;
  /** Relative random error of a density value, 1/sqrt(averages) (Bendat & Piersol). */
  readonly randomErrorRatio: number;
  /** One per axis: amplitude, m/s² peak of a sine at that frequency. */
  readonly amplitudeMps2: readonly Float64Array[];
  /** One per axis: power spectral density, (m/s²)²/Hz. */
  readonly densityMps4PerHz: readonly Float64Array[];
}

/** One ring-down along its mode's direction, for drawing measured points over the fit. */
export interface RingDown {
  readonly tapTimeS: number;
  readonly timeS: Float64Array;
  readonly measuredMps2: Float64Array;
  readonly fittedMps2: Float64Array;
  /** The fitted model between the samples too, for a smooth curve; absent: only at the samples. */
  readonly curveTimeS?: Float64Array;
  readonly curveMps2?: Float64Array;
}

/** What screens and reports draw. Derived from the recording each time, never stored. */
export interface AnalysisPictures {
  /** Gravity and drift removed, thinned for drawing (min and max kept), one array per axis. */
  readonly trace: { readonly timeS: Float64Array; readonly accelerationMps2: readonly Float64Array[] };
  readonly spectrum: Spectrum;
  readonly ringDowns: readonly RingDown[];
  /** Amplitude along a coast-down, against frequency. */
  readonly pass?: {
    readonly frequencyHz: Float64Array;
    readonly measuredMps2: Float64Array;
    readonly fittedMps2: Float64Array;
  };
}

export interface AnalysisResult {
  readonly analysis: Analysis;
  readonly pictures: AnalysisPictures;
}
