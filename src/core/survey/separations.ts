import type { Separation, Verdict } from '../model/judgement.ts';
import type { Forcing } from '../model/source.ts';
import { separationOf, type SeparationContext } from './separation.ts';

/** A rise of the amplification below this is none. Our own bound. */
const NOTICED_RISE_RATIO = 1.05;

/** A pair gets worse when its verdict does and its response grows (more damping widens the zones and worsens nothing). */
export const isWorse = (before: Separation, after: Separation): boolean =>
  VERDICT_RANK[after.verdict] > VERDICT_RANK[before.verdict] &&
  after.amplification.interval[1] > NOTICED_RISE_RATIO * before.amplification.interval[1];

/** Worse is higher; blind stands above apart because it is not known to be good. */
export const VERDICT_RANK: Readonly<Record<Verdict, number>> = {
  apart: 0,
  blind: 1,
  close: 2,
  undecided: 3,
  coincident: 4,
};
/** Nothing can make such a pair worse. */
export const isWorst = (verdict: Verdict): boolean => verdict === 'coincident';
export const isNear = (verdict: Verdict): boolean => VERDICT_RANK[verdict] >= VERDICT_RANK.close;

/**
 * Above this, Hz, steps no longer build up a response: each is a blow that rings out before the next (AISC design guide 11, 2nd ed.:
 * impulsive from 9 Hz; CCIP-016: from 4.2 times the pace, 10 Hz). The higher of the two, so that nothing near is left out.
 */
export const IMPULSIVE_FROM_HZ = 10;

/** True when a footfall forcing meets a mode as single blows: mode above the limit, and the harmonic wholly below it. */
export function isImpulsive(separation: Separation, forcing: Forcing): boolean {
  return (
    forcing.sourceKind === 'footfall' &&
    separation.modeHz > IMPULSIVE_FROM_HZ &&
    separation.ratio[1] < 1 &&
    !(separation.verdict === 'coincident')
  );
}

/** What a pair does: amplification, times the load factor where one is published. Ranks high damping on resonance against low beside it. */
export const effectOf = (separation: Separation): number =>
  separation.effectRatio ?? separation.amplification.interval[1];

function worstFirst(a: Separation, b: Separation): number {
  const nearness = Number(isNear(b.verdict)) - Number(isNear(a.verdict));
  if (nearness !== 0) return nearness;
  if (!isNear(a.verdict) && a.verdict !== b.verdict) return VERDICT_RANK[b.verdict] - VERDICT_RANK[a.verdict];
  return effectOf(b) - effectOf(a) || VERDICT_RANK[b.verdict] - VERDICT_RANK[a.verdict];
}

/** Every mode against every forcing, worst first: what is near by its effect, then what could not be seen, then what is apart. */
export function separationsOf(forcings: readonly Forcing[], context: SeparationContext): Separation[] {
  return context.analysis.modes
    .flatMap((_, modeIndex) =>
      forcings.map((forcing, forcingIndex) => separationOf(modeIndex, forcingIndex, forcing, context)),
    )
    .sort(worstFirst);
}
