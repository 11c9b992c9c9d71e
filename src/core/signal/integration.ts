import { inverseTwoReal, nextPowerOfTwo, realTransform, type HalfSpectrum } from './fft.ts';

/** Share of a band's ends over which it fades in and out, against the end frequency. */
const EDGE_SHARE = 0.1;
/** A bin takes part in integration only where its neighbourhood's density stands this far above the sensor's floor: dividing by f² would else show noise. */
export const INTEGRATED_ABOVE_FLOOR = 3;
/** Neighbourhood, reciprocal durations to each side. */
const NEIGHBOURHOOD = 4;

export interface BandMotion {
  readonly accelerationMps2: Float64Array;
  readonly velocityMps: Float64Array;
  readonly displacementM: Float64Array;
  /** Transform of the faded samples, for further weightings of the same record. */
  readonly spectrum: HalfSpectrum;
  readonly velocitySpectrum: HalfSpectrum;
  readonly displacementSpectrum: HalfSpectrum;
}

/**
 * Acceleration within a band, and velocity and displacement by division by 2πf (Parseval: no integrator drift).
 * Misleads below about 1 Hz, where tilt and sensor drift pass for motion; velocity and displacement leave out bins that
 * do not stand out of the floor, so they are lower bounds.
 * @param samples uniform acceleration, m/s², length n
 * @param floorPerHz one-sided density of the sensor's own noise, (m/s²)²/Hz
 * @param leftOutHz ranges that velocity and displacement leave out
 */
export function bandMotion(
  samples: Float64Array,
  periodS: number,
  bandHz: readonly [number, number],
  floorPerHz: number,
  leftOutHz: readonly (readonly [number, number])[],
): BandMotion {
  const n = samples.length;
  const size = nextPowerOfTwo(n + Math.ceil(1 / (periodS * Math.max(bandHz[0], 0.1))));
  const stepHz = 1 / (size * periodS);
  const spectrum = realTransform(samples, size);
  const stands = standingOut(
    spectrum,
    (floorPerHz * n) / (2 * periodS),
    Math.ceil((NEIGHBOURHOOD * size) / n),
  );
  const bins = spectrum.re.length;
  const acceleration = blank(spectrum);
  const velocity = blank(spectrum);
  const displacement = blank(spectrum);
  for (let k = 1; k < bins; k++) {
    const frequencyHz = k * stepHz;
    const weight = edgeWeight(frequencyHz, bandHz);
    if (weight === 0) continue;
    const re = weight * spectrum.re[k]!;
    const im = weight * spectrum.im[k]!;
    acceleration.re[k] = re;
    acceleration.im[k] = im;
    if (!stands[k] || leftOutHz.some(([low, high]) => frequencyHz > low && frequencyHz < high)) continue;
    const w = 2 * Math.PI * frequencyHz;
    velocity.re[k] = im / w;
    velocity.im[k] = -re / w;
    displacement.re[k] = -re / (w * w);
    displacement.im[k] = -im / (w * w);
  }
  const [a, v] = inverseTwoReal(acceleration, velocity);
  const [d] = inverseTwoReal(displacement, displacement);
  return {
    accelerationMps2: a.subarray(0, n),
    velocityMps: v.subarray(0, n),
    displacementM: d.subarray(0, n),
    spectrum,
    velocitySpectrum: velocity,
    displacementSpectrum: displacement,
  };
}

/** Real samples of a spectrum multiplied by a real gain of frequency (no phase shift); first n of them. */
export function weightedSamples(
  spectrum: HalfSpectrum,
  periodS: number,
  n: number,
  gain: (frequencyHz: number) => number,
): Float64Array {
  const stepHz = 1 / (spectrum.size * periodS);
  const weighted = blank(spectrum);
  for (let k = 1; k < spectrum.re.length; k++) {
    const g = gain(k * stepHz);
    weighted.re[k] = g * spectrum.re[k]!;
    weighted.im[k] = g * spectrum.im[k]!;
  }
  return inverseTwoReal(weighted, weighted)[0].subarray(0, n);
}

/** Rms of the part of a spectrum within a band, over n samples (Parseval); no transform back, so no ends to ring. */
export function rmsWithin(
  spectrum: HalfSpectrum,
  periodS: number,
  n: number,
  bandHz: readonly [number, number],
): number {
  const stepHz = 1 / (spectrum.size * periodS);
  let sum = 0;
  for (let k = 1; k < spectrum.re.length; k++) {
    const weight = edgeWeight(k * stepHz, bandHz);
    if (weight > 0) sum += 2 * weight * weight * (spectrum.re[k]! ** 2 + spectrum.im[k]! ** 2);
  }
  return Math.sqrt(sum / (spectrum.size * n));
}

const blank = (like: HalfSpectrum): HalfSpectrum => ({
  size: like.size,
  re: new Float64Array(like.re.length),
  im: new Float64Array(like.im.length),
});

/** 1 within a band, raised-cosine edges outside of it. */
export function edgeWeight(frequencyHz: number, [low, high]: readonly [number, number]): number {
  const under = (low - frequencyHz) / (EDGE_SHARE * low);
  const over = (frequencyHz - high) / (EDGE_SHARE * high);
  const beyond = Math.max(under, over);
  if (beyond <= 0) return 1;
  return beyond >= 1 ? 0 : 0.5 + 0.5 * Math.cos(Math.PI * beyond);
}

function standingOut(spectrum: HalfSpectrum, floorPower: number, half: number): Uint8Array {
  const { re, im } = spectrum;
  const bins = re.length;
  const stands = new Uint8Array(bins);
  let sum = 0;
  const powerAt = (k: number): number => re[k]! * re[k]! + im[k]! * im[k]!;
  for (let k = 0; k < Math.min(bins, half); k++) sum += powerAt(k);
  for (let k = 0; k < bins; k++) {
    if (k + half < bins) sum += powerAt(k + half);
    if (k - half - 1 >= 0) sum -= powerAt(k - half - 1);
    const width = Math.min(bins - 1, k + half) - Math.max(0, k - half) + 1;
    if (sum > INTEGRATED_ABOVE_FLOOR * floorPower * width) stands[k] = 1;
  }
  return stands;
}
