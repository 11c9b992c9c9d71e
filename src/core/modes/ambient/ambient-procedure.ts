import type { AnalysisSettings, DampingCheck, Mode, Tone } from '../../model/analysis.ts';
import type { Doubt, DoubtCode } from '../../model/doubt.ts';
import { failure, success } from '../../model/outcome.ts';
import type { Outcome } from '../../model/outcome.ts';
import type { ConditionedSignal } from '../../signal/condition-recording.ts';
import { foldOfMode, foldOfTone } from '../fold.ts';
import type { ProcedureAnswer } from '../procedure-answer.ts';
import { findRandomModes } from './find-random-modes.ts';
import type { RandomMode } from './find-random-modes.ts';
import { halfPowerOfDensity } from './half-power-of-density.ts';
import { periodogramAlong, recordSpectra } from './record-spectra.ts';
import type { RecordSpectra } from './record-spectra.ts';
import { LEAST_BANDWIDTHS, sortPeaks } from './sort-peaks.ts';

/** Shorter records hold no averages at all, s. */
export const SHORTEST_AMBIENT_S = 20;
/** Below this many half-power bandwidths in the record the damping is said to be short of data (relative sd above about 30 %). */
const SHORT_BANDWIDTHS = 5;
/** Standard deviations are widened by this: what the model leaves out (low-pass, force not white, clock); generated records cover 95 to 97 %. */
const FREQUENCY_WIDENING = 1.15;
const DAMPING_WIDENING = 1.08;
/** A peak less than this above its floor is said to be weak (density ratio). */
const WEAK_PEAK = 6;
/** A mode above this share of the rate sits where the sensor's low-pass bends the band. */
const EDGE_RATE_SHARE = 0.38;
/** Half-power and likelihood further apart than this are said to disagree. */
const DISAGREEMENT_SHARE = 0.5;
/** The least-known damping still called known: natural-log sd at which the duration needed is stated. */
const WANTED_BANDWIDTHS = 10;

/**
 * Modes under random excitation (wind, traffic, footsteps far off): maximum likelihood in the frequency domain.
 * Refuses when nothing stands out (`no-mode`), when the record is too short for any honest damping (`too-short`).
 */
export function ambientProcedure(
  conditioned: ConditionedSignal,
  _settings: AnalysisSettings,
): Outcome<ProcedureAnswer> {
  const { facts, grid } = conditioned;
  if (facts.durationS < SHORTEST_AMBIENT_S)
    return failure('too-short', { durationS: facts.durationS, neededS: SHORTEST_AMBIENT_S });
  const spectra = recordSpectra(grid.accelerationMps2, grid.periodS);
  const peaks = findRandomModes(spectra, facts.usableBandHz);
  const { modes, lines, unresolved } = sortPeaks(peaks);
  if (!modes.length && !lines.length) {
    const widest = unresolved[0];
    if (!widest) return failure('no-mode', { durationS: facts.durationS });
    return failure('too-short', {
      durationS: facts.durationS,
      frequencyHz: widest.frequencyHz,
      neededS: neededDuration(widest, facts.durationS),
    });
  }
  const found = modes.map((mode) => modeOf(conditioned, mode));
  return success({
    modes: found.sort((a, b) => b.amplitudeMps2 - a.amplitudeMps2),
    tones: lines
      .map((line) => toneOf(conditioned, spectra, line))
      .sort((a, b) => b.amplitudeMps2 - a.amplitudeMps2),
    broadPeaks: [],
    tapTimesS: [],
    doubts: recordDoubts(modes, unresolved, facts.durationS),
    ringDowns: [],
  });
}

/** Duration that would hold enough bandwidths of a peak; a peak narrower than the resolution is taken at the resolution. */
function neededDuration(peak: RandomMode, durationS: number): number {
  const bandwidths = Math.max(peak.bandwidthTimesDuration, LEAST_BANDWIDTHS / 3);
  return (durationS * WANTED_BANDWIDTHS) / bandwidths;
}

function recordDoubts(
  modes: readonly RandomMode[],
  unresolved: readonly RandomMode[],
  durationS: number,
): Doubt[] {
  const short = [...modes.filter((m) => m.bandwidthTimesDuration < SHORT_BANDWIDTHS), ...unresolved];
  if (!short.length) return [];
  const neededS = Math.max(...short.map((m) => neededDuration(m, durationS)));
  return [{ code: 'short', facts: { durationS, neededS } }];
}

export function modeOf(conditioned: ConditionedSignal, mode: RandomMode): Mode {
  const { grid, facts } = conditioned;
  const { frequencyHz, dampingRatio, direction } = mode;
  const along = Float64Array.from({ length: grid.present.length }, (_, k) =>
    grid.accelerationMps2.reduce((sum, axis, a) => sum + (axis[k] as number) * (direction[a] as number), 0),
  );
  const halfPower = halfPowerOfDensity(along, grid.periodS, frequencyHz, dampingRatio);
  const fold = foldOfMode(conditioned, { frequencyHz, dampingRatio, direction }, []);
  const verticalShare = facts.up
    ? facts.up.reduce((sum, u, a) => sum + u * (direction[a] as number), 0) ** 2
    : undefined;
  const foldDoubt: DoubtCode[] =
    fold.verdict === 'folded' ? ['folded'] : fold.verdict === 'undecided' ? ['fold-undecided'] : [];
  return {
    frequencyHz,
    frequencySdHz: FREQUENCY_WIDENING * mode.frequencySdHz,
    dampingRatio,
    dampingRatioSd: DAMPING_WIDENING * mode.dampingLogSd * dampingRatio,
    amplitudeMps2: Math.sqrt(Math.PI * mode.peakPerHz * dampingRatio * frequencyHz),
    direction,
    ...(verticalShare === undefined ? {} : { verticalShare }),
    method: 'ambient-likelihood-debiased',
    eventCount: 1,
    halfPower,
    fold,
    doubts: [...modeDoubts(mode, halfPower, facts.rateHz), ...foldDoubt],
  };
}

function modeDoubts(mode: RandomMode, halfPower: DampingCheck, rateHz: number): DoubtCode[] {
  const doubts: DoubtCode[] = [];
  if (mode.bandwidthTimesDuration < SHORT_BANDWIDTHS) doubts.push('near-resolution');
  if (mode.peakPerHz < WEAK_PEAK * mode.floorPerHz) doubts.push('low-signal');
  if (mode.frequencyHz > EDGE_RATE_SHARE * rateHz) doubts.push('band-edge');
  if ('refusal' in halfPower) doubts.push('half-power-refused');
  else if (Math.abs(Math.log(halfPower.dampingRatio / mode.dampingRatio)) > DISAGREEMENT_SHARE)
    doubts.push('methods-disagree');
  return doubts;
}

/** A forced line met in an ambient record, read off its peak: half the power of a sine of that amplitude. */
function toneOf(conditioned: ConditionedSignal, spectra: RecordSpectra, line: RandomMode): Tone {
  const { frequencyHz, direction } = line;
  const periodogram = periodogramAlong(spectra, direction);
  const reach = Math.ceil(Math.max(0.02 * frequencyHz, 4 * spectra.stepHz) / spectra.stepHz);
  const centre = Math.round(frequencyHz / spectra.stepHz);
  let power = 0;
  for (let k = Math.max(1, centre - reach); k <= Math.min(spectra.binCount - 1, centre + reach); k++)
    power += Math.max(0, (periodogram[k] as number) - line.floorPerHz) * spectra.stepHz;
  const amplitudeMps2 = Math.sqrt(2 * power);
  const sampleCount = conditioned.facts.sampleCount;
  const noiseVariance = (line.floorPerHz * conditioned.facts.rateHz) / 2;
  const durationS = conditioned.facts.durationS;
  // Cramér-Rao bound of a line's frequency (Rife & Boorstyn 1974); a drifting one is known to its width only.
  const boundHz =
    Math.sqrt((6 * noiseVariance) / sampleCount) / (Math.PI * durationS * Math.max(amplitudeMps2, 1e-9));
  const widthHz = line.dampingRatio * frequencyHz;
  return {
    frequencyHz,
    frequencySdHz: Math.max(
      boundHz,
      line.bandwidthTimesDuration > 1 ? widthHz : 0,
      // A line narrower than the record resolves has no width to be fitted: then half a bin is all that is known.
      Number.isFinite(line.frequencySdHz) ? line.frequencySdHz : spectra.stepHz / 2,
    ),
    amplitudeMps2,
    amplitudeSdMps2: Math.sqrt((2 * noiseVariance) / sampleCount),
    direction,
    nature: line.envelopeVariation !== undefined && line.envelopeVariation < 0.12 ? 'forced' : 'mixed',
    fold: foldOfTone(conditioned, { frequencyHz, direction }),
  };
}
