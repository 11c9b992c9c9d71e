/** Cautions that stand before a recording; each is confirmed once a day. Which ones fit is the survey's to say. */
import type { CautionCode } from '../core/model/judgement.ts';
import { cautionsFor } from '../core/survey/cautions.ts';
import type { TakePlan } from './take-plan.ts';

/** Those not yet confirmed on this day (ISO date), most pressing first. */
export function unseenCautions(
  plan: Pick<TakePlan, 'procedure' | 'spotKind' | 'circumstances'>,
  seen: readonly string[],
  day: string,
): readonly CautionCode[] {
  const { machineState, visibleSway } = plan.circumstances;
  return cautionsFor({
    procedure: plan.procedure,
    spotKind: plan.spotKind,
    machineState,
    visibleSway,
  }).filter((code) => !seen.includes(seenMark(code, day)));
}

/** The list to keep after confirming: marks of other days are forgotten. */
export const withSeen = (
  seen: readonly string[],
  codes: readonly CautionCode[],
  day: string,
): readonly string[] => [
  ...seen.filter((mark) => mark.endsWith(`@${day}`)),
  ...codes.map((code) => seenMark(code, day)),
];

const seenMark = (code: CautionCode, day: string) => `${code}@${day}`;
