/**
 * How the phase of a line follows the scatter of the stamps. A sample taken d late has its phase advanced by 2π·F·d, F
 * being the true signed frequency; a sample only delivered late has not. Fitting exp(2πi(f·clock + ν·d)) gives
 * ν = ρ·F with ρ the true share of the scatter: the sign tells a line from its image, the size the share.
 * Amplitude and phase are free in each block, so drift, decay and wandering clocks do not matter.
 */

/** Stamps further than this share of a period off the clock are not used: they could be counting slips. */
export const SLIP_GUARD_PERIODS = 0.35;
/** Local mean of the deviation removed before the fit, samples to each side: a counting slip is a step. */
const LOCAL_MEAN_SAMPLES = 80;

export interface SlopeInput {
  /** Steady clock per sample, s, and stamp minus clock, s; length n. */
  readonly clockS: Float64Array;
  readonly deviationS: Float64Array;
  readonly periodS: number;
  /** Signal along the line's direction, gravity removed; length n. */
  readonly samples: Float64Array;
}

export interface SlopeProfile {
  /** Trial slopes, Hz, uniform, increasing. */
  readonly slopesHz: Float64Array;
  /** Log likelihood of each, up to a constant. */
  readonly logLikelihood: Float64Array;
  readonly bestHz: number;
  readonly sdHz: number;
  /** Standard deviation of the scatter used, s. */
  readonly scatterS: number;
}

/** Deviation with its local mean removed; NaN-free, samples beyond the guard marked by 0 in `use`. */
export function guardedDeviation(
  deviationS: Float64Array,
  periodS: number,
): { readonly fastS: Float64Array; readonly use: Uint8Array; readonly scatterS: number } {
  const n = deviationS.length;
  const limit = SLIP_GUARD_PERIODS * periodS;
  const fastS = new Float64Array(n);
  const use = new Uint8Array(n);
  let sum = 0;
  let lo = 0;
  let hi = 0;
  let square = 0;
  let used = 0;
  for (let i = 0; i < n; i++) {
    const first = Math.max(0, i - LOCAL_MEAN_SAMPLES);
    const last = Math.min(n, i + LOCAL_MEAN_SAMPLES + 1);
    while (hi < last) sum += deviationS[hi++] as number;
    while (lo < first) sum -= deviationS[lo++] as number;
    const d = (deviationS[i] as number) - sum / (hi - lo);
    fastS[i] = d;
    if (Math.abs(d) < limit) {
      use[i] = 1;
      square += d * d;
      used++;
    }
  }
  return { fastS, use, scatterS: used ? Math.sqrt(square / used) : 0 };
}

/**
 * Profile of the log likelihood over the slope.
 * @param frequencyHz where the line appears on the clock, 0 to half the rate
 * @param blockS length of the blocks with free amplitude and phase, s
 * @param reachHz largest |slope| tried
 * @param segments index ranges [first, end) to use; blocks never cross them
 * @param decayRatePerS amplitude decay within a block, 1/s (0 for a steady line)
 */
export function slopeProfile(
  input: SlopeInput,
  frequencyHz: number,
  blockS: number,
  reachHz: number,
  segments: readonly (readonly [number, number])[] = [[0, input.samples.length]],
  decayRatePerS = 0,
): SlopeProfile {
  const { clockS, periodS, samples } = input;
  const { fastS, use, scatterS } = guardedDeviation(input.deviationS, periodS);
  const { coarseHz, fineHz } = trialSlopes(reachHz, scatterS);
  const slopesHz = fineHz;
  const logLikelihood = new Float64Array(fineHz.length);
  const fit = new BlockFit(coarseHz.length);
  const least = Math.max(6, Math.ceil(2 / Math.max(frequencyHz * periodS, 1e-6)));
  for (const [first, end] of segments) {
    for (let start = first; start < end;) {
      const stop = (clockS[start] as number) + blockS;
      let i = start;
      fit.clear();
      for (; i < end && (clockS[i] as number) < stop; i++) {
        if (!use[i]) continue;
        fit.add(
          samples[i] as number,
          Math.exp(-decayRatePerS * ((clockS[i] as number) - (clockS[start] as number))),
          2 * Math.PI * frequencyHz * (clockS[i] as number),
          2 * Math.PI * (fastS[i] as number),
          coarseHz,
        );
      }
      if (fit.count >= least) fit.addLogLikelihood(logLikelihood);
      start = Math.max(i, start + 1);
    }
  }
  const peak = peakOf(slopesHz, logLikelihood, (fineHz[1] as number) - (fineHz[0] as number));
  return { ...peak, slopesHz, logLikelihood, scatterS };
}

/** Trial slopes: coarse ones follow the fitted energy (smooth over 1/(2π·3·scatter)), fine ones its logarithm. */
function trialSlopes(
  reachHz: number,
  scatterS: number,
): { readonly coarseHz: Float64Array; readonly fineHz: Float64Array } {
  const stepHz = Math.min(reachHz / 8, 1 / (36 * Math.PI * Math.max(scatterS, 1e-5)));
  const half = Math.ceil(reachHz / stepHz) + 2;
  const fineHalf = (half - 2) * FINE_PER_COARSE;
  return {
    coarseHz: Float64Array.from({ length: 2 * half + 1 }, (_, i) => (i - half) * stepHz),
    fineHz: Float64Array.from(
      { length: 2 * fineHalf + 1 },
      (_, i) => ((i - fineHalf) * stepHz) / FINE_PER_COARSE,
    ),
  };
}

const FINE_PER_COARSE = 10;
/** Four-point Lagrange weights at the fine positions between two coarse slopes. */
const LAGRANGE = Array.from({ length: FINE_PER_COARSE }, (_, j) => {
  const s = j / FINE_PER_COARSE;
  return [
    (-s * (s - 1) * (s - 2)) / 6,
    ((s + 1) * (s - 1) * (s - 2)) / 2,
    (-(s + 1) * s * (s - 2)) / 2,
    ((s + 1) * s * (s - 1)) / 6,
  ] as const;
});

/** Sums of one block for every trial slope: least squares on cosine and sine. */
class BlockFit {
  count = 0;
  #energy = 0;
  #weight = 0;
  readonly #cc: Float64Array;
  readonly #cs: Float64Array;
  readonly #xc: Float64Array;
  readonly #xs: Float64Array;

  constructor(size: number) {
    this.#cc = new Float64Array(size);
    this.#cs = new Float64Array(size);
    this.#xc = new Float64Array(size);
    this.#xs = new Float64Array(size);
  }

  clear(): void {
    this.count = 0;
    this.#energy = 0;
    this.#weight = 0;
    this.#cc.fill(0);
    this.#cs.fill(0);
    this.#xc.fill(0);
    this.#xs.fill(0);
  }

  add(x: number, envelope: number, phaseRad: number, radPerHz: number, slopesHz: Float64Array): void {
    const size = slopesHz.length;
    this.count++;
    this.#energy += x * x;
    this.#weight += envelope * envelope;
    const start = phaseRad + radPerHz * (slopesHz[0] as number);
    const turn = radPerHz * ((slopesHz[1] as number) - (slopesHz[0] as number));
    let c = envelope * Math.cos(start);
    let s = envelope * Math.sin(start);
    const tc = Math.cos(turn);
    const ts = Math.sin(turn);
    const cc = this.#cc;
    const cs = this.#cs;
    const xc = this.#xc;
    const xs = this.#xs;
    for (let g = 0; g < size; g++) {
      cc[g] = (cc[g] as number) + c * c;
      cs[g] = (cs[g] as number) + c * s;
      xc[g] = (xc[g] as number) + x * c;
      xs[g] = (xs[g] as number) + x * s;
      const next = c * tc - s * ts;
      s = s * tc + c * ts;
      c = next;
    }
  }

  /** -(m/2)·log(residual): unknown noise level per block, so a block with a contact or a second line does not rule. */
  addLogLikelihood(total: Float64Array): void {
    const m = this.count;
    const explained = this.#xc;
    for (let g = 0; g < explained.length; g++) {
      const cc = this.#cc[g] as number;
      const cs = this.#cs[g] as number;
      const ss = this.#weight - cc;
      const xc = this.#xc[g] as number;
      const xs = this.#xs[g] as number;
      const det = cc * ss - cs * cs;
      explained[g] =
        det > 1e-9 * this.#weight * this.#weight ? (xc * xc * ss - 2 * xc * xs * cs + xs * xs * cc) / det : 0;
    }
    const least = 1e-12 * this.#energy + 1e-300;
    for (let i = 0; i < total.length; i++) {
      const g = 2 + Math.floor(i / FINE_PER_COARSE);
      const [a, b, c, d] = LAGRANGE[i % FINE_PER_COARSE] as (typeof LAGRANGE)[number];
      const fitted =
        a * (explained[g - 1] as number) +
        b * (explained[g] as number) +
        c * (explained[g + 1] as number) +
        d * (explained[g + 2] as number);
      total[i] = (total[i] as number) - ((m - 2) / 2) * Math.log(Math.max(this.#energy - fitted, least));
    }
  }
}

function peakOf(
  slopesHz: Float64Array,
  logLikelihood: Float64Array,
  stepHz: number,
): { readonly bestHz: number; readonly sdHz: number } {
  let best = 1;
  for (let g = 1; g < slopesHz.length - 1; g++)
    if ((logLikelihood[g] as number) > (logLikelihood[best] as number)) best = g;
  const left = logLikelihood[best - 1] as number;
  const top = logLikelihood[best] as number;
  const right = logLikelihood[best + 1] as number;
  const bend = left - 2 * top + right;
  const shift = bend < 0 ? Math.max(-1, Math.min(1, (0.5 * (left - right)) / bend)) : 0;
  return {
    bestHz: (slopesHz[best] as number) + shift * stepHz,
    sdHz: bend < 0 ? stepHz / Math.sqrt(-bend) : Infinity,
  };
}

/** Cubic interpolation (Catmull & Rom 1974) of a profile; its smallest value outside the range tried. */
export function likelihoodAt(profile: SlopeProfile, slopeHz: number): number {
  const { slopesHz, logLikelihood } = profile;
  const stepHz = (slopesHz[1] as number) - (slopesHz[0] as number);
  const at = (slopeHz - (slopesHz[0] as number)) / stepHz;
  const i = Math.floor(at);
  if (i < 1 || i > slopesHz.length - 3) return Math.min(...logLikelihood);
  const s = at - i;
  const [p, q, r, t] = [0, 1, 2, 3].map((j) => logLikelihood[i - 1 + j] as number) as [
    number,
    number,
    number,
    number,
  ];
  return q + 0.5 * s * (r - p + s * (2 * p - 5 * q + 4 * r - t + s * (3 * (q - r) + t - p)));
}
