import type { Interval } from '../model/interval.ts';

export interface Resonance {
  readonly frequencyHz: number;
  readonly dampingRatio: number;
}

export interface ProfilePoint {
  readonly frequencyHz: number;
  readonly amplificationRatio: number;
}

/** Smallest damping drawn: 0.1 % (a peak of 500) is already off the scale. */
const SMALLEST_DAMPING_RATIO = 1e-3;

/** Steady amplification of a force on one damped oscillator, 1/sqrt((1-r²)² + (2 zeta r)²) (Thomson & Dahleh, ch. 3). */
export const forceAmplification = (frequencyHz: number, mode: Resonance): number => {
  const ratio = frequencyHz / mode.frequencyHz;
  const zeta = Math.max(mode.dampingRatio, SMALLEST_DAMPING_RATIO);
  return 1 / Math.hypot(1 - ratio * ratio, 2 * zeta * ratio);
};

/** Frequencies that draw a peak truly: dense within some bandwidths of it, whatever the zoom. */
const aroundPeak = ({ frequencyHz, dampingRatio }: Resonance): number[] => {
  const zeta = Math.max(dampingRatio, SMALLEST_DAMPING_RATIO);
  const widths = [0, 0.15, 0.3, 0.5, 0.75, 1, 1.5, 2.2, 3.3, 5, 8, 13];
  return widths.flatMap((w) => [frequencyHz * (1 + w * zeta), frequencyHz * Math.max(1e-3, 1 - w * zeta)]);
};

/**
 * The largest amplification by any of the modes against frequency, ascending in frequency, inside `rangeHz`.
 * Misleads where two modes are close: their sum can be larger or smaller, depending on where the force acts.
 */
export const resonanceProfile = (
  modes: readonly Resonance[],
  rangeHz: Interval,
  stepCount = 120,
): ProfilePoint[] => {
  if (modes.length === 0) return [];
  const [low, high] = rangeHz;
  const grid = Array.from({ length: stepCount + 1 }, (_, i) => low * (high / low) ** (i / stepCount));
  const frequenciesHz = [...grid, ...modes.flatMap(aroundPeak)]
    .filter((f) => f >= low && f <= high)
    .sort((a, b) => a - b);
  return frequenciesHz.map((frequencyHz) => ({
    frequencyHz,
    amplificationRatio: Math.max(...modes.map((mode) => forceAmplification(frequencyHz, mode))),
  }));
};
