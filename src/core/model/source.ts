import type { Interval } from './interval.ts';

export type KnownBy =
  'nameplate' | 'drive-display' | 'tachometer' | 'strobe' | 'counted' | 'estimate' | 'unknown';

interface SourceBase {
  readonly name: string;
  readonly knownBy?: KnownBy;
  /** Relative half-width of the uncertainty of the speed or frequency, e.g. 0.02. */
  readonly toleranceRatio?: number;
}

export interface MachineSource extends SourceBase {
  readonly kind: 'machine';
  readonly speedRpm: number | Interval;
  readonly bladeCount?: number;
  readonly orders?: readonly number[];
  readonly cylinders?: number;
  readonly twoStroke?: boolean;
  /** True when the speed can be chosen within `speedRpm` (variable-speed drive). */
  readonly variableSpeed?: boolean;
}
export interface BeltSource extends SourceBase {
  readonly kind: 'belt';
  readonly speedRpm: number | Interval;
  readonly pulleyDiameterM: number;
  readonly beltLengthM: number;
}
export interface MainsSource extends SourceBase {
  readonly kind: 'mains';
  readonly supplyHz: 50 | 60;
  readonly poles?: 2 | 4 | 6 | 8 | 10 | 12;
  /** Shaft speed under load, for slip and pole-pass; else a typical slip range is used and said. */
  readonly speedRpm?: number | Interval;
}
export type FootfallActivity = 'walking' | 'running' | 'stairs' | 'jumping' | 'dancing' | 'sway';
export interface FootfallSource extends SourceBase {
  readonly kind: 'footfall';
  readonly activity: FootfallActivity;
  readonly paceHz?: number | Interval;
  readonly peopleCount?: number;
}
export interface WindSource extends SourceBase {
  readonly kind: 'wind';
  readonly widthM: number;
  readonly speedMps: number | Interval;
  readonly shape?: 'circle' | 'square' | 'rectangle' | 'custom';
  readonly depthM?: number;
  readonly strouhalRatio?: number;
  readonly massPerLengthKgPerM?: number;
}
export interface TrafficSource extends SourceBase {
  readonly kind: 'traffic';
  readonly traffic?: 'road' | 'rail';
}
export interface BandSource extends SourceBase {
  readonly kind: 'band';
  readonly frequencyHz: number | Interval;
  readonly harmonics?: number;
}
export type Source =
  MachineSource | BeltSource | MainsSource | FootfallSource | WindSource | TrafficSource | BandSource;
export type SourceKind = Source['kind'];

/** One forcing frequency or band of a source. */
export interface Forcing {
  readonly source: string;
  readonly sourceKind: SourceKind;
  readonly label: string;
  readonly frequencyHz: Interval;
  /** Order or harmonic of the source's basic frequency. */
  readonly order: number;
  /** Load as a fraction of body weight (footfall) where published. */
  readonly loadFactorRatio?: number;
  /** Where its numbers come from, e.g. a standard or the nameplate. */
  readonly origin: string;
  /** False below .9 certainty: show "check against the standard". */
  readonly certain: boolean;
  readonly amplificationKind: AmplificationKind;
}
export type AmplificationKind = 'force' | 'base' | 'unbalance';
