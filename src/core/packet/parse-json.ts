import { isPlainObject, NESTING_LIMIT } from './canonical-json.ts';

/** Keys that could reach an object's prototype through a careless copy: such a document is refused whole. */
const FORBIDDEN_KEYS: ReadonlySet<string> = new Set(['__proto__', 'constructor', 'prototype']);

/** JSON text of unknown origin as plain data; undefined when it is not JSON, nests too deep or holds a forbidden key. */
export function parseJson(text: string): unknown {
  try {
    const value: unknown = JSON.parse(text);
    return isHarmless(value, 0) ? value : undefined;
  } catch {
    return undefined;
  }
}

/** The same from UTF-8 bytes; malformed UTF-8 is refused. */
export function parseJsonBytes(bytes: Uint8Array): unknown {
  const text = utf8Text(bytes);
  return text === undefined ? undefined : parseJson(text);
}

/** Whether a value is plain JSON data: finite numbers, bounded nesting, no key that reaches a prototype. */
export function isHarmless(value: unknown, depth = 0): boolean {
  if (depth > NESTING_LIMIT) return false;
  if (typeof value === 'number') return Number.isFinite(value);
  if (value === null || typeof value === 'string' || typeof value === 'boolean') return true;
  if (Array.isArray(value)) return value.every((item) => isHarmless(item, depth + 1));
  if (!isPlainObject(value)) return false;
  return Object.entries(value).every(
    ([key, item]) => !FORBIDDEN_KEYS.has(key) && isHarmless(item, depth + 1),
  );
}

/** Strict UTF-8 decoding (RFC 3629) without the DOM's TextDecoder; undefined where malformed. */
export function utf8Text(bytes: Uint8Array): string | undefined {
  const parts: string[] = [];
  let codes: number[] = [];
  for (let i = 0; i < bytes.length;) {
    const [code, length] = codePointAt(bytes, i);
    if (code < 0) return undefined;
    codes.push(code);
    i += length;
    if (codes.length === 4096) {
      parts.push(String.fromCodePoint(...codes));
      codes = [];
    }
  }
  parts.push(String.fromCodePoint(...codes));
  return parts.join('');
}

const MALFORMED = [-1, 1] as const;
const SMALLEST = [0, 0, 0x80, 0x800, 0x10000] as const;

function codePointAt(bytes: Uint8Array, at: number): readonly [number, number] {
  const first = bytes[at]!;
  if (first < 0x80) return [first, 1];
  const length =
    first >= 0xf0 && first < 0xf5 ? 4 : first >= 0xe0 && first < 0xf0 ? 3 : first >= 0xc2 ? 2 : 0;
  if (length === 0 || first >= 0xf5 || at + length > bytes.length) return MALFORMED;
  let code = first & (0xff >> (length + 1));
  for (let i = 1; i < length; i += 1) {
    const next = bytes[at + i]!;
    if ((next & 0xc0) !== 0x80) return MALFORMED;
    code = (code << 6) | (next & 0x3f);
  }
  const isSurrogate = code >= 0xd800 && code <= 0xdfff;
  return code < SMALLEST[length]! || isSurrogate || code > 0x10ffff ? MALFORMED : [code, length];
}
