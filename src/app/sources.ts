/** Sources are entities whose fields are those of a Source, laid flat, and the place they belong to. */
import type { Entity, FieldValue } from '../core/model/fact.ts';
import type { Source } from '../core/model/source.ts';
import type { StorePort } from './ports.ts';
import type { FoldedForcing } from '../core/model/folded-forcing.ts';
import { textField, type PlaceIds } from './places.ts';

export interface KnownSource {
  readonly id: string;
  readonly source: Source;
  readonly asset?: string;
  readonly site?: string;
}

export interface Sources {
  list(): Promise<readonly KnownSource[]>;
  /** Those of the asset, those of the site, and those that belong nowhere. */
  validFor(place: { readonly asset?: string; readonly site?: string }): Promise<readonly KnownSource[]>;
  /** Forcings valid there that this phone would show folded: said before the recording. */
  foldedAt(place: PlaceIds, rateHz: number): Promise<readonly FoldedForcing[]>;
  open(id: string): Promise<KnownSource | undefined>;
  save(
    source: Source,
    place: { readonly asset?: string; readonly site?: string },
    id?: string,
  ): Promise<string>;
}

/** Every field that any kind of source may have: a changed kind clears the fields of the former. */
const SOURCE_FIELDS = [
  'name',
  'kind',
  'knownBy',
  'toleranceRatio',
  'speedRpm',
  'bladeCount',
  'toothCount',
  'bearing',
  'orders',
  'cylinders',
  'twoStroke',
  'variableSpeed',
  'pulleyDiameterM',
  'beltLengthM',
  'supplyHz',
  'poles',
  'activity',
  'paceHz',
  'peopleCount',
  'stepCount',
  'widthM',
  'speedMps',
  'shape',
  'depthM',
  'strouhalRatio',
  'massPerLengthKgPerM',
  'traffic',
  'frequencyHz',
  'harmonics',
  'through',
] as const;

type ParseSource = (given: unknown) => Source | undefined;

export function createSources(store: StorePort, loadParser: () => Promise<ParseSource>): Sources {
  const known = (entity: Entity, parseSource: ParseSource): KnownSource | undefined => {
    const source = parseSource(sourceFields(entity));
    const asset = textField(entity, 'asset');
    const site = textField(entity, 'site');
    return source && { id: entity.id, source, ...(asset ? { asset } : {}), ...(site ? { site } : {}) };
  };
  const list = async () => {
    const parse = await loadParser();
    const entities = (await store.entities('source')).filter((entity) => !entity.trashed);
    return entities
      .map((entity) => known(entity, parse))
      .filter((source): source is KnownSource => source !== undefined)
      .sort((a, b) => a.source.name.localeCompare(b.source.name, undefined, { numeric: true }));
  };
  return {
    list,
    async validFor(place) {
      return (await list()).filter((entry) => isValidFor(entry, place));
    },
    async foldedAt(place, rateHz) {
      const valid = (await list()).filter((entry) => isValidFor(entry, place));
      const { forcingsOf } = await import('../core/survey/forcings.ts');
      const { foldedForcings } = await import('../core/survey/folded-images.ts');
      const forcings = forcingsOf(valid.map((entry) => entry.source));
      return forcings.ok ? foldedForcings(forcings.value, rateHz) : [];
    },
    async open(id) {
      const entity = await store.entity(id);
      return entity && !entity.trashed ? known(entity, await loadParser()) : undefined;
    },
    async save(source, place, id) {
      const fields = fieldsOf(source, place);
      if (!id) return (await store.newEntity('source', withoutNulls(fields))).id;
      const before = await store.entity(id);
      const changed = Object.entries(fields).filter(
        ([key, value]) => JSON.stringify(value) !== JSON.stringify(before?.fields[key] ?? null),
      );
      if (changed.length > 0) await store.edit(id, Object.fromEntries(changed));
      return id;
    },
  };
}

/** A source of an asset counts there; one of a site counts everywhere on it; one without a place counts everywhere. */
export function isValidFor(
  entry: Pick<KnownSource, 'asset' | 'site'>,
  place: { readonly asset?: string; readonly site?: string },
): boolean {
  if (entry.asset) return entry.asset === place.asset;
  if (entry.site) return entry.site === place.site;
  return true;
}

function sourceFields(entity: Entity): Record<string, FieldValue> {
  const present = SOURCE_FIELDS.map((key) => [key, entity.fields[key]] as const);
  return Object.fromEntries(
    present.filter((entry): entry is [(typeof SOURCE_FIELDS)[number], FieldValue] => entry[1] != null),
  );
}

function fieldsOf(source: Source, place: { readonly asset?: string; readonly site?: string }) {
  const given = source as unknown as Readonly<Record<string, FieldValue | undefined>>;
  const own = SOURCE_FIELDS.map((key) => [key, given[key] ?? null] as const);
  return { ...Object.fromEntries(own), asset: place.asset ?? null, site: place.site ?? null } as Record<
    string,
    FieldValue
  >;
}

const withoutNulls = (fields: Readonly<Record<string, FieldValue>>): Record<string, FieldValue> =>
  Object.fromEntries(Object.entries(fields).filter(([, value]) => value !== null));
