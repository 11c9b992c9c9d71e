/** Sites, assets and spots: where readings belong, and what can be told of a spot from its visits. */
import type { Entity, EntityKind, FieldValue } from '../core/model/fact.ts';
import type { ModalValues } from '../core/model/guided-pairs.ts';
import { SPOT_KINDS, type Place, type SpotKind } from '../core/model/place.ts';
import { parseModalValues } from '../core/survey/parse-modal-values.ts';
import { parsePlace } from '../core/survey/parse-place.ts';
import type { ReadingSummary, StorePort } from './ports.ts';

export interface Spot {
  readonly id: string;
  readonly name: string;
  readonly kind: SpotKind;
  readonly direction?: string;
  readonly asset?: string;
  readonly entity: Entity;
}
export interface Asset {
  readonly id: string;
  readonly name: string;
  readonly site?: string;
  readonly spots: readonly Spot[];
  readonly entity: Entity;
}
export interface Site {
  readonly id: string;
  readonly name: string;
  readonly assets: readonly Asset[];
  readonly entity: Entity;
}
/** Everything that has a place; what was not put under a site or an asset stands beside. */
export interface PlaceTree {
  readonly sites: readonly Site[];
  readonly looseAssets: readonly Asset[];
  readonly looseSpots: readonly Spot[];
}

export interface PlaceIds {
  readonly spot?: string;
  readonly asset?: string;
  readonly site?: string;
}
/** Ids and names of where a spot is, and what it is. */
export interface Whereabouts extends PlaceIds {
  readonly names: PlaceIds;
  readonly place?: Place;
  /** Modal mass and stiffness there, where an added-mass test was kept. */
  readonly modal?: ModalValues;
}

export interface Places {
  tree(): Promise<PlaceTree>;
  whereabouts(ids: PlaceIds): Promise<Whereabouts>;
  /** Names of all places by id, those in the trash included: an old reading keeps its name. */
  names(): Promise<ReadonlyMap<string, string>>;
  /** Readings of one spot, oldest first, trashed ones left out. */
  visits(spot: string): Promise<readonly ReadingSummary[]>;
  addSite(name: string): Promise<string>;
  addAsset(name: string, site?: string): Promise<string>;
  addSpot(name: string, kind: SpotKind, asset?: string, direction?: string): Promise<string>;
}

export const textField = (entity: Entity | undefined, key: string): string | undefined => {
  const value = entity?.fields[key];
  return typeof value === 'string' && value !== '' ? value : undefined;
};

/** What the criteria need to know of a spot, as far as it was entered. */
export const placeOf = (spot: Entity): Place => parsePlace(spot.fields);

const spotKindOf = (value: unknown): SpotKind => SPOT_KINDS.find((kind) => kind === value) ?? 'other';

export function createPlaces(store: StorePort): Places {
  const kept = async (kind: EntityKind) => (await store.entities(kind)).filter((entity) => !entity.trashed);
  const create = async (kind: EntityKind, fields: Record<string, FieldValue | undefined>) => {
    const given = Object.entries(fields).filter(
      (entry): entry is [string, FieldValue] => entry[1] !== undefined,
    );
    return (await store.newEntity(kind, Object.fromEntries(given))).id;
  };
  return {
    async tree() {
      const [sites, assets, spots] = await Promise.all([kept('site'), kept('asset'), kept('spot')]);
      return placeTree(sites, assets, spots);
    },
    whereabouts: (ids) => whereabouts(store, ids),
    async names() {
      const all = await Promise.all((['site', 'asset', 'spot'] as const).map((kind) => store.entities(kind)));
      return new Map(all.flat().map((entity) => [entity.id, textField(entity, 'name') ?? '']));
    },
    async visits(spot) {
      const found = await store.listReadings({ spot, trashed: false });
      return [...found].sort((a, b) => a.recordedAt.localeCompare(b.recordedAt));
    },
    addSite: (name) => create('site', { name }),
    addAsset: (name, site) => create('asset', { name, site }),
    addSpot: (name, kind, asset, direction) => create('spot', { name, kind, asset, direction }),
  };
}

async function whereabouts(store: Pick<StorePort, 'entity'>, ids: PlaceIds): Promise<Whereabouts> {
  const spot = ids.spot ? await store.entity(ids.spot) : undefined;
  const assetId = ids.asset ?? textField(spot, 'asset');
  const asset = assetId ? await store.entity(assetId) : undefined;
  const siteId = ids.site ?? textField(asset, 'site');
  const site = siteId ? await store.entity(siteId) : undefined;
  return {
    ...(ids.spot ? { spot: ids.spot } : {}),
    ...(assetId ? { asset: assetId } : {}),
    ...(siteId ? { site: siteId } : {}),
    ...(spot ? { place: placeOf(spot) } : {}),
    ...modalOf(spot),
    names: {
      ...nameEntry('spot', spot),
      ...nameEntry('asset', asset),
      ...nameEntry('site', site),
    },
  };
}

function modalOf(spot: Entity | undefined): Pick<Whereabouts, 'modal'> {
  const modal = parseModalValues(spot?.fields['modal']);
  return modal ? { modal } : {};
}

const nameEntry = (key: string, entity: Entity | undefined): Record<string, string> => {
  const name = textField(entity, 'name');
  return name ? { [key]: name } : {};
};

/** Puts spots under assets under sites, each list by name. */
export function placeTree(
  siteEntities: readonly Entity[],
  assetEntities: readonly Entity[],
  spotEntities: readonly Entity[],
): PlaceTree {
  const spots = byName(spotEntities.map(toSpot));
  const assets = byName(assetEntities.map((entity) => toAsset(entity, spots)));
  const siteIds = new Set(siteEntities.map((entity) => entity.id));
  const assetIds = new Set(assets.map((asset) => asset.id));
  return {
    sites: byName(
      siteEntities.map((entity) => ({
        id: entity.id,
        name: textField(entity, 'name') ?? '',
        assets: assets.filter((asset) => asset.site === entity.id),
        entity,
      })),
    ),
    looseAssets: assets.filter((asset) => !asset.site || !siteIds.has(asset.site)),
    looseSpots: spots.filter((spot) => !spot.asset || !assetIds.has(spot.asset)),
  };
}

function toSpot(entity: Entity): Spot {
  const asset = textField(entity, 'asset');
  const direction = textField(entity, 'direction');
  return {
    id: entity.id,
    name: textField(entity, 'name') ?? '',
    kind: spotKindOf(entity.fields.kind),
    ...(asset ? { asset } : {}),
    ...(direction ? { direction } : {}),
    entity,
  };
}

function toAsset(entity: Entity, spots: readonly Spot[]): Asset {
  const site = textField(entity, 'site');
  return {
    id: entity.id,
    name: textField(entity, 'name') ?? '',
    ...(site ? { site } : {}),
    spots: spots.filter((spot) => spot.asset === entity.id),
    entity,
  };
}

const byName = <T extends { readonly name: string }>(list: readonly T[]): readonly T[] =>
  [...list].sort((a, b) => a.name.localeCompare(b.name, undefined, { numeric: true }));
