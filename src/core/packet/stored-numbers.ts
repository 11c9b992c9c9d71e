/** Significant digits of a stored result: beyond them machines differ (sync.md: 7). */
export const STORED_DIGITS = 7;

/**
 * A result as it is stored: every number rounded to 7 significant digits, `undefined` members left out.
 * Compare a redone analysis with a stored one through this.
 * @throws TypeError for NaN and infinities: no model holds them.
 */
export function storedNumbers<T>(value: T): T {
  return rounded(value) as T;
}

function rounded(value: unknown): unknown {
  if (typeof value === 'number') return roundedNumber(value);
  if (Array.isArray(value)) return value.map(rounded);
  if (typeof value !== 'object' || value === null) return value;
  const entries = Object.entries(value).filter(([, item]) => item !== undefined);
  return Object.fromEntries(entries.map(([key, item]) => [key, rounded(item)]));
}

function roundedNumber(value: number): number {
  if (!Number.isFinite(value)) throw new TypeError(`a stored number must be finite, got ${value}`);
  const short = Number(value.toPrecision(STORED_DIGITS));
  return short === 0 ? 0 : short;
}
