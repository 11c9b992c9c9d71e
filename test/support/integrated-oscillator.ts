/** Equations of motion integrated by a registry package (odex: Hairer & Wanner's extrapolation method), independent of our formulas. */
import { createRequire } from 'node:module';

interface OdexSolver {
  absoluteTolerance: number;
  relativeTolerance: number;
  maxSteps: number;
  denseOutput: boolean;
  solve(
    derivative: (t: number, y: readonly number[]) => number[],
    from: number,
    initial: readonly number[],
    to: number,
    seen?: (
      step: number,
      fromT: number,
      toT: number,
      y: readonly number[],
      dense?: (c: number, t: number) => number,
    ) => void,
  ): { readonly y: readonly number[]; readonly outcome: number };
}
/** The package carries no types of its own that our compiler settings accept. */
const require = createRequire(import.meta.url);
const { Solver } = require('odex') as { Solver: new (n: number) => OdexSolver };

function solver(): OdexSolver {
  const made = new Solver(2);
  made.absoluteTolerance = 1e-11;
  made.relativeTolerance = 1e-11;
  made.maxSteps = 200_000;
  return made;
}

/** Acceleration of an oscillator of natural angular frequency 1 and mass 1, driven at angular frequency `ratio`. */
export type Drive = 'force' | 'base' | 'unbalance';
const accelerationOf =
  (drive: Drive, ratio: number, damping: number) => (t: number, x: number, v: number) => {
    const free = -2 * damping * v - x;
    if (drive === 'force') return free + Math.cos(ratio * t);
    if (drive === 'unbalance') return free + ratio ** 2 * Math.cos(ratio * t);
    // Base moving as y = cos(ratio t): spring and damper pull towards it.
    return free + Math.cos(ratio * t) - 2 * damping * ratio * Math.sin(ratio * t);
  };

/** Steady amplitude of the displacement, once the transient has died away by e^-20. */
export function steadyAmplitude(drive: Drive, ratio: number, damping: number): number {
  const acceleration = accelerationOf(drive, ratio, damping);
  const end = 20 / damping;
  const { y } = solver().solve((t, [x = 0, v = 0]) => [v, acceleration(t, x, v)], 0, [0, 0], end);
  return Math.hypot(y[0] as number, (y[1] as number) / ratio);
}

/** Largest displacement within so many cycles of the forcing, starting at rest. */
export function largestWithin(drive: Drive, ratio: number, damping: number, cycleCount: number): number {
  const acceleration = accelerationOf(drive, ratio, damping);
  const made = solver();
  made.denseOutput = true;
  let largest = 0;
  made.solve(
    (t, [x = 0, v = 0]) => [v, acceleration(t, x, v)],
    0,
    [0, 0],
    (2 * Math.PI * cycleCount) / ratio,
    (_, from, to, __, dense) => {
      // The first call reports the start, without an interpolator.
      for (let i = 0; dense && i <= 20; i++)
        largest = Math.max(largest, Math.abs(dense(0, from + ((to - from) * i) / 20)));
    },
  );
  return largest;
}
