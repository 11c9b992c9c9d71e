import { linearColumnCount, parameterCount, parameterIndex } from './decay-model.ts';
import type { Component, DecaySignal } from './decay-model.ts';
import { bayesCost, recordCost } from './bayes-cost.ts';
import { COARSE, FINE, LESS_COARSE, findTaps, isTapped } from './find-taps.ts';
import { busiestStretch, stretchOf, wholeOf } from './busiest-stretch.ts';
import { briefRingDowns, firstRingDowns } from './first-ring-downs.ts';
import type { FirstRingDown } from './first-ring-downs.ts';
import { ROUGH_ITERATIONS, fitDecays } from './fit-decays.ts';
import { withOneMore } from './one-more-component.ts';
import { found, refit } from './ring-down-state.ts';
import type { RingDownSearch, SearchInput } from './ring-down-state.ts';

/** Chance of one false tap in a record of pure noise. */
const FALSE_TAP_CHANCE = 1e-4;
/** Rounds of taps and shapes in turn. */
const SETTLE_LIMIT = 4;
const LOWEST_HZ = 0.4;
const LARGEST_DAMPING_RATIO = 0.3;

/** Finds taps, modes and tones of a tap record, alternately, each with what is known of the others. */
export function searchRingDowns(input: SearchInput): RingDownSearch | undefined {
  const busiest = busiestStretch(input.signal);
  if (busiest === undefined) return searchFromEach(input, firstRingDowns(input));
  const part = { ...input, signal: stretchOf(input.signal, busiest) };
  const known = searchFromEach(part, firstRingDowns(part));
  if (known === undefined) return undefined;
  const noise = known.quietVariance;
  if (!isTapped(part.signal, known.tapCount) || isHopeless(part.signal, known))
    return refit(input.signal, [wholeOf(input.signal)], known.fit.components, noise);
  // Taps are looked for in the whole record with the modes of its busiest part, then whatever else there is.
  const whole = settle(input, { ...known, decays: [] }, noise, FINE);
  return withTones(input.signal, prune(input, search(input, whole, noise, FINE), noise));
}

/** The same for a record whose motion hardly stands out of its noise. */
export const searchBriefRingDowns = (input: SearchInput): RingDownSearch | undefined =>
  searchFromEach(input, briefRingDowns(input));

function searchFromEach(input: SearchInput, starts: readonly FirstRingDown[]): RingDownSearch | undefined {
  const { signal } = input;
  let best: RingDownSearch | undefined;
  let runs = 0;
  const attempt = (start: FirstRingDown, coarse: number): RingDownSearch => {
    runs++;
    const result = searchFrom(input, start, coarse);
    if (best === undefined || recordCost(signal, result) < recordCost(signal, best)) best = result;
    return result;
  };
  for (const start of starts) {
    const result = attempt(start, COARSE);
    if (!isTapped(signal, result.tapCount) || runs >= RUN_LIMIT) break;
    if (isCrowded(result) && !isHopeless(signal, result)) attempt(start, LESS_COARSE);
    if (runs >= RUN_LIMIT || (best !== undefined && leavesOnlyNoise(best))) break;
  }
  return best;
}

/** Searches run at most: what is no tap test should not keep anyone waiting. */
const RUN_LIMIT = 3;

/** Lines nearer than this to each other may be two modes, or one whose missed tap they make up for. */
const NEIGHBOUR_SHARE = 0.1;

/** Close lines, many lines or no mode: reasons to look for weaker taps from the beginning. */
function isCrowded({ fit: { components } }: RingDownSearch): boolean {
  return (
    components.length > 2 ||
    components.every((c) => c.kind === 'tone') ||
    components.some((a, i) =>
      components.some((b, j) => j < i && Math.abs(a.angularRadPerS / b.angularRadPerS - 1) < NEIGHBOUR_SHARE),
    )
  );
}

function searchFrom(
  input: SearchInput,
  { tones, left, search: single }: FirstRingDown,
  coarse: number,
): RingDownSearch {
  const noise = single.quietVariance;
  const local = withOneMore({ ...input, signal: { ...input.signal, y: left } }, single, noise) ?? single;
  // Only shapes and noise are taken over: the first round fits the whole record.
  const components = [...tones, ...local.fit.components];
  const start: RingDownSearch = { ...local, fit: { ...local.fit, components } };
  const result = search(input, settle(input, start, noise, coarse), noise, coarse);
  if (!isTapped(input.signal, result.tapCount) || isHopeless(input.signal, result)) return result;
  return withTones(input.signal, prune(input, result, noise));
}

/** Residual above this many times the quiet stretches' variance: another start may do better. */
const NOISE_EXCESS = 1.4;

/** Whether the fit explains the record down to its noise. */
export function leavesOnlyNoise({ fit, quietVariance }: RingDownSearch): boolean {
  const sum = (values: readonly number[]): number => values.reduce((a, b) => a + b, 0);
  return sum(fit.variance) < NOISE_EXCESS * sum(quietVariance);
}

/** With this many lines and still less than half of the motion explained, a record is not made of ring-downs. */
const HOPELESS_COMPONENTS = 3;
const HOPELESS_SHARE = 0.5;

function isHopeless(signal: DecaySignal, { fit, quietVariance }: RingDownSearch): boolean {
  if (fit.components.length < HOPELESS_COMPONENTS) return false;
  let motion = 0;
  let unexplained = 0;
  signal.y.forEach((y, a) => {
    motion += y.reduce((sum, v) => sum + v * v, 0) / y.length - quietVariance[a]!;
    unexplained += fit.variance[a]! - quietVariance[a]!;
  });
  return unexplained > HOPELESS_SHARE * motion;
}

/** Steps taken at most: each adds a component, or looks for weaker taps. */
const STEP_LIMIT = 10;

/**
 * Either one more component or the weaker taps, whichever the record pays more for (a missed tap passes for a second
 * mode, a missed mode for many weak taps), until neither pays.
 */
function search(
  input: SearchInput,
  start: RingDownSearch,
  noise: readonly number[],
  coarse: number,
): RingDownSearch {
  const { signal } = input;
  let current = start;
  let threshold = coarse;
  let larger = withOneMore(input, current, noise);
  for (let step = 0; step < STEP_LIMIT && isTapped(signal, current.tapCount); step++) {
    if (isHopeless(signal, current)) break;
    const cost = recordCost(signal, current);
    const richer = larger === undefined ? undefined : settle(input, larger, noise, threshold);
    const finer = threshold === FINE ? undefined : settle(input, current, noise, FINE);
    const richerCost = richer === undefined ? Infinity : recordCost(signal, richer);
    const finerCost = finer === undefined ? Infinity : recordCost(signal, finer);
    const before = current;
    if (finer !== undefined && finerCost <= Math.min(cost, richerCost)) {
      current = finer;
      threshold = FINE;
    } else if (richer !== undefined && richerCost < cost) {
      current = richer;
    } else {
      break;
    }
    if (current !== before) larger = withOneMore(input, current, noise);
  }
  return current;
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
  const fit = fitDecays(signal, search.fitted, named, variance);
  return found(search.decays, search.fitted, fit, search.quietVariance);
}

const asTone = (component: Component): Component => ({ ...component, kind: 'tone', decayPerS: 0 });

/** Takes components away that do not pay, or that no phone could measure. */
function prune(input: SearchInput, start: RingDownSearch, noise: readonly number[]): RingDownSearch {
  const { signal } = input;
  let current = start;
  while (current.fit.components.length > 1) {
    const segments = current.fitted;
    const whole = bayesCost(signal, segments, current.fit);
    const fewer = current.fit.components.map((_, k) => {
      const rest = current.fit.components.filter((__, j) => j !== k);
      return {
        fit: fitDecays(signal, segments, rest, current.fit.variance, 1, ROUGH_ITERATIONS),
        removed: current.fit.components[k]!,
      };
    });
    const costs = fewer.map(({ fit, removed }) =>
      isMeasurable(removed, input.rateHz) ? bayesCost(signal, segments, fit) : -Infinity,
    );
    const best = costs.indexOf(Math.min(...costs));
    if (costs[best]! >= whole) break;
    current = settle(input, found(current.decays, segments, fewer[best]!.fit, noise), noise, FINE);
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

/** Step² times this is the least variance a tap is judged by: the error of coarse rounding goes with the motion. */
const ROUNDING_SHARE = 1 / 6;

/** Taps and shapes in turn until the taps stay. */
function settle(
  input: SearchInput,
  start: RingDownSearch,
  noise: readonly number[],
  relativeThreshold: number,
): RingDownSearch {
  const { signal, stepMps2 } = input;
  let current = start;
  for (let round = 0; round < SETTLE_LIMIT; round++) {
    const { components, variance } = current.fit;
    const decays = findTaps(
      signal,
      components,
      variance.map((v, a) => 1 / Math.max(v, ROUNDING_SHARE * (stepMps2[a] ?? 0) ** 2)),
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

/** Upper tail of the chi-squared of a state jump, over all samples (Laurent & Massart 2000, lemma 1). */
function tapThreshold(signal: DecaySignal, componentCount: number): number {
  const freedom = signal.y.length * linearColumnCount(componentCount);
  const tail = Math.log(signal.timeS.length / FALSE_TAP_CHANCE);
  return freedom + 2 * Math.sqrt(freedom * tail) + 2 * tail;
}
