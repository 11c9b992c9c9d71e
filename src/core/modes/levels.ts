import type { Levels, Tone } from '../model/analysis.ts';
import type { ConditionedSignal } from '../signal/condition-recording.ts';
import {
  bandMotion,
  edgeWeight,
  rmsWithin,
  weightedSamples,
  type BandMotion,
} from '../signal/integration.ts';
import { largestRunningRms, peak, rms } from '../signal/running-rms.ts';
import { weightingMagnitude, type WeightingKind } from '../signal/weighting.ts';
import { alongDirection } from './fold.ts';

/** Averaging time of the largest running rms (ISO 2631-1: MTVV) and of the equivalent sine peak (AISC design guide 11), s. */
const RUNNING_S = 1;
const SINE_PEAK_S = 2;
/** What is left out around a folded or undecided tone: its wandering and so many reciprocal durations. */
const LEFT_OUT_RESOLUTIONS = 3;
const LEFT_OUT_SHARE = 0.005;
/** Rounding of the transforms. */
const NO_VELOCITY_MPS = 1e-12;
/** Velocity is not given when less than this share of the acceleration's power is left after leaving tones out. */
const LEAST_LEFT_POWER = 0.25;

/**
 * Levels in the usable band. Acceleration and weighted values hold all that was recorded (folded tones at the wrong place);
 * velocity and displacement leave folded and undecided tones out, since integration would multiply their error.
 * Axes: vertical and two horizontal ones where gravity is known, else the sensor's. Velocity and displacement are of the
 * largest axis, `peakMps2` and `rmsMps2` of the vector.
 */
export function levelsOf(signal: ConditionedSignal, tones: readonly Tone[]): Levels {
  const { grid, facts } = signal;
  const n = grid.present.length;
  const up = facts.up;
  const leftOutHz = leftOutRanges(tones, facts.durationS);
  const frame = up
    ? uprightFrame(up)
    : signal.axes.map((_, a) => signal.axes.map((__, b) => (a === b ? 1 : 0)));
  const motions = frame.map((direction) =>
    bandMotion(
      alongDirection(grid.accelerationMps2, direction),
      grid.periodS,
      facts.usableBandHz,
      direction.reduce((sum, d, a) => sum + (d * facts.noiseMps2PerRootHz[a]!) ** 2, 0),
      leftOutHz,
    ),
  );
  const acceleration = motions.map((m) => m.accelerationMps2);
  const vertical = acceleration[0]!;
  const magnitude = vectorMagnitude(acceleration);
  const strongest = acceleration.reduce((best, axis) => (rms(axis) > rms(best) ? axis : best));
  const running = up ? vertical : strongest;
  const perS = 1 / grid.periodS;
  return {
    peakMps2: peak(magnitude),
    rmsMps2: rms(magnitude),
    ...integratedLevels(motions, leftOutHz, up !== undefined, facts.usableBandHz, grid.periodS),
    bandHz: facts.usableBandHz,
    runningRmsMaxMps2: largestRunningRms(running, RUNNING_S * perS),
    ...(up ? uprightLevels(motions, facts.usableBandHz, grid.periodS, n) : {}),
    leftOutTones: leftOutHz.length > 0,
  };
}

function leftOutRanges(tones: readonly Tone[], durationS: number): (readonly [number, number])[] {
  return tones
    .filter((tone) => tone.fold.verdict !== 'direct')
    .map((tone) => {
      const reach =
        LEFT_OUT_RESOLUTIONS / durationS +
        LEFT_OUT_SHARE * tone.frequencyHz +
        LEFT_OUT_RESOLUTIONS * (tone.frequencyDeviationHz ?? 0);
      return [tone.frequencyHz - reach, tone.frequencyHz + reach] as const;
    });
}

/** Vertical, the horizontal direction nearest to the sensor's first level axis, and the one across. */
function uprightFrame(up: readonly number[]): readonly (readonly number[])[] {
  const least = up.map(Math.abs).indexOf(Math.min(...up.map(Math.abs)));
  const unit = up.map((_, a) => (a === least ? 1 : 0));
  const level = unit.map((v, a) => v - up[least]! * up[a]!);
  const length = Math.hypot(...level);
  const first = level.map((v) => v / length);
  const [ux, uy, uz] = up as [number, number, number];
  const [fx, fy, fz] = first as [number, number, number];
  return [up, first, [uy * fz - uz * fy, uz * fx - ux * fz, ux * fy - uy * fx]];
}

function vectorMagnitude(axes: readonly Float64Array[]): Float64Array {
  const out = new Float64Array(axes[0]!.length);
  for (let i = 0; i < out.length; i++) {
    let square = 0;
    for (const axis of axes) square += axis[i]! * axis[i]!;
    out[i] = Math.sqrt(square);
  }
  return out;
}

function integratedLevels(
  motions: readonly BandMotion[],
  leftOutHz: readonly (readonly [number, number])[],
  hasVertical: boolean,
  bandHz: readonly [number, number],
  periodS: number,
): Partial<Levels> {
  if (leftOutHz.length && leftPowerShare(motions, leftOutHz, periodS) < LEAST_LEFT_POWER) return {};
  const velocities = motions.map((m) => m.velocityMps);
  const displacements = motions.map((m) => m.displacementM);
  const largest = (values: readonly number[]): number => Math.max(...values);
  const velocityRmsMps = largest(velocities.map(rms));
  // Nothing stood out of the floor: no velocity rather than a zero.
  if (velocityRmsMps < NO_VELOCITY_MPS) return {};
  const velocityPeakMps = largest(velocities.map(peak));
  return {
    velocityRmsMps,
    velocityPeakMps,
    displacementPeakM: largest(displacements.map(peak)),
    displacementRmsM: largest(displacements.map(rms)),
    largestAxisVelocityPeakMps: velocityPeakMps,
    ...(hasVertical ? { horizontalVelocityPeakMps: largest(velocities.slice(1).map(peak)) } : {}),
    ...machineLevels(motions, bandHz, periodS),
  };
}

/** Machine standards measure from here up (ISO 20816-3), Hz: slow sway of a building is not theirs. */
const MACHINE_LOWEST_HZ = 10;

/** Velocity and displacement of the largest axis from 10 Hz up; nothing where the band ends below. */
function machineLevels(
  motions: readonly BandMotion[],
  bandHz: readonly [number, number],
  periodS: number,
): Partial<Levels> {
  const upper = [Math.max(MACHINE_LOWEST_HZ, bandHz[0]), bandHz[1]] as const;
  if (upper[1] <= upper[0]) return {};
  const n = motions[0]!.velocityMps.length;
  return {
    velocityRmsFrom10HzMps: Math.max(...motions.map((m) => rmsWithin(m.velocitySpectrum, periodS, n, upper))),
    displacementRmsFrom10HzM: Math.max(
      ...motions.map((m) => rmsWithin(m.displacementSpectrum, periodS, n, upper)),
    ),
  };
}

/** Share of the acceleration's power outside the ranges left out. */
function leftPowerShare(
  motions: readonly BandMotion[],
  leftOutHz: readonly (readonly [number, number])[],
  periodS: number,
): number {
  let all = 0;
  let left = 0;
  for (const { spectrum } of motions) {
    const stepHz = 1 / (spectrum.size * periodS);
    for (let k = 1; k < spectrum.re.length; k++) {
      const power = spectrum.re[k]! ** 2 + spectrum.im[k]! ** 2;
      all += power;
      if (!leftOutHz.some(([low, high]) => k * stepHz > low && k * stepHz < high)) left += power;
    }
  }
  return all > 0 ? left / all : 0;
}

/** Values that need to know which way is up: vertical and horizontal peaks, ISO 2631-1 weighted values. */
function uprightLevels(
  motions: readonly BandMotion[],
  bandHz: readonly [number, number],
  periodS: number,
  n: number,
): Partial<Levels> {
  const weighted = motions.map(({ spectrum }, a) => {
    const kind: WeightingKind = a === 0 ? 'Wk' : 'Wd';
    return weightedSamples(spectrum, periodS, n, (f) => edgeWeight(f, bandHz) * weightingMagnitude(kind, f));
  });
  const rmsOf = weighted.map(rms);
  const peakAxis = rmsOf.indexOf(Math.max(...rmsOf));
  const horizontal = vectorMagnitude(motions.slice(1).map((m) => m.accelerationMps2));
  const vertical = motions[0]!.accelerationMps2;
  return {
    weightedVerticalRmsMps2: rmsOf[0]!,
    weightedHorizontalRmsMps2: Math.hypot(...rmsOf.slice(1)),
    weightedRunningRmsMaxMps2: Math.max(
      ...weighted.map((axis) => largestRunningRms(axis, RUNNING_S / periodS)),
    ),
    ...(rmsOf[peakAxis]! > 0 ? { crestFactorRatio: peak(weighted[peakAxis]!) / rmsOf[peakAxis]! } : {}),
    verticalPeakMps2: peak(vertical),
    horizontalPeakMps2: peak(horizontal),
    equivalentSinePeakMps2: Math.SQRT2 * largestRunningRms(vertical, SINE_PEAK_S / periodS),
  };
}
