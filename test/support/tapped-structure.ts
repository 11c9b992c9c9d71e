import type { Sample } from './scripted-sensor.ts';

export interface TappedStructure {
  readonly rateHz: number;
  readonly durationS: number;
  /** Undamped natural frequency. */
  readonly frequencyHz: number;
  readonly dampingRatio: number;
  readonly tapTimesS: readonly number[];
  /** Envelope at the tap, m/s². */
  readonly amplitudeMps2: number;
  /** Unit vector of the motion; default across (x). */
  readonly direction?: Sample;
  readonly gravity?: Sample;
}

/**
 * Exact acceleration of one tapped mode at a time: sum over taps of A exp(-zeta w tau) sin(w sqrt(1 - zeta²) tau),
 * added to gravity.
 */
export function tappedStructureAt(structure: TappedStructure, timeS: number): Sample {
  const { frequencyHz, dampingRatio, tapTimesS, amplitudeMps2 } = structure;
  const [gx, gy, gz] = structure.gravity ?? [0, 0, 9.81];
  const [dx, dy, dz] = structure.direction ?? [1, 0, 0];
  const w = 2 * Math.PI * frequencyHz;
  const wd = w * Math.sqrt(1 - dampingRatio ** 2);
  const motion = tapTimesS
    .map((tapS) => timeS - tapS)
    .filter((tau) => tau >= 0)
    .reduce((sum, tau) => sum + amplitudeMps2 * Math.exp(-dampingRatio * w * tau) * Math.sin(wd * tau), 0);
  return [gx + motion * dx, gy + motion * dy, gz + motion * dz];
}

/** The same at t = i / rateHz for the whole duration. */
export function tappedStructureSamples(structure: TappedStructure): Sample[] {
  const { rateHz, durationS } = structure;
  return Array.from({ length: Math.round(durationS * rateHz) }, (_, i) =>
    tappedStructureAt(structure, i / rateHz),
  );
}
