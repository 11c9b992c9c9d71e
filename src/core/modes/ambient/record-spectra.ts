import { realTransform } from '../../signal/fft.ts';

/** Records longer than this are cut into pieces of this many samples, so that time and memory stay bounded. */
export const LONGEST_PIECE_SAMPLES = 40000;
const PIECE_SAMPLES = 32768;

/** Untapered transforms of a record (in equal pieces when long), kept complex so that any direction can be looked along. */
export interface RecordSpectra {
  readonly periodS: number;
  /** Samples of a piece. */
  readonly pieceSamples: number;
  readonly stepHz: number;
  readonly binCount: number;
  /** [piece][axis]: re and im at k·stepHz. */
  readonly pieces: readonly (readonly { readonly re: Float64Array; readonly im: Float64Array }[])[];
}

/** @param axes uniform samples, m/s², one array per axis, equal lengths */
export function recordSpectra(axes: readonly Float64Array[], periodS: number): RecordSpectra {
  const n = axes[0]?.length ?? 0;
  const pieceSamples = n > LONGEST_PIECE_SAMPLES ? PIECE_SAMPLES : n - (n % 2);
  const pieceCount = Math.max(1, Math.floor(n / pieceSamples));
  const pieces = Array.from({ length: pieceCount }, (_, p) =>
    axes.map((axis) => {
      const piece = axis.subarray(p * pieceSamples, (p + 1) * pieceSamples);
      return realTransform(withoutMean(piece));
    }),
  );
  return {
    periodS,
    pieceSamples,
    stepHz: 1 / (pieceSamples * periodS),
    binCount: pieceSamples / 2 + 1,
    pieces,
  };
}

function withoutMean(samples: Float64Array): Float64Array {
  const mean = samples.reduce((sum, v) => sum + v, 0) / Math.max(1, samples.length);
  return samples.map((v) => v - mean);
}

/**
 * One-sided periodogram along a direction, averaged over the pieces, (m/s²)²/Hz.
 * @param direction unit vector in sensor axes
 */
export function periodogramAlong(spectra: RecordSpectra, direction: readonly number[]): Float64Array {
  const out = new Float64Array(spectra.binCount);
  const scale = (2 * spectra.periodS) / (spectra.pieceSamples * spectra.pieces.length);
  for (const axes of spectra.pieces)
    for (let k = 0; k < out.length; k++) {
      let re = 0;
      let im = 0;
      for (let a = 0; a < axes.length; a++) {
        const weight = direction[a] as number;
        const axis = axes[a] as { re: Float64Array; im: Float64Array };
        re += weight * (axis.re[k] as number);
        im += weight * (axis.im[k] as number);
      }
      out[k] = (out[k] as number) + scale * (re * re + im * im);
    }
  return out;
}

/** Sum of the axes' periodograms, (m/s²)²/Hz: what is there in any direction. */
export function totalPeriodogram(spectra: RecordSpectra): Float64Array {
  const axisCount = spectra.pieces[0]?.length ?? 0;
  const out = new Float64Array(spectra.binCount);
  for (let a = 0; a < axisCount; a++) {
    const unit = Array.from({ length: axisCount }, (_, i) => (i === a ? 1 : 0));
    const own = periodogramAlong(spectra, unit);
    for (let k = 0; k < out.length; k++) out[k] = (out[k] as number) + (own[k] as number);
  }
  return out;
}

/** Real part of the cross-spectral matrix summed over a band: its principal direction is that of the motion there. */
export function bandCovariance(spectra: RecordSpectra, bandHz: readonly [number, number]): number[][] {
  const axisCount = spectra.pieces[0]?.length ?? 0;
  const first = Math.max(1, Math.floor(bandHz[0] / spectra.stepHz));
  const last = Math.min(spectra.binCount - 1, Math.ceil(bandHz[1] / spectra.stepHz));
  return Array.from({ length: axisCount }, (_, a) =>
    Array.from({ length: axisCount }, (__, b) => {
      let sum = 0;
      for (const axes of spectra.pieces) {
        const x = axes[a] as { re: Float64Array; im: Float64Array };
        const y = axes[b] as { re: Float64Array; im: Float64Array };
        for (let k = first; k <= last; k++)
          sum += (x.re[k] as number) * (y.re[k] as number) + (x.im[k] as number) * (y.im[k] as number);
      }
      return sum;
    }),
  );
}
