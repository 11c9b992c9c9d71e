import type { Component, DecaySignal } from './decay-model.ts';
import type { FreeDecay } from './find-taps.ts';
import { strongestOnsets } from './first-decay.ts';
import type { FirstDecay } from './first-decay.ts';
import { fitDecays } from './fit-decays.ts';
import { residuals } from './modelled-signal.ts';
import { refit } from './ring-down-state.ts';
import type { RingDownSearch, SearchInput } from './ring-down-state.ts';
import { strongestDecay } from './start-bank.ts';

/**
 * First components: steady tones over the whole record, then the strongest decaying line: rough frequency from the
 * whole record, best onset by matched filter, and what rings in the time after that onset.
 */
export function firstRingDowns(input: SearchInput, noise: readonly number[]): RingDownSearch[] {
  const { signal, rateHz } = input;
  const weights = noise.map((v) => 1 / v);
  const whole: FreeDecay[] = [{ start: 0, end: signal.timeS.length, onset: undefined }];
  let tones: Component[] = [];
  let left: readonly Float64Array[] = signal.y;
  while (tones.length < TONE_LIMIT) {
    const rough = strongestDecay(signal, left, whole, rateHz, weights);
    if (rough === undefined) return [];
    const slow = { ...rough.component, decayPerS: STEADY_START_PER_S };
    const line = fitDecays(signal, whole, [...tones, slow], noise, 1);
    if (!isSteady(signal, left, line.components.at(-1)!)) break;
    tones = [...line.components];
    left = residuals(signal, whole, line);
  }
  const beside = startsBeside(input, tones, left, noise);
  // A slow ring-down tapped in step can pass for a tone: the same without tones is kept as a last resort.
  return tones.length === 0 ? beside : [...beside, ...startsBeside(input, [], signal.y, noise)];
}

/** Starts that take given tones for granted, likeliest first. */
function startsBeside(
  input: SearchInput,
  tones: readonly Component[],
  left: readonly Float64Array[],
  noise: readonly number[],
): RingDownSearch[] {
  const { signal, rateHz } = input;
  const weights = noise.map((v) => 1 / v);
  const whole = [{ start: 0, end: signal.timeS.length }];
  const rough = strongestDecay(signal, left, whole, rateHz, weights);
  if (rough === undefined) return [];
  const singles = strongestOnsets({ ...signal, y: left }, rough.component.angularRadPerS, weights)
    .map((onset) => localSearch(input, left, tones, onset, noise))
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
    .map(({ search }) => search);
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
  left: readonly Float64Array[],
  tones: readonly Component[],
  onset: FirstDecay,
  noise: readonly number[],
): RingDownSearch | undefined {
  const { signal, rateHz } = input;
  const start = Math.min(onset.onset + 2, signal.timeS.length - 12);
  const local: FreeDecay[] = [
    { start, end: endAfter(signal, start, 2 / onset.decayPerS), onset: onset.onset },
  ];
  const peak = strongestDecay(
    signal,
    left,
    local,
    rateHz,
    noise.map((v) => 1 / v),
  );
  return peak && refit(signal, local, [...tones, peak.component], noise);
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
