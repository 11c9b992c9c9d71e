import type { Fact, KnownFact } from '../core/model/fact.ts';
import { aboutOf } from '../core/packet/merge-facts.ts';
import { parseFact } from '../core/packet/parse-fact.ts';
import { revisionOf } from '../core/packet/revision.ts';
import type { FactRow } from './rows.ts';

export function rowOf(fact: Fact, revision = revisionOf(fact)): FactRow {
  const about = aboutOf(fact);
  return { id: fact._id, kind: fact.kind, ...(about === undefined ? {} : { about }), revision, fact };
}

/** The fact of a row if it is of that kind and this code understands it: what is read back is not trusted. */
export function knownFact<K extends KnownFact['kind']>(
  row: FactRow | undefined,
  kind: K,
): Extract<KnownFact, { kind: K }> | undefined {
  if (row === undefined) return undefined;
  const parsed = parseFact(row.fact);
  if (!parsed.ok || !parsed.value.known || parsed.value.fact.kind !== kind) return undefined;
  return parsed.value.fact as Extract<KnownFact, { kind: K }>;
}
