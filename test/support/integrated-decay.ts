/** Free decay of a damped oscillator integrated by a registry package (odex), independent of any closed form. */
import { createRequire } from 'node:module';

interface OdexSolver {
  absoluteTolerance: number;
  relativeTolerance: number;
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

/** Acceleration, m/s², after a push at rest that gives it a largest acceleration of about 1 m/s²; uniform samples. */
export function freeDecay(wanted: {
  readonly frequencyHz: number;
  readonly dampingRatio: number;
  readonly durationS: number;
  readonly rateHz: number;
}): number[] {
  const { frequencyHz, dampingRatio, durationS, rateHz } = wanted;
  const w = 2 * Math.PI * frequencyHz;
  const accelerationOf = (x: number, v: number): number => -w * w * x - 2 * dampingRatio * w * v;
  const solver = new Solver(2);
  solver.absoluteTolerance = 1e-12;
  solver.relativeTolerance = 1e-10;
  const samples: number[] = [];
  let state: readonly number[] = [0, 1 / w];
  for (let i = 0; i < durationS * rateHz; i++) {
    samples.push(accelerationOf(state[0]!, state[1]!));
    state = solver.solve((_, [x = 0, v = 0]) => [v, accelerationOf(x, v)], 0, state, 1 / rateHz).y;
  }
  return samples;
}
