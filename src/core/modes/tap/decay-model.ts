import { choleskyInPlace, forwardSubstitute, backSubstitute } from '../../signal/linear-algebra.ts';

/**
 * Free decays as separable least squares: every segment of the record is a sum of damped sinusoids that share
 * frequency and decay, with free amplitude and phase per segment and axis, plus a constant and a slope.
 * Only moments (products of columns) are kept, so one pass over the samples gives value, gradient and curvature
 * (variable projection: Golub & Pereyra 1973; Kaufman 1975).
 */

/** One damped sinusoid (mode) or steady line (tone, decay 0). */
export interface Component {
  readonly kind: 'mode' | 'tone';
  /** Damped angular frequency, rad/s. */
  readonly angularRadPerS: number;
  /** Decay rate, 1/s: damping ratio times undamped angular frequency. */
  readonly decayPerS: number;
  /** Change with amplitude; frequency and decay above are then those of small motion. */
  readonly softening?: ComponentSoftening;
}

/** Frequency w·(1 + frequencySlope·A) and decay a + decaySlope·A at amplitude A. */
export interface ComponentSoftening {
  /** Relative, per m/s². */
  readonly frequencySlopePerMps2: number;
  /** 1/s per m/s². */
  readonly decaySlopePerMps2: number;
}

/** Samples start <= i < end of one free decay. */
export interface Segment {
  readonly start: number;
  readonly end: number;
  /** Amplitude at the start, m/s², of a component that changes with amplitude. */
  readonly amplitudeMps2?: number;
}

/** Accelerations about gravity, m/s², one array per axis on common time stamps, s. */
export interface DecaySignal {
  readonly timeS: Float64Array;
  readonly y: readonly Float64Array[];
  /** Time by which the phases run, s, where it differs from the decay's: a folded mode follows the stamps' scatter faster. */
  readonly phaseTimeS?: Float64Array;
  /** Optional weight per sample and axis (1 = full); shared by all axes when one array is given. */
  readonly weights?: readonly Float64Array[];
}

/** Constant and slope: what the removal of gravity left. */
export const DRIFT_COLUMNS = 2;

export const linearColumnCount = (componentCount: number): number => 2 * componentCount + DRIFT_COLUMNS;

/** Nonlinear parameters: frequency and decay of each mode and their slopes if it has them; frequency of each tone. */
const parametersOf = (component: Component): number =>
  component.kind === 'tone' ? 1 : component.softening === undefined ? 2 : 4;

export const parameterCount = (components: readonly Component[]): number =>
  components.reduce((count, c) => count + parametersOf(c), 0);

const softenedCount = (components: readonly Component[]): number =>
  components.reduce((count, c) => count + (c.softening === undefined ? 0 : 1), 0);

/** Integral of the amplitude since the start, m/s² times s, for a start amplitude of one. */
const amplitudeIntegral = (component: Component, tau: number): number =>
  (1 - Math.exp(-component.decayPerS * tau)) / Math.max(component.decayPerS, 1e-9);

/** Phase, rad, and logarithm of the envelope of a component, times since the segment's start. */
export function courseOf(
  component: Component,
  tau: number,
  phaseTau: number,
  amplitudeMps2: number,
): { phase: number; fall: number } {
  const { angularRadPerS: w, decayPerS: a, softening } = component;
  if (softening === undefined) return { phase: w * phaseTau, fall: -a * tau };
  const integral = amplitudeMps2 * amplitudeIntegral(component, tau);
  return {
    phase: w * (phaseTau + softening.frequencySlopePerMps2 * integral),
    fall: -a * tau - softening.decaySlopePerMps2 * integral,
  };
}

/** Index of a component's first parameter. */
export function parameterIndex(components: readonly Component[], k: number): number {
  let at = 0;
  for (let j = 0; j < k; j++) at += parametersOf(components[j]!);
  return at;
}

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

interface Moments {
  readonly gram: Float64Array;
  readonly cross: Float64Array;
  readonly square: Float64Array;
}

/** Column products of one segment: columns c, s per component, constant, slope, then t*c, t*s per component. */
function segmentMoments(
  signal: DecaySignal,
  segment: Segment,
  components: readonly Component[],
  axes: readonly number[],
  weight: Float64Array | undefined,
): Moments {
  const m = components.length;
  const p = linearColumnCount(m);
  const q = p + 2 * m + 2 * softenedCount(components);
  const rows = q + axes.length;
  const products = new Float64Array(rows * q);
  const square = new Float64Array(axes.length);
  const block = new Float64Array(rows * BLOCK_SAMPLES);
  for (let first = segment.start; first < segment.end; first += BLOCK_SAMPLES) {
    const count = Math.min(BLOCK_SAMPLES, segment.end - first);
    fillBlock(signal, segment, components, first, count, p, block);
    axes.forEach((axis, a) => {
      block.set(signal.y[axis]!.subarray(first, first + count), (q + a) * BLOCK_SAMPLES);
    });
    if (weight !== undefined) weighBlock(block, rows, weight, first, count);
    addProducts(block, rows, q, count, products);
    for (let a = 0; a < axes.length; a++) square[a]! += dot(block, q + a, q + a, count);
  }
  return { gram: products.slice(0, q * q), cross: products.slice(q * q), square };
}

/** Samples whose columns are held at once: some kilobytes, so that they stay in the nearest cache. */
const BLOCK_SAMPLES = 256;

/** Columns of `count` samples, one row of the block per column. */
function fillBlock(
  signal: DecaySignal,
  segment: Segment,
  components: readonly Component[],
  first: number,
  count: number,
  p: number,
  block: Float64Array,
): void {
  const { timeS, phaseTimeS = timeS } = signal;
  const origin = timeS[segment.start]!;
  const span = Math.max(timeS[segment.end - 1]! - origin, 1e-9);
  const m = components.length;
  let soft = p + 2 * m;
  for (let k = 0; k < m; k++) {
    const component = components[k]!;
    const { angularRadPerS, decayPerS, softening } = component;
    const [onC, onS] = [2 * k * BLOCK_SAMPLES, (2 * k + 1) * BLOCK_SAMPLES];
    const [onTc, onTs] = [(p + 2 * k) * BLOCK_SAMPLES, (p + 2 * k + 1) * BLOCK_SAMPLES];
    for (let i = 0; i < count; i++) {
      const tau = timeS[first + i]! - origin;
      let phase = angularRadPerS * (phaseTimeS[first + i]! - origin);
      let fall = -decayPerS * tau;
      if (softening !== undefined) {
        const integral = (segment.amplitudeMps2 ?? 0) * amplitudeIntegral(component, tau);
        phase += angularRadPerS * softening.frequencySlopePerMps2 * integral;
        fall -= softening.decaySlopePerMps2 * integral;
        const envelope = Math.exp(fall);
        block[soft * BLOCK_SAMPLES + i] = integral * envelope * Math.cos(phase);
        block[(soft + 1) * BLOCK_SAMPLES + i] = integral * envelope * Math.sin(phase);
      }
      const envelope = fall === 0 ? 1 : Math.exp(fall);
      const c = envelope * Math.cos(phase);
      const s = envelope * Math.sin(phase);
      block[onC + i] = c;
      block[onS + i] = s;
      block[onTc + i] = tau * c;
      block[onTs + i] = tau * s;
    }
    if (softening !== undefined) soft += 2;
  }
  const [constant, slope] = [2 * m * BLOCK_SAMPLES, (2 * m + 1) * BLOCK_SAMPLES];
  for (let i = 0; i < count; i++) {
    block[constant + i] = 1;
    block[slope + i] = (timeS[first + i]! - origin) / span - 0.5;
  }
}

function weighBlock(
  block: Float64Array,
  rows: number,
  weight: Float64Array,
  first: number,
  count: number,
): void {
  for (let i = 0; i < count; i++) {
    const root = Math.sqrt(weight[first + i]!);
    for (let r = 0; r < rows; r++) block[r * BLOCK_SAMPLES + i]! *= root;
  }
}

/** Adds the products of every row with every column at or below it; four sums at a time keep the processor busy. */
function addProducts(
  block: Float64Array,
  rows: number,
  q: number,
  count: number,
  products: Float64Array,
): void {
  for (let r = 0; r < rows; r++) {
    const end = Math.min(r + 1, q);
    const x = r * BLOCK_SAMPLES;
    let k = 0;
    for (; k + 3 < end; k += 4) {
      const a = k * BLOCK_SAMPLES;
      const b = a + BLOCK_SAMPLES;
      const c = b + BLOCK_SAMPLES;
      const d = c + BLOCK_SAMPLES;
      let [sa, sb, sc, sd] = [0, 0, 0, 0];
      for (let i = 0; i < count; i++) {
        const v = block[x + i]!;
        sa += v * block[a + i]!;
        sb += v * block[b + i]!;
        sc += v * block[c + i]!;
        sd += v * block[d + i]!;
      }
      products[r * q + k]! += sa;
      products[r * q + k + 1]! += sb;
      products[r * q + k + 2]! += sc;
      products[r * q + k + 3]! += sd;
    }
    for (; k < end; k++) products[r * q + k]! += dot(block, r, k, count);
  }
}

function dot(block: Float64Array, row: number, other: number, count: number): number {
  const x = row * BLOCK_SAMPLES;
  const y = other * BLOCK_SAMPLES;
  let sum = 0;
  for (let i = 0; i < count; i++) sum += block[x + i]! * block[y + i]!;
  return sum;
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
