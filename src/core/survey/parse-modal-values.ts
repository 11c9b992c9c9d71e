import type { Interval } from '../model/interval.ts';
import type { ModalValues } from '../model/guided-pairs.ts';

const KEYS = ['massKg', 'massSdKg', 'stiffnessNPerM', 'stiffnessSdNPerM'] as const;
const INTERVALS = ['massIntervalKg', 'stiffnessIntervalNPerM'] as const;

const isPositive = (value: unknown): value is number =>
  typeof value === 'number' && Number.isFinite(value) && value > 0;
function isInterval(value: unknown): value is Interval {
  if (!Array.isArray(value) || value.length !== 2) return false;
  const [low, high] = value as readonly unknown[];
  return isPositive(low) && isPositive(high) && low <= high;
}

/** Result of an added-mass test as kept with its spot (it may come from another phone); undefined unless all of it is sound. */
export function parseModalValues(value: unknown): ModalValues | undefined {
  if (typeof value !== 'object' || value === null) return undefined;
  const fields = new Map<string, unknown>(Object.entries(value));
  const isSound =
    KEYS.every((key) => isPositive(fields.get(key))) && INTERVALS.every((key) => isInterval(fields.get(key)));
  if (!isSound) return undefined;
  const known = [...KEYS, ...INTERVALS].map((key) => [key, fields.get(key)]);
  return Object.fromEntries(known) as ModalValues;
}

/** A mode counts as the one that was tested within this share of its frequency: a season or a phone moves it by less (our own bound). */
export const SAME_MODE_RATIO = 0.1;

/** Whether modal values belong to the mode at a frequency: theirs is the root of stiffness over mass. */
export function belongsToMode({ massKg, stiffnessNPerM }: ModalValues, frequencyHz: number): boolean {
  const testedHz = Math.sqrt(stiffnessNPerM / massKg) / (2 * Math.PI);
  return Math.abs(testedHz / frequencyHz - 1) <= SAME_MODE_RATIO;
}
