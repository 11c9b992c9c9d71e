/** Fields that two people wrote unknown to each other: listed over everything that has fields, until a person chooses. */
import type { EntityKind, FieldValue } from '../core/model/fact.ts';
import type { StorePort } from './ports.ts';
import { textField } from './places.ts';

export interface OpenConflict {
  readonly entity: string;
  readonly kind: EntityKind;
  /** Of the thing, as it is shown now. */
  readonly name?: string;
  readonly field: string;
  readonly versions: readonly {
    readonly edit: string;
    readonly value: FieldValue;
    /** Where the value is another thing of ours: its name. */
    readonly named?: string;
    readonly isHere: boolean;
    readonly device: string;
    readonly at: string;
  }[];
}

const KINDS: readonly EntityKind[] = ['site', 'asset', 'spot', 'source', 'round', 'reading', 'photo'];

export async function openConflicts(
  store: Pick<StorePort, 'entities' | 'device'>,
): Promise<readonly OpenConflict[]> {
  const entities = (await Promise.all(KINDS.map((kind) => store.entities(kind)))).flat();
  const names = new Map(entities.map((entity) => [entity.id, nameOf(entity)]));
  return entities.flatMap((entity) =>
    Object.entries(entity.conflicts).map(([field, versions]) => {
      const name = names.get(entity.id);
      return {
        entity: entity.id,
        kind: entity.kind,
        ...(name === undefined ? {} : { name }),
        field,
        versions: versions.map((version) => {
          const named = typeof version.value === 'string' ? names.get(version.value) : undefined;
          return {
            ...version,
            ...(named === undefined ? {} : { named }),
            isHere: version.device === store.device,
          };
        }),
      };
    }),
  );
}

/** The choice is an edit that replaces all versions; they stay in the history. */
export async function settle(
  store: Pick<StorePort, 'edit'>,
  { entity, field }: OpenConflict,
  value: FieldValue,
): Promise<void> {
  await store.edit(entity, { [field]: value });
}

const nameOf = (entity: Parameters<typeof textField>[0]): string | undefined =>
  textField(entity, 'name') ?? textField(entity, 'label');
