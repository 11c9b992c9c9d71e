/**
 * How the phase of a line follows the scatter of the stamps. A sample taken d late has its phase advanced by 2π·F·d, F
 * being the true signed frequency; a sample only delivered late has not. Fitting exp(2πi(f·clock + ν·d)) gives
 * ν = ρ·F with ρ the true share of the scatter: the sign tells a line from its image, the size the share.
 * Amplitude and phase are free in each block, so drift, decay and wandering clocks do not matter.
 */

/** Stamps further than this share of a period off the clock are not used: they could be counting slips. */
export const SLIP_GUARD_PERIODS = 0.35;
/** Local mean of the deviation removed before the fit, samples to each side: a counting slip is a step. */
const LOCAL_MEAN_SAMPLES = 12;

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
 */
export function slopeProfile(
  input: SlopeInput,
  frequencyHz: number,
  blockS: number,
  reachHz: number,
  segments: readonly (readonly [number, number])[] = [[0, input.samples.length]],
): SlopeProfile {
  const { clockS, periodS, samples } = input;
  const { fastS, use, scatterS } = guardedDeviation(input.deviationS, periodS);
  // A third of the likelihood's width at one radian of phase: the parabola through three points is then exact enough.
  const stepHz = Math.min(reachHz / 8, 1 / (2 * Math.PI * Math.max(scatterS, 1e-5)) / 4);
  const half = Math.ceil(reachHz / stepHz);
  const size = 2 * half + 1;
  const slopesHz = Float64Array.from({ length: size }, (_, i) => (i - half) * stepHz);
  const logLikelihood = new Float64Array(size);
  const fit = new BlockFit(size);
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
          2 * Math.PI * frequencyHz * (clockS[i] as number),
          2 * Math.PI * (fastS[i] as number),
          slopesHz,
        );
      }
      if (fit.count >= least) fit.addLogLikelihood(logLikelihood);
      start = Math.max(i, start + 1);
    }
  }
  return { ...peakOf(slopesHz, logLikelihood, stepHz), slopesHz, logLikelihood, scatterS };
}

/** Sums of one block for every trial slope: least squares on cosine and sine. */
class BlockFit {
  count = 0;
  #energy = 0;
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
    this.#cc.fill(0);
    this.#cs.fill(0);
    this.#xc.fill(0);
    this.#xs.fill(0);
  }

  add(x: number, phaseRad: number, radPerHz: number, slopesHz: Float64Array): void {
    const size = slopesHz.length;
    this.count++;
    this.#energy += x * x;
    const start = phaseRad + radPerHz * (slopesHz[0] as number);
    const turn = radPerHz * ((slopesHz[1] as number) - (slopesHz[0] as number));
    let c = Math.cos(start);
    let s = Math.sin(start);
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
    for (let g = 0; g < total.length; g++) {
      const cc = this.#cc[g] as number;
      const cs = this.#cs[g] as number;
      const ss = m - cc;
      const xc = this.#xc[g] as number;
      const xs = this.#xs[g] as number;
      const det = cc * ss - cs * cs;
      const explained = det > 1e-9 * m * m ? (xc * xc * ss - 2 * xc * xs * cs + xs * xs * cc) / det : 0;
      const residual = Math.max(this.#energy - explained, 1e-12 * this.#energy + 1e-300);
      total[g] = (total[g] as number) - ((m - 2) / 2) * Math.log(residual);
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
