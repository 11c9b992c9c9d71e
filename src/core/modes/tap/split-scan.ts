import { choleskyInPlace, forwardSubstitute } from '../../signal/linear-algebra.ts';
import { DRIFT_COLUMNS, linearColumnCount } from './decay-model.ts';
import type { Component, DecaySignal, Segment } from './decay-model.ts';

/** Weighted residual sums of squares of the free-decay model on every leading and every trailing part of a segment. */
export interface SplitScan {
  /** leading[k]: samples start .. start+k-1; length n+1. In noise variances, summed over axes. */
  readonly leading: Float64Array;
  /** trailing[k]: samples start+k .. end-1; length n+1. */
  readonly trailing: Float64Array;
  /** The same with drift and steady lines alone: what there is beside them, ringing included; length n+1 each. */
  readonly leadingMotion: Float64Array;
  readonly trailingMotion: Float64Array;
}

/**
 * The state of the modes just before and just after any instant, tried at every sample: a free decay remains in the
 * space of the model's columns whatever its start, so running products forwards and backwards give all fits at once.
 */
export function scanSplits(
  signal: DecaySignal,
  segment: Segment,
  components: readonly Component[],
  axisWeights: readonly number[],
): SplitScan {
  const n = segment.end - segment.start;
  const p = linearColumnCount(components.length);
  // Drift and steady lines first: their share of the squares then comes apart from that of what decays.
  const steady = components.filter((c) => isSteadyLine(c));
  const ordered = [...steady, ...components.filter((c) => !isSteadyLine(c))];
  const columns = segmentColumns(signal, segment, ordered, p);
  const steadyColumns = DRIFT_COLUMNS + 2 * steady.length;
  const leading = runningResidual(signal, segment, columns, p, steadyColumns, axisWeights, 1, n);
  const trailing = runningResidual(signal, segment, columns, p, steadyColumns, axisWeights, -1, n);
  return {
    leading: leading.residual,
    trailing: trailing.residual,
    leadingMotion: leading.whole,
    trailingMotion: trailing.whole,
  };
}

/** Damping below which a line counts as steady here: a tone that the fit has not yet been told to be one. */
const STEADY_DAMPING_RATIO = 5e-4;

const isSteadyLine = (c: Component): boolean => c.decayPerS < STEADY_DAMPING_RATIO * c.angularRadPerS;

function segmentColumns(
  signal: DecaySignal,
  segment: Segment,
  components: readonly Component[],
  p: number,
): Float64Array {
  const n = segment.end - segment.start;
  const columns = new Float64Array(n * p);
  const { phaseTimeS = signal.timeS } = signal;
  const origin = signal.timeS[segment.start]!;
  const span = Math.max(signal.timeS[segment.end - 1]! - origin, 1e-9);
  const m = components.length;
  for (let i = 0; i < n; i++) {
    const tau = signal.timeS[segment.start + i]! - origin;
    const phaseTau = phaseTimeS[segment.start + i]! - origin;
    const row = i * p;
    for (let k = 0; k < m; k++) {
      const component = components[k]!;
      const envelope = component.decayPerS === 0 ? 1 : Math.exp(-component.decayPerS * tau);
      columns[row + DRIFT_COLUMNS + 2 * k] = envelope * Math.cos(component.angularRadPerS * phaseTau);
      columns[row + DRIFT_COLUMNS + 2 * k + 1] = envelope * Math.sin(component.angularRadPerS * phaseTau);
    }
    columns[row] = 1;
    columns[row + 1] = tau / span - 0.5;
  }
  return columns;
}

function runningResidual(
  signal: DecaySignal,
  segment: Segment,
  columns: Float64Array,
  p: number,
  steadyColumns: number,
  axisWeights: readonly number[],
  step: 1 | -1,
  n: number,
): { residual: Float64Array; whole: Float64Array } {
  const axisCount = signal.y.length;
  const residual = new Float64Array(n + 1);
  const whole = new Float64Array(n + 1);
  const gram = new Float64Array(p * p);
  const cross = new Float64Array(axisCount * p);
  const square = new Float64Array(axisCount);
  const lower = new Float64Array(p * p);
  const v = new Float64Array(axisCount * p);
  for (let count = 1; count <= n; count++) {
    const k = step === 1 ? count - 1 : n - count;
    const row = k * p;
    for (let r = 0; r < p; r++) {
      const x = columns[row + r]!;
      for (let c = 0; c <= r; c++) gram[r * p + c]! += x * columns[row + c]!;
    }
    for (let a = 0; a < axisCount; a++) {
      const y = signal.y[a]![segment.start + k]!;
      square[a]! += y * y;
      for (let r = 0; r < p; r++) cross[a * p + r]! += y * columns[row + r]!;
    }
    lower.set(gram);
    choleskyInPlace(lower, p);
    v.set(cross);
    let sum = 0;
    let all = 0;
    for (let a = 0; a < axisCount; a++) {
      forwardSubstitute(lower, p, v, a * p);
      let rss = square[a]!;
      for (let r = 0; r < steadyColumns; r++) rss -= v[a * p + r]! * v[a * p + r]!;
      all += axisWeights[a]! * Math.max(rss, 0);
      for (let r = steadyColumns; r < p; r++) rss -= v[a * p + r]! * v[a * p + r]!;
      sum += axisWeights[a]! * Math.max(rss, 0);
    }
    const at = step === 1 ? count : k;
    residual[at] = sum;
    whole[at] = all;
  }
  return { residual, whole };
}
