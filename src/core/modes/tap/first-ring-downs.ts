import type { Component, DecaySignal } from './decay-model.ts';
import type { FreeDecay } from './find-taps.ts';
import { strongestOnsets } from './first-decay.ts';
import type { FirstDecay } from './first-decay.ts';
import { ROUGH_ITERATIONS, fitDecays } from './fit-decays.ts';
import { residuals } from './modelled-signal.ts';
import { quietNoiseVariance } from './quiet-noise.ts';
import { refit } from './ring-down-state.ts';
import type { RingDownSearch, SearchInput } from './ring-down-state.ts';
import { strongestDecay } from './start-bank.ts';
import type { BankPeak } from './start-bank.ts';

/** A place to begin: one ring-down fitted alone, beside tones that are taken for granted. */
export interface FirstRingDown {
  readonly tones: readonly Component[];
  /** The record without those tones, which the ring-down was fitted to. */
  readonly left: readonly Float64Array[];
  readonly search: RingDownSearch;
}

/**
 * First components: steady tones over the whole record, then the strongest decaying line: rough frequency from the
 * whole record, best onset by matched filter, and what rings in the time after that onset.
 */
export function firstRingDowns(input: SearchInput): FirstRingDown[] {
  const { tones, left } = steadyTones(input);
  const noise = quietNoiseVariance(left, input.rateHz, input.stepMps2);
  const beside = startsBeside(input, tones, left, noise);
  // A slow ring-down tapped in step can pass for a tone: the same without tones is kept as a last resort.
  return tones.length === 0 ? beside : [...beside, ...startsBeside(input, [], input.signal.y, noise)];
}

/** Window of a whole record: none. */
const UNDAMPED = [0] as const;

/**
 * The same from the strongest line of any brief stretch: a weak mode that is dead within a few cycles drowns in the noise
 * of a whole record.
 */
export function briefRingDowns(input: SearchInput): FirstRingDown[] {
  const { signal, rateHz, stepMps2 } = input;
  const noise = quietNoiseVariance(signal.y, rateHz, stepMps2);
  const weights = noise.map((v) => 1 / v);
  let best: BankPeak | undefined;
  for (const lengthS of BRIEF_STRETCHES_S) {
    const length = Math.round(lengthS * rateHz);
    for (let start = 0; start + length <= signal.timeS.length; start += length >> 2) {
      const stretch = [{ start, end: start + length }];
      const peak = strongestDecay(signal, signal.y, stretch, rateHz, weights, UNDAMPED);
      if (peak !== undefined && (best === undefined || peak.gain > best.gain)) best = peak;
    }
  }
  return best === undefined ? [] : startsAt(input, [], signal.y, noise, best);
}

/** A mode of 5 to 25 Hz at some per cent of damping is gone in these, s. */
const BRIEF_STRETCHES_S = [0.4, 1.2] as const;

/** Lines that keep amplitude and phase over the whole record, and what is left without them. */
function steadyTones(input: SearchInput): { tones: Component[]; left: readonly Float64Array[] } {
  const { signal, rateHz, stepMps2 } = input;
  const noise = quietNoiseVariance(signal.y, rateHz, stepMps2);
  const whole = [{ start: 0, end: signal.timeS.length }];
  let tones: Component[] = [];
  let left: readonly Float64Array[] = signal.y;
  while (tones.length < TONE_LIMIT) {
    const rough = strongestDecay(
      signal,
      left,
      whole,
      rateHz,
      noise.map((v) => 1 / v),
      UNDAMPED,
    );
    if (rough === undefined) break;
    const slow = { ...rough.component, decayPerS: STEADY_START_PER_S };
    const line = fitDecays(signal, whole, [...tones, slow], noise, 1, ROUGH_ITERATIONS);
    if (!isSteady(signal, left, line.components.at(-1)!)) break;
    tones = [...line.components];
    left = residuals(signal, whole, line);
  }
  return { tones, left };
}

/** Starts that take given tones for granted: the cleanest first, then the likeliest. */
function startsBeside(
  input: SearchInput,
  tones: readonly Component[],
  left: readonly Float64Array[],
  noise: readonly number[],
): FirstRingDown[] {
  const { signal, rateHz } = input;
  const weights = noise.map((v) => 1 / v);
  const whole = [{ start: 0, end: signal.timeS.length }];
  const rough = strongestDecay(signal, left, whole, rateHz, weights, UNDAMPED);
  return rough === undefined ? [] : startsAt(input, tones, left, noise, rough);
}

function startsAt(
  input: SearchInput,
  tones: readonly Component[],
  left: readonly Float64Array[],
  noise: readonly number[],
  rough: BankPeak,
): FirstRingDown[] {
  const weights = noise.map((v) => 1 / v);
  const toneless = { ...input.signal, y: left };
  const singles = strongestOnsets(toneless, rough.component.angularRadPerS, weights)
    .map((onset) => localSearch({ ...input, signal: toneless }, onset, noise))
    .filter((single) => single !== undefined)
    .map((single) => startOf(left, single, noise));
  const most = Math.max(...singles.map(({ gain }) => gain));
  const cleanest = singles
    .filter(({ gain }) => gain > LEAST_GAIN_SHARE * most)
    .sort((a, b) => a.excess - b.excess);
  const likeliest = singles.sort((a, b) => b.likelihood - a.likelihood);
  const first = cleanest[0];
  return [first, likeliest.find((start) => start !== first)]
    .filter((start) => start !== undefined)
    .map(({ search }) => ({ tones, left, search }));
}

/** Starts that explain less than this share of the most are not looked at. */
const LEAST_GAIN_SHARE = 0.1;

interface Start {
  readonly search: RingDownSearch;
  /** Energy explained, in noise variances. */
  readonly gain: number;
  /** Residual variance over the quiet one: a line fitted across several taps leaves most of the motion. */
  readonly excess: number;
  readonly likelihood: number;
}

function startOf(left: readonly Float64Array[], search: RingDownSearch, noise: readonly number[]): Start {
  const { start, end } = search.decays[0]!;
  const { rss } = search.fit.evaluation;
  let gain = 0;
  let excess = 0;
  let likelihood = 0;
  left.forEach((y, a) => {
    let square = 0;
    for (let i = start; i < end; i++) square += y[i]! * y[i]!;
    gain += (square - rss[a]!) / noise[a]!;
    excess += search.fit.variance[a]! / noise[a]! / left.length;
    // Logarithm of the likelihood ratio against none, noise unknown.
    likelihood += (end - start) * Math.log((square + 1e-30) / (rss[a]! + 1e-30));
  });
  return { search, gain, excess, likelihood };
}

/** The decay that begins at a given onset, fitted alone over two time constants. */
function localSearch(
  input: SearchInput,
  onset: FirstDecay,
  noise: readonly number[],
): RingDownSearch | undefined {
  const { signal, rateHz } = input;
  const start = Math.min(onset.onset + 2, signal.timeS.length - 12);
  const end = endAfter(signal, start, 2 / onset.decayPerS);
  const local: FreeDecay[] = [{ start, end, onset: onset.onset }];
  const peak = strongestDecay(
    signal,
    signal.y,
    local,
    rateHz,
    noise.map((v) => 1 / v),
  );
  return peak && refit(signal, local, [peak.component], noise);
}

/** A line that falls less than this over the whole record is steady: a tone. */
const STEADY_FALL = 0.3;
const STEADY_START_PER_S = 0.01;
const TONE_LIMIT = 3;

/** Stretches in which a tone must keep amplitude and phase, and how well: one of equal arrows, less of random ones. */
const STEADY_STRETCHES = 16;
const STEADY_COHERENCE = 0.93;

function isSteady(signal: DecaySignal, left: readonly Float64Array[], component: Component): boolean {
  const { timeS, phaseTimeS = timeS } = signal;
  const n = timeS.length;
  if (component.decayPerS * (timeS[n - 1]! - timeS[0]!) > STEADY_FALL) return false;
  let together = 0;
  let apart = 0;
  for (const y of left) {
    let [sumRe, sumIm] = [0, 0];
    for (let b = 0; b < STEADY_STRETCHES; b++) {
      const [first, end] = [b, b + 1].map((k) => Math.floor((k * n) / STEADY_STRETCHES)) as [number, number];
      let [re, im] = [0, 0];
      for (let i = first; i < end; i++) {
        const phase = component.angularRadPerS * phaseTimeS[i]!;
        re += y[i]! * Math.cos(phase);
        im += y[i]! * Math.sin(phase);
      }
      apart += re * re + im * im;
      sumRe += re;
      sumIm += im;
    }
    together += sumRe * sumRe + sumIm * sumIm;
  }
  return together > STEADY_COHERENCE * STEADY_STRETCHES * apart;
}

function endAfter(signal: DecaySignal, start: number, durationS: number): number {
  const n = signal.timeS.length;
  const limit = signal.timeS[start]! + durationS;
  let end = Math.min(start + 12, n);
  while (end < n && signal.timeS[end]! < limit) end++;
  return end;
}
