/** Significant digits of every kept number: far finer than any uncertainty, coarse enough to agree between machines. */
export const KEPT_DIGITS = 7;

/**
 * A copy of plain data with every number rounded to seven significant digits, so that a re-analysis on another phone,
 * whose sine may differ in the last bit, gives equal facts.
 * @throws RangeError on a number that is not finite: a model never holds one
 */
export function roundedForKeeping<T>(value: T): T {
  return rounded(value, '') as T;
}

function rounded(value: unknown, path: string): unknown {
  if (typeof value === 'number') {
    if (!Number.isFinite(value)) throw new RangeError(`${path} must be finite, got ${value}`);
    // Adding zero turns -0 into 0, which JSON does not keep.
    return Number(value.toPrecision(KEPT_DIGITS)) + 0;
  }
  if (Array.isArray(value)) return value.map((item, i) => rounded(item, `${path}[${i}]`));
  if (typeof value === 'object' && value !== null) {
    return Object.fromEntries(
      Object.entries(value).map(([key, item]) => [key, rounded(item, `${path}.${key}`)]),
    );
  }
  return value;
}
