import type { UnpairedVerdict, Verdict } from '../core/model/judgement.ts';

export interface VerdictText {
  readonly word: string;
  readonly meaning: string;
}

const VERDICTS: Readonly<Record<Verdict, VerdictText>> = {
  coincident: {
    word: 'coincident',
    meaning: 'The forcing falls on this mode: the response builds up.',
  },
  close: { word: 'close', meaning: 'The forcing lies near this mode: the response is amplified.' },
  apart: {
    word: 'apart',
    meaning: 'The forcing lies well away from this mode: little amplification from this pair.',
  },
  undecided: {
    word: 'undecided',
    meaning: 'The uncertainty spans from coincident to apart: measure again before deciding.',
  },
  blind: {
    word: 'blind',
    meaning: 'This recording could not see it. That is not good news and not bad news.',
  },
};

/** The verdict's word and what it means. */
export const verdictText = (verdict: Verdict): VerdictText => VERDICTS[verdict];
export const verdictWord = (verdict: Verdict): string => VERDICTS[verdict].word;

const UNPAIRED: Readonly<Record<UnpairedVerdict, VerdictText>> = {
  'none-near': {
    word: 'none found near',
    meaning: 'No mode found near it in this reading. Another spot or direction may still show one.',
  },
  blind: {
    word: 'blind',
    meaning: 'This recording could not see there: a mode near it would have been missed.',
  },
  'not-sought': {
    word: 'not looked for',
    meaning: 'A running reading rarely shows modes. Tap the spot with the machine stopped and locked out.',
  },
};
export const unpairedText = (verdict: UnpairedVerdict): VerdictText => UNPAIRED[verdict];
