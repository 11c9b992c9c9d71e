import type { Analysis } from '../model/analysis.ts';
import type { EditFact, Entity, Fact, KnownFact, ReadingFact } from '../model/fact.ts';
import { foldEdits } from './fold-edits.ts';
import { aboutOf } from './merge-facts.ts';

/** What of all facts goes along, and what is known of the places of the readings. */
export interface PacketSelection {
  /** Ids of the readings, or all. */
  has(fact: Fact): boolean;
  readonly factCounts: Readonly<Record<string, number>>;
  readonly readingCount: number;
  entity(id: string): Entity | undefined;
  /** The newest kept analysis: the last redo, else the reading's own. */
  analysisOf(reading: ReadingFact): Analysis;
  placeOf(reading: ReadingFact): { readonly site?: string; readonly asset?: string; readonly spot?: string };
}

const isKind = <K extends KnownFact['kind']>(fact: Fact, kind: K): fact is Extract<KnownFact, { kind: K }> =>
  fact.kind === kind && fact.v === 1;

const textOf = (entity: Entity | undefined, field: string): string | undefined => {
  const value = entity?.fields[field];
  return typeof value === 'string' && value !== '' ? value : undefined;
};

/**
 * Chooses the facts of some readings and everything that they need to be understood elsewhere: their edits, redone analyses
 * and photos, their places with photos, their rounds, and the sources that count there. `all`: everything there is.
 */
export async function selectFacts(
  facts: AsyncIterable<Fact>,
  chosen: readonly string[] | 'all',
): Promise<PacketSelection> {
  const edits = new Map<string, EditFact[]>();
  const readings = new Map<string, ReadingFact>();
  const results = new Map<string, { id: string; analysis: Analysis }>();
  const heads: { id: string; kind: string; about?: string }[] = [];
  const isWanted = chosen === 'all' ? () => true : (id: string) => asked.has(id);
  const asked = new Set(chosen === 'all' ? [] : chosen);
  for await (const fact of facts) {
    const about = aboutOf(fact);
    heads.push({ id: fact._id, kind: fact.kind, ...(about === undefined ? {} : { about }) });
    if (isKind(fact, 'edit')) edits.set(fact.entity, [...(edits.get(fact.entity) ?? []), fact]);
    // The body is dropped: of a reading only its places are needed here.
    if (isKind(fact, 'reading') && isWanted(fact._id)) readings.set(fact._id, placesOnly(fact));
    if (isKind(fact, 'result') && isWanted(fact.reading) && fact._id > (results.get(fact.reading)?.id ?? ''))
      results.set(fact.reading, { id: fact._id, analysis: fact.analysis });
  }
  const folded = new Map<string, Entity>();
  const entity = (id: string): Entity | undefined => {
    const own = edits.get(id);
    if (own === undefined) return undefined;
    const known = folded.get(id) ?? foldEdits(id, own);
    folded.set(id, known);
    return known;
  };
  const placeOf = (reading: ReadingFact) => placesOf(reading, entity);
  const wanted =
    chosen === 'all' ? undefined : wantedEntities([...readings.values()], placeOf, entity, [...edits.keys()]);
  const has = (head: { id: string; about?: string }) =>
    wanted === undefined || wanted.has(head.id) || (head.about !== undefined && wanted.has(head.about));
  const kept = heads.filter(has);
  const ids = wanted === undefined ? undefined : new Set(kept.map(({ id }) => id));
  return {
    has: (fact) => ids === undefined || ids.has(fact._id),
    factCounts: countsOf(kept.map(({ kind }) => kind)),
    readingCount: readings.size,
    entity,
    analysisOf: (reading) => results.get(reading._id)?.analysis ?? reading.analysis,
    placeOf,
  };
}

const placesOnly = (reading: ReadingFact): ReadingFact =>
  ({
    _id: reading._id,
    site: reading.site,
    asset: reading.asset,
    spot: reading.spot,
    round: reading.round,
  }) as ReadingFact;

function countsOf(kinds: readonly string[]): Record<string, number> {
  const counts = new Map<string, number>();
  for (const kind of kinds) counts.set(kind, (counts.get(kind) ?? 0) + 1);
  return Object.fromEntries([...counts].sort(([a], [b]) => (a < b ? -1 : 1)));
}

/** Where a reading belongs now: an edit wins over what was known when it was taken; an asset and a site follow from the spot. */
function placesOf(reading: ReadingFact, entity: (id: string) => Entity | undefined) {
  const own = entity(reading._id);
  const now = (field: 'site' | 'asset' | 'spot') =>
    own && field in own.fields ? textOf(own, field) : reading[field];
  const spot = now('spot');
  const asset = now('asset') ?? (spot && textOf(entity(spot), 'asset'));
  const site = now('site') ?? (asset && textOf(entity(asset), 'site'));
  return { ...(site ? { site } : {}), ...(asset ? { asset } : {}), ...(spot ? { spot } : {}) };
}

function wantedEntities(
  readings: readonly ReadingFact[],
  placeOf: PacketSelection['placeOf'],
  entity: (id: string) => Entity | undefined,
  entityIds: readonly string[],
): ReadonlySet<string> {
  const wanted = new Set<string>();
  for (const reading of readings) {
    wanted.add(reading._id);
    for (const id of Object.values(placeOf(reading))) wanted.add(id);
    const round = textOf(entity(reading._id), 'round') ?? reading.round;
    if (round) wanted.add(round);
  }
  const sources = entityIds.filter((id) => id.startsWith('source:')).map((id) => ({ id, is: entity(id) }));
  for (const { id, is } of sources) {
    const place = textOf(is, 'asset') ?? textOf(is, 'site');
    if (place === undefined || wanted.has(place)) wanted.add(id);
  }
  return wanted;
}
