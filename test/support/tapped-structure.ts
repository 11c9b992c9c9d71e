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
 * Exact samples of one tapped mode: sum over taps of A exp(-zeta w tau) sin(w sqrt(1 - zeta²) tau), at
 * t = i / rateHz, added to gravity.
 */
export function tappedStructureSamples(structure: TappedStructure): Sample[] {
  const { rateHz, durationS, frequencyHz, dampingRatio, tapTimesS, amplitudeMps2 } = structure;
  const direction = structure.direction ?? [1, 0, 0];
  const gravity = structure.gravity ?? [0, 0, 9.81];
  const w = 2 * Math.PI * frequencyHz;
  const wd = w * Math.sqrt(1 - dampingRatio ** 2);
  return Array.from({ length: Math.round(durationS * rateHz) }, (_, i) => {
    const since = tapTimesS.map((tapS) => i / rateHz - tapS).filter((tau) => tau >= 0);
    const motion = since.reduce(
      (sum, tau) => sum + amplitudeMps2 * Math.exp(-dampingRatio * w * tau) * Math.sin(wd * tau),
      0,
    );
    return [
      gravity[0] + motion * direction[0],
      gravity[1] + motion * direction[1],
      gravity[2] + motion * direction[2],
    ];
  });
}
