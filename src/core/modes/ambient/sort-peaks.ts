import type { RandomMode } from './find-random-modes.ts';

/** Envelopes below are steady lines (tone or resonance by the envelope; generated records, December 2026)... */
const LINE_VARIATION = 0.2;
/** ...and below this where the peak is no wider than a line of that duration: 2·zeta·f·T below `LINE_BANDWIDTHS`. */
const NARROW_LINE_VARIATION = 0.3;
const LINE_BANDWIDTHS = 4;
/** Peaks this near a stronger line are its drift or its skirt. */
const SKIRT_SHARE = 0.03;
/** A peak this near a multiple of a line belongs to it. */
const HARMONIC_SHARE = 0.012;
const MOST_HARMONICS = 12;
/** Peaks that are multiples of one frequency, at least so many of them consecutive: steps or strokes, no structure. */
const SERIES_LENGTH = 3;
/** Steps and strokes of people are slower than this (running, one foot: about 3.5 Hz). */
const FASTEST_STRIDE_HZ = 4;
/** Fewer half-power bandwidths in the record than this, or a wider spread of ln zeta, leave no honest damping. */
export const LEAST_BANDWIDTHS = 1.5;
export const MOST_DAMPING_LOG_SD = 0.6;

export interface SortedPeaks {
  readonly modes: readonly RandomMode[];
  readonly lines: readonly RandomMode[];
  /** Stand out, but too narrow for the record's length to tell mode from line or to give a damping. */
  readonly unresolved: readonly RandomMode[];
}

/**
 * Modes, forced lines, and what the record is too short to tell. A line has a steady envelope, or is a harmonic of one, or
 * one of a series of multiples. Misleads where a mode happens to sit on a multiple of a machine's line: it is then left out.
 * @param peaks strongest first
 */
export function sortPeaks(peaks: readonly RandomMode[]): SortedPeaks {
  const steady = peaks.filter(isSteady);
  const lines: RandomMode[] = [];
  for (const peak of steady) if (!lines.some((line) => isSkirt(peak, line))) lines.push(peak);
  const rest = peaks.filter((p) => !steady.includes(p) && !lines.some((line) => isSkirt(p, line)));
  const harmonics = rest.filter((p) => lines.some((line) => isMultiple(p.frequencyHz, line.frequencyHz)));
  const others = rest.filter((p) => !harmonics.includes(p));
  const series = harmonicSeries(others);
  const strides = harmonicSeries([...lines, ...harmonics, ...series]);
  const steps = others.filter((p) => !series.includes(p) && isStep(p, strides));
  const free = others.filter((p) => !series.includes(p) && !steps.includes(p));
  const resolved = (p: RandomMode): boolean =>
    p.bandwidthTimesDuration >= LEAST_BANDWIDTHS && p.dampingLogSd <= MOST_DAMPING_LOG_SD;
  return {
    modes: free.filter(resolved),
    lines: [...lines, ...harmonics, ...series, ...steps],
    unresolved: free.filter((p) => !resolved(p)),
  };
}

function isSteady(peak: RandomMode): boolean {
  if (peak.envelopeVariation === undefined) return false;
  const limit = peak.bandwidthTimesDuration < LINE_BANDWIDTHS ? NARROW_LINE_VARIATION : LINE_VARIATION;
  return peak.envelopeVariation < limit;
}

const isSkirt = (peak: RandomMode, line: RandomMode): boolean =>
  Math.abs(peak.frequencyHz / line.frequencyHz - 1) < SKIRT_SHARE;

function isMultiple(frequencyHz: number, baseHz: number): boolean {
  const order = Math.round(frequencyHz / baseHz);
  return (
    order >= 2 && order <= MOST_HARMONICS && Math.abs(frequencyHz / (order * baseHz) - 1) < HARMONIC_SHARE
  );
}

/**
 * Beside a series of steps, a peak within its own width of a multiple is one of them: a gait wanders by a per cent or two,
 * which widens its higher multiples.
 */
function isStep(peak: RandomMode, series: readonly RandomMode[]): boolean {
  const stepHz = Math.min(...series.map((p) => p.frequencyHz));
  if (!(stepHz < FASTEST_STRIDE_HZ)) return false;
  // Left and right foot differ: half the step rate is there as well.
  const baseHz = stepHz / 2;
  const order = Math.round(peak.frequencyHz / baseHz);
  const off = Math.abs(peak.frequencyHz / (Math.max(1, order) * baseHz) - 1);
  return order <= 2 * MOST_HARMONICS && off < Math.max(HARMONIC_SHARE, peak.dampingRatio);
}

/** Longest run of consecutive multiples of one of the peaks (or of half of it: left and right foot differ). */
function harmonicSeries(peaks: readonly RandomMode[]): RandomMode[] {
  let best: RandomMode[] = [];
  for (const base of peaks)
    for (const baseHz of [base.frequencyHz, base.frequencyHz / 2]) {
      const run: RandomMode[] = [];
      for (let order = 1; order <= MOST_HARMONICS; order++) {
        const member = peaks.find((p) => Math.abs(p.frequencyHz / (order * baseHz) - 1) < HARMONIC_SHARE);
        if (member) run.push(member);
        else if (run.length) break;
      }
      if (run.length > best.length) best = run;
    }
  return best.length >= SERIES_LENGTH ? best : [];
}
