import type { Procedure } from '../../model/analysis.ts';
import type { ConditionedSignal } from '../../signal/condition-recording.ts';
import { findRandomModes, recordSpectra, sortPeaks } from '../ambient.ts';
import type { RandomMode } from '../ambient.ts';
import { trackLine } from '../coastdown/line-track.ts';
import { energyShape } from './energy-shape.ts';
import { withoutSteadyLines } from './without-steady-lines.ts';

/** Rise less fall, plus a share of the rise over that of random motion: above the sum the record was struck. Generated records. */
const STRUCK_SCORE = 1.25;
const RISE_WEIGHT = 0.4;
const RANDOM_RISE = 1.5;
/** A rise this sudden (e⁴ in a third of a second) is a blow, whatever falls after. */
const BLOW_RISE = 4;
/** A record that is loudest at its start and falls by this (ln of energy, first to last tenth) is one decay. */
const DECAY_DECLINE = 2;
const DECAY_LOUDEST_AT = 0.06;
/** A line that falls by this ratio over the record, clear for this share of it, is a machine running down. */
const RUN_DOWN_RATIO = 1.3;
const CLEAR_POINT = 1.6;
const CLEAR_SHARE = 0.25;
/** Scatter of the tracked line about a bent curve, share of its fall: a path through noise jumps. */
const TRACK_SCATTER_SHARE = 0.08;
/** Less than this share of the energy beside steady lines is no blow. */
const LEAST_LEFT_SHARE = 1e-3;
/** Longest stretch looked at, s: recognition must not cost more than the analysis. */
const LOOKED_AT_S = 300;
/** ... and to contradict a person, s. */
const CHECKED_S = 60;
/** Peaks narrower than this many half-power bandwidths are lines as far as the record can tell. */
const LINE_BANDWIDTHS = 1.5;

/**
 * Which procedure a record was taken with: struck (tap), a falling line (coast-down), steady lines (running), or random
 * motion (ambient). Misleads where several are true at once: a tapped machine that runs down, a resonance shaken by a
 * machine's own noise (called ambient), a structure walked on (called running, since its lines are forced).
 */
export function recogniseProcedure(conditioned: ConditionedSignal): Procedure {
  if (isStruck(conditioned)) return 'tap';
  if (isRunningDown(conditioned)) return 'coastdown';
  return strongestIsLine(conditioned) ? 'running' : 'ambient';
}

/**
 * Which procedure a record was plainly taken with, where it is another than the one asked for: struck records taken as
 * running or ambient, records without a blow taken as taps, run-downs taken as steady. Undefined where nothing speaks against it.
 */
export function otherProcedure(conditioned: ConditionedSignal, asked: Procedure): Procedure | undefined {
  // A coast-down asks for a falling line itself and refuses records without.
  if (asked === 'coastdown') return undefined;
  if (asked === 'tap' ? isStruck(conditioned) : isStruck(conditioned, CHECKED_S))
    return asked === 'tap' ? undefined : 'tap';
  if (isRunningDown(conditioned, CHECKED_S)) return 'coastdown';
  if (asked !== 'tap') return undefined;
  return strongestIsLine(conditioned) ? 'running' : 'ambient';
}

/** Variance over that of the sensor's own noise, as it stands between a tenth and 0.42 of the rate, up to which nothing moved. */
const REST_VARIANCE_RATIO = 1.5;

/** Nothing but the sensor's own noise on any axis. Misleads where broad-band shaking fills the whole band evenly. */
export function isAtRest(conditioned: ConditionedSignal): boolean {
  const { facts, accelerationMps2 } = conditioned;
  return accelerationMps2.every((axis, a) => {
    const variance = axis.reduce((sum, v) => sum + v * v, 0) / axis.length;
    return variance <= (REST_VARIANCE_RATIO * facts.noiseMps2PerRootHz[a]! ** 2 * facts.rateHz) / 2;
  });
}

function lookedAt(conditioned: ConditionedSignal, longestS = LOOKED_AT_S): Float64Array[] {
  const { grid } = conditioned;
  const most = Math.round(longestS / grid.periodS);
  return grid.accelerationMps2.map((axis) => (axis.length > most ? axis.subarray(0, most) : axis));
}

function isStruck(conditioned: ConditionedSignal, longestS?: number): boolean {
  const { periodS } = conditioned.grid;
  const axes = lookedAt(conditioned, longestS);
  const left = withoutSteadyLines(axes, periodS);
  // Next to nothing but lines: what is left is the error of taking them off.
  if (energyOf(left) < LEAST_LEFT_SHARE * energyOf(axes)) return false;
  const shape = energyShape(left, periodS);
  // Too short for anything but one decay.
  if (!shape) return true;
  if (shape.loudestAt < DECAY_LOUDEST_AT && shape.declineLog > DECAY_DECLINE) return true;
  if (shape.rise > BLOW_RISE) return true;
  return shape.rise - shape.fall + RISE_WEIGHT * (shape.rise - RANDOM_RISE) > STRUCK_SCORE;
}

const energyOf = (axes: readonly Float64Array[]): number =>
  axes.reduce((sum, axis) => sum + axis.reduce((s, v) => s + v * v, 0), 0);

function isRunningDown(conditioned: ConditionedSignal, longestS?: number): boolean {
  const { grid, facts } = conditioned;
  const axes = lookedAt(conditioned, longestS);
  const length = axes[0]?.length ?? 0;
  const cut = { ...grid, accelerationMps2: axes, present: grid.present.subarray(0, length) };
  const track = trackLine(cut, 0.48 * facts.rateHz, 'falling');
  if (!track) return false;
  const clear = [...track.frequencyHz.keys()].filter((k) => (track.clarity[k] as number) > CLEAR_POINT);
  if (clear.length < CLEAR_SHARE * track.frequencyHz.length) return false;
  const at = (k: number): number => track.frequencyHz[k] as number;
  const firstHz = medianOf(clear.slice(0, Math.ceil(clear.length / 10)).map(at));
  const lastHz = medianOf(clear.slice(-Math.ceil(clear.length / 10)).map(at));
  if (firstHz < RUN_DOWN_RATIO * lastHz) return false;
  return scatterShare(clear.map((k) => [k, at(k)])) < TRACK_SCATTER_SHARE;
}

/** Mean step between neighbouring clear points that is not explained by their neighbours, as a share of the whole fall. */
function scatterShare(points: readonly (readonly [number, number])[]): number {
  let jump = 0;
  let fall = 0;
  for (let i = 1; i < points.length; i++) {
    const [k0, f0] = points[i - 1] as readonly [number, number];
    const [k1, f1] = points[i] as readonly [number, number];
    const step = Math.abs(f1 - f0);
    fall += step;
    // A fall of more than a tenth of the frequency within neighbouring frames is a jump from one line to another.
    if (step > 0.1 * f0 && k1 - k0 < 4) jump += step;
  }
  return fall > 0 ? jump / fall : 1;
}

function medianOf(values: readonly number[]): number {
  const sorted = [...values].sort((a, b) => a - b);
  return sorted[sorted.length >> 1] ?? 0;
}

/** Power under a peak: height times half-power width. */
const power = (peak: RandomMode): number => peak.peakPerHz * peak.dampingRatio * peak.frequencyHz;

function strongestIsLine(conditioned: ConditionedSignal): boolean {
  const { grid, facts } = conditioned;
  const spectra = recordSpectra(lookedAt(conditioned), grid.periodS);
  const band = [facts.usableBandHz[0], 0.48 * facts.rateHz] as const;
  const { modes, lines, unresolved } = sortPeaks(findRandomModes(spectra, band));
  const narrow = unresolved.filter((p) => p.bandwidthTimesDuration < LINE_BANDWIDTHS);
  const strongest = (peaks: readonly RandomMode[]): number => Math.max(0, ...peaks.map(power));
  return strongest([...lines, ...narrow]) > strongest(modes);
}
