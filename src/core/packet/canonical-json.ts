import type { FieldValue } from '../model/fact.ts';

/**
 * Canonical JSON: one text for one content, so that a hash names the content (RFC 8785, Rundgren et al. 2020).
 * Members whose value is `undefined` are left out. Keys are sorted by UTF-16 code units.
 * @throws TypeError for NaN, infinities, lone surrogates and anything that JSON cannot hold.
 */
export function canonicalJson(value: unknown): string {
  return write(value, 0);
}

/** Deepest nesting that is written or accepted (our own bound: facts nest about 8 deep). */
export const NESTING_LIMIT = 64;

function write(value: unknown, depth: number): string {
  if (depth > NESTING_LIMIT) throw new TypeError(`nesting must be at most ${NESTING_LIMIT} deep`);
  if (value === null || typeof value === 'boolean') return String(value);
  if (typeof value === 'number') return writeNumber(value);
  if (typeof value === 'string') return writeText(value);
  if (Array.isArray(value)) return `[${value.map((item) => write(item, depth + 1)).join(',')}]`;
  if (isPlainObject(value)) return writeObject(value, depth);
  throw new TypeError(`value must be JSON, got ${typeof value}`);
}

function writeNumber(value: number): string {
  if (!Number.isFinite(value)) throw new TypeError(`number must be finite, got ${value}`);
  // RFC 8785 section 3.2.2.3 prescribes exactly what ECMAScript does; minus zero becomes 0.
  return JSON.stringify(value);
}

function writeText(value: string): string {
  if (hasLoneSurrogate(value)) throw new TypeError('text must not hold a lone surrogate');
  return JSON.stringify(value);
}

function writeObject(value: Readonly<Record<string, unknown>>, depth: number): string {
  const members = Object.keys(value)
    .filter((key) => value[key] !== undefined)
    .sort((a, b) => (a < b ? -1 : 1))
    .map((key) => `${writeText(key)}:${write(value[key], depth + 1)}`);
  return `{${members.join(',')}}`;
}

export function isPlainObject(value: unknown): value is Record<string, unknown> {
  if (typeof value !== 'object' || value === null) return false;
  const prototype: unknown = Object.getPrototypeOf(value);
  return prototype === Object.prototype || prototype === null;
}

const LONE_SURROGATE = /[\uD800-\uDBFF](?![\uDC00-\uDFFF])|(?<![\uD800-\uDBFF])[\uDC00-\uDFFF]/;
export function hasLoneSurrogate(text: string): boolean {
  return LONE_SURROGATE.test(text);
}

/** Text as a fact may hold it: lone surrogates (half an emoji) replaced, composed form (NFC). */
export function wellFormedText(text: string): string {
  return text.replace(new RegExp(LONE_SURROGATE, 'g'), '\uFFFD').normalize('NFC');
}

/** A field value whose texts are well formed and whose `undefined` members are gone. */
export function wellFormedValue(value: FieldValue): FieldValue {
  if (typeof value === 'string') return wellFormedText(value);
  if (Array.isArray(value)) return value.map((item: FieldValue) => wellFormedValue(item));
  if (value === null || typeof value !== 'object') return value;
  const entries = Object.entries(value).filter(([, item]) => item !== undefined);
  return Object.fromEntries(entries.map(([key, item]) => [key, wellFormedValue(item as FieldValue)]));
}
