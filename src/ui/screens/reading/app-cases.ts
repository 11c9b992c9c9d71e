import type { App } from '../../../app/app.ts';
import { currentAnalysis, currentPlaceIds } from '../../../app/readings.ts';
import { readingText } from '../../../text/reading-screen.ts';
import type {
  Counterpart,
  OpenedView,
  ReadingLinks,
  ReadingUseCases,
  ReadingView,
} from './reading-use-cases.ts';

async function openView(app: App, id: string): Promise<OpenedView> {
  const opened = await app.readings.open(id);
  // kept but not understood: made by a newer version
  if (!opened) return { state: (await app.store.fact(id)) ? 'newer' : 'missing' };
  const where = await app.readings.whereabouts(opened);
  const [sources, photos, history, judge, settings] = await Promise.all([
    app.sources.validFor(where),
    app.readings.photos(id),
    app.readings.history(id),
    app.readings.judge(),
    app.readings.judgeSettings(opened),
  ]);
  return {
    state: 'open',
    view: {
      reading: opened.reading,
      recording: opened.recording,
      entity: opened.entity,
      results: opened.results,
      place: where.names,
      ...(where.spot ? { spotId: where.spot } : {}),
      ...(settings.place ? { spotPlace: settings.place } : {}),
      ...(where.modal ? { modal: where.modal } : {}),
      hasOwnLimits: Object.keys(settings.thresholds ?? {}).length > 0,
      sources,
      photos,
      history,
      judge: (analysis, given) => judge(analysis, given, opened.reading.circumstances, settings),
    },
  };
}

/** More readings of a spot than these are not opened for one answer. */
const MOST_OPENED = 8;
const OTHER_STATE: Readonly<Record<string, string>> = { running: 'off', off: 'running' };

async function counterpartOf(app: App, { reading, spotId }: ReadingView): Promise<Counterpart | undefined> {
  const wanted = OTHER_STATE[reading.circumstances.machineState];
  if (spotId === undefined || wanted === undefined) return undefined;
  const away = (recordedAt: string) => Math.abs(Date.parse(recordedAt) - Date.parse(reading.recordedAt));
  const visits = (await app.places.visits(spotId))
    .filter(({ procedure }) => procedure === 'running' || procedure === 'ambient')
    .filter(({ id, practice }) => id !== reading._id && practice === reading.practice)
    .sort((a, b) => away(a.recordedAt) - away(b.recordedAt));
  for (const { id, recordedAt } of visits.slice(0, MOST_OPENED)) {
    const opened = await app.readings.open(id);
    if (opened?.reading.circumstances.machineState === wanted)
      return { id, recordedAt, analysis: currentAnalysis(opened) };
  }
  return undefined;
}

export const readingUseCases = (app: App): ReadingUseCases => ({
  open: (id) => openView(app, id),
  subscribe: (listener) => app.store.onChange((what) => what === 'facts' && listener()),
  analyse: (view, settings, signal) => app.readings.analyse(view.recording, settings, signal),
  counterpart: (view) => counterpartOf(app, view),
  keepAnalysis: (id, analysis) => app.readings.keepResult(id, analysis),
  edit: (id, set) => app.readings.edit(id, set),
  trash: (id) => app.readings.trash([id]),
  restore: (id) => app.readings.restore([id]),
  async addPhoto(id, image) {
    const { jpeg, widthPx, heightPx } = await app.store.preparePhoto(image);
    await app.readings.savePhoto(id, jpeg, widthPx, heightPx);
  },
  removePhoto: (photoId) => app.readings.edit(photoId, { trashed: true }, readingText.notes.photoRemoved),
  device: app.store.device,
});

export const readingLinks = (app: App): ReadingLinks => ({
  back: () => app.navigation.back({ screen: 'readings' }),
  again: (view) => app.take.again({ ...currentPlaceIds(view), procedure: view.reading.procedure }),
  next: (view) => app.take.next({ procedure: view.reading.procedure }),
  spot: (id) => app.navigation.href({ screen: 'spot', id }),
  source: (id) => app.navigation.href({ screen: 'source', id }),
  newSource: (reading) => app.navigation.href({ screen: 'source', id: 'new', reading }),
  pace: (frequencyHz) =>
    app.navigation.href({ screen: 'pace', frequencyHz: Number(frequencyHz.toPrecision(4)) }),
  reading: (id) => app.navigation.href({ screen: 'reading', id }),
  limits: app.navigation.href({ screen: 'phone', part: 'limits' }),
  handOver: (reading) => app.navigation.href({ screen: 'hand-over', reading }),
});
