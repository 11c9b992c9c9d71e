import type { Interval } from './interval.ts';

/** How a speed or frequency was known. Each has a typical tolerance (core/survey/tolerance.ts). */
export const KNOWN_BY = [
  'nameplate',
  'drive-display',
  'tachometer',
  'strobe',
  'counted',
  'estimate',
  'unknown',
] as const;
export type KnownBy = (typeof KNOWN_BY)[number];

interface SourceBase {
  readonly name: string;
  readonly knownBy?: KnownBy;
  /** Relative half-width (95 %) of the uncertainty of the speed or frequency, e.g. 0.02. */
  readonly toleranceRatio?: number;
}

/** Rolling bearing by the numbers a catalogue gives. */
export interface BearingGeometry {
  readonly ballCount: number;
  /** Ball diameter over pitch diameter, 0..1. */
  readonly diameterRatio: number;
  readonly contactAngleRad?: number;
}

/** A speed given as [low, high] is a range that the machine really visits, not an uncertainty. */
export interface MachineSource extends SourceBase {
  readonly kind: 'machine';
  readonly speedRpm: number | Interval;
  readonly bladeCount?: number;
  readonly toothCount?: number;
  readonly orders?: readonly number[];
  readonly cylinders?: number;
  readonly twoStroke?: boolean;
  readonly bearing?: BearingGeometry;
  /** True when the speed can be chosen within `speedRpm` (variable-speed drive). */
  readonly variableSpeed?: boolean;
}
export interface BeltSource extends SourceBase {
  readonly kind: 'belt';
  readonly speedRpm: number | Interval;
  readonly pulleyDiameterM: number;
  readonly beltLengthM: number;
}
export type PoleCount = 2 | 4 | 6 | 8 | 10 | 12;
export interface MainsSource extends SourceBase {
  readonly kind: 'mains';
  readonly supplyHz: 50 | 60;
  readonly poles?: PoleCount;
  /** Shaft speed under load, for slip and pole-pass; else a typical slip range is used and said. */
  readonly speedRpm?: number | Interval;
}
export const FOOTFALL_ACTIVITIES = ['walking', 'running', 'stairs', 'jumping', 'dancing', 'sway'] as const;
export type FootfallActivity = (typeof FOOTFALL_ACTIVITIES)[number];
export interface FootfallSource extends SourceBase {
  readonly kind: 'footfall';
  readonly activity: FootfallActivity;
  readonly paceHz?: number | Interval;
  readonly peopleCount?: number;
  /** Steps (or jumps) one after the other on the structure; absent: as many as it takes. */
  readonly stepCount?: number;
}
export interface WindSource extends SourceBase {
  readonly kind: 'wind';
  readonly widthM: number;
  readonly speedMps: number | Interval;
  readonly shape?: 'circle' | 'square' | 'rectangle' | 'custom';
  /** Depth along the wind, for a rectangle. */
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
  /** How it reaches the structure; a force when absent. */
  readonly through?: AmplificationKind;
}
export type Source =
  MachineSource | BeltSource | MainsSource | FootfallSource | WindSource | TrafficSource | BandSource;
export type SourceKind = Source['kind'];
export const SOURCE_KINDS: readonly SourceKind[] = [
  'machine',
  'belt',
  'mains',
  'footfall',
  'wind',
  'traffic',
  'band',
];

/** What a forcing is, for its name in words (src/text/sources.ts). */
export const FORCING_ROLES = [
  'shaft',
  'shaft-order',
  'blade-pass',
  'gear-mesh',
  'firing',
  'bearing-outer',
  'bearing-inner',
  'bearing-cage',
  'bearing-ball',
  'belt-pass',
  'belt-pass-second',
  'twice-line',
  'motor-shaft',
  'pole-pass',
  'step',
  'sway',
  'vortex',
  'road-traffic',
  'rail-traffic',
  'band',
] as const;
export type ForcingRole = (typeof FORCING_ROLES)[number];

/** One forcing frequency or band of a source. */
export interface Forcing {
  /** Name of the source. */
  readonly source: string;
  readonly sourceKind: SourceKind;
  /** Short and stable, e.g. "2×", "walking 3rd"; sentences use role and order. */
  readonly label: string;
  readonly role: ForcingRole;
  readonly activity?: FootfallActivity;
  /** Outer interval: the range visited, widened by the tolerance. */
  readonly frequencyHz: Interval;
  /** The range it really visits (low = high for one speed); the nearest point of it counts. */
  readonly rangeHz: Interval;
  /** Relative half-width (95 %) of what is not known about it. */
  readonly toleranceRatio: number;
  /** Order or harmonic of the source's basic frequency. */
  readonly order: number;
  /** Load as a fraction of body weight (footfall) where published, over the range visited. */
  readonly loadFactorRatio?: Interval;
  /** Cycles of this forcing there are to build up a response; absent: as many as it takes. */
  readonly cycleCount?: number;
  /** True when the speed can be chosen within the range (variable-speed drive). */
  readonly adjustable?: boolean;
  /** Vortex shedding: what a critical wind speed and a Scruton number need. */
  readonly wind?: {
    readonly widthM: number;
    readonly strouhalRatio: Interval;
    readonly massPerLengthKgPerM?: number;
  };
  /** Where its numbers come from, e.g. a standard or the nameplate. */
  readonly origin: string;
  /** False below .9 certainty: show "check against the standard". */
  readonly certain: boolean;
  readonly amplificationKind: AmplificationKind;
}
export type AmplificationKind = 'force' | 'base' | 'unbalance';
