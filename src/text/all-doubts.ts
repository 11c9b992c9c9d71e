import type { Analysis } from '../core/model/analysis.ts';
import type { Doubt } from '../core/model/doubt.ts';
import type { Judgement } from '../core/model/judgement.ts';

/** Doubts of the reading, of its circumstances and of its modes, each once; those that carry figures first. */
export function allDoubts(analysis: Analysis, judgement?: Judgement): Doubt[] {
  const own = judgement?.doubts ?? analysis.doubts;
  const known = new Set(own.map((doubt) => doubt.code));
  const ofModes = new Set(analysis.modes.flatMap((mode) => mode.doubts));
  return [...own, ...[...ofModes].filter((code) => !known.has(code)).map((code) => ({ code }))];
}
