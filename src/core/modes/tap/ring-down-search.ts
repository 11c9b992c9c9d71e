import { linearColumnCount, parameterCount, parameterIndex } from './decay-model.ts';
import type { Component, DecaySignal, Segment } from './decay-model.ts';
import { fitDecays, SMALLEST_DECAY_RATIO } from './fit-decays.ts';
import { residuals } from './modelled-signal.ts';
import type { DecayFit } from './fit-decays.ts';
import { findTaps, used } from './find-taps.ts';
import type { FreeDecay } from './find-taps.ts';
import { strongestOnset } from './first-decay.ts';
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
  let current = settle(signal, start, noise, COARSE);
  current = grow(input, current, noise, COARSE);
  current = prune(input, settle(signal, current, noise, FINE), noise);
  current = settle(signal, current, noise, FINE);
  const grown = grow(input, current, noise, FINE);
  return withTones(signal, grown === current ? current : prune(input, grown, noise));
}

/** Standard deviations of its decay above zero that a component needs to be a mode; else it is a steady tone. */
const DECAY_SDS = 3;

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
      component.decayPerS > 2 * SMALLEST_DECAY_RATIO * component.angularRadPerS;
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

/** Adds components while the data pay for them. */
function grow(
  input: SearchInput,
  start: RingDownSearch,
  noise: readonly number[],
  relativeThreshold: number,
): RingDownSearch {
  let current = start;
  while (current.fit.components.length < COMPONENT_LIMIT) {
    const larger = withOneMore(input, current, noise);
    if (larger === undefined) break;
    current = settle(input.signal, larger, noise, relativeThreshold);
  }
  return current;
}

/**
 * First components: steady tones over the whole record, then the strongest decaying line: rough frequency from the
 * whole record, best onset by matched filter, and what rings in the time after that onset.
 */
function firstComponents(input: SearchInput, noise: readonly number[]): RingDownSearch | undefined {
  const { signal, rateHz } = input;
  const weights = noise.map((v) => 1 / v);
  const n = signal.timeS.length;
  const whole: FreeDecay[] = [{ start: 0, end: n, onset: undefined }];
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
    if (tones.length < TONE_LIMIT && isSteady(signal, newest)) {
      tones = [...tones, asTone(newest)];
      left = residuals(signal, whole, line);
      continue;
    }
    const onset = strongestOnset({ ...signal, y: left }, rough.component.angularRadPerS, weights);
    if (onset === undefined) return undefined;
    const start = Math.min(onset.onset + 2, n - 8);
    const local: FreeDecay[] = [
      { start, end: endAfter(signal, start, 2 / onset.decayPerS), onset: onset.onset },
    ];
    const peak = strongestDecay(signal, left, local, rateHz, weights) ?? rough;
    const single = refit(signal, local, [...tones, peak.component], noise);
    const second = withOneMore(input, single, noise) ?? single;
    return second;
  }
}

/** A line that falls less than this over the whole record is steady: a tone. */
const STEADY_FALL = 0.3;
const STEADY_START_PER_S = 0.01;
const TONE_LIMIT = 3;

function isSteady(signal: DecaySignal, component: Component): boolean {
  const durationS = signal.timeS.at(-1)! - signal.timeS[0]!;
  return component.decayPerS * durationS < STEADY_FALL;
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
  const segments = used(current.decays);
  const residual = residuals(signal, segments, current.fit);
  const weights = current.fit.variance.map((v) => 1 / v);
  const peak = strongestDecay(signal, residual, segments, rateHz, weights);
  if (peak === undefined) return undefined;
  const trial = fitDecays(signal, segments, [...current.fit.components, peak.component], noise);
  if (bayesCost(signal, segments, trial) >= bayesCost(signal, segments, current.fit)) return undefined;
  return found(current.decays, trial, noise);
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
