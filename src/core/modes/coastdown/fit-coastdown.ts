import {
  backSubstitute,
  choleskyInPlace,
  forwardSubstitute,
  symmetricInverse,
} from '../../signal/linear-algebra.ts';
import { sweepColumns } from './sweep-response.ts';
import type { Sweep } from './sweep-response.ts';

/**
 * Maximum likelihood fit of a pass in the time domain: the acceleration of a mode driven by an unbalance whose speed is a
 * polynomial, complex amplitude, constant, slope and starting decay free on each axis (variable projection, Golub &
 * Pereyra 1973; Gauss-Newton with Levenberg's damping 1944).
 */
export interface CoastdownPoint {
  readonly frequencyHz: number;
  readonly dampingRatio: number;
  readonly sweep: Sweep;
}

export interface CoastdownFit extends CoastdownPoint {
  readonly frequencySdHz: number;
  readonly dampingRatioSd: number;
  /** [axis]: complex amplitude of the unit response, m/s². */
  readonly amplitudes: readonly (readonly [number, number])[];
  readonly residualVariance: number;
  readonly sumOfSquares: number;
  readonly sampleCount: number;
  /** [axis] fitted and left-over, length n. */
  readonly fitted: readonly Float64Array[];
  readonly residuals: readonly Float64Array[];
}

export interface PassSamples {
  /** Length n, s. */
  readonly timeS: Float64Array;
  readonly axes: readonly Float64Array[];
}

const LINEAR = 6;
const MOST_STEPS = 25;
/** A step that lowers the sum of squares by less than this share ends the search. */
const ENOUGH = 1e-7;

interface Projection {
  readonly point: CoastdownPoint;
  readonly columns: readonly Float64Array[];
  readonly lower: Float64Array;
  readonly coefficients: readonly Float64Array[];
  readonly residuals: readonly Float64Array[];
  readonly sum: number;
}

function project(samples: PassSamples, point: CoastdownPoint): Projection {
  const { timeS, axes } = samples;
  const c = sweepColumns(timeS, point.sweep, point.frequencyHz, point.dampingRatio);
  const { centreS, halfS } = point.sweep;
  const columns = [
    c.re,
    c.im,
    c.decayRe,
    c.decayIm,
    new Float64Array(timeS.length).fill(1),
    timeS.map((t) => (t - centreS) / halfS),
  ];
  const lower = new Float64Array(LINEAR * LINEAR);
  for (let i = 0; i < LINEAR; i++)
    for (let j = 0; j <= i; j++)
      lower[i * LINEAR + j] = dot(columns[i] as Float64Array, columns[j] as Float64Array);
  choleskyInPlace(lower, LINEAR);
  const coefficients: Float64Array[] = [];
  const residuals: Float64Array[] = [];
  let sum = 0;
  for (const axis of axes) {
    const b = solved(lower, columns, axis);
    const left = axis.slice();
    subtract(left, columns, b);
    coefficients.push(b);
    residuals.push(left);
    sum += dot(left, left);
  }
  return { point, columns, lower, coefficients, residuals, sum };
}

function dot(a: Float64Array, b: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < a.length; i++) sum += (a[i] as number) * (b[i] as number);
  return sum;
}

function solved(lower: Float64Array, columns: readonly Float64Array[], axis: Float64Array): Float64Array {
  const b = Float64Array.from(columns, (column) => dot(column, axis));
  forwardSubstitute(lower, LINEAR, b);
  backSubstitute(lower, LINEAR, b);
  return b;
}

function subtract(left: Float64Array, columns: readonly Float64Array[], b: Float64Array): void {
  columns.forEach((column, j) => {
    const weight = b[j] as number;
    for (let i = 0; i < left.length; i++) left[i] = (left[i] as number) - weight * (column[i] as number);
  });
}

const parameterCount = (point: CoastdownPoint): number => 2 + point.sweep.speedHz.length;

/** Parameters: ln f, ln zeta, then speed coefficients (the constant phase is in the complex amplitude). */
function moved(point: CoastdownPoint, delta: ArrayLike<number>): CoastdownPoint {
  return {
    frequencyHz: point.frequencyHz * Math.exp(delta[0] as number),
    dampingRatio: Math.min(0.5, Math.max(1e-4, point.dampingRatio * Math.exp(delta[1] as number))),
    sweep: { ...point.sweep, speedHz: point.sweep.speedHz.map((b, j) => b + (delta[2 + j] as number)) },
  };
}

/** Change of the projected model per unit of each parameter, [parameter][axis]. */
function projectedSlopes(samples: PassSamples, at: Projection): Float64Array[][] {
  const { point } = at;
  const size = parameterCount(point);
  // Steps well inside the width of the mode and a small fraction of a turn over the pass.
  const steps = Array.from({ length: size }, (_, i) =>
    i === 0 ? 0.01 * point.dampingRatio : i === 1 ? 0.01 : 1e-3 / point.sweep.halfS,
  );
  return steps.map((h, i) => {
    const next = moved(
      point,
      steps.map((_, j) => (i === j ? h : 0)),
    );
    const c = sweepColumns(samples.timeS, next.sweep, next.frequencyHz, next.dampingRatio);
    const changed = [c.re, c.im, c.decayRe, c.decayIm];
    return samples.axes.map((_, a) => {
      const coefficients = at.coefficients[a] as Float64Array;
      const slope = new Float64Array(samples.timeS.length);
      changed.forEach((column, j) => {
        const weight = (coefficients[j] as number) / h;
        const old = at.columns[j] as Float64Array;
        for (let k = 0; k < slope.length; k++)
          slope[k] = (slope[k] as number) + weight * ((column[k] as number) - (old[k] as number));
      });
      const inside = solved(at.lower, at.columns, slope);
      subtract(slope, at.columns, inside);
      return slope;
    });
  });
}

function normalMatrix(slopes: readonly (readonly Float64Array[])[]): Float64Array {
  const size = slopes.length;
  const matrix = new Float64Array(size * size);
  for (let i = 0; i < size; i++)
    for (let j = 0; j <= i; j++) {
      let sum = 0;
      (slopes[i] as Float64Array[]).forEach((s, a) => {
        sum += dot(s, (slopes[j] as Float64Array[])[a] as Float64Array);
      });
      matrix[i * size + j] = sum;
      matrix[j * size + i] = sum;
    }
  return matrix;
}

export interface FitOptions {
  readonly mostSteps?: number;
  /** Frequency and damping of the mode stay as they are; only the sweep is fitted. */
  readonly isModeHeld?: boolean;
}

/** @param start near the solution: phases within about a radian over the pass */
export function fitCoastdown(
  samples: PassSamples,
  start: CoastdownPoint,
  options: FitOptions = {},
): CoastdownFit {
  const { mostSteps = MOST_STEPS, isModeHeld = false } = options;
  let at = project(samples, start);
  let damping = 1e-3;
  let slopes = projectedSlopes(samples, at);
  for (let step = 0; step < mostSteps; step++) {
    const matrix = normalMatrix(slopes);
    const gradient = slopes.map((axes) =>
      axes.reduce((sum, s, a) => sum + dot(s, at.residuals[a] as Float64Array), 0),
    );
    if (isModeHeld) holdMode(matrix, gradient);
    const before = at.sum;
    let accepted = false;
    for (let attempt = 0; attempt < 7 && !accepted; attempt++) {
      const delta = damped(matrix, gradient, damping);
      const next = delta && project(samples, moved(at.point, delta));
      if (next && next.sum < at.sum) {
        at = next;
        damping = Math.max(1e-8, damping / 10);
        accepted = true;
      } else damping *= 10;
    }
    if (!accepted) break;
    slopes = projectedSlopes(samples, at);
    if (before - at.sum < ENOUGH * before) break;
  }
  return described(samples, at, normalMatrix(slopes));
}

function holdMode(matrix: Float64Array, gradient: number[]): void {
  const size = gradient.length;
  for (let i = 0; i < 2; i++) {
    gradient[i] = 0;
    for (let j = 0; j < size; j++) {
      matrix[i * size + j] = 0;
      matrix[j * size + i] = 0;
    }
    matrix[i * size + i] = 1;
  }
}

function damped(matrix: Float64Array, gradient: readonly number[], damping: number): number[] | undefined {
  const size = gradient.length;
  const raised = matrix.slice();
  for (let i = 0; i < size; i++) raised[i * size + i] = (raised[i * size + i] as number) * (1 + damping);
  const inverse = symmetricInverse(raised, size);
  if (!inverse) return undefined;
  const delta = gradient.map((_, i) =>
    gradient.reduce((sum, g, j) => sum + (inverse[i * size + j] as number) * g, 0),
  );
  return delta.map((d, i) => (i < 2 ? Math.max(-0.5, Math.min(0.5, d)) : d));
}

function described(samples: PassSamples, at: Projection, matrix: Float64Array): CoastdownFit {
  const size = parameterCount(at.point);
  const n = samples.timeS.length;
  const freedom = Math.max(1, samples.axes.length * (n - LINEAR) - size);
  const residualVariance = at.sum / freedom;
  const inverse = symmetricInverse(matrix, size);
  const sd = (i: number): number =>
    inverse ? Math.sqrt(Math.max(0, (inverse[i * size + i] as number) * residualVariance)) : Infinity;
  return {
    ...at.point,
    frequencySdHz: at.point.frequencyHz * sd(0),
    dampingRatioSd: at.point.dampingRatio * sd(1),
    amplitudes: at.coefficients.map((b) => [b[0] as number, b[1] as number] as const),
    residualVariance,
    sumOfSquares: at.sum,
    sampleCount: n * samples.axes.length,
    residuals: at.residuals,
    fitted: at.residuals.map((r, a) => r.map((v, k) => ((samples.axes[a] as Float64Array)[k] as number) - v)),
  };
}
