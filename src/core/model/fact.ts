import type { Analysis, AnalysisSettings, Procedure } from './analysis.ts';
import type { SensorDescription } from './recording.ts';

/** Everything kept is an immutable fact (see DEVELOPERS.md, "Facts"). Ids are kind + ":" + ULID. */
export interface Circumstances {
  readonly mounting: 'laid' | 'strapped' | 'putty' | 'clamp' | 'magnet' | 'unknown';
  readonly surface: 'tube' | 'plate' | 'floor' | 'unknown';
  readonly excitation:
    | 'knuckle'
    | 'mallet'
    | 'heel-drop'
    | 'bounce-and-stop'
    | 'pull-and-release'
    | 'machine'
    | 'ambient'
    | 'unknown';
  readonly machineState: 'off' | 'running' | 'slowing' | 'none' | 'unknown';
  readonly peopleOnIt: 'none' | 'hands' | 'people' | 'unknown';
  readonly load?: string;
  readonly temperatureC?: number;
  readonly phoneMassKg?: number;
  /** Direction on the asset that the person names, e.g. "across the run". */
  readonly direction?: string;
  /** Seen by the person: feeds the "call a specialist" rules. */
  readonly visibleSway?: boolean;
  readonly cracksOrLooseParts?: boolean;
  /** Speed entered for a running reading (speed series). */
  readonly speedRpm?: number;
}

export interface PhoneCheck {
  readonly checkedAt: string;
  readonly rateHz: number;
  readonly scatterSdS: number;
  readonly repeatCount: number;
  readonly gapCount: number;
  readonly stepMps2: number;
  readonly noiseMps2PerRootHz: readonly number[];
  readonly gravityMps2: number;
  readonly smallestToneMps2: number;
  readonly usableBandHz: readonly [number, number];
}

export interface ReadingFact {
  readonly _id: string;
  readonly v: 1;
  readonly kind: 'reading';
  readonly recordedAt: string;
  readonly timeZone: string;
  readonly procedure: Procedure;
  readonly practice: boolean;
  readonly site?: string;
  readonly asset?: string;
  readonly spot?: string;
  readonly round?: string;
  readonly circumstances: Circumstances;
  readonly phone: { readonly device: string; readonly userAgent: string; readonly check?: PhoneCheck };
  readonly sensor: SensorDescription;
  readonly rawSha256: string;
  readonly rawBytes: number;
  readonly analysis: Analysis;
  readonly app: { readonly version: string; readonly commit: string };
}

export interface ResultFact {
  readonly _id: string;
  readonly v: 1;
  readonly kind: 'result';
  readonly reading: string;
  readonly analysisVersion: number;
  readonly settings: AnalysisSettings;
  readonly analysis: Analysis;
  readonly at: string;
}

export type EntityKind = 'site' | 'asset' | 'spot' | 'source' | 'round' | 'reading' | 'photo';
export type FieldValue =
  string | number | boolean | null | readonly FieldValue[] | { readonly [key: string]: FieldValue };

export interface EditFact {
  readonly _id: string;
  readonly v: 1;
  readonly kind: 'edit';
  /** e.g. "spot:01H..." */
  readonly entity: string;
  readonly set: Readonly<Record<string, FieldValue>>;
  /** Per field: ids of the edits this one replaces. */
  readonly over: Readonly<Record<string, readonly string[]>>;
  readonly device: string;
  readonly at: string;
}

export interface EraseFact {
  readonly _id: string;
  readonly v: 1;
  readonly kind: 'erase';
  readonly target: string;
  readonly device: string;
  readonly at: string;
}

export interface PhotoFact {
  readonly _id: string;
  readonly v: 1;
  readonly kind: 'photo';
  readonly entity: string;
  readonly type: 'image/jpeg';
  readonly widthCount: number;
  readonly heightCount: number;
  readonly rawSha256: string;
  readonly rawBytes: number;
  readonly at: string;
}

/** A kind or version this code does not know: kept and forwarded untouched. */
export interface UnknownFact {
  readonly _id: string;
  readonly v: number;
  readonly kind: string;
  readonly [key: string]: unknown;
}

export type KnownFact = ReadingFact | ResultFact | EditFact | EraseFact | PhotoFact;
export type Fact = KnownFact | UnknownFact;

/** Current state of an entity, folded from its edits. */
export interface Entity {
  readonly id: string;
  readonly kind: EntityKind;
  readonly fields: Readonly<Record<string, FieldValue>>;
  /** Fields with edits written unknown to each other: a person should choose. */
  readonly conflicts: Readonly<
    Record<
      string,
      readonly {
        readonly edit: string;
        readonly value: FieldValue;
        readonly device: string;
        readonly at: string;
      }[]
    >
  >;
  readonly trashed: boolean;
}
