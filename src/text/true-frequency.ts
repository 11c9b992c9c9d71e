import type { Fold, Mode } from '../core/model/analysis.ts';

/** The most likely true frequency of a mode or tone: where it appears unless it is folded. */
export const likelyHz = (seen: { readonly frequencyHz: number; readonly fold: Fold }): number =>
  seen.fold.verdict === 'folded' ? (seen.fold.candidatesHz[0] ?? seen.frequencyHz) : seen.frequencyHz;

/** What else it could be. */
export const otherCandidatesHz = (seen: { readonly frequencyHz: number; readonly fold: Fold }): number[] => {
  if (seen.fold.verdict === 'direct') return [];
  const likely = likelyHz(seen);
  return [...new Set([seen.frequencyHz, ...seen.fold.candidatesHz])].filter(
    (candidate) => Math.abs(candidate / likely - 1) > 1e-6,
  );
};

/** Damping ratio at the true frequency: decay rate stays, so it goes with the apparent over the true frequency (design, section 5). */
export const likelyDampingRatio = (mode: Mode): number =>
  (mode.dampingRatio * mode.frequencyHz) / likelyHz(mode);
