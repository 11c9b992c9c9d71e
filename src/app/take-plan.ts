/** What is about to be recorded: procedure, place and circumstances, with defaults that spare the person every form. */
import type { Procedure } from '../core/model/analysis.ts';
import type { Circumstances } from '../core/model/fact.ts';
import type { SpotKind } from '../core/model/place.ts';
import type { Whereabouts } from './places.ts';
import type { SessionOptions, StartBy } from './ports.ts';

export interface TakePlan {
  readonly procedure: Procedure;
  readonly where: Whereabouts;
  readonly spotKind: SpotKind;
  readonly circumstances: Circumstances;
  readonly durationS: number;
  readonly startBy: StartBy;
  /** Query of the practice rig; absent: the real sensor. */
  readonly practice?: string;
}

/** Our own choice: five taps with four seconds each for the ringing, and some to spare. */
const TAP_DURATION_S = 30;
/** Long enough for 0.03 Hz between lines of a running machine. */
const RUNNING_DURATION_S = 45;
/** Shortest useful time for lightly damped low modes; the person can choose up to ten minutes. */
const AMBIENT_DURATION_S = 180;
const COASTDOWN_DURATION_S = 120;
/** Time to take the hand away before a recording that nothing else starts. */
export const TIMER_S = 3;

const DURATIONS_S: Readonly<Record<Procedure, number>> = {
  tap: TAP_DURATION_S,
  running: RUNNING_DURATION_S,
  ambient: AMBIENT_DURATION_S,
  coastdown: COASTDOWN_DURATION_S,
};
/** Offered in the plan, s. */
export const DURATION_CHOICES_S: Readonly<Record<Procedure, readonly number[]>> = {
  tap: [20, 30, 60],
  running: [30, 45, 60, 120],
  ambient: [120, 180, 300, 600],
  coastdown: [60, 120, 300],
};

const SURFACES: Readonly<Record<SpotKind, Circumstances['surface']>> = {
  handrail: 'tube',
  stair: 'floor',
  floor: 'floor',
  footbridge: 'floor',
  'bearing-housing': 'plate',
  'machine-base': 'plate',
  'fan-frame': 'plate',
  pipe: 'tube',
  foundation: 'floor',
  'top-floor': 'floor',
  other: 'unknown',
};

const MACHINES: readonly SpotKind[] = ['bearing-housing', 'machine-base', 'fan-frame', 'pipe'];

/** Circumstances that follow from procedure and kind of spot; the person corrects what differs. */
export function usualCircumstances(
  procedure: Procedure,
  spotKind: SpotKind,
  mounting: Circumstances['mounting'],
): Circumstances {
  const isMachine = MACHINES.includes(spotKind);
  const floorLike = SURFACES[spotKind] === 'floor';
  return {
    mounting,
    surface: SURFACES[spotKind],
    excitation:
      procedure === 'tap'
        ? floorLike
          ? 'heel-drop'
          : 'knuckle'
        : procedure === 'ambient'
          ? 'ambient'
          : 'machine',
    machineState:
      procedure === 'running'
        ? 'running'
        : procedure === 'coastdown'
          ? 'slowing'
          : isMachine
            ? 'off'
            : 'none',
    peopleOnIt: 'unknown',
  };
}

export function planTake(
  procedure: Procedure,
  where: Whereabouts,
  mounting: Circumstances['mounting'],
  practice?: string,
): TakePlan {
  const spotKind = where.place?.kind ?? 'other';
  return {
    procedure,
    where,
    spotKind,
    circumstances: usualCircumstances(procedure, spotKind, mounting),
    durationS: DURATIONS_S[procedure],
    startBy: procedure === 'tap' ? 'first-tap' : 'timer',
    ...(practice ? { practice } : {}),
  };
}

/** Another procedure or kind of spot: what follows from it follows, what the person chose stays. */
export function replan(
  plan: TakePlan,
  change: { readonly procedure?: Procedure; readonly spotKind?: SpotKind },
): TakePlan {
  const procedure = change.procedure ?? plan.procedure;
  const spotKind = change.spotKind ?? plan.spotKind;
  const usual = usualCircumstances(procedure, spotKind, plan.circumstances.mounting);
  const { excitation, machineState, surface } = usual;
  return {
    ...plan,
    procedure,
    spotKind,
    circumstances: { ...plan.circumstances, excitation, machineState, surface },
    durationS: procedure === plan.procedure ? plan.durationS : DURATIONS_S[procedure],
    startBy: procedure === 'tap' ? 'first-tap' : 'timer',
  };
}

export function sessionOptions(plan: TakePlan): SessionOptions {
  return {
    durationS: plan.durationS,
    startBy: plan.startBy,
    ...(plan.startBy === 'timer' ? { timerS: TIMER_S } : {}),
    ...(plan.practice ? { practice: plan.practice } : {}),
  };
}
