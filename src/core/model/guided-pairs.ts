/** Results of readings taken in pairs or series: added mass, speeds, machine running against off. */
import type { Interval } from './interval.ts';

/** Modal mass and stiffness at a spot, in its direction, with the phone on it as in both readings. */
export interface ModalValues {
  readonly massKg: number;
  readonly massSdKg: number;
  readonly massIntervalKg: Interval;
  readonly stiffnessNPerM: number;
  readonly stiffnessSdNPerM: number;
  readonly stiffnessIntervalNPerM: Interval;
}

export interface SpeedPoint {
  readonly speedRpm: number;
  readonly amplitudeMps2: number;
  /** Displacement of the line over speed squared, relative to the largest: what a constant unbalance gives. */
  readonly perForceRatio: number;
}

/**
 * `resonance`: the response to a like unbalance rises to a peak inside the range and falls again on both sides; `rising`, `falling`: it
 * is largest at an end, the peak lies there or beyond; `flat`: no peak that stands out.
 */
export type SpeedFinding = 'resonance' | 'rising' | 'falling' | 'flat';

export interface SpeedSeries {
  readonly order: number;
  /** By rising speed. */
  readonly points: readonly SpeedPoint[];
  /** Speeds at which the line was not found. */
  readonly missingRpm: readonly number[];
  readonly finding: SpeedFinding;
  /** Neighbours of the largest point, between which the peak lies, and the frequency of the line there. */
  readonly peakRpm?: Interval;
  readonly peakHz?: Interval;
}

export interface ToneOrigin {
  readonly toneIndex: number;
  /** Amplitude with the machine off over amplitude running; 0 where nothing was found. */
  readonly remainingRatio: number;
  /** `machine`: gone when it is off; `elsewhere`: still there; `both`: part of it; `unknown`: the other reading could not have shown it. */
  readonly whose: 'machine' | 'elsewhere' | 'both' | 'unknown';
}
