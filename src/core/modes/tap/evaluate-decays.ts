import { choleskyInPlace, forwardSubstitute, backSubstitute } from '../../signal/linear-algebra.ts';
import { linearColumnCount, parameterCount, softenedCount } from './decay-model.ts';
import type { Component, DecaySignal, Segment } from './decay-model.ts';
import { segmentMoments } from './segment-moments.ts';
import type { Moments } from './segment-moments.ts';

export interface SegmentFit {
  /** Amplitudes, linear column after linear column, per axis. */
  readonly coefficients: readonly Float64Array[];
  /** Residual sum of squares per axis, (m/s²)². */
  readonly rss: Float64Array;
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
  const axisCount = signal.y.length;
  const np = parameterCount(components);
  const total = {
    rss: new Float64Array(axisCount),
    gradient: new Float64Array(np),
    curvature: new Float64Array(np * np),
  };
  const groups = axisGroups(signal);
  const fits: SegmentFit[] = [];
  for (const segment of segments) {
    const fit: SegmentFit = {
      coefficients: signal.y.map(() => new Float64Array(linearColumnCount(components.length))),
      rss: new Float64Array(axisCount),
      curvature: new Float64Array(np * np),
      gradient: new Float64Array(np),
    };
    for (const { axes, weight } of groups) {
      const moments = segmentMoments(signal, segment, components, axes, weight);
      addProjected(moments, components, axes, axisWeights, fit);
    }
    for (let a = 0; a < axisCount; a++) total.rss[a]! += fit.rss[a]!;
    for (let i = 0; i < np; i++) total.gradient[i]! += fit.gradient[i]!;
    for (let i = 0; i < np * np; i++) total.curvature[i]! += fit.curvature[i]!;
    fits.push(fit);
  }
  let cost = 0;
  for (let a = 0; a < axisCount; a++) cost += axisWeights[a]! * total.rss[a]!;
  return { cost, ...total, segments: fits };
}

/**
 * Solves the linear part and projects the derivatives. The Cholesky factor of all columns, linear ones first, holds
 * the projected derivative products in its lower right block.
 */
function addProjected(
  moments: Moments,
  components: readonly Component[],
  axes: readonly number[],
  axisWeights: readonly number[],
  fit: SegmentFit,
): void {
  const m = components.length;
  const p = linearColumnCount(m);
  const q = p + 2 * m + 2 * softenedCount(components);
  const lower = moments.gram;
  choleskyInPlace(lower, q);
  const np = fit.gradient.length;
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
    const w = axisWeights[axis]!;
    for (let i = 0; i < np; i++) {
      const ji = jacobian[i]!;
      let g = 0;
      for (let r = 0; r < q - p; r++) g += ji[r]! * v[p + r]!;
      fit.gradient[i]! += w * g;
      for (let j = 0; j <= i; j++) {
        const jj = jacobian[j]!;
        let h = 0;
        for (let r = 0; r < q - p; r++) h += ji[r]! * jj[r]!;
        fit.curvature[i * np + j]! += w * h;
        if (i !== j) fit.curvature[j * np + i]! += w * h;
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
