import {
  choleskyInPlace,
  forwardSubstitute,
  backSubstitute,
  symmetricInverse,
} from '../../signal/linear-algebra.ts';
import { linearColumnCount, parameterCount, parameterIndex } from './decay-model.ts';
import { evaluateDecays, reweighed } from './evaluate-decays.ts';
import type { Component, DecaySignal, Segment } from './decay-model.ts';
import type { Evaluation } from './evaluate-decays.ts';

/** Stop when a step promises less than this part of the cost's unit (cost is in noise variances). */
const STOP_DECREASE = 1e-4;
const ITERATION_LIMIT = 20;
/** Enough where only the order of an answer counts: whether a line falls, whether a component is missed. */
export const ROUGH_ITERATIONS = 10;
/** Rounds of shapes and noise in turn. */
const ROUND_LIMIT = 5;
/** A noise variance that falls by more than this in a round was a poor guess. */
const NOISE_SETTLED_FACTOR = 1.5;
/** Smallest damping ratio searched: below it a free decay cannot be told from a line in a minute. */
export const SMALLEST_DECAY_RATIO = 1e-5;

export interface DecayFit {
  readonly components: readonly Component[];
  readonly evaluation: Evaluation;
  /** Residual variance per axis, (m/s²)². */
  readonly variance: readonly number[];
  /** Covariance of the nonlinear parameters (angular frequency and decay per mode, angular frequency per tone). */
  readonly covariance: Float64Array | undefined;
  readonly sampleCount: number;
}

/**
 * Joint least squares of free decays: Levenberg-Marquardt (Marquardt 1963) on frequencies and decays with the
 * amplitudes projected out (Golub & Pereyra 1973). Axis variances are estimated along.
 * @param start first guess; within about half a bandwidth of the answer or one over the segment length
 * @param variance starting noise variance per axis, (m/s²)²
 */
export function fitDecays(
  signal: DecaySignal,
  segments: readonly Segment[],
  start: readonly Component[],
  variance: readonly number[],
  rounds = 2,
  iterations = ITERATION_LIMIT,
): DecayFit {
  let components = start;
  let noise = variance;
  let evaluation = evaluateDecays(
    signal,
    segments,
    components,
    noise.map((v) => 1 / v),
  );
  for (let round = 0; round < ROUND_LIMIT; round++) {
    ({ components, evaluation } = descend(signal, segments, components, noise, evaluation, iterations));
    const before = noise;
    noise = residualVariance(signal, segments, components.length, evaluation, variance);
    evaluation = reweighed(
      evaluation,
      noise.map((v) => 1 / v),
    );
    // Against a noise guessed too large the descent rests too early: it goes on until the guess has come down.
    const hasSettled = noise.every((v, a) => before[a]! < NOISE_SETTLED_FACTOR * v);
    if (round + 1 >= rounds && hasSettled) break;
  }
  const sampleCount = segments.reduce((n, s) => n + s.end - s.start, 0);
  return {
    components,
    evaluation,
    variance: noise,
    covariance: symmetricInverse(evaluation.curvature, parameterCount(components)),
    sampleCount,
  };
}

function residualVariance(
  signal: DecaySignal,
  segments: readonly Segment[],
  componentCount: number,
  evaluation: Evaluation,
  floor: readonly number[],
): number[] {
  const columns = linearColumnCount(componentCount);
  const count = segments.reduce((n, s) => n + s.end - s.start, 0);
  const freedom = Math.max(count - segments.length * columns, 1);
  return signal.y.map((_, a) => Math.max(evaluation.rss[a]! / freedom, 1e-6 * floor[a]!, 1e-18));
}

interface Descent {
  readonly components: readonly Component[];
  readonly evaluation: Evaluation;
}

function descend(
  signal: DecaySignal,
  segments: readonly Segment[],
  start: readonly Component[],
  variance: readonly number[],
  first: Evaluation,
  iterations: number,
): Descent {
  const weights = variance.map((v) => 1 / v);
  let current: Descent = { components: start, evaluation: first };
  let lambda = 1e-3;
  for (let i = 0; i < iterations; i++) {
    const step = marquardtStep(current, lambda);
    if (step === undefined || (step.promised < STOP_DECREASE && lambda < 1)) break;
    const components = moved(current.components, step.change);
    const evaluation = evaluateDecays(signal, segments, components, weights);
    const decrease = current.evaluation.cost - evaluation.cost;
    if (decrease >= 0) {
      current = { components, evaluation };
      if (decrease < STOP_DECREASE && lambda < 1) break;
      lambda = Math.max(lambda / 8, 1e-9);
    } else {
      lambda *= 8;
      if (lambda > 1e9) break;
    }
  }
  return current;
}

function marquardtStep(
  { components, evaluation }: Descent,
  lambda: number,
): { change: Float64Array; promised: number } | undefined {
  const size = evaluation.gradient.length;
  const matrix = evaluation.curvature.slice();
  for (let i = 0; i < size; i++) matrix[i * size + i]! *= 1 + lambda;
  const change = evaluation.gradient.slice();
  // A decay that rests on its bound and would go below stays there: the others must not wait for it.
  components.forEach((component, k) => {
    const at = parameterIndex(components, k) + 1;
    if (component.kind === 'tone' || change[at]! > 0 || !isAtBound(component)) return;
    change[at] = 0;
    for (let i = 0; i < size; i++) matrix[at * size + i] = matrix[i * size + at] = 0;
  });
  if (choleskyInPlace(matrix, size) === 0) return undefined;
  forwardSubstitute(matrix, size, change);
  let promised = 0;
  for (let i = 0; i < size; i++) promised += change[i]! * change[i]!;
  backSubstitute(matrix, size, change);
  return { change, promised };
}

const isAtBound = ({ decayPerS, angularRadPerS }: Component): boolean =>
  decayPerS <= 1.001 * SMALLEST_DECAY_RATIO * angularRadPerS;

/** Applies a parameter change, kept within a factor of four in decay and a few bandwidths in frequency. */
function moved(components: readonly Component[], change: Float64Array): Component[] {
  let at = 0;
  return components.map((component) => {
    const angular = component.angularRadPerS;
    const reach = Math.max(3 * component.decayPerS, 0.05 * angular);
    const angularRadPerS = Math.max(angular + clamp(change[at++]!, reach), 0.2 * angular);
    if (component.kind === 'tone') return { ...component, angularRadPerS };
    const decay = component.decayPerS + change[at++]!;
    const decayPerS = Math.max(
      Math.min(Math.max(decay, component.decayPerS / 4), component.decayPerS * 4),
      SMALLEST_DECAY_RATIO * angular,
    );
    if (component.softening === undefined) return { ...component, angularRadPerS, decayPerS };
    const { frequencySlopePerMps2, decaySlopePerMps2 } = component.softening;
    const softening = {
      frequencySlopePerMps2: frequencySlopePerMps2 + change[at++]!,
      decaySlopePerMps2: decaySlopePerMps2 + change[at++]!,
    };
    return { ...component, angularRadPerS, decayPerS, softening };
  });
}

const clamp = (x: number, reach: number): number => Math.min(Math.max(x, -reach), reach);
