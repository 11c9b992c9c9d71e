import { nextPowerOfTwo, realTransform } from '../../signal/fft.ts';
import type { Component, DecaySignal, Segment } from './decay-model.ts';

/** Decay rates of the exponential windows tried, 1/s; a factor of three apart loses at most 7 % of a match. */
const BANK_DECAYS_PER_S = [0, 0.1, 0.3, 1, 3, 10] as const;
/** Lowest frequency looked for, Hz, and least number of cycles in the longest segment. */
const LOWEST_HZ = 0.4;
const LEAST_CYCLES = 3;

export interface BankPeak {
  readonly component: Component;
  /** Energy the damped sinusoid would explain, in noise variances. */
  readonly gain: number;
}

/**
 * Strongest damped sinusoid of a signal cut in free decays: a bank of exponential windows, each transformed segment by
 * segment, powers added over segments and axes.
 * @param y uniform to within stamp scatter, m/s²; rateHz its mean rate
 * @param decaysPerS windows tried; over a whole record only the one that does not fall makes sense
 */
export function strongestDecay(
  signal: DecaySignal,
  y: readonly Float64Array[],
  segments: readonly Segment[],
  rateHz: number,
  axisWeights: readonly number[],
  decaysPerS: readonly number[] = BANK_DECAYS_PER_S,
): BankPeak | undefined {
  const longest = segments.reduce(
    (m, s) => Math.max(m, signal.timeS[s.end - 1]! - signal.timeS[s.start]!),
    0,
  );
  const size = nextPowerOfTwo(Math.ceil(2 * longest * rateHz) + 2);
  const stepHz = rateHz / size;
  const first = Math.ceil(Math.max(LOWEST_HZ, LEAST_CYCLES / longest) / stepHz);
  const last = Math.floor(0.49 * size);
  let best: BankPeak | undefined;
  for (const decayPerS of decaysPerS) {
    const power = new Float64Array(size / 2 + 1);
    let windowEnergy = 0;
    for (const segment of segments) {
      windowEnergy += addSegmentPower(signal, y, segment, decayPerS, rateHz, size, axisWeights, power);
    }
    if (windowEnergy <= 0) continue;
    for (let k = first; k <= last; k++) {
      if (best === undefined || power[k]! > best.gain) {
        const angularRadPerS = 2 * Math.PI * stepHz * peakBin(power, k);
        best = {
          gain: power[k]!,
          component: { kind: 'mode', angularRadPerS, decayPerS: Math.max(decayPerS, 0.05) },
        };
      }
    }
  }
  return best;
}

function addSegmentPower(
  signal: DecaySignal,
  y: readonly Float64Array[],
  segment: Segment,
  decayPerS: number,
  rateHz: number,
  size: number,
  axisWeights: readonly number[],
  power: Float64Array,
): number {
  const origin = signal.timeS[segment.start]!;
  const samples = new Float64Array(size);
  const { phaseTimeS = signal.timeS } = signal;
  let energy = 0;
  for (let i = segment.start; i < segment.end; i++)
    energy += Math.exp(-2 * decayPerS * (signal.timeS[i]! - origin));
  if (energy < 4) return 0;
  for (let a = 0; a < y.length; a++) {
    samples.fill(0);
    for (let i = segment.start; i < segment.end; i++) {
      const tau = signal.timeS[i]! - origin;
      // A sample between two grid points is shared by them, which keeps its phase to first order.
      const place = Math.max(phaseTimeS[i]! - origin, 0) * rateHz;
      const k = Math.floor(place);
      const share = place - k;
      const value = y[a]![i]! * Math.exp(-decayPerS * tau);
      if (k + 1 < size) {
        samples[k]! += value * (1 - share);
        samples[k + 1]! += value * share;
      }
    }
    const { re, im } = realTransform(samples, size);
    const scale = (2 * axisWeights[a]!) / energy;
    for (let k = 0; k < power.length; k++) power[k]! += scale * (re[k]! * re[k]! + im[k]! * im[k]!);
  }
  return energy;
}

/** Bin of a peak by a parabola through three values. */
function peakBin(power: Float64Array, k: number): number {
  const a = power[k - 1] ?? 0;
  const b = power[k]!;
  const c = power[k + 1] ?? 0;
  const bend = a - 2 * b + c;
  return bend < 0 ? k + Math.min(Math.max((0.5 * (a - c)) / bend, -0.5), 0.5) : k;
}
