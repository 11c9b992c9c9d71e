import type { Procedure } from '../model/analysis.ts';
import type { Circumstances } from '../model/fact.ts';
import type { CautionCode } from '../model/judgement.ts';
import type { SpotKind } from '../model/place.ts';
import type { SourceKind } from '../model/source.ts';

export interface CautionFacts {
  readonly procedure: Procedure;
  readonly spotKind?: SpotKind | undefined;
  readonly sourceKinds?: readonly SourceKind[];
  readonly machineState?: Circumstances['machineState'] | undefined;
  readonly visibleSway?: boolean | undefined;
}

const MACHINE_SPOTS: readonly SpotKind[] = ['bearing-housing', 'machine-base', 'fan-frame', 'pipe'];
const MACHINE_SOURCES: readonly SourceKind[] = ['machine', 'belt', 'mains'];
const HIGH_SPOTS: readonly SpotKind[] = ['handrail', 'stair', 'footbridge'];

/** Whether there is, or may be, a machine within reach. */
function isAtMachine(facts: CautionFacts): boolean {
  if (facts.machineState === 'none') return false;
  return (
    facts.procedure === 'coastdown' ||
    facts.procedure === 'running' ||
    (facts.spotKind !== undefined && MACHINE_SPOTS.includes(facts.spotKind)) ||
    (facts.machineState !== undefined && facts.machineState !== 'unknown') ||
    (facts.sourceKinds ?? []).some((kind) => MACHINE_SOURCES.includes(kind))
  );
}

/** Cautions of a procedure at a spot, most pressing first; local rules and licensed practice come first of all. */
export function cautionsFor(facts: CautionFacts): readonly CautionCode[] {
  const { procedure, spotKind } = facts;
  const atMachine = isAtMachine(facts);
  const touching = procedure === 'tap';
  const moving = procedure === 'running' || procedure === 'coastdown' || facts.machineState === 'running';
  const codes: [CautionCode, boolean][] = [
    ['local-rules-first', true],
    ['leave-when-it-sways', facts.visibleSway === true],
    ['isolate-and-lock-out', atMachine && touching],
    ['stand-by-may-start', atMachine && !moving],
    ['no-tapping-pressurised-pipe', spotKind === 'pipe' && touching],
    ['no-loose-phone-near-moving-parts', atMachine && moving],
    ['stay-clear-while-slowing', procedure === 'coastdown'],
    ['live-parts', atMachine],
    ['do-not-lean-on-rail', spotKind === 'handrail'],
    ['heights', spotKind !== undefined && HIGH_SPOTS.includes(spotKind)],
  ];
  return codes.filter(([, applies]) => applies).map(([code]) => code);
}
