import { evaluateDecays, linearColumnCount, parameterCount, parameterIndex } from './decay-model.ts';
import type { Component, DecaySignal, Segment } from './decay-model.ts';
import { fitDecays } from './fit-decays.ts';
import { residuals } from './modelled-signal.ts';
import type { DecayFit } from './fit-decays.ts';
import { CONTACT_SAMPLE_PRICE, TAP_LIMIT, findTaps, used } from './find-taps.ts';
import type { FreeDecay } from './find-taps.ts';
import { strongestOnsets } from './first-decay.ts';
import type { FirstDecay } from './first-decay.ts';
import { quietNoiseVariance } from './quiet-noise.ts';
import { strongestDecay } from './start-bank.ts';

/** Modes and tones together. */
const COMPONENT_LIMIT = 5;
/** Chance of one false tap in a record of pure noise. */
const FALSE_TAP_CHANCE = 1e-4;
/** Rounds of taps and shapes in turn. */
const SETTLE_LIMIT = 4;
/** Least share of the strongest tap while the modes are still being found, and after. */
const COARSE = 0.05;
const LOWEST_HZ = 0.4;
const LARGEST_DAMPING_RATIO = 0.3;
const FINE = 0.0005;

export interface RingDownSearch {
  readonly decays: readonly FreeDecay[];
  readonly fit: DecayFit;
  readonly tapCount: number;
  /** Noise variance per axis in the quietest stretches, (m/s²)². */
  readonly quietVariance: readonly number[];
}

export interface SearchInput {
  readonly signal: DecaySignal;
  readonly rateHz: number;
  readonly stepMps2: readonly number[];
}

/** Finds taps, modes and tones of a tap record, alternately, each with what is known of the others. */
export function searchRingDowns(input: SearchInput): RingDownSearch | undefined {
  const { signal } = input;
  const noise = quietNoiseVariance(signal.y, input.rateHz, input.stepMps2);
  const start = firstComponents(input, noise);
  if (start === undefined) return undefined;
  const result = search(input, settle(signal, start, noise, COARSE), noise);
  return result.tapCount >= TAP_LIMIT ? result : withTones(signal, prune(input, result, noise));
}

/** Steps taken at most: each adds a component, or looks for weaker taps. */
const STEP_LIMIT = 10;

/**
 * Either one more component or the weaker taps, whichever the record pays more for (a missed tap passes for a second
 * mode, a missed mode for many weak taps), until neither pays.
 */
function search(input: SearchInput, start: RingDownSearch, noise: readonly number[]): RingDownSearch {
  const { signal } = input;
  let current = start;
  let threshold = COARSE;
  for (let step = 0; step < STEP_LIMIT && current.tapCount < TAP_LIMIT; step++) {
    const cost = recordCost(signal, current);
    const larger = withOneMore(input, current, noise);
    const richer = larger === undefined ? undefined : settle(signal, larger, noise, threshold);
    const finer = threshold === FINE ? undefined : settle(signal, current, noise, FINE);
    const richerCost = richer === undefined ? Infinity : recordCost(signal, richer);
    const finerCost = finer === undefined ? Infinity : recordCost(signal, finer);
    if (finer !== undefined && finerCost <= Math.min(cost, richerCost)) {
      current = finer;
      threshold = FINE;
    } else if (richer !== undefined && richerCost < cost) {
      current = richer;
    } else {
      break;
    }
  }
  return current;
}

/** Bayesian information criterion of the whole record: silence before the first tap and contacts count too. */
function recordCost(signal: DecaySignal, search: RingDownSearch): number {
  const { components, variance } = search.fit;
  const weights = variance.map((v) => 1 / v);
  const all = evaluateDecays(signal, search.decays, components, weights);
  const axes = signal.y.length;
  const n = signal.timeS.length;
  const inside = search.decays.reduce((sum, d) => sum + d.end - d.start, 0);
  let cost = 0;
  for (let a = 0; a < axes; a++) {
    const contact = ((n - inside) * (axes + CONTACT_SAMPLE_PRICE) * variance[a]!) / axes;
    cost += n * Math.log((all.rss[a]! + contact) / n);
  }
  const parameters = parameterCount(components) + search.decays.length * axes * linearColumnCount(components.length);
  return cost + parameters * Math.log(n * axes);
}

/** Standard deviations of its decay above zero that a component needs to be a mode; else it is a steady tone. */
const DECAY_SDS = 3;
/** Below this damping ratio nothing built rings (bare steel in air: about 0.0005; common practice, no source). */
const LEAST_DAMPING_RATIO = 2e-4;

/** Calls components that do not fall tones, and fits once more with their decay held at nothing. */
function withTones(signal: DecaySignal, search: RingDownSearch): RingDownSearch {
  const { components, covariance, variance } = search.fit;
  const size = parameterCount(components);
  const named = components.map((component, k): Component => {
    if (component.kind === 'tone') return component;
    const at = parameterIndex(components, k) + 1;
    const decaySd = covariance === undefined ? 0 : Math.sqrt(covariance[at * size + at]!);
    const falls =
      component.decayPerS > DECAY_SDS * decaySd &&
      component.decayPerS > LEAST_DAMPING_RATIO * component.angularRadPerS;
    return falls ? component : asTone(component);
  });
  if (named.every((component, k) => component === components[k])) return search;
  return found(search.decays, fitDecays(signal, used(search.decays), named, variance), search.quietVariance);
}

const asTone = (component: Component): Component => ({ ...component, kind: 'tone', decayPerS: 0 });

/** Takes components away that do not pay, or that no phone could measure. */
function prune(input: SearchInput, start: RingDownSearch, noise: readonly number[]): RingDownSearch {
  const { signal } = input;
  let current = start;
  while (current.fit.components.length > 1) {
    const segments = used(current.decays);
    const whole = bayesCost(signal, segments, current.fit);
    const fewer = current.fit.components.map((_, k) => {
      const rest = current.fit.components.filter((__, j) => j !== k);
      return {
        fit: fitDecays(signal, segments, rest, current.fit.variance, 1),
        removed: current.fit.components[k]!,
      };
    });
    const costs = fewer.map(({ fit, removed }) =>
      isMeasurable(removed, input.rateHz) ? bayesCost(signal, segments, fit) : -Infinity,
    );
    const best = costs.indexOf(Math.min(...costs));
    if (costs[best]! >= whole) break;
    current = settle(signal, found(current.decays, fewer[best]!.fit, noise), noise, FINE);
  }
  return current;
}

/** A component outside the band of the samples, or dead within a cycle, is a misfit and not a mode. */
function isMeasurable(component: Component, rateHz: number): boolean {
  const hz = component.angularRadPerS / (2 * Math.PI);
  return (
    hz > LOWEST_HZ &&
    hz < rateHz / 2 &&
    component.decayPerS < LARGEST_DAMPING_RATIO * component.angularRadPerS
  );
}

/**
 * First components: steady tones over the whole record, then the strongest decaying line: rough frequency from the
 * whole record, best onset by matched filter, and what rings in the time after that onset.
 */
function firstComponents(input: SearchInput, noise: readonly number[]): RingDownSearch | undefined {
  const { signal, rateHz } = input;
  const weights = noise.map((v) => 1 / v);
  const whole: FreeDecay[] = [{ start: 0, end: signal.timeS.length, onset: undefined }];
  let tones: Component[] = [];
  let left: readonly Float64Array[] = signal.y;
  for (;;) {
    const rough = strongestDecay(signal, left, whole, rateHz, weights);
    if (rough === undefined) return undefined;
    const line = fitDecays(
      signal,
      whole,
      [...tones, { ...rough.component, decayPerS: STEADY_START_PER_S }],
      noise,
      1,
    );
    const newest = line.components.at(-1)!;
    if (tones.length < TONE_LIMIT && isSteady(signal, left, newest)) {
      tones = [...line.components];
      left = residuals(signal, whole, line);
      continue;
    }
    const singles = strongestOnsets({ ...signal, y: left }, rough.component.angularRadPerS, weights)
      .map((onset) => localSearch(input, left, tones, onset, noise))
      .filter((single) => single !== undefined);
    if (singles.length === 0) return undefined;
    const single = singles.reduce((best, s) => (likelihoodGain(signal, s) > likelihoodGain(signal, best) ? s : best));
    return withOneMore(input, single, noise) ?? single;
  }
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
  const peak = strongestDecay(signal, left, local, rateHz, noise.map((v) => 1 / v));
  return peak && refit(signal, local, [...tones, peak.component], noise);
}

/** Logarithm of the likelihood ratio of the fit against silence, noise unknown: long poor fits lose to short good ones. */
function likelihoodGain(signal: DecaySignal, search: RingDownSearch): number {
  const { start, end } = search.decays[0]!;
  let gain = 0;
  signal.y.forEach((y, a) => {
    let square = 0;
    for (let i = start; i < end; i++) square += y[i]! * y[i]!;
    gain += (end - start) * Math.log((square + 1e-30) / (search.fit.evaluation.rss[a]! + 1e-30));
  });
  return gain;
}

/** A line that falls less than this over the whole record is steady: a tone. */
const STEADY_FALL = 0.3;
const STEADY_START_PER_S = 0.01;
const TONE_LIMIT = 3;

/** Stretches in which a tone must keep amplitude and phase, and how well: one of equal arrows, less of random ones. */
const STEADY_STRETCHES = 8;
const STEADY_COHERENCE = 0.8;

function isSteady(signal: DecaySignal, left: readonly Float64Array[], component: Component): boolean {
  const { timeS } = signal;
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
        const phase = component.angularRadPerS * timeS[i]!;
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

/** Taps and shapes in turn until the taps stay. */
function settle(
  signal: DecaySignal,
  start: RingDownSearch,
  noise: readonly number[],
  relativeThreshold: number,
): RingDownSearch {
  let current = start;
  for (let round = 0; round < SETTLE_LIMIT; round++) {
    const { components, variance } = current.fit;
    const decays = findTaps(
      signal,
      components,
      variance.map((v) => 1 / v),
      {
        contactS: 0.1,
        threshold: tapThreshold(signal, components.length),
        relativeThreshold,
      },
    );
    const same =
      decays.length === current.decays.length &&
      decays.every((d, k) => d.start === current.decays[k]!.start && d.end === current.decays[k]!.end);
    if (same) break;
    current = refit(signal, decays, components, noise);
  }
  return current;
}

function endAfter(signal: DecaySignal, start: number, durationS: number): number {
  const n = signal.timeS.length;
  const limit = signal.timeS[start]! + durationS;
  let end = Math.min(start + 12, n);
  while (end < n && signal.timeS[end]! < limit) end++;
  return end;
}

/** Upper tail of the chi-squared of a state jump, over all samples (Laurent & Massart 2000, lemma 1). */
function tapThreshold(signal: DecaySignal, componentCount: number): number {
  const freedom = signal.y.length * linearColumnCount(componentCount);
  const tail = Math.log(signal.timeS.length / FALSE_TAP_CHANCE);
  return freedom + 2 * Math.sqrt(freedom * tail) + 2 * tail;
}

const found = (
  decays: readonly FreeDecay[],
  fit: DecayFit,
  quietVariance: readonly number[],
): RingDownSearch => ({
  decays,
  fit,
  quietVariance,
  tapCount: decays.filter((d) => d.onset !== undefined).length,
});

function refit(
  signal: DecaySignal,
  decays: readonly FreeDecay[],
  components: readonly Component[],
  noise: readonly number[],
): RingDownSearch {
  return found(decays, fitDecays(signal, used(decays), components, noise), noise);
}

function withOneMore(
  input: SearchInput,
  current: RingDownSearch,
  noise: readonly number[],
): RingDownSearch | undefined {
  const { signal, rateHz } = input;
  if (current.fit.components.length >= COMPONENT_LIMIT) return undefined;
  const segments = used(current.decays);
  const residual = residuals(signal, segments, current.fit);
  const weights = current.fit.variance.map((v) => 1 / v);
  const peak = strongestDecay(signal, residual, segments, rateHz, weights);
  if (peak === undefined) return undefined;
  const trial = fitDecays(signal, segments, [...current.fit.components, peak.component], noise);
  if (areTooClose(signal, segments, trial.components)) return undefined;
  if (bayesCost(signal, segments, trial) >= bayesCost(signal, segments, current.fit)) return undefined;
  return found(current.decays, trial, noise);
}

/** Two lines nearer than these shares of one over the longest decay are one line to a single decay, to several. */
const CLOSEST_IN_ONE_DECAY = 0.5;
const CLOSEST_IN_SEVERAL = 0.2;

/** What softening or a poor start looks like: a second line inside the resolution of the first. */
function areTooClose(
  signal: DecaySignal,
  segments: readonly Segment[],
  components: readonly Component[],
): boolean {
  const longestS = Math.max(...segments.map((s) => signal.timeS[s.end - 1]! - signal.timeS[s.start]!));
  const share = segments.length > 1 ? CLOSEST_IN_SEVERAL : CLOSEST_IN_ONE_DECAY;
  const leastRadPerS = (2 * Math.PI * share) / longestS;
  return components.some((a, i) =>
    components.some((b, j) => j < i && Math.abs(a.angularRadPerS - b.angularRadPerS) < leastRadPerS),
  );
}

/** Bayesian information criterion (Schwarz 1978) with the residual variance of each axis estimated. */
function bayesCost(signal: DecaySignal, segments: readonly Segment[], fit: DecayFit): number {
  const { sampleCount } = fit;
  const axes = signal.y.length;
  let cost = 0;
  for (let a = 0; a < axes; a++) cost += sampleCount * Math.log(fit.evaluation.rss[a]! / sampleCount);
  const parameters =
    parameterCount(fit.components) + segments.length * axes * linearColumnCount(fit.components.length);
  return cost + parameters * Math.log(sampleCount * axes);
}
