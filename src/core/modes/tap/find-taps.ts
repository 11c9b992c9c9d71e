import { linearColumnCount } from './decay-model.ts';
import type { Component, DecaySignal, Segment } from './decay-model.ts';
import { scanSplits } from './split-scan.ts';

/** One free decay: fitted from `start` to `end`; its tap began at sample `onset` (absent: it runs from before). */
export interface FreeDecay extends Segment {
  readonly onset: number | undefined;
}

/** Fall of the summed squares that a contact sample must bring, beyond one per axis, to be left out. Our own choice. */
export const CONTACT_SAMPLE_PRICE = 8;

/**
 * A tap changes the motion by at least this share of its energy (14 % of its amplitude): smaller jumps are how far a
 * real structure is from a linear one. Our own choice, tried on measured beams.
 */
const LEAST_JUMP_SHARE = 0.02;
/** Jumps above this share are taken as they are; smaller ones must also be sudden: loss doubling with distance, not fourfold. */
const SURE_JUMP_SHARE = 0.15;
const SUDDEN_RATIO = 3;

/** Least share of the strongest tap's fall while the modes are still being found, and after. */
export const COARSE = 0.05;
export const LESS_COARSE = 0.02;
export const FINE = 0.0005;

export interface TapSearch {
  /** Longest contact left out, s. */
  readonly contactS: number;
  /** Least fall of the weighted squares that makes a tap. */
  readonly threshold: number;
  /** Least share of the strongest tap's fall. */
  readonly relativeThreshold: number;
}

interface Split {
  readonly gain: number;
  readonly onset: number;
  readonly start: number;
}

/**
 * Taps as jumps of the modes' own state: generalised likelihood ratio of one free decay against two with a contact
 * between them (Willsky & Jones 1976), at every sample, split after split, then every border once more.
 * @param components modes and tones known so far: the better they are, the sharper the test
 */
export function findTaps(
  signal: DecaySignal,
  components: readonly Component[],
  axisWeights: readonly number[],
  search: TapSearch,
): FreeDecay[] {
  const whole: FreeDecay = { start: 0, end: signal.timeS.length, onset: undefined };
  const splits: { decay: FreeDecay; split: Split | undefined }[] = [
    { decay: whole, split: bestSplit(signal, whole, components, axisWeights, search) },
  ];
  let strongest = 0;
  const limit = search.relativeThreshold > FINE ? COARSE_TAP_LIMIT : TAP_LIMIT;
  for (let count = 0; count < limit; count++) {
    const at = indexOfLargest(splits.map((s) => s.split?.gain ?? 0));
    const { decay, split } = splits[at]!;
    if (split === undefined || split.gain < Math.max(search.threshold, search.relativeThreshold * strongest))
      break;
    strongest = Math.max(strongest, split.gain);
    const parts: FreeDecay[] = [
      { ...decay, end: split.onset },
      { start: split.start, end: decay.end, onset: split.onset },
    ];
    splits.splice(
      at,
      1,
      ...parts.map((part) => ({
        decay: part,
        split: bestSplit(signal, part, components, axisWeights, search),
      })),
    );
  }
  return refineBorders(
    signal,
    splits.map((s) => s.decay),
    components,
    axisWeights,
    search,
  );
}

/** More than this many taps is not a tap test. */
export const TAP_LIMIT = 40;
/** Nor more than this while modes are still missing: they make up for each other. */
const COARSE_TAP_LIMIT = 14;

/** Each border searched again between its neighbours; borders that no longer pay are taken away. */
export function refineBorders(
  signal: DecaySignal,
  decays: readonly FreeDecay[],
  components: readonly Component[],
  axisWeights: readonly number[],
  search: TapSearch,
): FreeDecay[] {
  const refined = [...decays];
  for (let round = 0; round < 2; round++) {
    for (let k = 1; k < refined.length; k++) {
      const left = refined[k - 1]!;
      const right = refined[k]!;
      const union: FreeDecay = { start: left.start, end: right.end, onset: left.onset };
      const split = bestSplit(signal, union, components, axisWeights, search);
      if (split === undefined || split.gain < search.threshold) {
        refined.splice(k - 1, 2, union);
        k--;
        continue;
      }
      refined[k - 1] = { ...left, end: split.onset };
      refined[k] = { start: split.start, end: right.end, onset: split.onset };
    }
  }
  return refined;
}

function bestSplit(
  signal: DecaySignal,
  decay: FreeDecay,
  components: readonly Component[],
  axisWeights: readonly number[],
  search: TapSearch,
): Split | undefined {
  const n = decay.end - decay.start;
  const least = linearColumnCount(components.length) + 2;
  if (n < 2 * least) return undefined;
  const { leading, trailing, leadingMotion, trailingMotion } = scanSplits(
    signal,
    decay,
    components,
    axisWeights,
  );
  const price = signal.y.length + CONTACT_SAMPLE_PRICE;
  const total = leading[n]!;
  const gains = new Float64Array(n - least + 1);
  const starts = new Int32Array(n - least + 1);
  let k = 0;
  // A record may begin within a contact: then the left part is empty (split at 0) and costs nothing.
  for (let onset = 0; onset <= n - least; onset++) {
    const onsetTime = signal.timeS[decay.start + onset]!;
    gains[onset] = -Infinity;
    for (let j = onset; j <= n - least; j++) {
      if (signal.timeS[decay.start + j]! - onsetTime > search.contactS) break;
      const gain = total - leading[onset]! - trailing[j]! - price * (j - onset);
      if (gain > gains[onset]!) {
        gains[onset] = gain;
        starts[onset] = j;
      }
    }
    if (gains[onset]! > gains[k]!) k = onset;
  }
  if (k === 0) return undefined;
  const gain = gains[k]!;
  const j = starts[k]!;
  const motion = Math.min(leadingMotion[k]! - leading[k]!, trailingMotion[j]! - trailing[j]!);
  if (gain < LEAST_JUMP_SHARE * motion) return undefined;
  if (gain < SURE_JUMP_SHARE * motion && !isSudden(gains, k, halfCycleSamples(signal, decay, components)))
    return undefined;
  return { gain, onset: decay.start + k, start: decay.start + j };
}

/** Half a cycle of the slowest component, in samples. */
function halfCycleSamples(signal: DecaySignal, decay: FreeDecay, components: readonly Component[]): number {
  const slowest = Math.min(...components.map((c) => c.angularRadPerS));
  const durationS = signal.timeS[decay.end - 1]! - signal.timeS[decay.start]!;
  return Math.max(2, Math.round((Math.PI / slowest / durationS) * (decay.end - decay.start)));
}

/**
 * Away from a sudden jump the gain falls in proportion to the distance; away from the best place to break a slow
 * misfit (a beat, an amplitude-dependent frequency) it falls with the square.
 */
function isSudden(gains: Float64Array, k: number, step: number): boolean {
  if (k < 2 * step || k + 2 * step >= gains.length) return true;
  const lossAt = (distance: number): number => gains[k]! - (gains[k - distance]! + gains[k + distance]!) / 2;
  return lossAt(2 * step) < SUDDEN_RATIO * lossAt(step);
}

function indexOfLargest(values: readonly number[]): number {
  let best = 0;
  for (let i = 1; i < values.length; i++) if (values[i]! > values[best]!) best = i;
  return best;
}
