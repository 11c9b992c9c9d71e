import { symmetricInverse } from '../../signal/linear-algebra.ts';
import { linearColumnCount, parameterCount } from './decay-model.ts';
import { evaluateDecays } from './evaluate-decays.ts';
import type { DecaySignal, Segment } from './decay-model.ts';
import { fitDecays } from './fit-decays.ts';
import type { DecayFit } from './fit-decays.ts';
import { residuals } from './modelled-signal.ts';

/**
 * Steps above this many standard deviations of the residual (its own rounding included) call for it: below, rounding
 * is as good as more white noise (study of estimators, section 8).
 */
const COARSE_STEP_SDS = 1.5;
const ITERATION_LIMIT = 14;
/** Relative change of the noise at which the iteration rests. */
const NOISE_SETTLED = 0.01;
/** Least weight of a sample against an unrounded one: keeps the working value finite in the middle of a cell. */
const LEAST_WEIGHT = 1e-3;
/** Noise is not searched below this share of the step: no rounded record can tell it. */
const LEAST_NOISE_SHARE = 0.02;
/** A cell whose probability is below this is treated by its nearest border. */
const LEAST_PROBABILITY = 1e-12;

export const isStepCoarse = (variance: readonly number[], stepMps2: readonly number[]): boolean =>
  variance.some((v, a) => (stepMps2[a] ?? 0) > COARSE_STEP_SDS * Math.sqrt(v));

/**
 * Maximum likelihood of a fit to rounded samples: each value only says in which cell the true one lies
 * (interval censoring). Fisher scoring by weighted least squares on working values (Nelder & Wedderburn 1972), noise by
 * its own search, in turn.
 * @param start ordinary fit of the same segments
 * @param stepMps2 rounding step per axis; 0 leaves an axis as it is
 */
export function fitRounded(
  signal: DecaySignal,
  segments: readonly Segment[],
  start: DecayFit,
  stepMps2: readonly number[],
): DecayFit {
  const n = signal.timeS.length;
  const working = signal.y.map(() => new Float64Array(n));
  const weights = signal.y.map(() => new Float64Array(n).fill(1));
  let noise = start.variance.map((v, a) => {
    const step = stepMps2[a] ?? 0;
    return Math.max(v - step ** 2 / 12, (0.15 * step) ** 2, 1e-18);
  });
  let fit = start;
  let left = residuals(signal, segments, start);
  const columns = linearColumnCount(fit.components.length) * segments.length;
  const freedom = fit.sampleCount / Math.max(fit.sampleCount - columns, 1);
  for (let i = 0; i < ITERATION_LIMIT; i++) {
    signal.y.forEach((y, a) =>
      fillWorking(y, left[a]!, segments, stepMps2[a] ?? 0, Math.sqrt(noise[a]!), working[a]!, weights[a]!),
    );
    fit = fitDecays({ ...signal, y: working, weights }, segments, fit.components, noise, 1);
    left = residuals(signal, segments, fit);
    const updated = axisNoise(left, segments, stepMps2, noise).map((v) => freedom * v);
    const settled = noise.every((v, a) => Math.abs(updated[a]! / v - 1) < NOISE_SETTLED);
    noise = updated;
    if (settled && i > 1) break;
  }
  return withNoise({ ...signal, y: working, weights }, segments, fit, noise);
}

/** The fit's curvature at the noise that maximum likelihood gives, not at the working residual's. */
function withNoise(
  weighted: DecaySignal,
  segments: readonly Segment[],
  fit: DecayFit,
  noise: readonly number[],
): DecayFit {
  const evaluation = evaluateDecays(
    weighted,
    segments,
    fit.components,
    noise.map((v) => 1 / v),
  );
  return {
    ...fit,
    evaluation,
    variance: noise,
    covariance: symmetricInverse(evaluation.curvature, parameterCount(fit.components)),
  };
}

/**
 * Working values and weights of one axis for the present fit.
 */
function fillWorking(
  y: Float64Array,
  left: Float64Array,
  segments: readonly Segment[],
  step: number,
  sd: number,
  working: Float64Array,
  weights: Float64Array,
): void {
  for (const { start, end } of segments) {
    for (let i = start; i < end; i++) {
      const value = y[i]!;
      const residual = left[i]!;
      if (step === 0) {
        working[i] = value;
        continue;
      }
      const model = value - residual;
      const a = (residual - step / 2) / sd;
      const b = (residual + step / 2) / sd;
      const probability = normalDistribution(b) - normalDistribution(a);
      if (probability < LEAST_PROBABILITY) {
        const border = Math.abs(a) < Math.abs(b) ? a : b;
        working[i] = model + border * sd;
        weights[i] = 1;
        continue;
      }
      const da = normalDensity(a);
      const db = normalDensity(b);
      const score = (da - db) / probability;
      const bend = (a * da - b * db) / probability;
      const weight = Math.max(score * score - bend, LEAST_WEIGHT);
      working[i] = model + (sd * score) / weight;
      weights[i] = weight;
    }
  }
}

/** Steps of the search for the noise, each narrowing it to 0.62 of its range. */
const NOISE_STEPS = 9;
/** Range of one search about the present value, as a factor of the standard deviation. */
const NOISE_RANGE = 2;
const GOLDEN = (Math.sqrt(5) - 1) / 2;

/** Steps that differ by less are one step, read from different samples. */
const ALIKE_SHARE = 0.02;

/** Axes rounded alike are of one sensor and share its noise: what one alone shows of it may all lie in one cell. */
function axisNoise(
  left: readonly Float64Array[],
  segments: readonly Segment[],
  stepMps2: readonly number[],
  present: readonly number[],
): number[] {
  const known = new Map<number, number>();
  return left.map((l, a) => {
    const step = stepMps2[a] ?? 0;
    if (step === 0) return meanSquare(l, segments);
    const alike = left.flatMap((_, b) => (Math.abs((stepMps2[b] ?? 0) / step - 1) < ALIKE_SHARE ? [b] : []));
    const mean = alike.reduce((sum, b) => sum + present[b]!, 0) / alike.length;
    const variance =
      known.get(alike[0]!) ??
      roundedNoise(
        alike.map((b) => left[b]!),
        segments,
        step,
        mean,
      );
    known.set(alike[0]!, variance);
    return variance;
  });
}

/**
 * Noise variance that makes the cells likeliest: golden section on the logarithm. (Expectation and maximisation creeps
 * here: rounding hides most of what it steps by.)
 */
function roundedNoise(
  left: readonly Float64Array[],
  segments: readonly Segment[],
  step: number,
  present: number,
): number {
  const misfit = (logSd: number): number =>
    -left.reduce((sum, l) => sum + logLikelihood(l, segments, step, Math.exp(logSd)), 0);
  let low = Math.log(Math.max(Math.sqrt(present) / NOISE_RANGE, LEAST_NOISE_SHARE * step));
  let high = Math.max(Math.log(Math.sqrt(present) * NOISE_RANGE), low);
  let [a, b] = [high - GOLDEN * (high - low), low + GOLDEN * (high - low)];
  let [atA, atB] = [misfit(a), misfit(b)];
  for (let i = 0; i < NOISE_STEPS; i++) {
    if (atA < atB) {
      [high, b, atB] = [b, a, atA];
      a = high - GOLDEN * (high - low);
      atA = misfit(a);
    } else {
      [low, a, atA] = [a, b, atB];
      b = low + GOLDEN * (high - low);
      atB = misfit(b);
    }
  }
  return Math.exp(low + high);
}

/** Mean square within the segments, (m/s²)². */
export function meanSquare(left: Float64Array, segments: readonly Segment[]): number {
  let sum = 0;
  let count = 0;
  for (const { start, end } of segments) {
    for (let i = start; i < end; i++) sum += left[i]! ** 2;
    count += end - start;
  }
  return Math.max(sum / Math.max(count, 1), 1e-18);
}

function logLikelihood(left: Float64Array, segments: readonly Segment[], step: number, sd: number): number {
  let sum = 0;
  for (const { start, end } of segments) {
    for (let i = start; i < end; i++) {
      const residual = Math.abs(left[i]!);
      const probability =
        normalDistribution((step / 2 - residual) / sd) - normalDistribution((-step / 2 - residual) / sd);
      sum += Math.log(Math.max(probability, LEAST_PROBABILITY));
    }
  }
  return sum;
}

const normalDensity = (x: number): number => Math.exp(-0.5 * x * x) / Math.sqrt(2 * Math.PI);

/** Standard normal distribution (Abramowitz & Stegun 26.2.17: error below 7.5e-8), its tail kept relative. */
function normalDistribution(x: number): number {
  const t = 1 / (1 + 0.2316419 * Math.abs(x));
  const poly =
    t * (0.31938153 + t * (-0.356563782 + t * (1.781477937 + t * (-1.821255978 + t * 1.330274429))));
  const tail = normalDensity(x) * poly;
  return x > 0 ? 1 - tail : tail;
}
