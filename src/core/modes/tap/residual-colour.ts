import type { Component, DecaySignal, Segment } from './decay-model.ts';
import type { DecayFit } from './fit-decays.ts';

/** Frequencies looked at on each side of a mode, in steps of its own resolution; the nearest ones are the fit's own. */
const NEAREST_STEP = 2;
const FARTHEST_STEP = 7;
/** Chance fluctuation allowed before noise is called coloured: standard deviations of the mean power. */
const CHANCE_SDS = 4;

/**
 * How much stronger the residual is around a mode than white noise of the same variance would be there. Model error
 * (amplitude dependence, unmodelled neighbours) gathers near the mode, where it hurts most: intervals grow by the root.
 * @param left what the fit left, zero outside the segments
 * @returns 1 where the residual is white within chance, else the ratio of powers
 */
export function residualColour(
  signal: DecaySignal,
  segments: readonly Segment[],
  fit: DecayFit,
  left: readonly Float64Array[],
  component: Component,
): number {
  let sum = 0;
  let count = 0;
  for (const { start, end } of segments) {
    const durationS = signal.timeS[end - 1]! - signal.timeS[start]!;
    const stepRadPerS = Math.max((2 * Math.PI) / Math.max(durationS, 1e-3), component.decayPerS);
    for (let step = -FARTHEST_STEP; step <= FARTHEST_STEP; step++) {
      const w = component.angularRadPerS + step * stepRadPerS;
      if (Math.abs(step) < NEAREST_STEP || w < stepRadPerS) continue;
      sum += relativePower(signal, start, end, fit, left, w, component.decayPerS);
      count++;
    }
  }
  if (count === 0) return 1;
  const ratio = sum / count;
  // A mean of `count` exponential variables per axis scatters by one over the root of their number.
  return ratio > 1 + CHANCE_SDS / Math.sqrt(count * left.length) ? ratio : 1;
}

/** Power of the residual at one frequency under the mode's own envelope, over its expectation for white noise. */
function relativePower(
  signal: DecaySignal,
  start: number,
  end: number,
  fit: DecayFit,
  left: readonly Float64Array[],
  w: number,
  decayPerS: number,
): number {
  const { timeS, phaseTimeS = timeS } = signal;
  const re = new Float64Array(left.length);
  const im = new Float64Array(left.length);
  let energy = 0;
  for (let i = start; i < end; i++) {
    const envelope = Math.exp(-decayPerS * (timeS[i]! - timeS[start]!));
    const phase = w * (phaseTimeS[i]! - timeS[start]!);
    const c = envelope * Math.cos(phase);
    const s = envelope * Math.sin(phase);
    energy += envelope * envelope;
    for (let a = 0; a < left.length; a++) {
      re[a]! += c * left[a]![i]!;
      im[a]! += s * left[a]![i]!;
    }
  }
  let sum = 0;
  for (let a = 0; a < left.length; a++) sum += (re[a]! ** 2 + im[a]! ** 2) / (energy * fit.variance[a]!);
  return sum / left.length;
}
