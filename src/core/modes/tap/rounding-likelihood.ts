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
 * (interval censoring). Fisher scoring by weighted least squares on working values (Nelder & Wedderburn 1972); noise by
 * expectation and maximisation (Dempster, Laird & Rubin 1977).
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
  for (let i = 0; i < ITERATION_LIMIT; i++) {
    const updated = signal.y.map((y, a) =>
      fillWorking(y, left[a]!, segments, stepMps2[a] ?? 0, Math.sqrt(noise[a]!), working[a]!, weights[a]!),
    );
    const weighted: DecaySignal = { ...signal, y: working, weights };
    const next = fitDecays(weighted, segments, fit.components, noise, 1);
    const columns = linearColumnCount(fit.components.length) * segments.length;
    const freedom = fit.sampleCount / Math.max(fit.sampleCount - columns, 1);
    const settled = noise.every((v, a) => Math.abs((freedom * updated[a]!) / v - 1) < NOISE_SETTLED);
    fit = next;
    left = residuals(signal, segments, fit);
    noise = updated.map((v, a) =>
      Math.max(freedom * v, (LEAST_NOISE_SHARE * (stepMps2[a] ?? 0)) ** 2, 1e-18),
    );
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
 * @returns expected squared deviation of the unrounded values from the fit, mean over the samples
 */
function fillWorking(
  y: Float64Array,
  left: Float64Array,
  segments: readonly Segment[],
  step: number,
  sd: number,
  working: Float64Array,
  weights: Float64Array,
): number {
  let sum = 0;
  let count = 0;
  for (const { start, end } of segments) {
    for (let i = start; i < end; i++) {
      const value = y[i]!;
      const residual = left[i]!;
      count++;
      if (step === 0) {
        working[i] = value;
        sum += residual * residual;
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
        sum += (border * sd) ** 2;
        continue;
      }
      const da = normalDensity(a);
      const db = normalDensity(b);
      const score = (da - db) / probability;
      const bend = (a * da - b * db) / probability;
      const weight = Math.max(score * score - bend, LEAST_WEIGHT);
      working[i] = model + (sd * score) / weight;
      weights[i] = weight;
      sum += sd * sd * (1 + bend);
    }
  }
  return sum / Math.max(count, 1);
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
