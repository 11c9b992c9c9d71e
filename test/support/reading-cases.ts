import { judge } from '../../src/core/survey/judge.ts';
import type { Entity, FieldValue } from '../../src/core/model/fact.ts';
import type { ReadingLinks, ReadingUseCases } from '../../src/ui/screens/reading/reading-use-cases.ts';
import { READING_EXAMPLES, type ReadingExample } from './reading-examples.ts';

export const noLinks: ReadingLinks = {
  back: () => undefined,
  again: () => undefined,
  next: () => undefined,
  spot: (id) => `#/spot/${id}`,
  source: (id) => `#/source/${id}`,
  newSource: (id) => `#/source/new?reading=${id}`,
  pace: (hz) => `#/pace?hz=${hz}`,
  reading: (id) => `#/reading/${id}`,
  limits: '#/phone/limits',
  handOver: (id) => `#/hand-over?reading=${id}`,
};

export interface ExampleCases extends ReadingUseCases {
  /** What was asked of them, in order. */
  readonly asked: { readonly what: string; readonly with: unknown }[];
}

/** Use cases over one example in memory: edits stick, the analysis answers after a moment. */
export function exampleCases(name: string, delayMs = 30): ExampleCases {
  const found = READING_EXAMPLES.find((one) => one.name === name);
  const asked: { what: string; with: unknown }[] = [];
  const listeners = new Set<() => void>();
  let example: ReadingExample | undefined = found;
  const change = (part: Partial<ReadingExample>) => {
    if (example) example = { ...example, ...part };
    for (const listener of listeners) listener();
  };
  const setFields = (set: Readonly<Record<string, FieldValue>>) => {
    if (!example) return;
    const { entity } = example;
    const conflicts = Object.fromEntries(
      Object.entries(entity.conflicts).filter(([field]) => !(field in set)),
    );
    const next: Entity = {
      ...entity,
      fields: { ...entity.fields, ...set },
      conflicts,
      trashed: 'trashed' in set ? set['trashed'] === true : entity.trashed,
    };
    change({ entity: next });
  };
  return {
    asked,
    device: 'device-a',
    async open() {
      if (name === 'newer') return { state: 'newer' };
      if (!example) return { state: 'missing' };
      const { reading, recording, entity, results, place, sources, history } = example;
      return {
        state: 'open',
        view: {
          reading,
          recording,
          entity,
          results,
          place,
          history,
          photos: [],
          sources: sources.map((source, index) => ({ id: `source:${index}`, source })),
          judge: (analysis, given) => judge(analysis, given, reading.circumstances),
        },
      };
    },
    subscribe(listener) {
      listeners.add(listener);
      return () => listeners.delete(listener);
    },
    async analyse(view, settings, signal) {
      asked.push({ what: 'analyse', with: settings });
      await new Promise((done) => setTimeout(done, delayMs));
      if (signal.aborted || !example) return { ok: false, problem: { code: 'cancelled', facts: {} } };
      const analysis = view.results.at(-1)?.analysis ?? view.reading.analysis;
      // another time base shifts the answer a little, so that old and new differ
      const shift = settings.timing === analysis.settings.timing ? 1 : 1.004;
      const modes = analysis.modes.map((mode) => ({ ...mode, frequencyHz: mode.frequencyHz * shift }));
      return {
        ok: true,
        value: { analysis: { ...analysis, settings, modes }, pictures: example.pictures() },
      };
    },
    counterpart: async () => undefined,
    async keepAnalysis(id, analysis) {
      asked.push({ what: 'keepAnalysis', with: id });
      change({
        results: [
          ...(example?.results ?? []),
          {
            _id: 'result:01JNEW',
            v: 1,
            kind: 'result',
            reading: id,
            analysisVersion: analysis.version,
            settings: analysis.settings,
            analysis,
            at: '2026-12-01T10:00:00.000Z',
          },
        ],
      });
    },
    async edit(id, set) {
      asked.push({ what: 'edit', with: { id, set } });
      setFields(set);
    },
    async trash() {
      asked.push({ what: 'trash', with: undefined });
      setFields({ trashed: true });
    },
    async restore() {
      asked.push({ what: 'restore', with: undefined });
      setFields({ trashed: false });
    },
    async addPhoto(id, image) {
      asked.push({ what: 'addPhoto', with: { id, size: image.size } });
    },
    async removePhoto(photoId) {
      asked.push({ what: 'removePhoto', with: photoId });
    },
  };
}
