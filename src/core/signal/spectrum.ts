import type { Spectrum } from '../model/pictures.ts';
import { nextPowerOfTwo, realTransform } from './fft.ts';
import type { UniformSignal } from './uniform-grid.ts';
import { coherentGain, noiseBandwidthBins, windowSamples, type WindowKind } from './window.ts';

/** Averaged density of one axis, with the cross terms to the others where asked for. */
export interface AveragedDensity {
  readonly stepHz: number;
  /** Equivalent noise bandwidth of a line, Hz. */
  readonly resolutionHz: number;
  /** Averages that count: overlapping segments are not independent (Welch 1967). */
  readonly averageCount: number;
  /** Unit²/Hz, one-sided, one array per axis. */
  readonly densityPerHz: readonly Float64Array[];
}

/**
 * Averaged one-sided power spectral density (Welch 1967), Hann window, half overlap.
 * @param axes uniform samples, one array per axis
 * @param segmentSamples length of a segment; cut to the record
 * Misleads at a resonance narrower than about four resolutions: its peak reads low and wide (Bendat & Piersol, 8.5.1).
 */
export function averagedDensity(
  axes: readonly Float64Array[],
  periodS: number,
  segmentSamples: number,
  window: WindowKind = 'hann',
): AveragedDensity {
  const n = axes[0]?.length ?? 0;
  const length = Math.max(4, Math.min(segmentSamples, n));
  const hop = Math.max(1, Math.floor(length / 2));
  const segmentCount = Math.max(1, Math.floor((n - length) / hop) + 1);
  const size = nextPowerOfTwo(length);
  const weights = windowSamples(window, length);
  const energy = weights.reduce((sum, w) => sum + w * w, 0);
  const piece = new Float64Array(length);
  const densityPerHz = axes.map((axis) => {
    const density = new Float64Array(size / 2 + 1);
    for (let s = 0; s < segmentCount; s++) {
      for (let i = 0; i < length; i++) piece[i] = (weights[i] as number) * (axis[s * hop + i] ?? 0);
      const { re, im } = realTransform(piece, size);
      for (let k = 0; k < density.length; k++)
        density[k] = (density[k] as number) + (re[k] as number) ** 2 + (im[k] as number) ** 2;
    }
    const scale = (2 * periodS) / (energy * segmentCount);
    for (let k = 0; k < density.length; k++) density[k] = (density[k] as number) * scale;
    density[0] = (density[0] as number) / 2;
    density[size / 2] = (density[size / 2] as number) / 2;
    return density;
  });
  return {
    stepHz: 1 / (size * periodS),
    resolutionHz: noiseBandwidthBins(window) / (length * periodS),
    averageCount: effectiveAverages(segmentCount, window === 'hann' ? HANN_HALF_OVERLAP_CORRELATION : 0.25),
    densityPerHz,
  };
}

/** Correlation of two Hann windows half a length apart (Harris 1978, table 1). */
const HANN_HALF_OVERLAP_CORRELATION = 1 / 6;

/** Independent averages that K half-overlapping segments are worth (Welch 1967): K / (1 + 2c²(K-1)/K). */
export function effectiveAverages(segmentCount: number, correlation: number): number {
  return segmentCount / (1 + (2 * correlation * correlation * (segmentCount - 1)) / segmentCount);
}

/** Segment of the averaged density: a compromise of resolution and averages, s. */
const DENSITY_SEGMENT_S = 12;
/** Longest record whose amplitude spectrum is taken in one piece, samples (an hour at 100 Hz needs no finer grid to draw). */
const LONGEST_TRANSFORM_SAMPLES = 1 << 17;

/**
 * Amplitude spectrum of the whole record and its averaged density on one grid, for drawing and reading off.
 * A steady sine on a bin reads its peak amplitude; between bins up to 15 % less with this window (Harris 1978: 1.42 dB).
 */
export function amplitudeSpectrum(signal: UniformSignal): Spectrum {
  const { periodS, accelerationMps2 } = signal;
  const n = Math.min(signal.present.length, LONGEST_TRANSFORM_SAMPLES);
  const size = nextPowerOfTwo(n);
  const weights = windowSamples('hann', n);
  const stepHz = 1 / (size * periodS);
  const amplitudes = accelerationMps2.map((axis) => {
    const piece = Float64Array.from({ length: n }, (_, i) => (weights[i] as number) * (axis[i] as number));
    const { re, im } = realTransform(piece, size);
    const scale = 2 / (n * coherentGain('hann'));
    return Float64Array.from(re, (r, k) => scale * Math.hypot(r, im[k] as number));
  });
  const density = averagedDensity(accelerationMps2, periodS, Math.round(DENSITY_SEGMENT_S / periodS));
  return {
    stepHz,
    window: 'hann',
    resolutionHz: density.resolutionHz,
    averageCount: density.averageCount,
    randomErrorRatio: 1 / Math.sqrt(density.averageCount),
    amplitudeMps2: amplitudes,
    densityMps4PerHz: density.densityPerHz.map((d) =>
      Float64Array.from({ length: size / 2 + 1 }, (_, k) => interpolated(d, (k * stepHz) / density.stepHz)),
    ),
  };
}

function interpolated(values: Float64Array, at: number): number {
  const i = Math.min(values.length - 2, Math.floor(at));
  const share = Math.min(1, at - i);
  return (1 - share) * (values[i] as number) + share * (values[i + 1] as number);
}
