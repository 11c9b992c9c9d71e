import { choleskyInPlace, forwardSubstitute, backSubstitute } from '../../signal/linear-algebra.ts';
import { linearColumnCount, parameterCount, softenedCount } from './decay-model.ts';
import type { Component, DecaySignal, Segment } from './decay-model.ts';
import { segmentMoments } from './segment-moments.ts';
import type { Moments } from './segment-moments.ts';

/** One segment's part of the fit, samples of unit variance. */
interface SegmentProducts {
  /** Amplitudes, linear column after linear column, per axis. */
  readonly coefficients: readonly Float64Array[];
  /** Residual sum of squares per axis, (m/s²)². */
  readonly rss: Float64Array;
  /** Curvature and gradient per axis. */
  readonly curvatures: readonly Float64Array[];
  readonly gradients: readonly Float64Array[];
}

export interface SegmentFit extends SegmentProducts {
  /** Curvature and gradient of this segment alone, weighted by axis. */
  readonly curvature: Float64Array;
  readonly gradient: Float64Array;
}

export interface Evaluation {
  /** Weighted residual sum of squares. */
  readonly cost: number;
  readonly rss: Float64Array;
  readonly gradient: Float64Array;
  readonly curvature: Float64Array;
  readonly segments: readonly SegmentFit[];
}

/** Axes that share one weight array are treated together. */
function axisGroups(signal: DecaySignal): { axes: number[]; weight: Float64Array | undefined }[] {
  const all = signal.y.map((_, a) => a);
  if (signal.weights === undefined) return [{ axes: all, weight: undefined }];
  if (signal.weights.length === 1) return [{ axes: all, weight: signal.weights[0] }];
  return all.map((a) => ({ axes: [a], weight: signal.weights![a] }));
}

/**
 * Value, gradient (descent direction) and Gauss-Newton curvature of the joint fit.
 * @param axisWeights 1/variance per axis
 */
export function evaluateDecays(
  signal: DecaySignal,
  segments: readonly Segment[],
  components: readonly Component[],
  axisWeights: readonly number[],
): Evaluation {
  const np = parameterCount(components);
  const groups = axisGroups(signal);
  const products = segments.map((segment) => {
    const fit: SegmentProducts = {
      coefficients: signal.y.map(() => new Float64Array(linearColumnCount(components.length))),
      rss: new Float64Array(signal.y.length),
      curvatures: signal.y.map(() => new Float64Array(np * np)),
      gradients: signal.y.map(() => new Float64Array(np)),
    };
    for (const { axes, weight } of groups)
      addProjected(segmentMoments(signal, segment, components, axes, weight), components, axes, fit);
    return fit;
  });
  return weighed(products, axisWeights);
}

/** The same fit with other variances of the axes: nothing but sums. */
export const reweighed = (evaluation: Evaluation, axisWeights: readonly number[]): Evaluation =>
  weighed(evaluation.segments, axisWeights);

function weighed(products: readonly SegmentProducts[], axisWeights: readonly number[]): Evaluation {
  const segments = products.map((fit) => ({
    ...fit,
    curvature: weightedSum(fit.curvatures, axisWeights),
    gradient: weightedSum(fit.gradients, axisWeights),
  }));
  const ones = segments.map(() => 1);
  const rss = weightedSum(
    segments.map((s) => s.rss),
    ones,
  );
  return {
    cost: axisWeights.reduce((sum, w, a) => sum + w * rss[a]!, 0),
    rss,
    gradient: weightedSum(
      segments.map((s) => s.gradient),
      ones,
    ),
    curvature: weightedSum(
      segments.map((s) => s.curvature),
      ones,
    ),
    segments,
  };
}

function weightedSum(arrays: readonly Float64Array[], weights: readonly number[]): Float64Array {
  const sum = new Float64Array(arrays[0]?.length ?? 0);
  arrays.forEach((array, k) => {
    const weight = weights[k]!;
    for (let i = 0; i < sum.length; i++) sum[i]! += weight * array[i]!;
  });
  return sum;
}

/**
 * Solves the linear part and projects the derivatives. The Cholesky factor of all columns, linear ones first, holds
 * the projected derivative products in its lower right block.
 */
function addProjected(
  moments: Moments,
  components: readonly Component[],
  axes: readonly number[],
  fit: SegmentProducts,
): void {
  const m = components.length;
  const p = linearColumnCount(m);
  const q = p + 2 * m + 2 * softenedCount(components);
  const lower = moments.gram;
  choleskyInPlace(lower, q);
  const np = fit.gradients[0]!.length;
  const v = new Float64Array(q);
  for (let a = 0; a < axes.length; a++) {
    const axis = axes[a]!;
    v.set(moments.cross.subarray(a * q, (a + 1) * q));
    forwardSubstitute(lower, q, v);
    let explained = 0;
    for (let i = 0; i < p; i++) explained += v[i]! * v[i]!;
    fit.rss[axis] = Math.max(moments.square[a]! - explained, 0);
    const amplitudes = solveLeading(lower, q, p, v);
    fit.coefficients[axis]!.set(amplitudes);
    const jacobian = derivativeFactors(components, amplitudes, lower, q, p);
    const gradient = fit.gradients[axis]!;
    const curvature = fit.curvatures[axis]!;
    for (let i = 0; i < np; i++) {
      const ji = jacobian[i]!;
      let g = 0;
      for (let r = 0; r < q - p; r++) g += ji[r]! * v[p + r]!;
      gradient[i] = g;
      for (let j = 0; j <= i; j++) {
        const jj = jacobian[j]!;
        let h = 0;
        for (let r = 0; r < q - p; r++) h += ji[r]! * jj[r]!;
        curvature[i * np + j] = h;
        curvature[j * np + i] = h;
      }
    }
  }
}

function solveLeading(lower: Float64Array, q: number, p: number, v: Float64Array): Float64Array {
  const x = v.slice(0, p);
  if (q === p) {
    backSubstitute(lower, p, x);
    return x;
  }
  for (let i = p - 1; i >= 0; i--) {
    const pivot = lower[i * q + i]!;
    if (pivot === 0) {
      x[i] = 0;
      continue;
    }
    let sum = x[i]!;
    for (let k = i + 1; k < p; k++) sum -= lower[k * q + i]! * x[k]!;
    x[i] = sum / pivot;
  }
  return x;
}

/** Per parameter the vector L22ᵀ d, d being its coefficients on t*c and t*s: products of these are projected products. */
function derivativeFactors(
  components: readonly Component[],
  amplitudes: Float64Array,
  lower: Float64Array,
  q: number,
  p: number,
): Float64Array[] {
  const size = q - p;
  const factors: Float64Array[] = [];
  const push = (first: number, onCosine: number, onSine: number): void => {
    const factor = new Float64Array(size);
    for (let r = 0; r < size; r++) {
      const a = first >= r ? lower[(p + first) * q + p + r]! : 0;
      const b = first + 1 >= r ? lower[(p + first + 1) * q + p + r]! : 0;
      factor[r] = onCosine * a + onSine * b;
    }
    factors.push(factor);
  };
  let soft = 2 * components.length;
  components.forEach((component, k) => {
    const c = amplitudes[2 * k]!;
    const s = amplitudes[2 * k + 1]!;
    push(2 * k, s, -c);
    if (component.kind === 'mode') push(2 * k, -c, -s);
    if (component.softening === undefined) return;
    const { angularRadPerS } = component;
    push(soft, angularRadPerS * s, -angularRadPerS * c);
    push(soft, -c, -s);
    soft += 2;
  });
  return factors;
}
