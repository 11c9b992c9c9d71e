import type { BearingGeometry } from '../model/source.ts';

/** Synchronous speed of an alternating-current machine, r/min: 120 f / p (definition). */
export const synchronousSpeedRpm = (supplyHz: number, poles: number): number => (120 * supplyHz) / poles;

/** Pole-pass frequency, Hz: poles times the slip in turns per second (definition). */
export const polePassHz = (poles: number, synchronousRpm: number, shaftRpm: number): number =>
  (poles * (synchronousRpm - shaftRpm)) / 60;

/** Belt frequency, Hz: pulley circumference times its speed over the belt length (definition). */
export const beltHz = (pulleyDiameterM: number, speedRpm: number, beltLengthM: number): number =>
  (Math.PI * pulleyDiameterM * speedRpm) / (60 * beltLengthM);

export interface BearingOrders {
  readonly outer: number;
  readonly inner: number;
  readonly cage: number;
  /** Ball spin; a fault on a ball strikes both races and shows at twice this. */
  readonly ball: number;
}

/** Fault orders of a rolling bearing with a still outer race and no slip (kinematics; e.g. Harris, Rolling Bearing Analysis). */
export function bearingOrders(bearing: BearingGeometry): BearingOrders {
  const slope = bearing.diameterRatio * Math.cos(bearing.contactAngleRad ?? 0);
  return {
    outer: (bearing.ballCount / 2) * (1 - slope),
    inner: (bearing.ballCount / 2) * (1 + slope),
    cage: (1 - slope) / 2,
    ball: (1 - slope ** 2) / (2 * bearing.diameterRatio),
  };
}
