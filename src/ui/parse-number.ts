/** A typed number with decimal point or comma; undefined while it is empty or unfinished. */
export function parseNumber(typed: string): number | undefined {
  const plain = typed
    .trim()
    .replace(/[\s\u00a0\u202f]/g, '')
    .replace(',', '.')
    .replace('\u2212', '-');
  if (plain === '' || !/^-?\d*\.?\d*(e-?\d+)?$/i.test(plain)) return undefined;
  const value = Number(plain);
  return Number.isFinite(value) ? value : undefined;
}
