import { linearColumnCount } from './decay-model.ts';
import type { DecaySignal } from './decay-model.ts';
import type { FreeDecay } from './find-taps.ts';
import type { DecayFit } from './fit-decays.ts';
import type { ModeEstimate } from './mode-estimate.ts';

/** A mode must stand out of the noise by this many standard deviations of a sample at its strongest tap... */
const LEAST_AMPLITUDE_SDS = 3;
/** ...and its damping must be known to this relative standard deviation, else it is no answer. */
const LARGEST_DAMPING_SPREAD = 0.3;
/** ...its frequency to this one... */
const LARGEST_FREQUENCY_SPREAD = 0.02;
/** Above this damping nothing rings that a tap test could read: a tenth is left after two cycles. */
const LARGEST_DAMPING_RATIO = 0.2;
/** A mode must be seen ringing for this many cycles between two taps: less is a shape, not a vibration. */
const LEAST_CYCLES = 4;
/** Two lines that cancel each other have amplitudes beyond anything measured. */
const LARGEST_AMPLITUDE_FACTOR = 3;
/** The part of a decay that is looked at, in time constants of the strongest mode: later there is mostly noise. */
const JUDGED_DECAYS = 1.5;

/** Share of the squared motion early in the decays, noise taken off, that the model takes up. */
export function explainedShare(
  signal: DecaySignal,
  decays: readonly FreeDecay[],
  left: readonly Float64Array[],
  decayPerS: number,
  noise: readonly number[],
  componentCount: number,
): number {
  let whole = 0;
  let unexplained = 0;
  let count = 0;
  for (const { start, end } of decays) {
    const limitS = signal.timeS[start]! + JUDGED_DECAYS / decayPerS;
    for (let i = start; i < end && signal.timeS[i]! < limitS; i++) {
      for (let a = 0; a < left.length; a++) {
        whole += signal.y[a]![i]! ** 2;
        unexplained += left[a]![i]! ** 2 - noise[a]!;
      }
      count++;
    }
  }
  // Every free amplitude takes a share of the noise with it.
  const freedom = Math.max(count - decays.length * linearColumnCount(componentCount), 1);
  return whole > 0 ? 1 - (Math.max(unexplained, 0) * count) / freedom / whole : 0;
}

/** Strength of a mode: energy of its strongest ring-down, amplitude² over decay rate; a brief rattle is no strong mode. */
export const ringEnergy = ({ amplitudesMps2, dampingRatio, frequencyHz }: ModeEstimate): number =>
  Math.max(...amplitudesMps2) ** 2 / (dampingRatio * frequencyHz);

/** Cycles of a mode within a decay, averaged over the decays by its energy in them. */
function cyclesSeen(signal: DecaySignal, decays: readonly FreeDecay[], estimate: ModeEstimate): number {
  let cycles = 0;
  let energy = 0;
  decays.forEach(({ start, end }, s) => {
    const weight = estimate.amplitudesMps2[s]! ** 2;
    cycles += weight * estimate.frequencyHz * (signal.timeS[end - 1]! - signal.timeS[start]!);
    energy += weight;
  });
  return cycles / Math.max(energy, 1e-30);
}

export function isAnswer(
  signal: DecaySignal,
  decays: readonly FreeDecay[],
  estimate: ModeEstimate,
  fit: DecayFit,
  largestMps2: number,
): boolean {
  const noise = Math.sqrt(fit.variance.reduce((a, b) => a + b, 0) / fit.variance.length);
  return (
    Math.max(...estimate.amplitudesMps2) > LEAST_AMPLITUDE_SDS * noise &&
    Math.max(...estimate.amplitudesMps2) < LARGEST_AMPLITUDE_FACTOR * largestMps2 &&
    estimate.frequencySdHz < LARGEST_FREQUENCY_SPREAD * estimate.frequencyHz &&
    estimate.dampingRatio < LARGEST_DAMPING_RATIO &&
    cyclesSeen(signal, decays, estimate) > LEAST_CYCLES &&
    estimate.dampingRatioSd < LARGEST_DAMPING_SPREAD * estimate.dampingRatio
  );
}
