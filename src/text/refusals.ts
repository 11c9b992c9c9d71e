import type { RefusalCode } from '../core/model/doubt.ts';

const SENTENCES: Readonly<Record<RefusalCode, string>> = {
  'below-resolution': 'No half-power value: the peak is narrower than this record can resolve.',
  'too-few-averages': 'No value: too few averages for a steady spectrum. Record longer.',
  'window-dominates': 'No half-power value: the window, not the structure, sets the width of this peak.',
  'no-half-power-points':
    'No half-power value: the curve does not fall to half power on both sides of the peak.',
  'too-noisy': 'No value: the decay is lost in noise too soon.',
};
/** Why a cross-check gives no number. */
export const refusalSentence = (code: RefusalCode): string => SENTENCES[code];
