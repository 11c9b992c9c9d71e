import type { Mode } from '../../model/analysis.ts';

/**
 * Ghost modes that polling makes (see `polling-images.ts`): readings held at the sensor's rate s and polled at p show a ring-down
 * at f again at |f - m·s| folded at p, |sinc(f/s - m)| as strong and decaying as fast. Both nearest images, each where, as strong
 * and as brief as one sensor rate says, are taken as proof.
 */

/** Frequencies of images are read this exactly, Hz; strengths up to this factor; decay rates up to this factor. */
const FREQUENCY_SLACK_HZ = 0.06;
const STRENGTH_FACTOR = 1.6;
const DECAY_FACTOR = 1.35;
/** Images of higher order beat against each other: they may be this much stronger than predicted. */
const HIGHER_STRENGTH_FACTOR = 2.5;
const HIGHEST_IMAGE = 4;

export interface PolledModes {
  readonly sensorRateHz: number;
  /** Modes that are no images, as strong as they were before the hold; the fold of none can be decided. */
  readonly modes: Mode[];
}

/** @returns undefined where the modes are not explained by polling at `pollHz` */
export function withoutPollingGhosts(modes: readonly Mode[], pollHz: number): PolledModes | undefined {
  const [parent, ...others] = modes;
  if (parent === undefined) return undefined;
  for (const ghost of others)
    for (const apartHz of [ghost.frequencyHz - parent.frequencyHz, ghost.frequencyHz + parent.frequencyHz])
      for (const sensorRateHz of [pollHz - apartHz, pollHz + apartHz]) {
        const isProven =
          apartHz > 4 * FREQUENCY_SLACK_HZ &&
          sensorRateHz > 2 * parent.frequencyHz &&
          [1, -1].every((m) => others.some((mode) => isImage(mode, parent, m, sensorRateHz, pollHz)));
        if (isProven) return { sensorRateHz, modes: keptOf(modes, sensorRateHz, pollHz) };
      }
  return undefined;
}

const decayOf = (mode: Mode): number => mode.dampingRatio * mode.frequencyHz;

const within = (a: number, b: number, factor: number): boolean => a < factor * b && b < factor * a;

/** Image m of a line of the parent's frequency: nearest ones are as strong as predicted, others no stronger than allowed. */
function isImage(mode: Mode, parent: Mode, m: number, sensorRateHz: number, pollHz: number): boolean {
  const folded = Math.abs(parent.frequencyHz - m * sensorRateHz) % pollHz;
  const atHz = Math.min(folded, pollHz - folded);
  const turns = parent.frequencyHz / sensorRateHz;
  const strength = parent.amplitudeMps2 * Math.abs(turns / (turns - m));
  const order = Math.abs(m);
  if (mode === parent || Math.abs(mode.frequencyHz - atHz) > order * FREQUENCY_SLACK_HZ) return false;
  return order === 1
    ? within(mode.amplitudeMps2, strength, STRENGTH_FACTOR) &&
        within(decayOf(mode), decayOf(parent), DECAY_FACTOR)
    : mode.amplitudeMps2 < HIGHER_STRENGTH_FACTOR * strength;
}

function keptOf(modes: readonly Mode[], sensorRateHz: number, pollHz: number): Mode[] {
  const orders = Array.from({ length: 2 * HIGHEST_IMAGE + 1 }, (_, i) => i - HIGHEST_IMAGE).filter(Boolean);
  const parent = modes[0]!;
  return modes
    .filter((mode) => !orders.some((m) => isImage(mode, parent, m, sensorRateHz, pollHz)))
    .map((mode) => asBeforeTheHold(mode, sensorRateHz));
}

/** A hold lowers a line by sinc(f/s). What is folded cannot be told where stamp and reading are two clocks. */
function asBeforeTheHold(mode: Mode, sensorRateHz: number): Mode {
  const turn = (Math.PI * mode.frequencyHz) / sensorRateHz;
  const { frequencyHz, fold } = mode;
  return {
    ...mode,
    amplitudeMps2: (mode.amplitudeMps2 * turn) / Math.sin(Math.min(turn, Math.PI / 2)),
    fold: {
      verdict: 'undecided',
      candidatesHz: [frequencyHz, ...fold.candidatesHz.filter((f) => f !== frequencyHz)],
    },
    doubts: [...mode.doubts.filter((d) => d !== 'folded' && d !== 'fold-undecided'), 'fold-undecided'],
  };
}
