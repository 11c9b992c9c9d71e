import { STANDARD_DEVIATIONS_95 } from '../model/interval.ts';
import type { Mode } from '../model/analysis.ts';
import type { Doubt, DoubtCode, Trust } from '../model/doubt.ts';

/** How much a doubt takes away: grave alone makes a reading poor, moderate makes it fair, slight ones only together. */
export type DoubtWeight = 'grave' | 'moderate' | 'slight' | 'none';

/** Our own ranking (judgement, no source): grave where frequency itself may be wrong, moderate where damping or strength may. */
export const DOUBT_WEIGHTS: Readonly<Record<DoubtCode, DoubtWeight>> = {
  'phone-moved': 'grave',
  'contact-loss': 'grave',
  'low-signal': 'grave',
  'poor-fit': 'grave',
  'one-decay-close-modes': 'grave',
  'fold-undecided': 'moderate',
  folded: 'moderate',
  clipped: 'moderate',
  'tap-scatter': 'moderate',
  'methods-disagree': 'moderate',
  'near-resolution': 'moderate',
  'loose-and-strong': 'moderate',
  rocking: 'moderate',
  short: 'moderate',
  'band-edge': 'moderate',
  'sweep-fast': 'moderate',
  'gravity-scale': 'moderate',
  'tilt-leak': 'moderate',
  'phone-mass': 'slight',
  beating: 'moderate',
  'coarse-step': 'moderate',
  'few-taps': 'moderate',
  'amplitude-dependent': 'slight',
  gaps: 'slight',
  repeats: 'slight',
  'late-stamps': 'slight',
  polled: 'moderate',
  interrupted: 'slight',
  stalled: 'slight',
  'running-resonance': 'moderate',
  'other-procedure': 'moderate',
  'mounting-unknown': 'slight',
  'half-power-refused': 'none',
  practice: 'none',
};

/** So many moderate doubts together weigh as a grave one, so many slight ones as a moderate one. Our own judgement. */
export const MODERATE_FOR_POOR = 4;
export const SLIGHT_FOR_FAIR = 3;
/** Relative 95 % half-width of the damping ratio above which a mode is fair, poor. Our own judgement. */
export const DAMPING_FAIR_RATIO = 0.4;
export const DAMPING_POOR_RATIO = 1;
/** The same of the frequency: beyond 2 % a ratio verdict is mostly uncertainty, beyond the coincidence width it is nothing else. */
export const FREQUENCY_FAIR_RATIO = 0.02;
export const FREQUENCY_POOR_RATIO = 0.05;

const ORDER: readonly Trust[] = ['good', 'fair', 'poor'];
export const worseTrust = (a: Trust, b: Trust): Trust => (ORDER.indexOf(a) > ORDER.indexOf(b) ? a : b);

function trustOfSpread(mode: Mode): Trust {
  const frequency = (STANDARD_DEVIATIONS_95 * mode.frequencySdHz) / mode.frequencyHz;
  const damping = (STANDARD_DEVIATIONS_95 * mode.dampingRatioSd) / mode.dampingRatio;
  if (frequency > FREQUENCY_POOR_RATIO || damping > DAMPING_POOR_RATIO) return 'poor';
  return frequency > FREQUENCY_FAIR_RATIO || damping > DAMPING_FAIR_RATIO ? 'fair' : 'good';
}

function trustOfCodes(codes: ReadonlySet<DoubtCode>): Trust {
  const counts = { grave: 0, moderate: 0, slight: 0, none: 0 };
  for (const code of codes) counts[DOUBT_WEIGHTS[code]] += 1;
  if (counts.grave > 0 || counts.moderate >= MODERATE_FOR_POOR) return 'poor';
  return counts.moderate > 0 || counts.slight >= SLIGHT_FOR_FAIR ? 'fair' : 'good';
}

/**
 * What the doubts leave of a reading. The strongest mode is what the reading is about: its own doubts, its spread and a fold that is
 * not `direct` count; weaker modes carry their doubts themselves (`trustOfMode`).
 * @param modes sorted by strength, as in an analysis
 */
export function combineTrust(doubts: readonly Doubt[], modes: readonly Mode[]): Trust {
  const codes = new Set<DoubtCode>(doubts.map((doubt) => doubt.code));
  const strongest = modes[0];
  if (!strongest) return trustOfCodes(codes);
  for (const code of strongest.doubts) codes.add(code);
  return worseTrust(trustOfCodes(codes), trustOfFoldAndSpread(strongest));
}

/** Trust in one mode alone: its doubts, its spread, its fold. */
export function trustOfMode(mode: Mode): Trust {
  return worseTrust(trustOfCodes(new Set(mode.doubts)), trustOfFoldAndSpread(mode));
}

const trustOfFoldAndSpread = (mode: Mode): Trust =>
  worseTrust(trustOfSpread(mode), mode.fold.verdict === 'direct' ? 'good' : 'fair');
