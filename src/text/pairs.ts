import type { Judgement, Separation, UnpairedVerdict, Verdict } from '../core/model/judgement.ts';
import { headlinePair } from './sentence.ts';

/** What the person has picked on the ladder or in the list. */
export type Picked =
  | { readonly kind: 'mode'; readonly index: number }
  | { readonly kind: 'forcing'; readonly index: number }
  | { readonly kind: 'tone'; readonly index: number }
  | { readonly kind: 'pair'; readonly forcing: number; readonly mode: number };

/** A forcing with the mode that matters most to it; one row of the list. */
export interface PairRow {
  readonly forcingIndex: number;
  readonly separation?: Separation;
  readonly unpaired?: UnpairedVerdict;
}

export const forcingId = (index: number): string => `forcing-${index}`;
export const modeId = (index: number): string => `mode-${index}`;
export const toneId = (index: number): string => `tone-${index}`;

/** Separations come worst first, so the first of a forcing is the one that matters most to it. */
export const worstOfForcing = (judgement: Judgement, forcingIndex: number): Separation | undefined =>
  judgement.separations.find((separation) => separation.forcingIndex === forcingIndex);
export const worstOfMode = (judgement: Judgement, modeIndex: number): Separation | undefined =>
  judgement.separations.find((separation) => separation.modeIndex === modeIndex);

/** The verdict to show for a forcing: that of its worst pair; blind where it could not be seen at all. */
export function forcingVerdict(judgement: Judgement, forcingIndex: number): Verdict | undefined {
  const unpaired = judgement.unpaired.find((entry) => entry.forcingIndex === forcingIndex);
  const worst = worstOfForcing(judgement, forcingIndex);
  if (worst && worst.verdict !== 'apart') return worst.verdict;
  if (unpaired?.verdict === 'blind') return 'blind';
  return worst?.verdict;
}

const SEVERITY: readonly (Verdict | undefined)[] = [
  'coincident',
  'undecided',
  'close',
  'blind',
  'apart',
  undefined,
];

/** One row a forcing, worst first; within one verdict as the judgement ranks them. */
export function pairRows(judgement: Judgement): PairRow[] {
  const place = (row: PairRow) => SEVERITY.indexOf(forcingVerdict(judgement, row.forcingIndex));
  const rank = (row: PairRow) =>
    row.separation ? judgement.separations.indexOf(row.separation) : judgement.separations.length;
  return judgement.forcings
    .map((_, forcingIndex): PairRow => {
      const separation = worstOfForcing(judgement, forcingIndex);
      const unpaired = judgement.unpaired.find((entry) => entry.forcingIndex === forcingIndex)?.verdict;
      return {
        forcingIndex,
        ...(separation ? { separation } : {}),
        ...(unpaired ? { unpaired } : {}),
      };
    })
    .sort((a, b) => place(a) - place(b) || rank(a) - rank(b) || a.forcingIndex - b.forcingIndex);
}

/** What is worth showing first: the pair that the sentence speaks of, else the first mode, else the first tone. */
export function firstPick(judgement: Judgement, modeCount: number, toneCount: number): Picked | undefined {
  const pair = headlinePair(judgement.separations);
  if (pair) return { kind: 'pair', forcing: pair.forcingIndex, mode: pair.modeIndex };
  if (modeCount > 0) return { kind: 'mode', index: 0 };
  return toneCount > 0 ? { kind: 'tone', index: 0 } : undefined;
}

/** The pair that a picked mark stands for. */
export function pickedSeparation(judgement: Judgement, pick: Picked | undefined): Separation | undefined {
  if (pick === undefined) return undefined;
  if (pick.kind === 'mode') return worstOfMode(judgement, pick.index);
  if (pick.kind === 'forcing') return worstOfForcing(judgement, pick.index);
  if (pick.kind === 'tone') return undefined;
  return judgement.separations.find(
    (separation) => separation.forcingIndex === pick.forcing && separation.modeIndex === pick.mode,
  );
}

/** Ids of everything that should stand out for a pick. */
export function pickedIds(judgement: Judgement, pick: Picked | undefined): ReadonlySet<string> {
  if (pick === undefined) return new Set();
  if (pick.kind === 'tone') return new Set([toneId(pick.index)]);
  const separation = pickedSeparation(judgement, pick);
  const own =
    pick.kind === 'mode' ? [modeId(pick.index)] : pick.kind === 'forcing' ? [forcingId(pick.index)] : [];
  const isFar = separation?.verdict === 'apart' && pick.kind === 'mode';
  return new Set([
    ...own,
    ...(separation && !isFar ? [forcingId(separation.forcingIndex), modeId(separation.modeIndex)] : []),
  ]);
}

/** The id of a mark back to what it stands for. */
export function pickOf(id: string | undefined): Picked | undefined {
  const [kind, index] = id?.split('-') ?? [];
  if ((kind !== 'mode' && kind !== 'forcing' && kind !== 'tone') || index === undefined) return undefined;
  return { kind, index: Number(index) };
}
