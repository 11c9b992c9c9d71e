import type { Analysis } from '../model/analysis.ts';

/** What would halve the uncertainty of the strongest mode or tone of a reading. */
export type MoreRecording =
  | { readonly kind: 'seconds'; readonly extraS: number }
  | { readonly kind: 'taps'; readonly extraTapCount: number };

/** Lengths are suggested in steps of 10 s. */
const STEP_S = 10;
/**
 * The standard deviation of the frequency of a steady line falls with the 3/2 power of the length (Rife & Boorstyn
 * 1974): half of it takes 2^(2/3) times the length.
 */
const LINE_LENGTH_RATIO = 2 ** (2 / 3);
/** Averages over random excitation, and taps, count by their square root: half takes four times as many. */
const AVERAGE_RATIO = 4;

/**
 * How much more of the same halves the standard deviation of what the reading found first; undefined where nothing was
 * found or more of the same does not help (a pass through a resonance is over in its time).
 * Misleads when taps differ more than the noise says: then softening or contact, not number, is the limit.
 */
export function moreToHalve(analysis: Analysis): MoreRecording | undefined {
  const { procedure, modes, tones, recording } = analysis;
  const [mode] = modes;
  if (procedure === 'tap' && mode !== undefined && mode.eventCount > 0) {
    return { kind: 'taps', extraTapCount: (AVERAGE_RATIO - 1) * mode.eventCount };
  }
  if (procedure === 'ambient' && mode !== undefined)
    return seconds((AVERAGE_RATIO - 1) * recording.durationS);
  if (procedure === 'running' && tones.length > 0)
    return seconds((LINE_LENGTH_RATIO - 1) * recording.durationS);
  return undefined;
}

function seconds(extraS: number): MoreRecording {
  return { kind: 'seconds', extraS: Math.ceil(extraS / STEP_S - 1e-9) * STEP_S };
}
