import { complexTransform, nextPowerOfTwo, realTransform, type HalfSpectrum } from '../signal/fft.ts';
import type { UniformSignal } from '../signal/uniform-grid.ts';
import { principalDirection } from '../signal/linear-algebra.ts';

/** Share of the record faded in and out before the transform, each end; what is read off stays inside. */
const FADE_SHARE = 0.04;

/** Transforms of the whole record, one per axis, from which bands are cut. */
export interface BandSource {
  readonly spectra: readonly HalfSpectrum[];
  readonly stepHz: number;
  readonly durationS: number;
  readonly startS: number;
  readonly sampleCount: number;
  readonly periodS: number;
}

export function bandSource(grid: UniformSignal): BandSource {
  const n = grid.present.length;
  const size = nextPowerOfTwo(n);
  const fade = Math.max(1, Math.round(FADE_SHARE * n));
  const spectra = grid.accelerationMps2.map((axis) => {
    const faded = Float64Array.from(axis);
    for (let i = 0; i < fade; i++) {
      const weight = 0.5 - 0.5 * Math.cos((Math.PI * (i + 0.5)) / fade);
      faded[i]! *= weight;
      faded[n - 1 - i]! *= weight;
    }
    return realTransform(faded, size);
  });
  return {
    spectra,
    stepHz: 1 / (size * grid.periodS),
    durationS: n * grid.periodS,
    startS: grid.startS,
    sampleCount: n,
    periodS: grid.periodS,
  };
}

/** Complex envelope of a band: x(t) = Re(z(t)·exp(2πi·centre·t)), t from the record's first grid point; fades cut off. */
export interface Envelope {
  readonly centreHz: number;
  readonly stepS: number;
  readonly startS: number;
  /** One pair per axis. */
  readonly re: readonly Float64Array[];
  readonly im: readonly Float64Array[];
}

/**
 * Cuts a band out of the record's transform. The band edge falls off over its outer fifth (raised cosine).
 * @param halfWidthHz half width of the band where it has fallen to one half
 */
export function bandEnvelope(source: BandSource, centreHz: number, halfWidthHz: number): Envelope {
  const { stepHz, sampleCount, periodS } = source;
  const centreBin = Math.round(centreHz / stepHz);
  const reach = Math.ceil((1.2 * halfWidthHz) / stepHz);
  const size = nextPowerOfTwo(2 * reach + 2);
  const stepS = 1 / (size * stepHz);
  const first = Math.ceil((FADE_SHARE * sampleCount * periodS) / stepS);
  const end = Math.floor(((1 - FADE_SHARE) * sampleCount * periodS) / stepS);
  const re: Float64Array[] = [];
  const im: Float64Array[] = [];
  const total = source.spectra[0]!.size;
  for (const spectrum of source.spectra) {
    const cut = new Float64Array(2 * size);
    for (let j = -reach; j <= reach; j++) {
      const bin = centreBin + j;
      if (bin < 1 || bin >= spectrum.re.length) continue;
      const weight = (2 * size * edgeWeight(Math.abs(j * stepHz) / halfWidthHz)) / total;
      const at = 2 * (j < 0 ? size + j : j);
      cut[at] = weight * spectrum.re[bin]!;
      cut[at + 1] = weight * spectrum.im[bin]!;
    }
    const z = complexTransform(cut, true);
    re.push(Float64Array.from({ length: end - first }, (_, i) => z[2 * (first + i)]!));
    im.push(Float64Array.from({ length: end - first }, (_, i) => z[2 * (first + i) + 1]!));
  }
  return { centreHz: centreBin * stepHz, stepS, startS: source.startS + first * stepS, re, im };
}

function edgeWeight(ratio: number): number {
  if (ratio <= 0.8) return 1;
  return ratio >= 1.2 ? 0 : 0.5 + 0.5 * Math.cos((Math.PI * (ratio - 0.8)) / 0.4);
}

/** Envelope along one direction. */
export function envelopeAlong(
  envelope: Envelope,
  direction: readonly number[],
): { re: Float64Array; im: Float64Array } {
  const n = envelope.re[0]!.length;
  const re = new Float64Array(n);
  const im = new Float64Array(n);
  direction.forEach((share, a) => {
    for (let i = 0; i < n; i++) {
      re[i]! += share * envelope.re[a]![i]!;
      im[i]! += share * envelope.im[a]![i]!;
    }
  });
  return { re, im };
}

/** Turns of the power method: eigenvalues a tenth apart separate to 1e-3. */
const TURNS = 40;

/**
 * Strongest coherent motion of a band: axes may differ in phase (an orbit), so the weights are complex
 * (principal eigenvector of the Hermitian matrix of mean products).
 * @returns its envelope, squared weight per axis, and the mean squared envelope left in all other motion
 */
export function principalOrbit(envelope: Envelope): {
  readonly re: Float64Array;
  readonly im: Float64Array;
  readonly weights: readonly number[];
  readonly acrossPower: number;
} {
  const axes = envelope.re.length;
  const n = envelope.re[0]!.length;
  const pRe = new Float64Array(axes * axes);
  const pIm = new Float64Array(axes * axes);
  for (let a = 0; a < axes; a++)
    for (let b = 0; b < axes; b++) {
      const [ar, ai, br, bi] = [envelope.re[a]!, envelope.im[a]!, envelope.re[b]!, envelope.im[b]!];
      for (let i = 0; i < n; i++) {
        pRe[a * axes + b]! += (ar[i]! * br[i]! + ai[i]! * bi[i]!) / n;
        pIm[a * axes + b]! += (ai[i]! * br[i]! - ar[i]! * bi[i]!) / n;
      }
    }
  let vRe = envelope.re.map((_, a) => pRe[a * axes + a]! + 1e-300);
  let vIm = envelope.re.map((_, a) => (a ? 1e-3 * pRe[a * axes + a]! : 0));
  for (let turn = 0; turn < TURNS; turn++) {
    const re = vRe.map((_, a) =>
      vRe.reduce((sum, v, b) => sum + pRe[a * axes + b]! * v - pIm[a * axes + b]! * vIm[b]!, 0),
    );
    const im = vRe.map((_, a) =>
      vRe.reduce((sum, v, b) => sum + pRe[a * axes + b]! * vIm[b]! + pIm[a * axes + b]! * v, 0),
    );
    const length = Math.max(Math.hypot(...re, ...im), 1e-300);
    vRe = re.map((v) => v / length);
    vIm = im.map((v) => v / length);
  }
  const re = new Float64Array(n);
  const im = new Float64Array(n);
  let along = 0;
  for (let a = 0; a < axes; a++)
    for (let i = 0; i < n; i++) {
      re[i]! += vRe[a]! * envelope.re[a]![i]! + vIm[a]! * envelope.im[a]![i]!;
      im[i]! += vRe[a]! * envelope.im[a]![i]! - vIm[a]! * envelope.re[a]![i]!;
    }
  for (let i = 0; i < n; i++) along += (re[i]! ** 2 + im[i]! ** 2) / n;
  const total = envelope.re.reduce((sum, _, a) => sum + pRe[a * axes + a]!, 0);
  return {
    re,
    im,
    weights: vRe.map((v, a) => v * v + vIm[a]! ** 2),
    acrossPower: Math.max(0, total - along),
  };
}

/** Principal direction of the motion in a band: unit vector in sensor axes. */
export function envelopeDirection(envelope: Pick<Envelope, 're' | 'im'>): readonly number[] {
  const { re, im } = envelope;
  return principalDirection(
    re.map((_, a) =>
      re.map((__, b) => {
        let sum = 0;
        for (let i = 0; i < re[0]!.length; i++) sum += re[a]![i]! * re[b]![i]! + im[a]![i]! * im[b]![i]!;
        return sum;
      }),
    ),
  );
}
