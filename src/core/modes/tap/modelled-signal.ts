import { courseOf } from './decay-model.ts';
import type { Component, DecaySignal, Segment } from './decay-model.ts';
import type { DecayFit } from './fit-decays.ts';

/** What the fit leaves, m/s², per axis; zero outside the segments. */
export function residuals(signal: DecaySignal, segments: readonly Segment[], fit: DecayFit): Float64Array[] {
  const left = signal.y.map((y) => new Float64Array(y.length));
  const m = fit.components.length;
  const column = new Float64Array(2 * m + 2);
  const { phaseTimeS = signal.timeS } = signal;
  segments.forEach((segment, index) => {
    const { coefficients } = fit.evaluation.segments[index]!;
    const origin = signal.timeS[segment.start]!;
    const span = Math.max(signal.timeS[segment.end - 1]! - origin, 1e-9);
    for (let i = segment.start; i < segment.end; i++) {
      fillColumns(
        fit.components,
        signal.timeS[i]! - origin,
        phaseTimeS[i]! - origin,
        segment.amplitudeMps2 ?? 0,
        column,
      );
      column[2 * m] = 1;
      column[2 * m + 1] = (signal.timeS[i]! - origin) / span - 0.5;
      for (let a = 0; a < left.length; a++) {
        const c = coefficients[a]!;
        let value = 0;
        for (let r = 0; r < column.length; r++) value += c[r]! * column[r]!;
        left[a]![i] = signal.y[a]![i]! - value;
      }
    }
  });
  return left;
}

function fillColumns(
  components: readonly Component[],
  tau: number,
  phaseTau: number,
  amplitudeMps2: number,
  column: Float64Array,
): void {
  for (let k = 0; k < components.length; k++) {
    const { phase, fall } = courseOf(components[k]!, tau, phaseTau, amplitudeMps2);
    const envelope = Math.exp(fall);
    column[2 * k] = envelope * Math.cos(phase);
    column[2 * k + 1] = envelope * Math.sin(phase);
  }
}

/** One decay of component `k` along a direction: its model plus what the fit left; other components taken off. */
export function decayAlone(
  signal: DecaySignal,
  segments: readonly Segment[],
  fit: DecayFit,
  left: readonly Float64Array[],
  index: number,
  k: number,
  direction: readonly number[],
): Float64Array {
  const { start, end } = segments[index]!;
  const { coefficients } = fit.evaluation.segments[index]!;
  const { amplitudeMps2 = 0 } = segments[index]!;
  const origin = signal.timeS[start]!;
  const { phaseTimeS = signal.timeS } = signal;
  const along = (values: readonly number[]): number =>
    values.reduce((sum, v, a) => sum + v * direction[a]!, 0);
  const onCosine = along(coefficients.map((c) => c[2 * k]!));
  const onSine = along(coefficients.map((c) => c[2 * k + 1]!));
  return Float64Array.from({ length: end - start }, (_, i) => {
    const tau = signal.timeS[start + i]! - origin;
    const { phase, fall } = courseOf(fit.components[k]!, tau, phaseTimeS[start + i]! - origin, amplitudeMps2);
    const model = Math.exp(fall) * (onCosine * Math.cos(phase) + onSine * Math.sin(phase));
    return model + along(left.map((l) => l[start + i]!));
  });
}
