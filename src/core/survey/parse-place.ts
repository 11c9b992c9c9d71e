import { SPOT_KINDS, type MachinePlace, type Place } from '../model/place.ts';

const BUILDINGS = ['commercial', 'dwelling', 'sensitive'] as const;
const FLOORS = [
  'office',
  'residence',
  'mall',
  'indoor-footbridge',
  'outdoor-footbridge',
  'workshop',
] as const;
const TYPES = ['general', 'pump', 'fan'] as const;
const SUPPORTS = ['rigid', 'flexible'] as const;

const oneOf = <T>(words: readonly T[], value: unknown): T | undefined => words.find((word) => word === value);
const positive = (value: unknown): number | undefined =>
  typeof value === 'number' && Number.isFinite(value) && value > 0 ? value : undefined;
const fieldsOf = (value: unknown): ReadonlyMap<string, unknown> =>
  new Map(typeof value === 'object' && value !== null ? Object.entries(value) : []);

/** Keeps what is there: an absent field stays absent. */
function present<T extends object>(fields: T): { [Key in keyof T]?: NonNullable<T[Key]> } {
  const kept = Object.entries(fields).filter(([, value]) => value !== undefined);
  return Object.fromEntries(kept) as { [Key in keyof T]?: NonNullable<T[Key]> };
}

function machineOf(value: unknown): MachinePlace | undefined {
  const fields = fieldsOf(value);
  const machine = present({
    type: oneOf(TYPES, fields.get('type')),
    ratedPowerW: positive(fields.get('ratedPowerW')),
    support: oneOf(SUPPORTS, fields.get('support')),
    pumpCategory: oneOf([1, 2] as const, fields.get('pumpCategory')),
    speedRpm: positive(fields.get('speedRpm')),
  });
  return Object.keys(machine).length === 0 ? undefined : machine;
}

/**
 * What a spot is, from the fields of its entity (which may come from another phone, a packet or a newer version). What cannot be
 * understood is left out, so that a criterion then says that its class is not known.
 */
export function parsePlace(value: unknown): Place {
  const fields = fieldsOf(value);
  const rest = present({
    machine: machineOf(fields.get('machine')),
    building: oneOf(BUILDINGS, fields.get('building')),
    floorUse: oneOf(FLOORS, fields.get('floorUse')),
    presumedLoading: oneOf([true, false] as const, fields.get('presumedLoading')),
  });
  return { kind: oneOf(SPOT_KINDS, fields.get('kind')) ?? 'other', ...rest };
}
