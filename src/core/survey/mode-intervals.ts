import type { Mode } from '../model/analysis.ts';
import { STANDARD_DEVIATIONS_95, type Interval } from '../model/interval.ts';

/** Relative 95 % half-width of a mode's frequency, with a model uncertainty (relative, 95 %) in quadrature. */
export function frequencySpreadRatio(mode: Mode, modelRatio = 0): number {
  return Math.hypot((STANDARD_DEVIATIONS_95 * mode.frequencySdHz) / mode.frequencyHz, modelRatio);
}

/** Frequency interval about `frequencyHz` (the mode's own, or a fold candidate); stays above zero. */
export function frequencyInterval(frequencyHz: number, spreadRatio: number): Interval {
  return [frequencyHz / (1 + spreadRatio), frequencyHz * (1 + spreadRatio)];
}

/** No structure has less (bells have more); below it an amplification would be a number without a meaning. Our own bound. */
export const LEAST_DAMPING_RATIO = 1e-5;

/**
 * 95 % interval of the damping ratio at a candidate frequency (a folded mode's damping belongs to where it appears). The low end
 * is that of a log-normal, so that it stays above zero however large the uncertainty.
 */
export function dampingInterval(mode: Mode, candidateHz: number): Interval {
  const scale = mode.frequencyHz / candidateHz;
  const dampingRatio = Math.max(mode.dampingRatio, LEAST_DAMPING_RATIO);
  const relative = (STANDARD_DEVIATIONS_95 * mode.dampingRatioSd) / dampingRatio;
  return [
    Math.max(LEAST_DAMPING_RATIO, dampingRatio * Math.exp(-relative) * scale),
    Math.max(LEAST_DAMPING_RATIO, Math.min(1, dampingRatio * (1 + relative) * scale)),
  ];
}

/** Frequencies that the mode may truly have. */
export function candidateFrequencies(mode: Mode): readonly number[] {
  const { verdict, candidatesHz } = mode.fold;
  if (verdict === 'direct' || candidatesHz.length === 0) return [mode.frequencyHz];
  return verdict === 'folded' ? candidatesHz.slice(0, 1) : [...new Set([mode.frequencyHz, ...candidatesHz])];
}
