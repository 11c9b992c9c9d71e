import type { Mode } from '../model/analysis.ts';

/** Modes further apart than this, as a ratio of frequencies, are not taken for one and the same (our own bound). */
export const SAME_MODE_RATIO = 1.15;
/** Nor are modes of which one is mainly vertical and the other mainly horizontal (share of the motion along gravity). */
const SAME_DIRECTION_SHARE = 0.6;

const distance = (a: Mode, b: Mode): number => Math.abs(Math.log(a.frequencyHz / b.frequencyHz));

function mayBeSame(a: Mode, b: Mode): boolean {
  if (distance(a, b) > Math.log(SAME_MODE_RATIO)) return false;
  if (a.verticalShare === undefined || b.verticalShare === undefined) return true;
  return Math.abs(a.verticalShare - b.verticalShare) <= SAME_DIRECTION_SHARE;
}

/** Pairs of modes of two readings that may be the same mode, nearest first, each mode once: indexes into both lists. */
export function modePairs(a: readonly Mode[], b: readonly Mode[]): readonly (readonly [number, number])[] {
  const all = a.flatMap((first, i) =>
    b.flatMap((second, j) =>
      mayBeSame(first, second) ? [{ pair: [i, j] as const, gap: distance(first, second) }] : [],
    ),
  );
  const used = [new Set<number>(), new Set<number>()] as const;
  return all
    .sort((first, second) => first.gap - second.gap)
    .flatMap(({ pair: [i, j] }) => {
      if (used[0].has(i) || used[1].has(j)) return [];
      used[0].add(i);
      used[1].add(j);
      return [[i, j] as const];
    });
}
