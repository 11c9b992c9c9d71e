import type { Analysis, AnalysisSettings } from '../../../core/model/analysis.ts';
import type { EditFact, Entity, FieldValue, ReadingFact, ResultFact } from '../../../core/model/fact.ts';
import type { Judgement } from '../../../core/model/judgement.ts';
import type { Outcome } from '../../../core/model/outcome.ts';
import type { AnalysisResult } from '../../../core/model/pictures.ts';
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
  /** Sources valid for this reading. */
  readonly sources: readonly NamedSource[];
  /** Of the current analysis: the newest result, else the first analysis. */
  readonly judgement: Judgement;
  readonly photos: readonly ReadingPhoto[];
  readonly history: readonly EditFact[];
}

export type OpenedView =
  | { readonly state: 'open'; readonly view: ReadingView }
  | { readonly state: 'missing' }
  /** Made by a newer version of the program: kept, forwarded, not readable here. */
  | { readonly state: 'newer'; readonly version: number };

/** What the reading screen can ask for. */
export interface ReadingUseCases {
  open(id: string): Promise<OpenedView>;
  /** Called when something about this reading changed: open it again. */
  subscribe(id: string, listener: () => void): () => void;
  /** Pictures of the current analysis, made in the worker from the stored recording. */
  pictures(view: ReadingView, signal: AbortSignal): Promise<Outcome<AnalysisResult>>;
  /** Pure and quick: called on every move of a slider with a changed analysis or changed sources. */
  judge(view: ReadingView, analysis: Analysis, sources: readonly Source[]): Judgement;
  edit(id: string, set: Readonly<Record<string, FieldValue>>): Promise<void>;
  addPhoto(id: string, image: Blob): Promise<void>;
  removePhoto(photoId: string): Promise<void>;
  /** The analysis made again from the stored samples; not kept yet. */
  redo(view: ReadingView, settings: AnalysisSettings, signal: AbortSignal): Promise<Outcome<Analysis>>;
  keepRedo(id: string, settings: AnalysisSettings, analysis: Analysis): Promise<void>;
}
