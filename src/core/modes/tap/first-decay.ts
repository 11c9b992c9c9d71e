import type { DecaySignal } from './decay-model.ts';

/** Damping ratios tried when nothing is known, from bare steel to a wet handrail. */
const DAMPING_RATIOS = [0.002, 0.006, 0.015, 0.04, 0.1] as const;

export interface FirstDecay {
  /** Sample at which the damped sinusoid best begins. */
  readonly onset: number;
  readonly decayPerS: number;
  /** Energy explained, in noise variances. */
  readonly gain: number;
}

/**
 * Where a damped sinusoid of a given frequency best begins, for each of a few decays: matched filter over all onsets.
 * One backward recursion per decay: sum over later samples of y·exp(-(decay + i·angular)(t - onset)).
 */
export function strongestOnsets(
  signal: DecaySignal,
  angularRadPerS: number,
  axisWeights: readonly number[],
): FirstDecay[] {
  const { timeS, y, phaseTimeS = timeS } = signal;
  const n = timeS.length;
  const turn = new Float64Array(2 * n);
  for (let i = 0; i + 1 < n; i++) {
    const phase = angularRadPerS * (phaseTimeS[i + 1]! - phaseTimeS[i]!);
    turn[2 * i] = Math.cos(phase);
    turn[2 * i + 1] = -Math.sin(phase);
  }
  const candidates: FirstDecay[] = [];
  for (const ratio of DAMPING_RATIOS) {
    const decayPerS = ratio * angularRadPerS;
    const explained = new Float64Array(n);
    const energy = new Float64Array(n);
    let sum = 0;
    for (let i = n - 1; i >= 0; i--) {
      const fall = i + 1 < n ? Math.exp(-decayPerS * (timeS[i + 1]! - timeS[i]!)) : 0;
      sum = 1 + fall * fall * sum;
      energy[i] = sum / 2;
    }
    for (let a = 0; a < y.length; a++) {
      let re = 0;
      let im = 0;
      for (let i = n - 1; i >= 0; i--) {
        if (i + 1 < n) {
          const fall = Math.exp(-decayPerS * (timeS[i + 1]! - timeS[i]!));
          const c = fall * turn[2 * i]!;
          const s = fall * turn[2 * i + 1]!;
          const next = re * c - im * s;
          im = re * s + im * c;
          re = next;
        }
        re += y[a]![i]!;
        explained[i]! += axisWeights[a]! * (re * re + im * im);
      }
    }
    let best: FirstDecay = { onset: 0, decayPerS, gain: 0 };
    for (let i = 0; i < n - 8; i++) {
      // Half the squared sum over the window's energy: the likelihood ratio of a sinusoid beginning here.
      const gain = explained[i]! / (2 * energy[i]!);
      if (gain > best.gain) best = { onset: i, decayPerS, gain };
    }
    candidates.push(best);
  }
  return candidates;
}
