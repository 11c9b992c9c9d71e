import type { Analysis } from '../../../core/model/analysis.ts';
import type { Doubt } from '../../../core/model/doubt.ts';

/** Doubts of the reading and of its modes, each once, the reading's own (which carry figures) first. */
export function allDoubts(analysis: Analysis): Doubt[] {
  const own = new Set(analysis.doubts.map((doubt) => doubt.code));
  const ofModes = new Set(analysis.modes.flatMap((mode) => mode.doubts));
  return [...analysis.doubts, ...[...ofModes].filter((code) => !own.has(code)).map((code) => ({ code }))];
}
