import type { Analysis, AnalysisSettings } from '../../../core/model/analysis.ts';
import type { EditFact, Entity, FieldValue, ReadingFact, ResultFact } from '../../../core/model/fact.ts';
import type { ModalValues } from '../../../core/model/guided-pairs.ts';
import type { Judgement } from '../../../core/model/judgement.ts';
import type { Outcome } from '../../../core/model/outcome.ts';
import type { AnalysisResult } from '../../../core/model/pictures.ts';
import type { Place } from '../../../core/model/place.ts';
import type { Recording } from '../../../core/model/recording.ts';
import type { Source } from '../../../core/model/source.ts';

export interface NamedSource {
  readonly id: string;
  readonly source: Source;
}

export interface ReadingPhoto {
  readonly id: string;
  readonly jpeg: Uint8Array;
}

/** Everything the reading screen shows of one reading; a new value after every change. */
export interface ReadingView {
  readonly reading: ReadingFact;
  readonly recording: Recording;
  /** Its label, notes and trash mark, folded from the edits. */
  readonly entity: Entity;
  /** Analyses redone, oldest first. */
  readonly results: readonly ResultFact[];
  readonly place: { readonly site?: string; readonly asset?: string; readonly spot?: string };
  /** The spot it belongs to now. */
  readonly spotId?: string;
  /** What that spot is, and what was said of the loading in this reading. */
  readonly spotPlace?: Place;
  /** Modal mass and stiffness of the spot, where an added-mass test was kept. */
  readonly modal?: ModalValues;
  /** Verdicts go by limits that the person set on this phone. */
  readonly hasOwnLimits?: boolean;
  /** Sources valid for this reading. */
  readonly sources: readonly NamedSource[];
  readonly photos: readonly ReadingPhoto[];
  readonly history: readonly EditFact[];
  /** Pure and quick: called on every move of a slider with a changed analysis or changed sources. */
  readonly judge: (analysis: Analysis, sources: readonly Source[]) => Judgement;
}

/** The newest redone analysis, else the first one. */
export const currentAnalysis = (view: ReadingView): Analysis =>
  view.results.at(-1)?.analysis ?? view.reading.analysis;

export type OpenedView =
  | { readonly state: 'open'; readonly view: ReadingView }
  | { readonly state: 'missing' }
  /** Made by a newer version of the program: kept, forwarded, not readable here. */
  | { readonly state: 'newer' };

/** A reading of the same spot with the machine in the other state, for telling whose vibration it is. */
export interface Counterpart {
  readonly id: string;
  readonly recordedAt: string;
  readonly analysis: Analysis;
}

/** What the reading screen can ask for. */
export interface ReadingUseCases {
  open(id: string): Promise<OpenedView>;
  /** Called when something changed: open it again. */
  subscribe(listener: () => void): () => void;
  /** Made in the worker from the stored recording; never stored. */
  analyse(
    view: ReadingView,
    settings: AnalysisSettings,
    signal: AbortSignal,
  ): Promise<Outcome<AnalysisResult>>;
  keepAnalysis(id: string, analysis: Analysis): Promise<void>;
  /** The nearest in time that was taken with the machine off (of a running reading) or running (of one with the machine off). */
  counterpart(view: ReadingView): Promise<Counterpart | undefined>;
  edit(id: string, set: Readonly<Record<string, FieldValue>>): Promise<void>;
  trash(id: string): Promise<void>;
  restore(id: string): Promise<void>;
  addPhoto(id: string, image: Blob): Promise<void>;
  removePhoto(photoId: string): Promise<void>;
  /** This device, to tell its own edits from others'. */
  readonly device: string;
}

/** Where the screen leads. */
export interface ReadingLinks {
  readonly back: () => void;
  readonly again: (view: ReadingView) => void;
  readonly next: (view: ReadingView) => void;
  readonly spot: (id: string) => string;
  readonly source: (id: string) => string;
  readonly newSource: (readingId: string) => string;
  readonly handOver: (readingId: string) => string;
  readonly reading: (readingId: string) => string;
  /** The limits of the verdicts. */
  readonly limits: string;
  /** A pace to walk by, for a structure at this frequency. */
  readonly pace: (frequencyHz: number) => string;
}
