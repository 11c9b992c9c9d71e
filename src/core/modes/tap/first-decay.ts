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
 * Where a damped sinusoid of a given frequency best begins: matched filter over all onsets and a few decays.
 * One backward recursion per decay: sum over later samples of y·exp(-(decay + i·angular)(t - onset)).
 */
export function strongestOnset(
  signal: DecaySignal,
  angularRadPerS: number,
  axisWeights: readonly number[],
): FirstDecay | undefined {
  const { timeS, y } = signal;
  const n = timeS.length;
  const turn = new Float64Array(2 * n);
  for (let i = 0; i + 1 < n; i++) {
    const phase = angularRadPerS * (timeS[i + 1]! - timeS[i]!);
    turn[2 * i] = Math.cos(phase);
    turn[2 * i + 1] = -Math.sin(phase);
  }
  let best: FirstDecay | undefined;
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
    for (let i = 0; i < n - 8; i++) {
      // The energies of neighbouring onsets differ by the windows' own energy: normalised to a likelihood ratio.
      const gain = explained[i]! / (2 * energy[i]!);
      if (best === undefined || gain > best.gain) best = { onset: i, decayPerS, gain };
    }
  }
  return best;
}
