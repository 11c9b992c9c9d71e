import type { Interval } from '../model/interval.ts';
import { failure, success, type Outcome } from '../model/outcome.ts';
import {
  FOOTFALL_ACTIVITIES,
  KNOWN_BY,
  SOURCE_KINDS,
  type Source,
  type SourceKind,
} from '../model/source.ts';
import { impossibilityOf } from './impossible-source.ts';

/** Why unknown data is no source; with the impossible reasons, all that `bad-source` may carry as `reason`. */
export const SHAPE_REASONS = [
  'not-a-list',
  'not-an-object',
  'missing',
  'not-text',
  'not-a-number',
  'not-a-number-or-range',
  'not-yes-or-no',
  'not-a-list-of-numbers',
  'unknown-word',
  'unknown-field',
  'too-many',
] as const;
export type ShapeReason = (typeof SHAPE_REASONS)[number];

/** A file of more sources than this is not a list of what shakes one site. Our own bound. */
export const LARGEST_SOURCE_COUNT = 500;
/** Longest name kept, characters. Our own bound. */
export const LONGEST_NAME_COUNT = 200;

type Check = (value: unknown) => ShapeReason | undefined;
const isNumber = (value: unknown): value is number => typeof value === 'number' && Number.isFinite(value);
const number: Check = (value) => (isNumber(value) ? undefined : 'not-a-number');
const isRange = (value: unknown): value is Interval =>
  Array.isArray(value) && value.length === 2 && value.every(isNumber);
const numberOrRange: Check = (value) =>
  isNumber(value) || isRange(value) ? undefined : 'not-a-number-or-range';
const numbers: Check = (value) =>
  Array.isArray(value) && value.length > 0 && value.length <= 50 && value.every(isNumber)
    ? undefined
    : 'not-a-list-of-numbers';
const yesOrNo: Check = (value) => (typeof value === 'boolean' ? undefined : 'not-yes-or-no');
const name: Check = (value) =>
  typeof value === 'string' && value.trim() !== '' && value.length <= LONGEST_NAME_COUNT
    ? undefined
    : 'not-text';
const oneOf =
  (words: readonly unknown[]): Check =>
  (value) =>
    words.includes(value) ? undefined : 'unknown-word';
const bearing: Check = (value) => {
  if (typeof value !== 'object' || value === null) return 'not-an-object';
  const { ballCount, diameterRatio, contactAngleRad } = value as Record<string, unknown>;
  return (
    number(ballCount) ??
    number(diameterRatio) ??
    (contactAngleRad === undefined ? undefined : number(contactAngleRad))
  );
};

interface Fields {
  readonly needed: Readonly<Record<string, Check>>;
  readonly optional: Readonly<Record<string, Check>>;
}
const BASE: Fields = {
  needed: { name },
  optional: { knownBy: oneOf(KNOWN_BY), toleranceRatio: number },
};
const FIELDS: Readonly<Record<SourceKind, Fields>> = {
  machine: {
    needed: { speedRpm: numberOrRange },
    optional: {
      bladeCount: number,
      toothCount: number,
      orders: numbers,
      cylinders: number,
      twoStroke: yesOrNo,
      bearing,
      variableSpeed: yesOrNo,
    },
  },
  belt: { needed: { speedRpm: numberOrRange, pulleyDiameterM: number, beltLengthM: number }, optional: {} },
  mains: {
    needed: { supplyHz: oneOf([50, 60]) },
    optional: { poles: oneOf([2, 4, 6, 8, 10, 12]), speedRpm: numberOrRange },
  },
  footfall: {
    needed: { activity: oneOf(FOOTFALL_ACTIVITIES) },
    optional: { paceHz: numberOrRange, peopleCount: number, stepCount: number },
  },
  wind: {
    needed: { widthM: number, speedMps: numberOrRange },
    optional: {
      shape: oneOf(['circle', 'square', 'rectangle', 'custom']),
      depthM: number,
      strouhalRatio: number,
      massPerLengthKgPerM: number,
    },
  },
  traffic: { needed: {}, optional: { traffic: oneOf(['road', 'rail']) } },
  band: {
    needed: { frequencyHz: numberOrRange },
    optional: { harmonics: number, through: oneOf(['force', 'base', 'unbalance']) },
  },
};

const bad = (row: number, field: string, reason: ShapeReason, facts: Record<string, number | string> = {}) =>
  failure('bad-source', { row, field, reason, ...facts });

/**
 * One source from unknown data. Only known fields are kept; an unknown field is refused, so that a misspelt one is not lost silently.
 * @param row counted from 1, for the sentence
 */
export function parseSource(value: unknown, row = 1): Outcome<Source> {
  if (typeof value !== 'object' || value === null || Array.isArray(value))
    return bad(row, 'source', 'not-an-object');
  const record = new Map(Object.entries(value));
  const kind = record.get('kind') as SourceKind;
  if (!SOURCE_KINDS.includes(kind))
    return bad(row, 'kind', kind === undefined ? 'missing' : 'unknown-word', {
      found: String(kind).slice(0, 40),
    });
  const needed = { ...BASE.needed, ...FIELDS[kind].needed };
  const checks = new Map(Object.entries({ ...needed, ...BASE.optional, ...FIELDS[kind].optional }));
  for (const field of Object.keys(needed))
    if (record.get(field) === undefined) return bad(row, field, 'missing');
  const kept: Record<string, unknown> = { kind };
  for (const [field, fieldValue] of record) {
    if (field === 'kind' || fieldValue === undefined) continue;
    const check = checks.get(field);
    if (!check) return bad(row, field.slice(0, 40), 'unknown-field');
    const reason = check(fieldValue);
    if (reason) return bad(row, field, reason);
    kept[field] = fieldValue;
  }
  const source = kept as unknown as Source;
  const impossible = impossibilityOf(source);
  return impossible ? failure('bad-source', { row, name: source.name, ...impossible }) : success(source);
}

/** A sources file: a list of sources, each possible. The first that is not is refused with row (from 1), field and reason. */
export function parseSources(value: unknown): Outcome<readonly Source[]> {
  if (!Array.isArray(value)) return bad(0, 'file', 'not-a-list');
  if (value.length > LARGEST_SOURCE_COUNT) return bad(0, 'file', 'too-many', { bound: LARGEST_SOURCE_COUNT });
  const sources: Source[] = [];
  for (const [index, item] of value.entries()) {
    const outcome = parseSource(item, index + 1);
    if (!outcome.ok) return outcome;
    sources.push(outcome.value);
  }
  return success(sources);
}
