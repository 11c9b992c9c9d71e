/** Longest part of a name that comes from what people typed, characters. */
const LONGEST = 40;

/** "thrumbook-mill-yard-2026-12-01": letters, digits and dashes only, so that every system takes it. */
export function fileStem(day: string, ...words: readonly (string | undefined)[]): string {
  const told = words
    .filter((word) => word !== undefined)
    .join(' ')
    .normalize('NFKD')
    .replaceAll(/\p{M}/gu, '')
    .toLowerCase()
    .replaceAll(/[^\p{L}\p{N}]+/gu, '-')
    .slice(0, LONGEST)
    .replaceAll(/^-+|-+$/g, '');
  return ['thrumbook', told, day.slice(0, 10)].filter((part) => part !== '').join('-');
}
