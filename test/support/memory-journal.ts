import type { JournalPort } from '../../src/app/ports.ts';

/** A journal in memory: what was handed over, and ways to fail. */
export function memoryJournal() {
  const chunks: { sequence: number; timeS: Float64Array; accelerationMps2: readonly Float32Array[] }[] = [];
  const flags: string[] = [];
  const dropped: string[] = [];
  const state = { isBroken: false };
  const journal: JournalPort = {
    begin: () => (state.isBroken ? Promise.reject(new Error('full')) : Promise.resolve('J')),
    append(_id, sequence, timeS, accelerationMps2) {
      if (state.isBroken) return Promise.reject(new Error('full'));
      chunks.push({ sequence, timeS, accelerationMps2 });
      return Promise.resolve();
    },
    flag(_id, code) {
      flags.push(code);
      return Promise.resolve();
    },
    dropJournal(id) {
      dropped.push(id);
      return Promise.resolve();
    },
  };
  return { journal, chunks, flags, dropped, state };
}
