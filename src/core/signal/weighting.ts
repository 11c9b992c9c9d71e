/** Frequency weightings of whole-body vibration, computed from their filter parameters (ISO 8041-1:2017, table 3). */
export type WeightingKind = 'Wk' | 'Wd';

interface Parameters {
  /** Band limits, Hz (second order, Butterworth). */
  readonly f1Hz: number;
  readonly f2Hz: number;
  /** Acceleration-velocity transition. */
  readonly f3Hz: number;
  readonly f4Hz: number;
  readonly q4: number;
  /** Upward step; absent where the weighting has none. */
  readonly step?: { readonly f5Hz: number; readonly q5: number; readonly f6Hz: number; readonly q6: number };
}

const PARAMETERS: Readonly<Record<WeightingKind, Parameters>> = {
  Wk: {
    f1Hz: 0.4,
    f2Hz: 100,
    f3Hz: 12.5,
    f4Hz: 12.5,
    q4: 0.63,
    step: { f5Hz: 2.37, q5: 0.91, f6Hz: 3.35, q6: 0.91 },
  },
  Wd: { f1Hz: 0.4, f2Hz: 100, f3Hz: 2, f4Hz: 2, q4: 0.63 },
};

/**
 * Magnitude of a weighting at a frequency: band limits × transition × step (ISO 8041-1, equations 1 to 4).
 * The printed factor of Wd at 10 Hz (0.212) does not follow from the filter (0.2017) and is taken as a misprint.
 * @param frequencyHz >= 0
 */
export function weightingMagnitude(kind: WeightingKind, frequencyHz: number): number {
  if (!(frequencyHz >= 0)) throw new RangeError(`frequencyHz must be >= 0, got ${frequencyHz}`);
  if (frequencyHz === 0) return 0;
  const { f1Hz, f2Hz, f3Hz, f4Hz, q4, step } = PARAMETERS[kind];
  const f = frequencyHz;
  const highPass = 1 / Math.sqrt(1 + (f1Hz / f) ** 4);
  const lowPass = 1 / Math.sqrt(1 + (f / f2Hz) ** 4);
  const transition = Math.hypot(1, f / f3Hz) / secondOrder(f / f4Hz, q4);
  const upward = step
    ? (secondOrder(f / step.f5Hz, step.q5) / secondOrder(f / step.f6Hz, step.q6)) *
      (step.f5Hz / step.f6Hz) ** 2
    : 1;
  return highPass * lowPass * transition * upward;
}

/** |1 + jr/Q - r²|. */
const secondOrder = (r: number, q: number): number => Math.hypot(1 - r * r, r / q);
