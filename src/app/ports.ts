/**
 * What the app needs of the edges. Capture, store, exchange and worker satisfy these; main.tsx plugs them in;
 * tests plug in fakes. No edge imports another edge.
 */
import type { Analysis, AnalysisSettings } from '../core/model/analysis.ts';
import type { Judgement } from '../core/model/judgement.ts';
import type { AnalysisPictures, AnalysisResult } from '../core/model/pictures.ts';
import type { Place } from '../core/model/place.ts';
import type { Source } from '../core/model/source.ts';
import type { Outcome } from '../core/model/outcome.ts';
import type { Problem } from '../core/model/problem.ts';
import type { AxisName, InterruptionCode, Recording } from '../core/model/recording.ts';
import type {
  TeamStoreAccount,
  TeamStoreProblem,
  TeamStoreProgress,
  TeamStoreReport,
  TeamStoreStanding,
} from '../core/model/team-store.ts';
import type {
  EditFact,
  Entity,
  EntityKind,
  Fact,
  FieldValue,
  PhoneCheck,
  ReadingFact,
  ResultFact,
} from '../core/model/fact.ts';
import type { AccelerationUnit, DisplacementUnit, FrequencyUnit, VelocityUnit } from '../text/quantity.ts';

// ---------------------------------------------------------------- worker
export interface AnalysisPort {
  /** Copies the recording to a worker. Aborting ends the worker (a busy loop cannot be interrupted) within 100 ms. */
  analyse(
    recording: Recording,
    settings: AnalysisSettings,
    signal?: AbortSignal,
  ): Promise<Outcome<AnalysisResult>>;
  /** What the phone can see, from some seconds at rest. */
  checkPhone(recording: Recording, checkedAt: string): Promise<Outcome<PhoneCheck>>;
}

// ---------------------------------------------------------------- capture
export type CaptureProblem =
  | 'no-sensor'
  | 'not-allowed'
  | 'insecure-page'
  | 'blocked-by-policy'
  | 'sensor-error'
  | 'busy-elsewhere'
  | 'slow-sensor';

/** Live figures for drawing; views on preallocated memory, valid until the next call. */
export interface LiveWindow {
  readonly sampleCount: number;
  readonly elapsedS: number;
  /** Most recent seconds, gravity not removed: time and one array per axis, `length` valid entries. */
  readonly timeS: Float64Array;
  readonly accelerationMps2: readonly Float32Array[];
  readonly length: number;
  readonly rateHz: number;
  /** Rms about the running mean of the last second, m/s². */
  readonly levelMps2: number;
  readonly stepMps2: number;
  readonly tapCount: number;
  readonly settled: boolean;
  readonly clipped: boolean;
  readonly hint?: 'tap-harder' | 'too-strong' | 'wait-to-settle' | 'keep-still';
}

export type SessionState =
  | { readonly phase: 'idle' }
  | { readonly phase: 'asking' }
  | { readonly phase: 'refused'; readonly problem: CaptureProblem }
  | { readonly phase: 'checking'; readonly secondsLeftS: number }
  | { readonly phase: 'settling'; readonly settled: boolean; readonly startBy: StartBy }
  | {
      readonly phase: 'recording';
      readonly durationS: number;
      readonly secondsLeftS: number;
      readonly tapCount: number;
      readonly flags: readonly InterruptionCode[];
    }
  | { readonly phase: 'done'; readonly recording: Recording; readonly journalId: string }
  | {
      readonly phase: 'cut';
      readonly reason: InterruptionCode;
      readonly recording: Recording | undefined;
      readonly journalId: string;
    };

export type StartBy = 'hand' | 'timer' | 'first-tap';

export interface SessionOptions {
  readonly durationS: number;
  readonly startBy: StartBy;
  readonly timerS?: number;
  /** Rig query, e.g. "?rig=handrail&step=0.1"; absent: the real sensor. */
  readonly practice?: string;
}

export interface CapturePort {
  /** Whether this browser could have a sensor at all, without asking. */
  readonly support: 'likely' | 'none' | 'insecure-page';
  /** False where the browser cannot keep the screen on: a long recording is then cut when the screen goes dark. */
  readonly keepsScreenOn: boolean;
  readonly state: SessionState;
  subscribe(listener: (state: SessionState) => void): () => void;
  /** Must be called synchronously inside a tap: it asks for permission before any await. */
  open(options: SessionOptions): Promise<void>;
  /** 10 s at rest; only between recordings. Like `open` synchronously inside a tap. `practice`: rig query. */
  check(practice?: string): Promise<Outcome<PhoneCheck>>;
  start(): void;
  /** Ends early and keeps what there is. */
  finish(): void;
  cancel(): void;
  live(): LiveWindow | undefined;
}

// ---------------------------------------------------------------- store
export interface ReadingSummary {
  readonly id: string;
  readonly recordedAt: string;
  readonly procedure: ReadingFact['procedure'];
  readonly practice: boolean;
  readonly label?: string;
  readonly site?: string;
  readonly asset?: string;
  readonly spot?: string;
  readonly round?: string;
  /** Strongest mode or tone, for the list. */
  readonly frequencyHz?: number;
  readonly frequencySdHz?: number;
  readonly dampingRatio?: number;
  readonly dampingRatioSd?: number;
  readonly trust: ReadingFact['analysis']['trust'];
  readonly trashed: boolean;
}

export interface ReadingFilter {
  /** Words that must all occur in label, date, procedure or the names of round, site, asset and spot. */
  readonly text?: string;
  readonly procedure?: ReadingFact['procedure'];
  readonly spot?: string;
  readonly asset?: string;
  readonly site?: string;
  readonly round?: string;
  /** Absent: only readings that are not in the trash; true: only those that are. */
  readonly trashed?: boolean;
}

export interface OpenedReading {
  readonly reading: ReadingFact;
  readonly recording: Recording;
  readonly results: readonly ResultFact[];
  readonly entity: Entity;
}

export type StoreProblem = 'quota' | 'blocked' | 'closed' | 'newer-database' | 'damaged' | 'unavailable';

export interface RecoveredJournal {
  readonly journalId: string;
  readonly startedAt: string;
  readonly sampleCount: number;
  readonly durationS: number;
}

export interface StorePort {
  /** One strict transaction: fact, raw samples, summary, label edit if any; and the journal dropped. */
  saveReading(
    draft: Omit<ReadingFact, '_id' | 'rawSha256' | 'rawBytes' | 'v' | 'kind'>,
    recording: Recording,
    options?: { readonly label?: string; readonly journalId?: string },
  ): Promise<ReadingFact>;
  saveResult(draft: Omit<ResultFact, '_id' | 'v' | 'kind'>): Promise<ResultFact>;
  /** Newest first. */
  listReadings(filter?: ReadingFilter): Promise<readonly ReadingSummary[]>;
  /** Undefined when it is not here or not understood (see newerReadings); rejects with `damaged` when its samples are. */
  openReading(id: string): Promise<OpenedReading | undefined>;
  /** Readings that a newer version made: kept and forwarded, but neither listed nor opened here. */
  newerReadings(): Promise<readonly string[]>;

  edit(entity: string, set: Readonly<Record<string, FieldValue>>): Promise<EditFact>;
  newEntity(kind: EntityKind, fields: Readonly<Record<string, FieldValue>>): Promise<Entity>;
  entity(id: string): Promise<Entity | undefined>;
  entities(kind: EntityKind): Promise<readonly Entity[]>;
  history(entity: string): Promise<readonly EditFact[]>;
  erase(id: string): Promise<void>;

  /** Scaled down and drawn anew: place and camera marks in the file are gone. Rejects with `damaged` when it is no picture. */
  preparePhoto(
    file: Blob,
  ): Promise<{ readonly jpeg: Uint8Array; readonly widthPx: number; readonly heightPx: number }>;
  savePhoto(entity: string, jpeg: Uint8Array, widthPx: number, heightPx: number): Promise<string>;
  photos(entity: string): Promise<readonly { readonly id: string; readonly jpeg: Uint8Array }[]>;

  /** Facts as they are, for packets, back-up and the team store. */
  facts(): AsyncIterable<Fact>;
  /** Put if absent: same id and revision is a no-op; same id, other revision is reported and the first kept. */
  putFacts(
    facts: readonly { readonly fact: Fact; readonly raw?: Uint8Array }[],
  ): Promise<{ readonly added: number; readonly known: number; readonly damaged: readonly string[] }>;
  /** Raw v1 of a reading, unpacked, or the jpeg of a photo. */
  rawOf(readingOrPhotoId: string): Promise<Uint8Array | undefined>;
  /** The same as it lies in the store (a reading's is gzip, made once): what the team store gets. */
  storedRawOf(readingOrPhotoId: string): Promise<Uint8Array | undefined>;
  /** One fact as it is, with its revision. */
  fact(id: string): Promise<{ readonly fact: Fact; readonly revision: string } | undefined>;
  /** Whatever changed since a sequence number, for pushing; and small named values (settings, check-points). */
  changesSince(
    sequence: number,
    limit: number,
  ): Promise<{ readonly ids: readonly string[]; readonly last: number }>;
  getSetting(key: string): Promise<FieldValue | undefined>;
  putSetting(key: string, value: FieldValue): Promise<void>;

  recoverable(): Promise<readonly RecoveredJournal[]>;
  recover(journalId: string): Promise<Recording>;
  dropJournal(journalId: string): Promise<void>;

  persistence(): Promise<'granted' | 'refused' | 'unknown'>;
  askPersistence(): Promise<'granted' | 'refused' | 'unknown'>;
  usageBytes(): Promise<number | undefined>;
  readonly device: string;
  /**
   * `facts`: something changed, here or in another tab; `blocking`: a newer version waits in another tab, the recording
   * goes on; `closed`: the store was left to that tab, reload.
   */
  onChange(listener: (what: 'facts' | 'blocking' | 'closed') => void): () => void;

  /** The last 200 errors of this phone, oldest first; nothing leaves it unless the person copies it. */
  noteError(message: string, detail?: string): void;
  errorLog(): Promise<readonly LoggedError[]>;
}

export interface LoggedError {
  readonly at: string;
  readonly message: string;
  readonly detail: string;
}

/** Where capture puts samples while it records; the store satisfies it. At most 2 s are lost in a crash. */
export interface JournalPort {
  begin(meta: Pick<Recording, 'startedAt' | 'sensor' | 'axes'>): Promise<string>;
  append(
    journalId: string,
    sequence: number,
    timeS: Float64Array,
    accelerationMps2: readonly Float32Array[],
  ): Promise<void>;
  /** A gap, a flag: kept with the journal. */
  flag(journalId: string, code: InterruptionCode): Promise<void>;
  /** The person gave the recording up. */
  dropJournal(journalId: string): Promise<void>;
}

// ---------------------------------------------------------------- exchange
/** Long work can be watched and stopped; aborting rejects with the signal's reason and leaves nothing half done. */
export interface Watch {
  readonly signal: AbortSignal;
  /** Share done, 0 to 1. */
  readonly onProgress: (share: number) => void;
}

/** A reading with everything that a report prints of it. */
export interface ReportReading {
  readonly reading: ReadingFact;
  /** The newest kept analysis; `redoneAt` where that is not the first. */
  readonly analysis: Analysis;
  readonly redoneAt?: string;
  readonly judgement: Judgement;
  readonly sources: readonly Source[];
  readonly names: { readonly site?: string; readonly asset?: string; readonly spot?: string };
  readonly place?: Place;
  readonly label?: string;
  readonly notes?: string;
  /** Of the reading first, then of its spot. */
  readonly photos: readonly Uint8Array[];
  readonly axes: readonly AxisName[];
  /** Absent where the stored samples give no answer any more. */
  readonly pictures?: AnalysisPictures;
}

export interface ReportUnits {
  readonly frequency: FrequencyUnit;
  readonly acceleration: AccelerationUnit;
  readonly velocity: VelocityUnit;
  readonly displacement: DisplacementUnit;
}

export interface ReportContent {
  readonly readings: readonly ReportReading[];
  readonly units: ReportUnits;
}

/** A chart of a reading as a file. */
export const CHARTS = ['ladder', 'spectrum', 'ring-down'] as const;
export type Chart = (typeof CHARTS)[number];

export interface NewReading {
  readonly id: string;
  readonly recordedAt: string;
  readonly procedure: ReadingFact['procedure'];
  readonly practice: boolean;
  /** Site, asset, spot or name, as far as the packet tells. */
  readonly where: readonly string[];
  readonly analysis: Analysis;
}

/** What a packet holds, told before anything of it is taken. */
export interface ImportPreview {
  readonly newReadings: readonly NewReading[];
  readonly knownReadingCount: number;
  /** Places, sources, names, notes, photos, redone analyses that are not here yet. */
  readonly otherNewCount: number;
  /** Of a kind or version that this program does not know: kept and handed on untouched. */
  readonly newerCount: number;
  readonly refused: readonly { readonly name: string; readonly problem: Problem }[];
  /** Put if absent, in steps; what was taken before an abort stays, and taking again goes on from there. */
  take(watch: Watch): Promise<{ readonly added: number; readonly damaged: readonly string[] }>;
}

/** Files in and out. Everything is made before the tap that hands it over: browsers allow sharing only right after one. */
export interface ExchangePort {
  /** `report` is printed into it; without one it gets a list of its readings. */
  packet(readings: readonly string[] | 'all', report: ReportContent | undefined, watch: Watch): Promise<File>;
  /** One page that carries the packet of its readings inside. */
  report(content: ReportContent, watch: Watch): Promise<File>;
  readingsTable(readings: readonly string[] | 'all', watch: Watch): Promise<File>;
  samples(opened: OpenedReading, as: 'csv' | 'npy'): File;
  /** Undefined where this reading has no such chart. */
  chart(of: ReportReading, units: ReportUnits, chart: Chart, as: 'svg' | 'png'): Promise<File | undefined>;
  /** Packet, or report with a packet inside. */
  preview(file: Blob, watch: Watch): Promise<Outcome<ImportPreview>>;
  /** Whether this browser's share sheet takes such a file. */
  canShare(file: File): boolean;
  /** Whether saving would trap the person (home-screen app on iOS): then only sharing is offered. */
  readonly savesSafely: boolean;
  /** Call it right in the tap. */
  share(file: File): Promise<'shared' | 'cancelled' | 'refused'>;
  save(file: File): void;
  /** Lays a report out beside the screen and opens the browser's print dialog. */
  print(file: File): Promise<void>;
}

// ---------------------------------------------------------------- team store
/** A database server that a team's phones replicate with. Nothing is asked of it unless one of these is called. */
export interface TeamStorePort {
  /** The address as it will be used, without a slash at its end; or what is wrong with it. */
  address(typed: string): { readonly url: string } | { readonly problem: TeamStoreProblem };
  /** Asks the server whether account and database are right; undefined when they are. */
  check(account: TeamStoreAccount, signal: AbortSignal): Promise<TeamStoreProblem | undefined>;
  /**
   * Sends what the server lacks, fetches what is missing here, tries again after cuts. Never rejects for reasons of the
   * link or the server; failures of the phone's own store reject. `again`: compare everything, whatever was done before.
   */
  replicate(
    account: TeamStoreAccount,
    options: {
      readonly signal: AbortSignal;
      readonly onProgress: (progress: TeamStoreProgress) => void;
      readonly again?: boolean;
    },
  ): Promise<TeamStoreReport>;
  standing(url: string): Promise<TeamStoreStanding>;
}
