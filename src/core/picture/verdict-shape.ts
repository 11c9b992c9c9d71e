import type { Verdict } from '../model/judgement.ts';

/** Path data in a box of 16 by 16: told apart by shape alone, also at 12 px and in black print. */
export interface VerdictShape {
  /** Filled with the verdict's colour. */
  readonly filled: string;
  /** Stroked with the verdict's colour. */
  readonly outline: string;
}

const DIAMOND = 'M8 1L15 8L8 15L1 8Z';

export const VERDICT_BOX_PX = 16;

/** One diamond tells four of them: full, half, torn apart, empty with a dot; what was not seen is a hatched square. */
const SHAPES: Readonly<Record<Verdict, VerdictShape>> = {
  coincident: { filled: DIAMOND, outline: '' },
  close: { filled: 'M8 1L1 8L8 15Z', outline: DIAMOND },
  apart: { filled: '', outline: 'M5.6 2.6L.9 8L5.6 13.4ZM10.4 2.6L15.1 8L10.4 13.4Z' },
  undecided: { filled: 'M8 5.8A2.2 2.2 0 0 1 8 10.2A2.2 2.2 0 0 1 8 5.8Z', outline: DIAMOND },
  blind: { filled: '', outline: 'M2 2H14V14H2ZM2 8L8 2M2 14L14 2M8 14L14 8' },
};

export const verdictShape = (verdict: Verdict): VerdictShape => SHAPES[verdict];
