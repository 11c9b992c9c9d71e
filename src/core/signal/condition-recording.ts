import type { AnalysisSettings, RecordingFacts } from '../model/analysis.ts';
import { failure, success, type Outcome } from '../model/outcome.ts';
import type { Recording } from '../model/recording.ts';
import { slowPart } from './drift.ts';
import { screenSamples, type Screening } from './sample-screening.ts';
import { clippedCount, gravityOf, roundingStep } from './sensor-facts.ts';
import { averagedDensity } from './spectrum.ts';
import { estimateTimeBase, type TimeBase } from './time-base.ts';
import { uniformSignal, type UniformSignal } from './uniform-grid.ts';

/** Fewer samples than this, or less time, cannot be conditioned at all. */
export const FEWEST_SAMPLES = 32;
export const SHORTEST_RECORD_S = 0.25;
/** Upper end of the usable band as a share of the rate: 25 Hz of 60, where sensor low-pass and interpolation still hold. */
export const USABLE_RATE_SHARE = 0.42;
/** Lower end of the usable band, Hz: below, drift removal bites and tilt passes for motion. */
const LOWEST_USABLE_HZ = 0.3;
/** Periods of the lowest usable frequency that the record must hold. */
const LOWEST_USABLE_CYCLES = 3;
/** Lowest quantile of the averaged density taken as the sensor's floor, and what it reads of the mean for 16 averages and more. */
const FLOOR_QUANTILE = 0.2;
const FLOOR_OF_MEAN = 0.8;

/** A recording made ready: what every procedure works on. Times in s on the recording's own axis. */
export interface ConditionedSignal {
  readonly axes: Recording['axes'];
  /** Times decided by the time base, not decreasing; length n. */
  readonly timeS: Float64Array;
  /** Gravity, tilt and drift (below about 0.2 Hz) removed; one array of length n per axis. */
  readonly accelerationMps2: readonly Float64Array[];
  /** The slow part that was removed; sum of both is what the sensor gave. */
  readonly slowMps2: readonly Float64Array[];
  /** Steady clock behind the stamps and stamp minus clock, s; length n. */
  readonly clockS: Float64Array;
  readonly deviationS: Float64Array;
  /** Sample counter: grid index on the clock; strictly increasing. */
  readonly count: Int32Array;
  readonly periodS: number;
  /** Gap-free stretches [first, end) of indexes. */
  readonly segments: readonly (readonly [number, number])[];
  /** Row of the recording each sample came from. */
  readonly rows: Int32Array;
  /** False where the stamps show no steady clock at all (then times are the stamps). */
  readonly hasClock: boolean;
  readonly isTimeBaseDecided: boolean;
  readonly isPolled: boolean;
  readonly lostCount: number;
  readonly facts: RecordingFacts;
  readonly sensor: Recording['sensor'];
  /** The same samples moved to the clock's grid, for spectra and searches. */
  readonly grid: UniformSignal;
}

/**
 * Screens, times and levels a recording.
 * @returns problem `no-samples`, `too-short` or `irregular-sampling` when nothing can be done with it
 */
export function conditionRecording(
  recording: Recording,
  timing: AnalysisSettings['timing'] = 'auto',
): Outcome<ConditionedSignal> {
  if (recording.accelerationMps2.length === 0) return failure('no-samples');
  const screening = screenSamples(recording);
  const { kept } = screening;
  const n = kept.length;
  if (n === 0) return failure('no-samples');
  const durationS =
    (recording.timeS[kept[n - 1] as number] as number) - (recording.timeS[kept[0] as number] as number);
  if (n < FEWEST_SAMPLES || durationS < SHORTEST_RECORD_S)
    return failure('too-short', { durationS, sampleCount: n });
  const stampsS = Float64Array.from(kept, (row) => recording.timeS[row] as number);
  const raw = recording.accelerationMps2.map((axis) => Float32Array.from(kept, (row) => axis[row] as number));
  const base = estimateTimeBase(stampsS, raw, timing);
  if (!(base.periodS > 0) || (base.count[n - 1] as number) > 50 * n)
    return failure('irregular-sampling', { sampleCount: n, durationS });
  return success(assemble(recording, screening, raw, base));
}

function assemble(
  recording: Recording,
  screening: Screening,
  raw: readonly Float32Array[],
  base: TimeBase,
): ConditionedSignal {
  const { timing, losses, isDecided, ...times } = base;
  const rateHz = 1 / base.periodS;
  const n = base.timeS.length;
  const slowMps2 = raw.map((axis) => slowPart(axis, rateHz));
  const accelerationMps2 = raw.map((axis, a) => {
    const slow = slowMps2[a] as Float64Array;
    return Float64Array.from(axis, (v, i) => v - (slow[i] as number));
  });
  const starts = [0, ...losses.map((loss) => loss.index)];
  const grid = uniformSignal({ ...times, accelerationMps2 });
  const durationS = (base.timeS[n - 1] as number) - (base.timeS[0] as number);
  const stepMps2 = raw.map(roundingStep);
  const facts: RecordingFacts = {
    sampleCount: n,
    durationS,
    rateHz,
    timing: { ...timing, repeatCount: screening.repeatCount },
    stepMps2,
    noiseMps2PerRootHz: noiseFloor(grid),
    clippedCount: clippedCount(raw, stepMps2),
    usableBandHz: [
      Math.min(USABLE_RATE_SHARE * rateHz, Math.max(LOWEST_USABLE_HZ, LOWEST_USABLE_CYCLES / durationS)),
      USABLE_RATE_SHARE * rateHz,
    ],
    ...gravityOf(raw),
  };
  return {
    ...times,
    axes: recording.axes,
    sensor: recording.sensor,
    accelerationMps2,
    slowMps2,
    segments: starts.map((first, s) => [first, starts[s + 1] ?? n] as const),
    rows: screening.kept,
    isTimeBaseDecided: isDecided,
    isPolled: screening.isPolled,
    lostCount: losses.reduce((sum, loss) => sum + loss.lostCount, 0),
    facts,
    grid,
  };
}

/** Sensor floor per axis, m/s² per root Hz: low quantile of the averaged density between a tenth and 0.42 of the rate. */
function noiseFloor(grid: UniformSignal): number[] {
  const segment = Math.max(32, Math.min(1024, Math.floor(grid.present.length / 8)));
  const density = averagedDensity(grid.accelerationMps2, grid.periodS, segment);
  return density.densityPerHz.map((d) => {
    const band = d
      .subarray(Math.floor(0.2 * d.length), Math.floor(2 * USABLE_RATE_SHARE * d.length))
      .slice()
      .sort();
    return Math.sqrt(Math.max(0, (band[Math.floor(FLOOR_QUANTILE * band.length)] ?? 0) / FLOOR_OF_MEAN));
  });
}
