import { complexTransform, nextPowerOfTwo } from '../../signal/fft.ts';
import type { RecordSpectra } from './record-spectra.ts';

/**
 * Coefficient of variation of the envelope in a narrow band along a direction: about 0.52 for random motion
 * (Rayleigh), near 0 for a steady line. The band is cut out of the transform, so the ends of the record are left out.
 * @returns undefined when the band holds too few ordinates to tell
 */
export function envelopeVariation(
  spectra: RecordSpectra,
  direction: readonly number[],
  bandHz: readonly [number, number],
): number | undefined {
  const first = Math.max(1, Math.ceil(bandHz[0] / spectra.stepHz));
  const last = Math.min(spectra.binCount - 2, Math.floor(bandHz[1] / spectra.stepHz));
  const width = last - first + 1;
  if (width < LEAST_ORDINATES) return undefined;
  const size = 4 * nextPowerOfTwo(width);
  let sum = 0;
  let square = 0;
  let count = 0;
  for (const axes of spectra.pieces) {
    const data = new Float64Array(2 * size);
    for (let k = 0; k < width; k++) {
      // A raised-cosine edge keeps the record's ends from ringing into the envelope.
      const taper = Math.sin((Math.PI * (k + 0.5)) / width) ** 2;
      axes.forEach((axis, a) => {
        const weight = taper * (direction[a] as number);
        data[2 * k] = (data[2 * k] as number) + weight * (axis.re[first + k] as number);
        data[2 * k + 1] = (data[2 * k + 1] as number) + weight * (axis.im[first + k] as number);
      });
    }
    const envelope = complexTransform(data, true);
    const edge = Math.ceil(END_SHARE * size);
    for (let i = edge; i < size - edge; i++) {
      const value = Math.hypot(envelope[2 * i] as number, envelope[2 * i + 1] as number);
      sum += value;
      square += value * value;
      count++;
    }
  }
  const mean = sum / count;
  return Math.sqrt(Math.max(0, square / count - mean * mean)) / mean;
}

/** Fewer ordinates make an envelope of too few independent values. */
const LEAST_ORDINATES = 6;
/** Share of the record left out at each end. */
const END_SHARE = 0.06;
