/**
 * Free decays as separable least squares: every segment of the record is a sum of damped sinusoids that share
 * frequency and decay, with free amplitude and phase per segment and axis, plus a constant and a slope.
 * Only moments (products of columns) are kept, so one pass over the samples gives value, gradient and curvature
 * (variable projection: Golub & Pereyra 1973; Kaufman 1975).
 */

/** One damped sinusoid (mode) or steady line (tone, decay 0). */
export interface Component {
  readonly kind: 'mode' | 'tone';
  /** Damped angular frequency, rad/s. */
  readonly angularRadPerS: number;
  /** Decay rate, 1/s: damping ratio times undamped angular frequency. */
  readonly decayPerS: number;
  /** Change with amplitude; frequency and decay above are then those of small motion. */
  readonly softening?: ComponentSoftening;
}

/** Frequency w·(1 + frequencySlope·A) and decay a + decaySlope·A at amplitude A. */
export interface ComponentSoftening {
  /** Relative, per m/s². */
  readonly frequencySlopePerMps2: number;
  /** 1/s per m/s². */
  readonly decaySlopePerMps2: number;
}

/** Samples start <= i < end of one free decay. */
export interface Segment {
  readonly start: number;
  readonly end: number;
  /** Amplitude at the start, m/s², of a component that changes with amplitude. */
  readonly amplitudeMps2?: number;
}

/** Accelerations about gravity, m/s², one array per axis on common time stamps, s. */
export interface DecaySignal {
  readonly timeS: Float64Array;
  readonly y: readonly Float64Array[];
  /** Time by which the phases run, s, where it differs from the decay's: a folded mode follows the stamps' scatter faster. */
  readonly phaseTimeS?: Float64Array;
  /** Optional weight per sample and axis (1 = full); shared by all axes when one array is given. */
  readonly weights?: readonly Float64Array[];
}

/** Constant and slope: what the removal of gravity left. */
export const DRIFT_COLUMNS = 2;

export const linearColumnCount = (componentCount: number): number => 2 * componentCount + DRIFT_COLUMNS;

/** Nonlinear parameters: frequency and decay of each mode and their slopes if it has them; frequency of each tone. */
const parametersOf = (component: Component): number =>
  component.kind === 'tone' ? 1 : component.softening === undefined ? 2 : 4;

export const parameterCount = (components: readonly Component[]): number =>
  components.reduce((count, c) => count + parametersOf(c), 0);

export const softenedCount = (components: readonly Component[]): number =>
  components.reduce((count, c) => count + (c.softening === undefined ? 0 : 1), 0);

/** Integral of the amplitude since the start, m/s² times s, for a start amplitude of one. */
export const amplitudeIntegral = (component: Component, tau: number): number =>
  (1 - Math.exp(-component.decayPerS * tau)) / Math.max(component.decayPerS, 1e-9);

/** Phase, rad, and logarithm of the envelope of a component, times since the segment's start. */
export function courseOf(
  component: Component,
  tau: number,
  phaseTau: number,
  amplitudeMps2: number,
): { phase: number; fall: number } {
  const { angularRadPerS: w, decayPerS: a, softening } = component;
  if (softening === undefined) return { phase: w * phaseTau, fall: -a * tau };
  const integral = amplitudeMps2 * amplitudeIntegral(component, tau);
  return {
    phase: w * (phaseTau + softening.frequencySlopePerMps2 * integral),
    fall: -a * tau - softening.decaySlopePerMps2 * integral,
  };
}

/** Index of a component's first parameter. */
export function parameterIndex(components: readonly Component[], k: number): number {
  let at = 0;
  for (let j = 0; j < k; j++) at += parametersOf(components[j]!);
  return at;
}
