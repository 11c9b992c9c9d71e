import type { SampleSource } from './sensor-source.ts';

/** The practice rig, loaded when somebody practises: most days nobody does. */
export function createLatePracticeSource(query: string, nowMs: () => number): SampleSource {
  let source: SampleSource | undefined;
  return {
    async ask() {
      const { createPracticeSource } = await import('./practice-source.ts');
      source = createPracticeSource(query, nowMs);
      return source.ask();
    },
    start: (events) => source?.start(events),
    stop: () => source?.stop(),
    describe: () => source?.describe() ?? { source: 'practice', practice: true, name: query },
    act: () => source?.act?.(),
  };
}
