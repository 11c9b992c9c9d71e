/** An oscillator driven by an unbalance that slows down, integrated by a registry package (odex): no closed form of ours. */
import { createRequire } from 'node:module';

interface OdexSolver {
  absoluteTolerance: number;
  relativeTolerance: number;
  maxSteps: number;
  solve(
    derivative: (t: number, y: readonly number[]) => number[],
    from: number,
    initial: readonly number[],
    to: number,
  ): { readonly y: readonly number[] };
}

/** The package carries no types of its own that our compiler settings accept. */
const require = createRequire(import.meta.url);
const { Solver } = require('odex') as { Solver: new (n: number) => OdexSolver };

export interface WantedSweep {
  readonly frequencyHz: number;
  readonly dampingRatio: number;
  /** Speed start - rate·t + curve·t², Hz. */
  readonly start: number;
  readonly rate: number;
  readonly curve: number;
}

/** Acceleration at the given times, from rest at t = 0; force speed² · cos(angle), angle 0 at t = 0. */
export function integratedSweep(wanted: WantedSweep, timeS: Float64Array): Float64Array {
  const w = 2 * Math.PI * wanted.frequencyHz;
  const { start, rate, curve } = wanted;
  const acceleration = (t: number, x: number, v: number): number => {
    const speed = start - rate * t + curve * t * t;
    const angle = 2 * Math.PI * (start * t - (rate * t * t) / 2 + (curve * t ** 3) / 3);
    return speed * speed * Math.cos(angle) - 2 * wanted.dampingRatio * w * v - w * w * x;
  };
  const solver = new Solver(2);
  solver.absoluteTolerance = 1e-11;
  solver.relativeTolerance = 1e-9;
  let at = 0;
  let state: readonly number[] = [0, 0];
  return timeS.map((t) => {
    if (t > at) state = solver.solve((s, [x = 0, v = 0]) => [v, acceleration(s, x, v)], at, state, t).y;
    at = t;
    return acceleration(t, state[0] as number, state[1] as number);
  });
}
