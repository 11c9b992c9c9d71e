import type { Fact } from '../model/fact.ts';
import { revisionOf } from './revision.ts';

/** What is kept: revision by id (bodies live elsewhere), and the ids that were erased. */
export interface KeptFacts {
  readonly revisions: ReadonlyMap<string, string>;
  readonly erased: ReadonlySet<string>;
}

export interface MergePlan {
  /** New here, in the order given, each once. */
  readonly add: readonly { readonly fact: Fact; readonly revision: string }[];
  /** Already here, same revision; or erased here and refused. */
  readonly known: readonly string[];
  /** Same id, other content: damage or tampering. The first is kept. */
  readonly damaged: readonly string[];
  /** Targets of erasures that are new here: their bodies and raw samples have to go. */
  readonly drop: readonly string[];
}

/**
 * Put if absent, the one merge of every road: idempotent, and independent of the order of arrival as long as each id
 * has one content. An erasure refuses its target, and whatever hangs on it, from then on.
 */
export function planMerge(kept: KeptFacts, incoming: Iterable<Fact>): MergePlan {
  const facts = [...incoming];
  const add = new Map<string, { fact: Fact; revision: string }>();
  const known: string[] = [];
  const damaged: string[] = [];
  const erased = new Set(kept.erased);
  const drop = facts.flatMap((fact) => eraseTarget(fact)).filter((target) => !kept.erased.has(target));
  drop.forEach((target) => erased.add(target));
  for (const fact of facts) {
    const revision = revisionOf(fact);
    const here = kept.revisions.get(fact._id) ?? add.get(fact._id)?.revision;
    if (isErased(fact, erased) || here === revision) known.push(fact._id);
    // Two devices may erase the same thing, each with its own hour: not damage.
    else if (here !== undefined) (fact.kind === 'erase' ? known : damaged).push(fact._id);
    else add.set(fact._id, { fact, revision });
  }
  return { add: [...add.values()], known, damaged, drop: [...new Set(drop)] };
}

function eraseTarget(fact: Fact): readonly string[] {
  return fact.kind === 'erase' && fact.v === 1 ? [(fact as { target: string }).target] : [];
}

/** Whether a fact, or the thing it is about, was erased. */
export function isErased(fact: Fact, erased: ReadonlySet<string>): boolean {
  if (fact.kind === 'erase') return false;
  const about = aboutOf(fact);
  return erased.has(fact._id) || (about !== undefined && erased.has(about));
}

/** What a fact is about: the entity of an edit or photo, the reading of a result, the target of an erasure. */
export function aboutOf(fact: Fact): string | undefined {
  const { kind } = fact;
  const members = fact as unknown as Readonly<Record<string, unknown>>;
  const name = kind === 'result' ? 'reading' : kind === 'erase' ? 'target' : 'entity';
  const value = kind === 'reading' ? undefined : members[name];
  return typeof value === 'string' ? value : undefined;
}
