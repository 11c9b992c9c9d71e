/** Handing readings over and taking them in: what is made, how far it is, what came of it. Screens show these states. */
import type { Judgement } from '../core/model/judgement.ts';
import type { Problem } from '../core/model/problem.ts';
import { live, type Live } from './live-state.ts';
import { textField, type Places } from './places.ts';
import type {
  Chart,
  ExchangePort,
  ImportPreview,
  OpenedReading,
  ReportContent,
  ReportReading,
  ReportUnits,
  StorePort,
  Watch,
} from './ports.ts';
import { currentAnalysis, type Readings } from './readings.ts';
import type { Settings } from './settings.ts';
import type { Sources } from './sources.ts';

/** What is handed over: some readings, or everything there is. */
export type Chosen = readonly string[] | 'all';

export type Form =
  | { readonly kind: 'report' | 'packet' | 'table' }
  | { readonly kind: 'samples'; readonly as: 'csv' | 'npy' }
  | { readonly kind: 'chart'; readonly chart: Chart; readonly as: 'svg' | 'png' };

export type Outgoing =
  | { readonly phase: 'idle' }
  | { readonly phase: 'making'; readonly form: Form; readonly share: number }
  | {
      readonly phase: 'ready';
      readonly form: Form;
      readonly file: File;
      readonly ways: readonly ('share' | 'save' | 'print')[];
      readonly outcome?: 'shared' | 'saved' | 'refused';
    }
  /** `nothing`: the reading has no such chart; `too-many`: more readings than one report holds. */
  | { readonly phase: 'failed'; readonly form: Form; readonly why: 'nothing' | 'too-many' | 'error' };

export type Incoming =
  | { readonly phase: 'idle' }
  | { readonly phase: 'looking'; readonly name: string; readonly share: number }
  | { readonly phase: 'seen'; readonly name: string; readonly preview: ImportPreview }
  | { readonly phase: 'taking'; readonly name: string; readonly share: number }
  | {
      readonly phase: 'taken';
      readonly name: string;
      readonly readingCount: number;
      readonly refusedCount: number;
    }
  | { readonly phase: 'refused'; readonly name: string; readonly problem: Problem }
  | { readonly phase: 'failed'; readonly name: string; readonly code: string };

export interface HandOver {
  readonly outgoing: Live<Outgoing>;
  readonly incoming: Live<Incoming>;
  make(chosen: Chosen, form: Form): Promise<void>;
  /** Call these right in the tap. */
  share(): Promise<void>;
  save(): void;
  print(): void;
  /** Looks at a packet, or a report with one inside; nothing is taken before `take`. */
  look(file: File): Promise<void>;
  take(): Promise<void>;
  /** Stops what goes on, or puts its result away. */
  clearOutgoing(): void;
  clearIncoming(): void;
  /** When a packet of everything was last made here. */
  lastBackUp(): Promise<string | undefined>;
}

export interface HandOverParts {
  readonly store: Pick<StorePort, 'getSetting' | 'putSetting'>;
  readonly readings: Readings;
  readonly places: Pick<Places, 'whereabouts'>;
  readonly sources: Pick<Sources, 'validFor'>;
  readonly settings: { get(): Settings };
  readonly exchange: () => Promise<ExchangePort>;
  readonly now: () => Date;
  readonly noteError: (error: unknown) => void;
}

/** One report prints so many readings: a long day. Above it a page of this kind is no longer read. */
export const REPORT_MOST_COUNT = 80;
/** A packet's own page is a full report up to here; above it a list, or making the packet would take minutes. */
const PACKET_REPORT_COUNT = 12;
const BACK_UP_KEY = 'lastBackUp';

export function createHandOver(parts: HandOverParts): HandOver {
  const outgoing = live<Outgoing>({ phase: 'idle' });
  const incoming = live<Incoming>({ phase: 'idle' });
  let making = new AbortController();
  let taking = new AbortController();
  let preview: ImportPreview | undefined;
  // Held from the moment the file is ready: sharing must happen in the very tap.
  let exchange: ExchangePort | undefined;
  const loaded = async () => (exchange ??= await parts.exchange());

  const handover: HandOver = {
    outgoing,
    incoming,
    async make(chosen, form) {
      making.abort();
      const own = (making = new AbortController());
      const onProgress = (share: number) => {
        if (!own.signal.aborted) outgoing.set({ phase: 'making', form, share });
      };
      onProgress(0);
      try {
        const made = await fileOf(parts, await loaded(), chosen, form, {
          signal: own.signal,
          onProgress,
        });
        if (own.signal.aborted) return;
        if (typeof made === 'string') return outgoing.set({ phase: 'failed', form, why: made });
        outgoing.set({ phase: 'ready', form, file: made, ways: waysOf(await loaded(), form, made) });
        if (chosen === 'all' && form.kind === 'packet')
          await parts.store.putSetting(BACK_UP_KEY, parts.now().toISOString());
      } catch (error) {
        if (own.signal.aborted) return;
        parts.noteError(error);
        outgoing.set({ phase: 'failed', form, why: 'error' });
      }
    },
    async share() {
      const ready = outgoing.get();
      if (ready.phase !== 'ready' || !exchange) return;
      const outcome = await exchange.share(ready.file);
      if (outcome !== 'cancelled' && outgoing.get() === ready) outgoing.set({ ...ready, outcome });
    },
    save() {
      const ready = outgoing.get();
      if (ready.phase !== 'ready' || !exchange) return;
      exchange.save(ready.file);
      outgoing.set({ ...ready, outcome: 'saved' });
    },
    print() {
      const ready = outgoing.get();
      if (ready.phase === 'ready') exchange?.print(ready.file).catch(parts.noteError);
    },
    async look(file) {
      taking.abort();
      const own = (taking = new AbortController());
      const { name } = file;
      const onProgress = (share: number) => {
        if (!own.signal.aborted) incoming.set({ phase: 'looking', name, share });
      };
      onProgress(0);
      try {
        const seen = await (await loaded()).preview(file, { signal: own.signal, onProgress });
        if (own.signal.aborted) return;
        preview = seen.ok ? seen.value : undefined;
        incoming.set(
          seen.ok
            ? { phase: 'seen', name, preview: seen.value }
            : { phase: 'refused', name, problem: seen.problem },
        );
      } catch (error) {
        if (!own.signal.aborted) fail(name, error);
      }
    },
    async take() {
      const seen = incoming.get();
      if (seen.phase !== 'seen' || !preview) return;
      const { name } = seen;
      const { newReadings, refused } = preview;
      const own = (taking = new AbortController());
      const onProgress = (share: number) => {
        if (!own.signal.aborted) incoming.set({ phase: 'taking', name, share });
      };
      onProgress(0);
      try {
        const { damaged } = await preview.take({ signal: own.signal, onProgress });
        if (own.signal.aborted) return;
        const lost = newReadings.filter(({ id }) => damaged.includes(id)).length;
        const refusedCount = refused.length + damaged.length;
        incoming.set({ phase: 'taken', name, readingCount: newReadings.length - lost, refusedCount });
      } catch (error) {
        if (!own.signal.aborted) fail(name, error);
      }
    },
    clearOutgoing() {
      making.abort();
      outgoing.set({ phase: 'idle' });
    },
    clearIncoming() {
      taking.abort();
      preview = undefined;
      incoming.set({ phase: 'idle' });
    },
    async lastBackUp() {
      const at = await parts.store.getSetting(BACK_UP_KEY);
      return typeof at === 'string' ? at : undefined;
    },
  };
  const fail = (name: string, error: unknown) => {
    parts.noteError(error);
    const { code } = error as { code?: unknown };
    incoming.set({ phase: 'failed', name, code: typeof code === 'string' ? code : 'error' });
  };
  return handover;
}

function waysOf(exchange: ExchangePort, form: Form, file: File): ('share' | 'save' | 'print')[] {
  const share = exchange.canShare(file) ? (['share'] as const) : [];
  const save = exchange.savesSafely || share.length === 0 ? (['save'] as const) : [];
  const print = form.kind === 'report' ? (['print'] as const) : [];
  return [...share, ...save, ...print];
}

async function fileOf(
  parts: HandOverParts,
  exchange: ExchangePort,
  chosen: Chosen,
  form: Form,
  watch: Watch,
): Promise<File | 'nothing' | 'too-many'> {
  const ids = async () =>
    chosen === 'all' ? (await parts.readings.list()).map(({ id }) => id) : [...chosen];
  const first = async () => (await ids())[0];
  switch (form.kind) {
    case 'table':
      return exchange.readingsTable(chosen, watch);
    case 'report': {
      const wanted = await ids();
      if (wanted.length === 0) return 'nothing';
      if (wanted.length > REPORT_MOST_COUNT) return 'too-many';
      return exchange.report(await reportContent(parts, wanted, half(watch, 0)), half(watch, 1));
    }
    case 'packet': {
      const wanted = await ids();
      const isShort = wanted.length > 0 && wanted.length <= PACKET_REPORT_COUNT;
      const report = isShort ? await reportContent(parts, wanted, half(watch, 0)) : undefined;
      return exchange.packet(chosen, report, isShort ? half(watch, 1) : watch);
    }
    case 'samples': {
      const opened = await openedOf(parts, await first());
      return opened ? exchange.samples(opened, form.as) : 'nothing';
    }
    case 'chart': {
      const id = await first();
      const of = id === undefined ? undefined : await reportReading(parts, id, watch.signal);
      return (
        (of && (await exchange.chart(of, unitsOf(parts.settings.get()), form.chart, form.as))) ?? 'nothing'
      );
    }
  }
}

/** The first or second half of a work that is watched as one. */
const half = ({ signal, onProgress }: Watch, which: 0 | 1): Watch => ({
  signal,
  onProgress: (share) => onProgress((which + share) / 2),
});

const openedOf = async (parts: HandOverParts, id: string | undefined) =>
  id === undefined ? undefined : parts.readings.open(id);

async function reportContent(
  parts: HandOverParts,
  ids: readonly string[],
  { signal, onProgress }: Watch,
): Promise<ReportContent> {
  const readings: ReportReading[] = [];
  for (const [index, id] of ids.entries()) {
    signal.throwIfAborted();
    const reading = await reportReading(parts, id, signal);
    if (reading) readings.push(reading);
    onProgress((index + 1) / ids.length);
  }
  // In the order in which they were taken: the way of the round.
  readings.sort((a, b) => (a.reading.recordedAt < b.reading.recordedAt ? -1 : 1));
  return { readings, units: unitsOf(parts.settings.get()) };
}

const unitsOf = (settings: Settings): ReportUnits => ({
  frequency: settings.frequencyUnit,
  acceleration: settings.accelerationUnit,
  velocity: settings.velocityUnit,
  displacement: settings.displacementUnit,
});

/** A reading with its judgement by the sources valid now, and its pictures worked out from the stored samples. */
async function reportReading(
  parts: HandOverParts,
  id: string,
  signal: AbortSignal,
): Promise<ReportReading | undefined> {
  const opened = await parts.readings.open(id);
  if (!opened) return undefined;
  const where = await parts.readings.whereabouts(opened);
  const sources = (await parts.sources.validFor(where)).map(({ source }) => source);
  const analysis = currentAnalysis(opened);
  const judgement: Judgement = await parts.readings.judgementOf(opened, sources);
  const settings = { ...analysis.settings, procedure: analysis.procedure };
  const redone = await parts.readings.analyse(opened.recording, settings, signal);
  const photos = await photosOf(parts, opened, where.spot);
  const [label, notes] = [textField(opened.entity, 'label'), textField(opened.entity, 'notes')];
  const redoneAt = opened.results.at(-1)?.at;
  return {
    reading: opened.reading,
    analysis,
    judgement,
    sources,
    names: where.names,
    photos,
    axes: opened.recording.axes,
    ...(redoneAt ? { redoneAt } : {}),
    ...(where.place ? { place: where.place } : {}),
    ...(label ? { label } : {}),
    ...(notes ? { notes } : {}),
    ...(redone.ok ? { pictures: redone.value.pictures } : {}),
  };
}

async function photosOf(
  parts: HandOverParts,
  opened: OpenedReading,
  spot: string | undefined,
): Promise<Uint8Array[]> {
  const own = await parts.readings.photos(opened.reading._id);
  const ofSpot = spot === undefined ? [] : await parts.readings.photos(spot);
  return [...own, ...ofSpot].map(({ jpeg }) => jpeg);
}
