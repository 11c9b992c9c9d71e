/** Everything a screen can do with kept readings. Nothing is destroyed: a trash mark is an edit, and an edit can be undone. */
import type { Analysis, AnalysisSettings } from '../core/model/analysis.ts';
import type { EditFact, FieldValue } from '../core/model/fact.ts';
import type { Judgement } from '../core/model/judgement.ts';
import type { Outcome } from '../core/model/outcome.ts';
import type { AnalysisResult } from '../core/model/pictures.ts';
import type { Recording } from '../core/model/recording.ts';
import type { Source } from '../core/model/source.ts';
import type { judge, JudgeSettings } from '../core/survey/judge.ts';
import type { Notices } from './notices.ts';
import { textField, type PlaceIds, type Places, type Whereabouts } from './places.ts';
import type { AnalysisPort, OpenedReading, ReadingFilter, ReadingSummary, StorePort } from './ports.ts';

/** `judge` of core/survey, loaded when the first reading is opened. */
export type JudgeReading = typeof judge;

export interface Readings {
  list(filter?: ReadingFilter): Promise<readonly ReadingSummary[]>;
  open(id: string): Promise<OpenedReading | undefined>;
  /** Of the opened reading: where it belongs now (edits over what was recorded). */
  whereabouts(opened: OpenedReading): Promise<Whereabouts>;
  analyse(
    recording: Recording,
    settings: AnalysisSettings,
    signal?: AbortSignal,
  ): Promise<Outcome<AnalysisResult>>;
  keepResult(reading: string, analysis: Analysis): Promise<void>;
  judge(): Promise<JudgeReading>;
  /** What the spot is, what was said of the loading in this reading, and the person's own thresholds. */
  judgeSettings(opened: OpenedReading): Promise<JudgeSettings>;
  judgementOf(opened: OpenedReading, sources: readonly Source[]): Promise<Judgement>;
  /** Any entity; shows a notice with an undo when `said` tells what was done. */
  edit(entity: string, set: Readonly<Record<string, FieldValue>>, said?: string): Promise<void>;
  trash(ids: readonly string[]): Promise<void>;
  restore(ids: readonly string[]): Promise<void>;
  /** Where these readings belong from now on; undoable. */
  setSpot(ids: readonly string[], where: PlaceIds): Promise<void>;
  history(entity: string): Promise<readonly EditFact[]>;
  photos(entity: string): ReturnType<StorePort['photos']>;
  savePhoto: StorePort['savePhoto'];
}

export interface ReadingsWords {
  readonly undo: string;
  readonly trashed: (count: number) => string;
  readonly restored: (count: number) => string;
  readonly spotSet: (count: number) => string;
}

/** Newest kept analysis: the last redo, else the one made when the reading was taken. */
export const currentAnalysis = (opened: OpenedReading): Analysis =>
  opened.results.at(-1)?.analysis ?? opened.reading.analysis;

/** Where the reading belongs now: an edit wins over what was known when it was taken. */
export function currentPlaceIds(opened: OpenedReading): PlaceIds {
  const { entity, reading } = opened;
  const now = (key: 'site' | 'asset' | 'spot') =>
    key in entity.fields ? textField(entity, key) : reading[key];
  const [spot, asset, site] = [now('spot'), now('asset'), now('site')];
  return { ...(spot ? { spot } : {}), ...(asset ? { asset } : {}), ...(site ? { site } : {}) };
}

export function createReadings(
  store: StorePort,
  analysis: AnalysisPort,
  places: Places,
  notices: Notices,
  words: ReadingsWords,
  ownThresholds: () => Readonly<Record<string, number>>,
): Readings {
  const loadJudge = async () => (await import('../core/survey/judge.ts')).judge;
  const mark = (ids: readonly string[], trashed: boolean) =>
    Promise.all(ids.map((id) => store.edit(id, { trashed })));

  const readings: Readings = {
    list: (filter) => store.listReadings(filter),
    open: (id) => store.openReading(id),
    whereabouts: (opened) => places.whereabouts(currentPlaceIds(opened)),
    analyse: (recording, settings, signal) => analysis.analyse(recording, settings, signal),
    async keepResult(reading, kept) {
      await store.saveResult({
        reading,
        analysisVersion: kept.version,
        settings: kept.settings,
        analysis: kept,
        at: new Date().toISOString(),
      });
    },
    judge: loadJudge,
    async judgeSettings(opened) {
      const { place } = await readings.whereabouts(opened);
      const { sensibleThresholds } = await import('../core/survey/thresholds.ts');
      const loading = opened.entity.fields['presumedLoading'];
      return {
        thresholds: sensibleThresholds(ownThresholds()),
        ...(place
          ? { place: typeof loading === 'boolean' ? { ...place, presumedLoading: loading } : place }
          : {}),
      };
    },
    async judgementOf(opened, sources) {
      const settings = await readings.judgeSettings(opened);
      const judgeNow = await loadJudge();
      return judgeNow(currentAnalysis(opened), sources, opened.reading.circumstances, settings);
    },
    async edit(entity, set, said) {
      const before = await store.entity(entity);
      await store.edit(entity, set);
      if (!said) return;
      const former = Object.keys(set).map((key) => [key, before?.fields[key] ?? null] as const);
      notices.show(said, {
        action: { label: words.undo, run: () => void store.edit(entity, Object.fromEntries(former)) },
      });
    },
    async trash(ids) {
      await mark(ids, true);
      notices.show(words.trashed(ids.length), {
        action: { label: words.undo, run: () => void mark(ids, false) },
      });
    },
    async restore(ids) {
      await mark(ids, false);
      notices.show(words.restored(ids.length), {
        action: { label: words.undo, run: () => void mark(ids, true) },
      });
    },
    async setSpot(ids, where) {
      const set = { spot: where.spot ?? null, asset: where.asset ?? null, site: where.site ?? null };
      const opened = await Promise.all(ids.map((id) => store.openReading(id)));
      await Promise.all(ids.map((id) => store.edit(id, set)));
      const undo = () => {
        for (const former of opened) {
          if (!former) continue;
          const { spot = null, asset = null, site = null } = currentPlaceIds(former);
          void store.edit(former.reading._id, { spot, asset, site });
        }
      };
      notices.show(words.spotSet(ids.length), { action: { label: words.undo, run: undo } });
    },
    history: (entity) => store.history(entity),
    photos: (entity) => store.photos(entity),
    savePhoto: (...photo) => store.savePhoto(...photo),
  };
  return readings;
}
