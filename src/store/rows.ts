import type { Fact } from '../core/model/fact.ts';
import type { AxisName, InterruptionCode, SensorDescription } from '../core/model/recording.ts';

export interface FactRow {
  readonly id: string;
  readonly kind: string;
  /** Entity of an edit or photo, reading of a result, target of an erasure. */
  readonly about?: string;
  readonly revision: string;
  readonly fact: Fact;
}

/** Bytes of a reading's raw samples (gzip) or of a photo (jpeg). ArrayBuffer: some browsers lose Blobs. */
export interface RawRow {
  readonly id: string;
  readonly bytes: ArrayBuffer;
}

export interface JournalRow {
  readonly id: string;
  readonly startedAt: string;
  readonly sensor: SensorDescription;
  readonly axes: readonly AxisName[];
  readonly flags: readonly InterruptionCode[];
}

export interface ChunkRow {
  readonly journal: string;
  readonly sequence: number;
  readonly timeS: Float64Array;
  readonly accelerationMps2: readonly Float32Array[];
}

export interface ErrorRow {
  readonly at: string;
  readonly message: string;
  readonly detail: string;
}
