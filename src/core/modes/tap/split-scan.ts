import { DRIFT_COLUMNS, linearColumnCount } from './decay-model.ts';
import type { Component, DecaySignal } from './decay-model.ts';

/** Weighted squares that a free decay leaves of every stretch with one end in common; in noise variances, all axes. */
export interface StretchScan {
  /** First sample that an index stands for. */
  readonly origin: number;
  /** residual[i - origin]: of the stretch that ends before (leading) or begins with (trailing) sample i. */
  readonly residual: Float64Array;
  /** The same with drift and steady lines alone: what there is beside them, ringing included. */
  readonly motion: Float64Array;
}

export interface SplitScans {
  /** Stretches that begin with sample `start`, up to `end`. */
  leading(start: number, end: number): StretchScan;
  /** Stretches that end before sample `end`, back to `start`. */
  trailing(start: number, end: number): StretchScan;
}

/**
 * The state of the modes just before and just after any instant, tried at every sample: a free decay remains in the
 * space of the model's columns whatever its start, so one pass forwards and one backwards give all fits at once. Passes
 * are kept and taken further when asked: splitting a stretch needs only those that begin or end at the split.
 */
export function createSplitScans(
  signal: DecaySignal,
  components: readonly Component[],
  axisWeights: readonly number[],
): SplitScans {
  // Drift and steady lines first: their share of the squares then comes apart from that of what decays.
  const steady = components.filter((c) => isSteadyLine(c));
  const ordered = [...steady, ...components.filter((c) => !isSteadyLine(c))];
  const basis: Basis = {
    timeS: signal.timeS,
    y: signal.y.map((y, a) => y.map((v) => v * Math.sqrt(axisWeights[a]!))),
    turns: ordered.map((c) => turnsOf(signal, c)),
    steadyColumns: DRIFT_COLUMNS + 2 * steady.length,
  };
  const forwards = new Map<number, Pass>();
  const backwards = new Map<number, Pass>();
  const passOf = (passes: Map<number, Pass>, from: number, step: 1 | -1): Pass => {
    const known = passes.get(from);
    if (known !== undefined) return known;
    const pass = newPass(basis, from, step);
    passes.set(from, pass);
    return pass;
  };
  return {
    leading: (start, end) => scanned(basis, passOf(forwards, start, 1), end - start),
    trailing: (start, end) => scanned(basis, passOf(backwards, end, -1), end - start),
  };
}

/** Damping below which a line counts as steady here: a tone that the fit has not yet been told to be one. */
const STEADY_DAMPING_RATIO = 5e-4;

const isSteadyLine = (c: Component): boolean => c.decayPerS < STEADY_DAMPING_RATIO * c.angularRadPerS;

/** How a component turns and falls from each sample to the next: re and im of exp((-decay + i·angular)·dt), n - 1 pairs. */
interface Turns {
  readonly re: Float64Array;
  readonly im: Float64Array;
}

interface Basis {
  readonly timeS: Float64Array;
  /** Samples in standard deviations of the noise. */
  readonly y: readonly Float64Array[];
  readonly turns: readonly Turns[];
  readonly steadyColumns: number;
}

function turnsOf({ timeS, phaseTimeS = timeS }: DecaySignal, component: Component): Turns {
  const n = timeS.length;
  const re = new Float64Array(n);
  const im = new Float64Array(n);
  for (let i = 0; i + 1 < n; i++) {
    const fall = component.decayPerS === 0 ? 1 : Math.exp(-component.decayPerS * (timeS[i + 1]! - timeS[i]!));
    const phase = component.angularRadPerS * (phaseTimeS[i + 1]! - phaseTimeS[i]!);
    re[i] = fall * Math.cos(phase);
    im[i] = fall * Math.sin(phase);
  }
  return { re, im };
}

/** One pass as far as it has come: triangular factor of the columns, projected samples, squares left. */
interface Pass {
  readonly from: number;
  readonly step: 1 | -1;
  count: number;
  /** Cosine and sine of every component at the next sample, 1 and 0 at the first. */
  readonly state: Float64Array;
  readonly factor: Float64Array;
  readonly projected: Float64Array;
  left: number;
  residual: Float64Array;
  motion: Float64Array;
}

function newPass(basis: Basis, from: number, step: 1 | -1): Pass {
  const m = basis.turns.length;
  const p = linearColumnCount(m);
  const state = new Float64Array(2 * m);
  for (let k = 0; k < m; k++) state[2 * k] = 1;
  return {
    from,
    step,
    count: 0,
    state,
    factor: new Float64Array(p * p),
    projected: new Float64Array(p * basis.y.length),
    left: 0,
    residual: new Float64Array(1),
    motion: new Float64Array(1),
  };
}

function scanned(basis: Basis, pass: Pass, count: number): StretchScan {
  if (pass.count < count) {
    pass.residual = lengthened(pass.residual, count + 1, pass.step);
    pass.motion = lengthened(pass.motion, count + 1, pass.step);
    advance(basis, pass, count);
  }
  const { residual, motion, from, step } = pass;
  return { origin: step === 1 ? from : from + 1 - residual.length, residual, motion };
}

/** The same values in more room: at its end for a pass forwards, at its beginning for one backwards. */
function lengthened(values: Float64Array, length: number, step: 1 | -1): Float64Array {
  const longer = new Float64Array(length);
  longer.set(values, step === 1 ? 0 : length - values.length);
  return longer;
}

/** A column's value that changes nothing any more; its square would still be a number. */
const NOTHING = 1e-150;

/**
 * Takes a pass on: every sample is one more row of the least squares, worked in by plane rotations (Givens 1958), so
 * the squares left are a running sum that never cancels.
 */
function advance(basis: Basis, pass: Pass, count: number): void {
  const { timeS, y, turns, steadyColumns } = basis;
  const { from, step, state, factor, projected, residual, motion } = pass;
  const m = turns.length;
  const p = linearColumnCount(m);
  const axisCount = y.length;
  const x = new Float64Array(p);
  const value = new Float64Array(axisCount);
  const first = step === 1 ? from : from - 1;
  let { left } = pass;
  for (let done = pass.count; done < count; done++) {
    const i = first + step * done;
    x[0] = 1;
    x[1] = timeS[i]! - timeS[first]!;
    for (let r = 0; r < 2 * m; r++) x[DRIFT_COLUMNS + r] = state[r]!;
    for (let a = 0; a < axisCount; a++) value[a] = y[a]![i]!;
    for (let j = 0; j < p; j++) {
      const xj = x[j]!;
      if (Math.abs(xj) < NOTHING) continue;
      const diagonal = factor[j * p + j]!;
      const length = Math.sqrt(diagonal * diagonal + xj * xj);
      const c = diagonal / length;
      const s = xj / length;
      factor[j * p + j] = length;
      for (let k = j + 1; k < p; k++) {
        const above = factor[j * p + k]!;
        factor[j * p + k] = c * above + s * x[k]!;
        x[k] = c * x[k]! - s * above;
      }
      for (let a = 0; a < axisCount; a++) {
        const above = projected[j * axisCount + a]!;
        projected[j * axisCount + a] = c * above + s * value[a]!;
        value[a] = c * value[a]! - s * above;
      }
    }
    for (let a = 0; a < axisCount; a++) left += value[a]! * value[a]!;
    let ringing = 0;
    for (let r = steadyColumns * axisCount; r < p * axisCount; r++) ringing += projected[r]! * projected[r]!;
    const at = step === 1 ? done + 1 : residual.length - 2 - done;
    residual[at] = left;
    motion[at] = left + ringing;
    turnOn(turns, state, step === 1 ? i : i - 1, step);
    if (step === -1) keepInRange(state, factor, p);
  }
  pass.left = left;
  pass.count = count;
}

/** The columns' values one sample on or back. */
function turnOn(turns: readonly Turns[], state: Float64Array, at: number, step: 1 | -1): void {
  if (at < 0) return;
  for (let k = 0; k < turns.length; k++) {
    let re = turns[k]!.re[at]!;
    let im = turns[k]!.im[at]!;
    if (step === -1) {
      const square = re * re + im * im;
      re /= square;
      im /= -square;
    }
    const c = state[2 * k]!;
    const s = state[2 * k + 1]!;
    state[2 * k] = c * re - s * im;
    state[2 * k + 1] = s * re + c * im;
  }
}

/** Backwards a decay grows: past this size its columns are scaled down, which changes no residual. */
const LARGEST_COLUMN = 1e100;

function keepInRange(state: Float64Array, factor: Float64Array, p: number): void {
  for (let r = 0; r < state.length; r += 2) {
    if (Math.abs(state[r]!) < LARGEST_COLUMN && Math.abs(state[r + 1]!) < LARGEST_COLUMN) continue;
    for (let column = r; column < r + 2; column++) {
      state[column]! /= LARGEST_COLUMN;
      for (let row = 0; row < p; row++) factor[row * p + DRIFT_COLUMNS + column]! /= LARGEST_COLUMN;
    }
  }
}
