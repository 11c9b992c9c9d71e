import type { Circumstances } from '../model/fact.ts';
import type { Trust } from '../model/doubt.ts';
import type { LevelFinding, Separation, SpecialistReason } from '../model/judgement.ts';
import type { Forcing } from '../model/source.ts';
import { effectOf } from './separations.ts';
import type { Thresholds } from '../model/thresholds.ts';

export interface SpecialistFacts {
  readonly circumstances: Partial<Circumstances>;
  readonly separations: readonly Separation[];
  readonly forcings: readonly Forcing[];
  readonly levels: readonly LevelFinding[];
  readonly trust: Trust;
  readonly thresholds: Thresholds;
}

const PEOPLE: readonly Forcing['sourceKind'][] = ['footfall'];
const MACHINES: readonly Forcing['sourceKind'][] = ['machine', 'belt', 'mains'];

/** A coincidence (at face value, where the fold is undecided) whose effect (amplification, for people times their load factor) is beyond the stated value. */
function isStrongCoincidence(facts: SpecialistFacts, kinds: readonly Forcing['sourceKind'][]): boolean {
  return facts.separations.some(
    (separation) =>
      (separation.atFaceValue ?? separation.verdict) === 'coincident' &&
      effectOf(separation) > facts.thresholds.specialistAmplificationRatio &&
      kinds.includes((facts.forcings[separation.forcingIndex] as Forcing).sourceKind),
  );
}

/**
 * When to call a specialist, each rule with its reason: visible sway; cracks or loose parts seen; a level beyond the last boundary, even
 * as a lower bound; coincident with people or a machine and amplified beyond the stated value; poor trust where something is at stake.
 */
export function specialistReasons(facts: SpecialistFacts): readonly SpecialistReason[] {
  const { circumstances, separations, levels, trust } = facts;
  const reasons: SpecialistReason[] = [];
  if (circumstances.visibleSway) reasons.push('visible-sway');
  if (circumstances.cracksOrLooseParts) reasons.push('cracks-or-loose');
  if (levels.some((finding) => finding.beyondLast)) reasons.push('level-beyond');
  if (isStrongCoincidence(facts, PEOPLE)) reasons.push('coincident-people');
  if (isStrongCoincidence(facts, MACHINES)) reasons.push('coincident-machine');
  const open = separations.some(({ verdict }) => verdict === 'coincident' || verdict === 'undecided');
  if (trust === 'poor' && (open || reasons.length > 0)) reasons.push('poor-trust-serious');
  return reasons;
}
