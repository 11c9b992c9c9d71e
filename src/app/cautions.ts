/** Which cautions stand before a recording; each is confirmed once a day. The sentences are in src/text/cautions.ts. */
import type { CautionCode } from '../core/model/judgement.ts';
import type { SpotKind } from '../core/model/place.ts';
import type { TakePlan } from './take-plan.ts';

const MACHINE_KINDS: readonly SpotKind[] = ['bearing-housing', 'machine-base', 'fan-frame', 'pipe'];
const HEIGHT_KINDS: readonly SpotKind[] = ['stair', 'footbridge', 'handrail'];

/** Cautions that fit what is about to be done, the gravest first. */
export function cautionsBefore(plan: Pick<TakePlan, 'spotKind' | 'procedure'>): readonly CautionCode[] {
  const { spotKind, procedure } = plan;
  const found: CautionCode[] = [];
  const atMachine = MACHINE_KINDS.includes(spotKind);
  if (atMachine && procedure === 'tap') found.push('isolate-and-lock-out', 'stand-by-may-start');
  if (atMachine || procedure === 'running' || procedure === 'coastdown')
    found.push('no-loose-phone-near-moving-parts', 'live-parts');
  if (procedure === 'coastdown') found.push('stay-clear-while-slowing');
  if (spotKind === 'pipe' && procedure === 'tap') found.push('no-tapping-pressurised-pipe');
  if (spotKind === 'handrail') found.push('do-not-lean-on-rail');
  if (HEIGHT_KINDS.includes(spotKind)) found.push('heights');
  if (spotKind === 'footbridge' || spotKind === 'stair') found.push('leave-when-it-sways');
  return [...found, 'local-rules-first'];
}

/** Those not yet confirmed on this day (ISO date). */
export const unseenCautions = (
  plan: Pick<TakePlan, 'spotKind' | 'procedure'>,
  seen: readonly string[],
  day: string,
): readonly CautionCode[] => cautionsBefore(plan).filter((code) => !seen.includes(seenMark(code, day)));

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
