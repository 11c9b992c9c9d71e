import type { AnalysisSettings, TimingFacts } from '../model/analysis.ts';
import { clockLine, spread } from './clock-line.ts';
import { likelihoodAt, slopeProfile } from './jitter-slope.ts';
import { countSamples } from './sample-counter.ts';
import { slowPart } from './drift.ts';
import { principalDirection } from './linear-algebra.ts';
import { toneEnvelope, withoutTone } from './tone-envelope.ts';
import { averagedDensity } from './spectrum.ts';
import { uniformSignal } from './uniform-grid.ts';

/**
 * Scatter about the clock (robust: late bursts do not count) beyond this share of the period: there is no steady clock to be
 * found, the stamps are all there is.
 */
const NO_CLOCK_PERIODS = 0.6;
/** Scatter below which stamps and clock give the same answer, s (0.1 ms at 25 Hz is 0.9° of phase). */
const NEGLIGIBLE_SCATTER_S = 1e-4;
/** Log-likelihood range over the shares below which the record does not tell (chi-square 6 on one degree of freedom). */
const TELLING_LOG_LIKELIHOOD = 3;
/** All true or all late is kept unless another share is better by this log likelihood (two standard deviations). */
const SIMPLE_LOG_LIKELIHOOD = 2;
/** Shares this near 0 or 1 are taken as 0 or 1. */
const SNAP_SHARE = 0.05;
/** Lines used for the decision, and how far a line must stand out of the median density. */
const LINES_USED = 4;
const LINE_ABOVE_MEDIAN = 12;
const SHARES = Float64Array.from({ length: 21 }, (_, i) => i / 20);

export interface TimeBase {
  /** Times decided for, s. */
  readonly timeS: Float64Array;
  /** Steady clock, s, and stamp minus clock, s. */
  readonly clockS: Float64Array;
  readonly deviationS: Float64Array;
  readonly count: Int32Array;
  readonly periodS: number;
  readonly losses: readonly { readonly index: number; readonly lostCount: number }[];
  readonly timing: Omit<TimingFacts, 'repeatCount'>;
  /** False where the stamps show no steady clock: nothing can then be told from their scatter. */
  readonly hasClock: boolean;
  /** False where nothing in the record tells stamps from clock, or there is no steady clock. */
  readonly isDecided: boolean;
}

/**
 * Times of the samples: stamps, a steady clock behind late stamps, or a mixture clock + ρ·(stamp - clock), by the
 * likelihood of ρ under the strongest lines of the record (each free in amplitude and phase every second or so).
 * @param stampsS stamps of the samples kept, s, not decreasing, length n >= 4
 * @param axes acceleration per axis, m/s²
 */
export function estimateTimeBase(
  stampsS: Float64Array,
  axes: readonly Float32Array[],
  timing: AnalysisSettings['timing'],
): TimeBase {
  const counted = countSamples(stampsS);
  const line = clockLine(stampsS, counted.count, counted.periodS);
  const hasClock = spread(line.deviationS) < NO_CLOCK_PERIODS * counted.periodS;
  const base = hasClock
    ? { ...counted, ...line }
    : { ...countByTime(stampsS, counted.periodS), scatterSdS: line.scatterSdS };
  const share =
    timing === 'stamps' || !hasClock
      ? 1
      : timing === 'clock'
        ? 0
        : line.scatterSdS < NEGLIGIBLE_SCATTER_S
          ? 1
          : undefined;
  const found = share === undefined ? estimateTrueShare(base, axes) : undefined;
  const trueShare = share ?? found ?? defaultShare(stampsS, counted.periodS);
  return {
    ...base,
    timeS: Float64Array.from(base.clockS, (c, i) => c + trueShare * (base.deviationS[i] as number)),
    timing: {
      model: trueShare > 0.9 ? 'stamps' : trueShare < 0.1 ? 'clock' : 'mixed',
      trueShare,
      scatterSdS: line.scatterSdS,
      gapCount: base.losses.length,
    },
    hasClock,
    isDecided: hasClock && (share !== undefined || found !== undefined),
  };
}

/** Where no steady clock exists: the grid is only a ruler, each stamp its own clock reading. */
function countByTime(
  stampsS: Float64Array,
  periodS: number,
): Omit<TimeBase, 'timeS' | 'timing' | 'hasClock' | 'isDecided'> {
  const n = stampsS.length;
  const start = stampsS[0] as number;
  const count = new Int32Array(n);
  const losses: { index: number; lostCount: number }[] = [];
  for (let i = 1; i < n; i++) {
    const k = Math.round(((stampsS[i] as number) - start) / periodS);
    count[i] = Math.max((count[i - 1] as number) + 1, k);
    const lost = Math.round(((stampsS[i] as number) - (stampsS[i - 1] as number)) / periodS) - 1;
    if (lost >= 2) losses.push({ index: i, lostCount: lost });
  }
  const clockS = Float64Array.from(count, (k) => start + k * periodS);
  return {
    clockS,
    deviationS: Float64Array.from(stampsS, (t, i) => t - (clockS[i] as number)),
    count,
    periodS,
    losses,
  };
}

/** Stamps that repeat or nearly do cannot be sampling instants; otherwise a stamp is taken at its word. */
function defaultShare(stampsS: Float64Array, periodS: number): number {
  let crowded = 0;
  for (let i = 1; i < stampsS.length; i++)
    if ((stampsS[i] as number) - (stampsS[i - 1] as number) < 0.1 * periodS) crowded++;
  return crowded > 0.001 * stampsS.length ? 0 : 1;
}

/** Samples the decision is taken on; of a longer record the middle is used (the share is the phone's, not the moment's). */
const DECISION_SAMPLES = 40_000;

type Counted = Pick<TimeBase, 'clockS' | 'deviationS' | 'count' | 'periodS'>;

function estimateTrueShare(whole: Counted, allAxes: readonly Float32Array[]): number | undefined {
  const { base, axes } = middleOf(whole, allAxes);
  const rateHz = 1 / base.periodS;
  const still = axes.map((axis) => {
    const slow = slowPart(axis, rateHz);
    return Float64Array.from(axis, (v, i) => v - (slow[i] as number));
  });
  const total = new Float64Array(SHARES.length);
  let rest: readonly Float64Array[] = still;
  for (const frequencyHz of strongestLines({ ...base, timeS: base.clockS, accelerationMps2: still })) {
    const blockS = Math.max(0.6, Math.min(2, 6 / frequencyHz));
    const profile = slopeProfile(
      { ...base, samples: principalSamples(rest, base.clockS, frequencyHz, blockS) },
      frequencyHz,
      blockS,
      1.1 * rateHz,
    );
    SHARES.forEach((share, i) => {
      total[i] =
        (total[i] as number) +
        Math.max(
          likelihoodAt(profile, share * frequencyHz),
          likelihoodAt(profile, share * (frequencyHz - rateHz)),
        );
    });
    // The next line must not meet this one as structured noise; as fitted, scatter and all.
    const stampsS = Float64Array.from(base.clockS, (c, i) => c + (base.deviationS[i] as number));
    const timed = { timeS: stampsS, clockS: base.clockS, accelerationMps2: rest };
    rest = withoutTone(timed, frequencyHz, profile.bestHz, blockS);
  }
  let best = 0;
  for (let i = 1; i < total.length; i++) if ((total[i] as number) > (total[best] as number)) best = i;
  const top = total[best] as number;
  if (top - Math.min(...total) < TELLING_LOG_LIKELIHOOD) return undefined;
  return refinedShare(total, best);
}

function middleOf(
  whole: Counted,
  axes: readonly Float32Array[],
): { readonly base: Counted; readonly axes: readonly Float32Array[] } {
  const n = whole.count.length;
  if (n <= DECISION_SAMPLES) return { base: whole, axes };
  const first = (n - DECISION_SAMPLES) >> 1;
  const end = first + DECISION_SAMPLES;
  const start = whole.count[first]!;
  return {
    base: {
      periodS: whole.periodS,
      clockS: whole.clockS.subarray(first, end),
      deviationS: whole.deviationS.subarray(first, end),
      count: whole.count.subarray(first, end).map((k) => k - start),
    },
    axes: axes.map((axis) => axis.subarray(first, end)),
  };
}

function refinedShare(total: Float64Array, best: number): number {
  const top = total[best] as number;
  if (top - (total[total.length - 1] as number) < SIMPLE_LOG_LIKELIHOOD) return 1;
  if (top - (total[0] as number) < SIMPLE_LOG_LIKELIHOOD) return 0;
  const stepShare = 1 / (SHARES.length - 1);
  const middle = Math.max(1, Math.min(total.length - 2, best));
  const [a, b, c] = [total[middle - 1], total[middle], total[middle + 1]] as [number, number, number];
  const bend = a - 2 * b + c;
  const shift = bend < 0 ? (0.5 * (a - c)) / bend : 0;
  const share = Math.max(0, Math.min(1, (middle + Math.max(-1, Math.min(1, shift))) * stepShare));
  if (share > 1 - SNAP_SHARE) return 1;
  return share < SNAP_SHARE ? 0 : share;
}

/** Samples along the principal direction of a line: that of its block amplitudes on the clock. */
function principalSamples(
  axes: readonly Float64Array[],
  clockS: Float64Array,
  frequencyHz: number,
  blockS: number,
): Float64Array {
  const { re, im } = toneEnvelope(
    { timeS: clockS, clockS, accelerationMps2: axes },
    frequencyHz,
    frequencyHz,
    blockS,
  );
  const products = re.map((_, a) =>
    re.map((__, b) => {
      let sum = 0;
      for (let i = 0; i < re[0]!.length; i++) sum += re[a]![i]! * re[b]![i]! + im[a]![i]! * im[b]![i]!;
      return sum;
    }),
  );
  const direction = principalDirection(products);
  const out = new Float64Array(clockS.length);
  axes.forEach((axis, a) => {
    for (let i = 0; i < out.length; i++) out[i]! += direction[a]! * axis[i]!;
  });
  return out;
}

/** Strongest narrow lines of any axis, apart from each other, on the clock's grid. */
function strongestLines(signal: Parameters<typeof uniformSignal>[0]): number[] {
  const grid = uniformSignal(signal);
  const density = averagedDensity(grid.accelerationMps2, grid.periodS, Math.round(8 / grid.periodS));
  const found: { axis: number; bin: number; height: number }[] = [];
  const lowest = Math.ceil(1 / density.stepHz);
  density.densityPerHz.forEach((d, axis) => {
    const floor = Float64Array.from(d).sort()[d.length >> 1] as number;
    for (let k = lowest; k < d.length - 2; k++) {
      const v = d[k] as number;
      if (v > LINE_ABOVE_MEDIAN * floor && v >= (d[k - 1] as number) && v > (d[k + 1] as number))
        found.push({ axis, bin: k, height: v });
    }
  });
  found.sort((a, b) => b.height - a.height);
  const apart = Math.ceil((3 * density.resolutionHz) / density.stepHz);
  const lines: typeof found = [];
  for (const peak of found) {
    if (lines.length >= LINES_USED) break;
    if (lines.every((other) => Math.abs(other.bin - peak.bin) > apart)) lines.push(peak);
  }
  return lines.map(
    ({ axis, bin }) => centreBin(density.densityPerHz[axis] as Float64Array, bin) * density.stepHz,
  );
}

/** Power-weighted centre of a peak and its two neighbours to each side, bins. */
function centreBin(density: Float64Array, bin: number): number {
  let sum = 0;
  let moment = 0;
  for (let k = Math.max(0, bin - 2); k <= Math.min(density.length - 1, bin + 2); k++) {
    sum += density[k] as number;
    moment += k * (density[k] as number);
  }
  return moment / sum;
}
