/**
 * What an untapered periodogram of finite length shows on average of a mode under white force: the density of the
 * acceleration smeared by the Fejér kernel (Sykulski, Olhede, Guillaumin, Lilly & Early 2019), here in closed form from
 * the two poles of the mode, so that no numerical convolution is needed.
 */

export interface PieceShape {
  readonly periodS: number;
  readonly pieceSamples: number;
  readonly stepHz: number;
}

/**
 * Expected one-sided periodogram at bins first..last, scaled so that the true density at the resonance is 1.
 * True density: r⁴ / ((1-r²)² + (2·zeta·r)²) times (2·zeta)², r = f / frequencyHz.
 * @param out written from index 0; length >= last - first + 1
 */
export function expectedModeDensity(
  frequencyHz: number,
  dampingRatio: number,
  piece: PieceShape,
  first: number,
  last: number,
  out: Float64Array,
): void {
  const z = dampingRatio;
  const w0 = 2 * Math.PI * frequencyHz;
  const root = Math.sqrt(1 - z * z);
  const { periodS, pieceSamples: n, stepHz } = piece;
  // r⁴G = 1 + ((2-4z²)r² - 1)G with G the displacement response, whose autocorrelation is c·Re[(1 - i·z/root)·e^(λτ)].
  const lambdaRe = -z * w0;
  const lambdaIm = root * w0;
  const c = (frequencyHz * Math.PI) / (4 * z);
  // r²G has the autocorrelation -R''/w0², hence the factor -(2-4z²)λ²/w0² - 1 on the exponential.
  const squareRe = (lambdaRe * lambdaRe - lambdaIm * lambdaIm) / (w0 * w0);
  const squareIm = (2 * lambdaRe * lambdaIm) / (w0 * w0);
  const g = 2 - 4 * z * z;
  const aRe = -g * squareRe - 1;
  const aIm = -g * squareIm;
  const bIm = -z / root;
  const kRe = c * (aRe - aIm * bIm);
  const kIm = c * (aIm + aRe * bIm);
  const atZero = kRe;
  // e^(λ·periodS) and e^(λ·n·periodS); the latter does not change from bin to bin since e^(iωT) = 1 there.
  const decay = Math.exp(lambdaRe * periodS);
  const end = Math.exp(lambdaRe * periodS * n);
  const endRe = end * Math.cos(lambdaIm * periodS * n);
  const endIm = end * Math.sin(lambdaIm * periodS * n);
  const peak = 4 * z * z;
  // The bin's phase turns by the same angle from bin to bin: a product instead of a sine, set right every so often.
  const turn = 2 * Math.PI * stepHz * periodS;
  const turnRe = Math.cos(turn);
  const turnIm = Math.sin(turn);
  const poleRe = decay * Math.cos(lambdaIm * periodS);
  const poleIm = decay * Math.sin(lambdaIm * periodS);
  const eRe = (1 - endRe) / n;
  const eIm = -endIm / n;
  let binRe = 0;
  let binIm = 0;
  for (let k = first; k <= last; k++) {
    if ((k - first) % RESET_BINS === 0) {
      binRe = Math.cos(k * turn);
      binIm = Math.sin(k * turn);
    }
    let sum = 0;
    for (let sign = -1; sign <= 1; sign += 2) {
      const zRe = poleRe * binRe - sign * poleIm * binIm;
      const zIm = poleIm * binRe + sign * poleRe * binIm;
      // sum over τ=1..n-1 of (1 - τ/n)·z^τ = z/(1-z) - z(1 - z^n)/(n(1-z)²)
      const dRe = 1 - zRe;
      const inverse = 1 / (dRe * dRe + zIm * zIm);
      const pRe = (zRe * dRe - zIm * zIm) * inverse;
      const pIm = (zIm * dRe + zRe * zIm) * inverse;
      const qRe = (eRe * dRe - eIm * zIm) * inverse;
      const qIm = (eIm * dRe + eRe * zIm) * inverse;
      const sRe = pRe - (pRe * qRe - pIm * qIm);
      const sIm = pIm - (pRe * qIm + pIm * qRe);
      sum += 0.5 * (kRe * sRe - kIm * sIm);
    }
    out[k - first] = peak * Math.max(1e-12, 1 + 2 * periodS * (atZero + 2 * sum));
    const nextRe = binRe * turnRe - binIm * turnIm;
    binIm = binRe * turnIm + binIm * turnRe;
    binRe = nextRe;
  }
}

/** Bins after which the turned phase is computed afresh (rounding grows by about 1e-16 a bin). */
const RESET_BINS = 256;

/** The same without smearing: density of the acceleration, 1 at the resonance. */
export function modeDensity(frequencyAtHz: number, frequencyHz: number, dampingRatio: number): number {
  const r = frequencyAtHz / frequencyHz;
  return (2 * dampingRatio) ** 2 * (r ** 4 / ((1 - r * r) ** 2 + (2 * dampingRatio * r) ** 2));
}
