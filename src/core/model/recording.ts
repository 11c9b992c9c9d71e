/** Raw samples of one reading, as the sensor gave them, and the facts of the sensor. Immutable. */
export type AxisName = 'x' | 'y' | 'z';
export type SensorSource = 'accelerometer' | 'devicemotion' | 'file' | 'practice';

export interface SensorDescription {
  readonly source: SensorSource;
  /** True for everything made with the practice rig, for good. */
  readonly practice: boolean;
  /** File name for source `file`; user agent string otherwise. */
  readonly name: string;
  /** What the browser claimed (never used in any computation). */
  readonly claimedIntervalMs?: number;
  readonly requestedRateHz?: number;
  readonly screenAngleDeg?: number;
  /** Lying flat, screen up: most browsers read +g along z (`up`), some -g (`down`). Noted; the samples stay as they came. */
  readonly gravityReads?: 'up' | 'down';
  /** How the recording ended: whole, or cut by something (hidden page, lost sensor...). */
  readonly interruption?: InterruptionCode;
}

export const INTERRUPTION_CODES = [
  'hidden',
  'frozen',
  'sensor-error',
  'permission-withdrawn',
  'long-gap',
  'wake-lock-lost',
  'main-thread-stall',
  'recovered-after-crash',
  'storage-failed',
] as const;
export type InterruptionCode = (typeof INTERRUPTION_CODES)[number];

export interface Recording {
  /** ISO date-time of the first sample, where known. */
  readonly startedAt?: string;
  readonly sensor: SensorDescription;
  readonly axes: readonly AxisName[];
  /** Stamps as delivered, s; usually relative to the first sample. Length n. */
  readonly timeS: Float64Array;
  /** One array of length n per axis, m/s², gravity included if the sensor includes it. */
  readonly accelerationMps2: readonly Float32Array[];
}
