import { linearColumnCount } from './decay-model.ts';
import type { Component, DecaySignal, Segment } from './decay-model.ts';
import { createSplitScans } from './split-scan.ts';
import type { SplitScans } from './split-scan.ts';

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
  const splitter = createSplitter(signal, components, axisWeights, search);
  const splits = chunksOf(signal).map((decay) => ({ decay, split: splitter(decay) }));
  let strongest = 0;
  const limit = splits.length * (search.relativeThreshold > FINE ? COARSE_TAP_LIMIT : TAP_LIMIT);
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
    splits.splice(at, 1, ...parts.map((part) => ({ decay: part, split: splitter(part) })));
  }
  const decays = splits.map((s) => s.decay);
  return refineBorders(decays, splitter, search.threshold);
}

/** More than this many taps in a minute or in a shorter record is not a tap test. */
const TAP_LIMIT = 40;
/** Nor more than this while modes are still missing: they make up for each other. */
const COARSE_TAP_LIMIT = 14;
/** Records of two of these and more are looked through piece by piece: the work then grows with their length alone. */
const CHUNK_S = 60;

const chunkCount = ({ timeS }: DecaySignal): number =>
  Math.max(1, Math.floor((timeS[timeS.length - 1]! - timeS[0]!) / CHUNK_S));

/** Whether a record holds more taps than anyone makes. */
export const isTapped = (signal: DecaySignal, tapCount: number): boolean =>
  tapCount < TAP_LIMIT * chunkCount(signal);

function chunksOf(signal: DecaySignal): FreeDecay[] {
  const count = chunkCount(signal);
  const n = signal.timeS.length;
  return Array.from({ length: count }, (_, c) => ({
    start: Math.floor((c * n) / count),
    end: Math.floor(((c + 1) * n) / count),
    onset: undefined,
  }));
}

/** Each border searched again between its neighbours; borders that no longer pay are taken away. */
function refineBorders(decays: readonly FreeDecay[], splitter: Splitter, threshold: number): FreeDecay[] {
  const refined = [...decays];
  for (let round = 0; round < 2; round++) {
    for (let k = 1; k < refined.length; k++) {
      const left = refined[k - 1]!;
      const right = refined[k]!;
      // Where a piece of a long record begins there is nothing to refine.
      if (right.onset === undefined) continue;
      const union: FreeDecay = { start: left.start, end: right.end, onset: left.onset };
      const split = splitter(union);
      if (split === undefined || split.gain < threshold) {
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

type Splitter = (decay: Segment) => Split | undefined;

/** Best split of any stretch; what was once asked is kept. */
function createSplitter(
  signal: DecaySignal,
  components: readonly Component[],
  axisWeights: readonly number[],
  search: TapSearch,
): Splitter {
  const scans = createSplitScans(signal, components, axisWeights);
  const known = new Map<string, Split | undefined>();
  return (decay) => {
    const key = `${decay.start} ${decay.end}`;
    if (!known.has(key)) known.set(key, bestSplit(signal, decay, components, scans, search));
    return known.get(key);
  };
}

function bestSplit(
  signal: DecaySignal,
  { start, end }: Segment,
  components: readonly Component[],
  scans: SplitScans,
  search: TapSearch,
): Split | undefined {
  const least = linearColumnCount(components.length) + 2;
  if (end - start < 2 * least) return undefined;
  const leading = scans.leading(start, end);
  const trailing = scans.trailing(start, end);
  const before = leading.residual.subarray(start - leading.origin);
  const after = trailing.residual.subarray(start - trailing.origin);
  const price = signal.y.length + CONTACT_SAMPLE_PRICE;
  const total = before[end - start]!;
  const last = end - start - least;
  const gains = new Float64Array(last + 1);
  const starts = new Int32Array(last + 1);
  let k = 0;
  // A record may begin within a contact: then the left part is empty (split at 0) and costs nothing.
  for (let onset = 0; onset <= last; onset++) {
    const latestS = signal.timeS[start + onset]! + search.contactS;
    let best = -Infinity;
    for (let j = onset; j <= last && signal.timeS[start + j]! <= latestS; j++) {
      const gain = total - before[onset]! - after[j]! - price * (j - onset);
      if (gain > best) {
        best = gain;
        starts[onset] = j;
      }
    }
    gains[onset] = best;
    if (best > gains[k]!) k = onset;
  }
  if (k === 0) return undefined;
  const gain = gains[k]!;
  const j = starts[k]!;
  const motion = Math.min(
    leading.motion[start + k - leading.origin]! - before[k]!,
    trailing.motion[start + j - trailing.origin]! - after[j]!,
  );
  if (gain < LEAST_JUMP_SHARE * motion) return undefined;
  if (
    gain < SURE_JUMP_SHARE * motion &&
    !isSudden(gains, k, halfCycleSamples(signal, start, end, components))
  )
    return undefined;
  return { gain, onset: start + k, start: start + j };
}

/** Half a cycle of the slowest component, in samples. */
function halfCycleSamples(
  signal: DecaySignal,
  start: number,
  end: number,
  components: readonly Component[],
): number {
  const slowest = Math.min(...components.map((c) => c.angularRadPerS));
  const durationS = signal.timeS[end - 1]! - signal.timeS[start]!;
  return Math.max(2, Math.round((Math.PI / slowest / durationS) * (end - start)));
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
