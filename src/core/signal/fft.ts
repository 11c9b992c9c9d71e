/**
 * The one file that imports fft.js (radix 4, powers of two). Other lengths go through the chirp transform
 * (Bluestein 1970), so a caller never has to pad unless it wants to.
 */
import FFT from 'fft.js';

interface Plan {
  readonly size: number;
  transform(out: Float64Array, data: Float64Array): void;
  inverseTransform(out: Float64Array, data: Float64Array): void;
  realTransform(out: Float64Array, data: Float64Array): void;
}

/** Plans kept at most: a plan of 2^20 points holds about 40 MB. */
const PLAN_LIMIT = 6;
const plans = new Map<number, Plan>();

function planOf(size: number): Plan {
  let plan = plans.get(size);
  if (!plan) {
    if (plans.size >= PLAN_LIMIT) plans.delete(plans.keys().next().value as number);
    plan = new FFT(size) as unknown as Plan;
    plans.set(size, plan);
  }
  return plan;
}

const isPowerOfTwo = (n: number): boolean => n > 1 && (n & (n - 1)) === 0;

/** Smallest power of two that is at least `n` (and at least 2). */
export function nextPowerOfTwo(n: number): number {
  let size = 2;
  while (size < n) size *= 2;
  return size;
}

function requireSize(size: number, least: number): void {
  if (!Number.isInteger(size) || size < least)
    throw new RangeError(`transform size must be an integer >= ${least}, got ${size}`);
}

/** Half of a conjugate-symmetric spectrum: bins 0..floor(size/2), bin i at i/(size·dt). No scaling. */
export interface HalfSpectrum {
  readonly size: number;
  readonly re: Float64Array;
  readonly im: Float64Array;
}

/**
 * Discrete Fourier transform of real samples, zero padded (or cut) to `size`.
 * @param samples uniform samples, any unit
 * @param size transform length, any integer >= 2; powers of two are fastest
 * @returns sum of x[n]·exp(-2πi·k·n/size), k = 0..floor(size/2)
 */
export function realTransform(samples: ArrayLike<number>, size: number = samples.length): HalfSpectrum {
  requireSize(size, 2);
  const half = Math.floor(size / 2) + 1;
  const re = new Float64Array(half);
  const im = new Float64Array(half);
  const used = Math.min(samples.length, size);
  let out: Float64Array;
  if (isPowerOfTwo(size)) {
    const data = new Float64Array(size);
    for (let i = 0; i < used; i++) data[i] = samples[i] as number;
    out = new Float64Array(2 * size);
    planOf(size).realTransform(out, data);
  } else {
    const data = new Float64Array(2 * size);
    for (let i = 0; i < used; i++) data[2 * i] = samples[i] as number;
    out = chirpTransform(data, false);
  }
  for (let k = 0; k < half; k++) {
    re[k] = out[2 * k] as number;
    im[k] = out[2 * k + 1] as number;
  }
  return { size, re, im };
}

/**
 * Discrete Fourier transform of complex samples.
 * @param interleaved re, im, re, im...; length 2n, n >= 2
 * @param inverse true: exp(+i...) and division by n
 */
export function complexTransform(interleaved: Float64Array, inverse = false): Float64Array {
  const size = interleaved.length / 2;
  requireSize(size, 2);
  if (!isPowerOfTwo(size)) return chirpTransform(interleaved, inverse);
  const out = new Float64Array(2 * size);
  if (inverse) planOf(size).inverseTransform(out, interleaved);
  else planOf(size).transform(out, interleaved);
  return out;
}

/** Real samples from a half spectrum (the inverse of `realTransform`). */
export function inverseRealTransform(spectrum: HalfSpectrum): Float64Array {
  const { size, re, im } = spectrum;
  const full = new Float64Array(2 * size);
  for (let k = 0; k < size; k++) {
    const mirrored = 2 * k > size;
    const bin = mirrored ? size - k : k;
    full[2 * k] = re[bin] as number;
    full[2 * k + 1] = mirrored ? -(im[bin] as number) : (im[bin] as number);
  }
  const out = complexTransform(full, true);
  const samples = new Float64Array(size);
  for (let i = 0; i < size; i++) samples[i] = out[2 * i] as number;
  return samples;
}

/** Two real signals from their half spectra by one complex inverse transform. Both of the same size. */
export function inverseTwoReal(a: HalfSpectrum, b: HalfSpectrum): readonly [Float64Array, Float64Array] {
  const size = a.size;
  if (b.size !== size) throw new RangeError(`spectra must have one size, got ${size} and ${b.size}`);
  const full = new Float64Array(2 * size);
  for (let k = 0; k < size; k++) {
    const mirrored = 2 * k > size;
    const bin = mirrored ? size - k : k;
    const sign = mirrored ? -1 : 1;
    full[2 * k] = (a.re[bin] as number) - sign * (b.im[bin] as number);
    full[2 * k + 1] = sign * (a.im[bin] as number) + (b.re[bin] as number);
  }
  const out = complexTransform(full, true);
  const first = new Float64Array(size);
  const second = new Float64Array(size);
  for (let i = 0; i < size; i++) {
    first[i] = out[2 * i] as number;
    second[i] = out[2 * i + 1] as number;
  }
  return [first, second];
}

/** Bluestein's chirp transform: any length by a circular convolution of power-of-two length. */
function chirpTransform(data: Float64Array, inverse: boolean): Float64Array {
  const n = data.length / 2;
  const size = nextPowerOfTwo(2 * n - 1);
  const plan = planOf(size);
  const sign = inverse ? 1 : -1;
  const chirpRe = new Float64Array(n);
  const chirpIm = new Float64Array(n);
  for (let k = 0; k < n; k++) {
    // k² modulo 2n keeps the angle small: k² itself would lose digits for long records.
    const angle = (Math.PI * ((k * k) % (2 * n))) / n;
    chirpRe[k] = Math.cos(angle);
    chirpIm[k] = sign * Math.sin(angle);
  }
  const a = new Float64Array(2 * size);
  const b = new Float64Array(2 * size);
  for (let k = 0; k < n; k++) {
    const re = data[2 * k] as number;
    const im = data[2 * k + 1] as number;
    const cr = chirpRe[k] as number;
    const ci = chirpIm[k] as number;
    a[2 * k] = re * cr - im * ci;
    a[2 * k + 1] = re * ci + im * cr;
    b[2 * k] = cr;
    b[2 * k + 1] = -ci;
    if (k > 0) {
      b[2 * (size - k)] = cr;
      b[2 * (size - k) + 1] = -ci;
    }
  }
  const fa = new Float64Array(2 * size);
  const fb = new Float64Array(2 * size);
  plan.transform(fa, a);
  plan.transform(fb, b);
  for (let i = 0; i < 2 * size; i += 2) {
    const re = (fa[i] as number) * (fb[i] as number) - (fa[i + 1] as number) * (fb[i + 1] as number);
    fa[i + 1] = (fa[i] as number) * (fb[i + 1] as number) + (fa[i + 1] as number) * (fb[i] as number);
    fa[i] = re;
  }
  plan.inverseTransform(a, fa);
  const out = new Float64Array(2 * n);
  const scale = inverse ? 1 / n : 1;
  for (let k = 0; k < n; k++) {
    const re = a[2 * k] as number;
    const im = a[2 * k + 1] as number;
    const cr = chirpRe[k] as number;
    const ci = chirpIm[k] as number;
    out[2 * k] = scale * (re * cr - im * ci);
    out[2 * k + 1] = scale * (re * ci + im * cr);
  }
  return out;
}
