import { principalDirection } from '../../signal/linear-algebra.ts';
import { parameterIndex } from './decay-model.ts';
import type { Component, DecaySignal } from './decay-model.ts';
import type { FreeDecay } from './find-taps.ts';
import type { DecayFit } from './fit-decays.ts';
import { tapScatter } from './tap-scatter.ts';
import type { Combination, TapValue } from './tap-scatter.ts';

/** Undamped natural frequency and damping ratio with standard deviations, and where and how strongly it moves. */
export interface ModeEstimate {
  readonly frequencyHz: number;
  readonly frequencySdHz: number;
  readonly dampingRatio: number;
  readonly dampingRatioSd: number;
  /** Unit vector of its main motion. */
  readonly direction: readonly number[];
  /** Amplitude at each decay's tap, m/s², along all axes together. */
  readonly amplitudesMps2: readonly number[];
  /** Frequency or damping differ from tap to tap by more than noise explains. */
  readonly scatters: boolean;
}

export const naturalFrequencyHz = (c: Component): number =>
  Math.hypot(c.angularRadPerS, c.decayPerS) / (2 * Math.PI);
export const dampingRatioOf = (c: Component): number =>
  c.decayPerS / Math.hypot(c.angularRadPerS, c.decayPerS);

/**
 * Reads component `k` of a joint fit as a mode: larger of the Fisher interval and the tap-to-tap one.
 * @param colourRatio power of the residual near the mode over that of white noise, >= 1
 */
export function modeEstimate(
  signal: DecaySignal,
  decays: readonly FreeDecay[],
  fit: DecayFit,
  k: number,
  colourRatio = 1,
): ModeEstimate {
  const component = fit.components[k]!;
  const gradients = shapeGradients(component);
  const at = parameterIndex(fit.components, k);
  const size = Math.round(Math.sqrt(fit.evaluation.curvature.length));
  const covariance = fit.covariance;
  const fisher = (g: readonly number[]): number =>
    covariance === undefined
      ? Infinity
      : Math.sqrt(
          colourRatio *
            Math.max(
              g[0]! ** 2 * covariance[at * size + at]! +
                2 * g[0]! * g[1]! * covariance[at * size + at + 1]! +
                g[1]! ** 2 * covariance[(at + 1) * size + at + 1]!,
              0,
            ),
        );
  const frequency = larger(
    { value: naturalFrequencyHz(component), sd: fisher(gradients.frequency), betweenSd: 0 },
    tapScatter(tapValues(fit, at, naturalFrequencyHz(component), gradients.frequency)),
  );
  const damping = larger(
    { value: dampingRatioOf(component), sd: fisher(gradients.damping), betweenSd: 0 },
    tapScatter(tapValues(fit, at, dampingRatioOf(component), gradients.damping)),
  );
  return {
    frequencyHz: frequency.value,
    frequencySdHz: frequency.sd,
    dampingRatio: damping.value,
    dampingRatioSd: damping.sd,
    direction: directionOf(fit, k),
    amplitudesMps2: decays.map((decay, s) => {
      const back = signal.timeS[decay.start]! - signal.timeS[decay.onset ?? decay.start]!;
      return amplitudeAtStart(fit, s, k) * Math.exp(component.decayPerS * back);
    }),
    scatters: frequency.betweenSd > 0 || damping.betweenSd > 0,
  };
}

const larger = (joint: Combination, between: Combination | undefined): Combination =>
  between !== undefined && between.sd > joint.sd ? between : joint;

/** Derivatives of natural frequency, Hz, and damping ratio by damped angular frequency and decay. */
function shapeGradients(component: Component): { frequency: number[]; damping: number[] } {
  const { angularRadPerS: w, decayPerS: a } = component;
  const wn = Math.hypot(w, a);
  return {
    frequency: [w / (2 * Math.PI * wn), a / (2 * Math.PI * wn)],
    damping: [(-a * w) / wn ** 3, (w * w) / wn ** 3],
  };
}

/** Each tap's own value: one Gauss-Newton step from the joint fit on that tap's samples alone. */
function tapValues(fit: DecayFit, at: number, joint: number, g: readonly number[]): TapValue[] {
  const size = Math.round(Math.sqrt(fit.evaluation.curvature.length));
  const values: TapValue[] = [];
  for (const { curvature, gradient } of fit.evaluation.segments) {
    const a = curvature[at * size + at]!;
    const b = curvature[at * size + at + 1]!;
    const d = curvature[(at + 1) * size + at + 1]!;
    const determinant = a * d - b * b;
    if (!(determinant > 1e-12 * a * d)) continue;
    const solve = (x: number, y: number): [number, number] => [
      (d * x - b * y) / determinant,
      (a * y - b * x) / determinant,
    ];
    const step = solve(gradient[at]!, gradient[at + 1]!);
    const spread = solve(g[0]!, g[1]!);
    values.push({
      value: joint + g[0]! * step[0] + g[1]! * step[1],
      variance: g[0]! * spread[0] + g[1]! * spread[1],
    });
  }
  return values;
}

export function amplitudeAtStart(fit: DecayFit, segment: number, k: number): number {
  let sum = 0;
  for (const c of fit.evaluation.segments[segment]!.coefficients) sum += c[2 * k]! ** 2 + c[2 * k + 1]! ** 2;
  return Math.sqrt(sum);
}

/** Principal axis of a component's motion over all decays. */
export function directionOf(fit: DecayFit, k: number): number[] {
  const axes = fit.evaluation.rss.length;
  const matrix = Array.from({ length: axes }, () => new Array<number>(axes).fill(0));
  for (const { coefficients } of fit.evaluation.segments) {
    for (let i = 0; i < axes; i++) {
      for (let j = 0; j < axes; j++) {
        const [p, q] = [coefficients[i]!, coefficients[j]!];
        matrix[i]![j]! += p[2 * k]! * q[2 * k]! + p[2 * k + 1]! * q[2 * k + 1]!;
      }
    }
  }
  return principalDirection(matrix);
}
