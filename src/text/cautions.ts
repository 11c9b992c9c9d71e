import type { CautionCode } from '../core/model/judgement.ts';

export interface CautionText {
  readonly text: string;
  /** True where hands or lives are near: the person must acknowledge it before going on. */
  readonly mustAcknowledge: boolean;
}

const CAUTIONS: Readonly<Record<CautionCode, CautionText>> = {
  'local-rules-first': {
    text: 'Local rules and licensed practice come first. This survey replaces neither.',
    mustAcknowledge: false,
  },
  'isolate-and-lock-out': {
    text: 'Before touching a stopped machine: power isolated, locked out, tagged, and tried.',
    mustAcknowledge: true,
  },
  'stand-by-may-start': {
    text: 'A stand-by machine may start by itself. Lock it out as well.',
    mustAcknowledge: true,
  },
  'no-loose-phone-near-moving-parts': {
    text: 'No loose phone, strap, sleeve or hand near belts, couplings and fans.',
    mustAcknowledge: true,
  },
  'live-parts': { text: 'Keep clear of live parts and open terminal boxes.', mustAcknowledge: false },
  'no-tapping-pressurised-pipe': {
    text: 'Do not tap pressurised small-bore pipe, gauge lines or sight glasses. Depressurise first, or do not tap.',
    mustAcknowledge: true,
  },
  'do-not-lean-on-rail': {
    text: 'Nobody leans on a suspect rail, on either side of it, while it is tapped or after.',
    mustAcknowledge: true,
  },
  heights: {
    text: 'Stand where you cannot fall, and look that nothing falls on people below.',
    mustAcknowledge: false,
  },
  'leave-when-it-sways': {
    text: 'It visibly sways: get off it, keep others off, and call a structural engineer.',
    mustAcknowledge: true,
  },
  'stay-clear-while-slowing': {
    text: 'Stay clear until it stands still. It may shake hardest while slowing down.',
    mustAcknowledge: true,
  },
};
export const cautionText = (code: CautionCode): CautionText => CAUTIONS[code];
export const cautionSentence = (code: CautionCode): string => CAUTIONS[code].text;
