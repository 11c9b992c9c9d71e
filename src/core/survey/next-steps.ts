import type { Coverage, NextStep, PooledMode, PooledPair } from '../model/asset-verdict.ts';
import type { Source } from '../model/source.ts';
import type { JudgedReading } from './asset-reading.ts';

/** Fewer spots than this and a node of a mode may hide under all of them (common practice: quarter points and middle). */
export const FEWEST_SPOTS = 3;
/** Directions to excite: up and down, along, across. */
export const DIRECTION_COUNT = 3;

export interface NextStepFacts {
  readonly judged: readonly JudgedReading[];
  readonly sources: readonly Source[];
  readonly pairs: readonly PooledPair[];
  readonly modes: readonly PooledMode[];
  readonly coverage: Coverage;
}

const atSpot = (spot: string | undefined): { spot?: string } => (spot === undefined ? {} : { spot });

function repeats({ judged, pairs }: NextStepFacts): NextStep[] {
  const poor = judged
    .filter(({ judgement }) => judgement.trust === 'poor')
    .map(({ id, spot }): NextStep => ({ kind: 'repeat-poor', reading: id, ...atSpot(spot) }));
  const undecided = pairs.flatMap(({ verdict, reading }): NextStep[] => {
    if (verdict !== 'undecided' || reading === undefined) return [];
    if (poor.some((step) => step.reading === reading)) return [];
    const spot = judged.find(({ id }) => id === reading)?.spot;
    return [{ kind: 'settle-undecided', reading, ...atSpot(spot) }];
  });
  const once = new Map(undecided.map((step) => [step.reading, step]));
  return [...poor, ...once.values()];
}

/** Steps that would tell most about the asset, in the order in which they are worth doing. */
export function nextSteps(facts: NextStepFacts): readonly NextStep[] {
  const { sources, modes, coverage } = facts;
  const steps: NextStep[] = [];
  const machine = sources.some(({ kind }) => kind === 'machine' || kind === 'belt' || kind === 'mains');
  if (coverage.tapCount === 0)
    steps.push({ kind: machine && coverage.hasRunning ? 'tap-stopped' : 'tap-first' });
  steps.push(...repeats(facts));
  steps.push(...coverage.spotsMissing.map((spot): NextStep => ({ kind: 'read-spot', spot })));
  const known = coverage.spotsRead.length + coverage.spotsMissing.length;
  if (known < FEWEST_SPOTS) steps.push({ kind: 'add-spot' });
  if (coverage.tapCount > 0 && coverage.directions.length < DIRECTION_COUNT)
    steps.push({ kind: 'other-direction', ...atSpot(modes[0]?.strongestSpot) });
  if (machine && !coverage.hasRunning) steps.push({ kind: 'read-running' });
  return steps;
}
