import { windowSamples } from '../signal/window.ts';
import { nextPowerOfTwo, realTransform } from '../signal/fft.ts';
import type { UniformSignal } from '../signal/uniform-grid.ts';

/**
 * A mean over m independent ordinates of unit mean per axis is taken as a peak above 1 + 6.5/sqrt(m) + 7/m: for one ordinate
 * of three axes the gamma tail there is about 1e-8, so that a record of noise shows one in ten thousand.
 */
const PEAK_SIGMAS = 6.5;
const PEAK_TAIL = 7;
/** Widths over which the periodogram is averaged, reciprocal durations: lines that wander are spread that wide. */
const SEARCH_WIDTHS = [1, 6, 20] as const;
/** A search width reaches this share of the frequency to each side at most. */
const WIDEST_SHARE = 0.08;
/** Width over which the floor under a bin is taken, to each side: the larger of these, Hz and share of the frequency. */
const FLOOR_HALF_WIDTH_HZ = 1.5;
const FLOOR_HALF_WIDTH_SHARE = 0.12;
/** Median of a unit exponential. */
const EXPONENTIAL_MEDIAN = Math.LN2;

/** Whole-record periodogram of all axes, each divided by its own local floor: 1 per axis on average where there is only noise. */
export interface LineSpectrum {
  readonly stepHz: number;
  /** Mean over axes of power over floor. */
  readonly height: Float64Array;
  /** Bins per reciprocal duration (zero padding), and axes. */
  readonly binsPerResolution: number;
  readonly axisCount: number;
  /** Density floor per axis, (m/s²)²/Hz one-sided. */
  readonly floorPerHz: readonly Float64Array[];
  /** Power density summed over axes, (m/s²)²/Hz. */
  readonly densityPerHz: Float64Array;
}

export function lineSpectrum(grid: UniformSignal): LineSpectrum {
  const n = grid.present.length;
  const size = nextPowerOfTwo(n);
  const stepHz = 1 / (size * grid.periodS);
  const weights = windowSamples('hann', n);
  const scale = (2 * grid.periodS) / (0.375 * n);
  const axisCount = grid.accelerationMps2.length;
  const height = new Float64Array(size / 2 + 1);
  const densityPerHz = new Float64Array(size / 2 + 1);
  const floorPerHz = grid.accelerationMps2.map((axis) => {
    const { re, im } = realTransform(
      axis.map((v, i) => v * weights[i]!),
      size,
    );
    const density = re.map((r, k) => scale * (r * r + im[k]! * im[k]!));
    const floor = localFloor(density, stepHz);
    for (let k = 0; k < height.length; k++) {
      height[k]! += density[k]! / Math.max(floor[k]!, 1e-30) / axisCount;
      densityPerHz[k]! += density[k]!;
    }
    return floor;
  });
  return { stepHz, height, binsPerResolution: size / n, axisCount, floorPerHz, densityPerHz };
}

/** Running median of the density over a neighbourhood that a line or a light resonance does not fill, as a mean. */
function localFloor(density: Float64Array, stepHz: number): Float64Array {
  const bins = density.length;
  const floor = new Float64Array(bins);
  // The floor changes slowly: medians at a few hundred points, straight between.
  const knots: { at: number; value: number }[] = [];
  for (let at = 0; at < bins;) {
    const half = Math.max(
      8,
      Math.round(Math.max(FLOOR_HALF_WIDTH_HZ, FLOOR_HALF_WIDTH_SHARE * at * stepHz) / stepHz),
    );
    const low = Math.max(1, Math.min(at - half, bins - 1 - 2 * half));
    const high = Math.min(bins, Math.max(at + half, 1 + 2 * half) + 1);
    const stride = Math.max(1, Math.floor((high - low) / 400));
    const picked: number[] = [];
    for (let k = low; k < high; k += stride) picked.push(density[k]!);
    picked.sort((a, b) => a - b);
    knots.push({ at, value: picked[picked.length >> 1]! / EXPONENTIAL_MEDIAN });
    at += Math.max(4, half >> 2);
  }
  let j = 0;
  for (let k = 0; k < bins; k++) {
    while (j < knots.length - 2 && k > knots[j + 1]!.at) j++;
    const a = knots[j]!;
    const b = knots[Math.min(j + 1, knots.length - 1)]!;
    const share = b.at > a.at ? Math.min(1, (k - a.at) / (b.at - a.at)) : 0;
    floor[k] = (1 - share) * a.value + share * b.value;
  }
  return floor;
}

export interface Peak {
  readonly frequencyHz: number;
  /** Width it was found with, Hz. */
  readonly widthHz: number;
  /** Power above the floor within that width, (m/s²)². */
  readonly power: number;
}

/** Peaks that stand out of their floor, found with three widths, strongest first. Neighbours of a stronger one are kept out. */
export function findPeaks(spectrum: LineSpectrum, bandHz: readonly [number, number]): Peak[] {
  const { stepHz, binsPerResolution, axisCount, height } = spectrum;
  const candidates: Peak[] = [];
  for (const width of SEARCH_WIDTHS) {
    const half = Math.floor((width * binsPerResolution) / 2);
    const mean = runningMean(height, half);
    const density = runningMean(spectrum.densityPerHz, half);
    // A Hann window spreads an ordinate over 1.5 resolutions: neighbours are not independent.
    const threshold = peakThreshold(axisCount * Math.max(1, width / 1.5));
    const last = Math.min(mean.length - 2, Math.floor(bandHz[1] / stepHz));
    const lowest = Math.max(bandHz[0], (half * stepHz) / WIDEST_SHARE);
    for (let k = Math.max(2, Math.ceil(lowest / stepHz)); k <= last; k++)
      if (mean[k]! > threshold && mean[k]! >= mean[k - 1]! && mean[k]! > mean[k + 1]!)
        candidates.push({
          frequencyHz: highestWithin(spectrum.densityPerHz, k, half) * stepHz,
          widthHz: (2 * half + 1) * stepHz,
          power: density[k]! * (1 - 1 / mean[k]!) * (2 * half + 1) * stepHz,
        });
  }
  return candidates.sort((a, b) => b.power - a.power);
}

export const peakThreshold = (ordinates: number): number =>
  1 + PEAK_SIGMAS / Math.sqrt(ordinates) + PEAK_TAIL / ordinates;

function highestWithin(values: Float64Array, centre: number, half: number): number {
  let best = centre;
  for (let k = Math.max(0, centre - half); k <= Math.min(values.length - 1, centre + half); k++)
    if (values[k]! > values[best]!) best = k;
  return best;
}

function runningMean(values: Float64Array, half: number): Float64Array {
  if (half < 1) return values;
  const n = values.length;
  const out = new Float64Array(n);
  let sum = 0;
  for (let k = 0; k < Math.min(n, half); k++) sum += values[k]!;
  for (let k = 0; k < n; k++) {
    if (k + half < n) sum += values[k + half]!;
    if (k - half - 1 >= 0) sum -= values[k - half - 1]!;
    out[k] = sum / (Math.min(n - 1, k + half) - Math.max(0, k - half) + 1);
  }
  return out;
}
