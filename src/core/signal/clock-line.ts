import { median } from './sample-counter.ts';

/** Length of a piece over which a sensor clock is taken as straight, s; our choice, well above the scatter's time scale. */
const PIECE_S = 5;
/** Ratio of observed to expected variance of the pieces' mean lateness above which the clock is taken to wander. */
const WANDER_VARIANCE_RATIO = 4;
/** Lateness beyond this many robust standard deviations is cut before averaging: delivery has a long tail. */
const TAIL_LIMIT = 3;

export interface ClockLine {
  /** Steady clock behind the stamps, s, one per sample. */
  readonly clockS: Float64Array;
  /** Stamp minus clock, s. */
  readonly deviationS: Float64Array;
  readonly scatterSdS: number;
}

/**
 * The steady (or slowly wandering) clock behind stamps: robust straight line of stamp against count, replaced by a
 * chain of 5 s means when the pieces' lateness varies more than the scatter explains.
 * @param timeS stamps, s
 * @param count sample counter, strictly increasing
 */
export function clockLine(timeS: Float64Array, count: Int32Array, periodS: number): ClockLine {
  const n = timeS.length;
  const line = robustLine(timeS, count, periodS);
  const clockS = Float64Array.from(count, (k) => line.startS + line.periodS * k);
  const deviationS = Float64Array.from(timeS, (t, i) => t - (clockS[i] as number));
  const limit = TAIL_LIMIT * Math.max(spread(deviationS), 1e-9);
  const pieces = pieceMeans(deviationS, count, Math.max(8, Math.round(PIECE_S / periodS)), limit);
  if (wanders(pieces)) {
    const bend = interpolatePieces(pieces, count);
    for (let i = 0; i < n; i++) {
      clockS[i] = (clockS[i] as number) + (bend[i] as number);
      deviationS[i] = (deviationS[i] as number) - (bend[i] as number);
    }
  }
  let square = 0;
  for (let i = 0; i < n; i++) square += (deviationS[i] as number) ** 2;
  return { clockS, deviationS, scatterSdS: Math.sqrt(square / n) };
}

/** Robust standard deviation: 1.4826 × median absolute deviation (of at most about 4,000 values). */
export function spread(values: Float64Array): number {
  const stride = Math.max(1, Math.floor(values.length / 4000));
  const picked: number[] = [];
  for (let i = 0; i < values.length; i += stride) picked.push(values[i] as number);
  const centre = median(picked);
  return 1.4826 * median(picked.map((v) => Math.abs(v - centre)));
}

function robustLine(
  timeS: Float64Array,
  count: Int32Array,
  periodS: number,
): { startS: number; periodS: number } {
  const n = timeS.length;
  let slope = periodS;
  let start = 0;
  let limit = Infinity;
  for (let pass = 0; pass < 4; pass++) {
    let s0 = 0;
    let s1 = 0;
    let s2 = 0;
    let r0 = 0;
    let r1 = 0;
    const centre = (count[n - 1] as number) / 2;
    for (let i = 0; i < n; i++) {
      const k = (count[i] as number) - centre;
      const base = start + slope * (count[i] as number);
      const residual =
        pass === 0 ? (timeS[i] as number) - slope * (count[i] as number) : (timeS[i] as number) - base;
      const cut = Math.max(-limit, Math.min(limit, residual));
      s0++;
      s1 += k;
      s2 += k * k;
      r0 += cut;
      r1 += k * cut;
    }
    const det = s0 * s2 - s1 * s1;
    const tilt = det > 0 ? (s0 * r1 - s1 * r0) / det : 0;
    const offset = (r0 - tilt * s1) / s0;
    start += offset - tilt * centre;
    slope += tilt;
    const residuals = Float64Array.from(timeS, (t, i) => t - start - slope * (count[i] as number));
    limit = TAIL_LIMIT * Math.max(spread(residuals), 1e-9);
  }
  return { startS: start, periodS: slope };
}

interface Piece {
  readonly at: number;
  readonly mean: number;
  readonly variance: number;
}

function pieceMeans(deviationS: Float64Array, count: Int32Array, length: number, limit: number): Piece[] {
  const pieces: Piece[] = [];
  const n = deviationS.length;
  for (let first = 0; first < n;) {
    let last = first;
    const end = (count[first] as number) + length;
    let sum = 0;
    let square = 0;
    let at = 0;
    while (last < n && (count[last] as number) < end) {
      const v = Math.max(-limit, Math.min(limit, deviationS[last] as number));
      sum += v;
      square += v * v;
      at += count[last] as number;
      last++;
    }
    const size = last - first;
    if (size >= length / 4) {
      const mean = sum / size;
      pieces.push({ at: at / size, mean, variance: Math.max(0, square / size - mean * mean) / size });
    }
    first = last;
  }
  return pieces;
}

function wanders(pieces: readonly Piece[]): boolean {
  if (pieces.length < 4) return false;
  const expected = pieces.reduce((sum, p) => sum + p.variance, 0) / pieces.length;
  const seen = pieces.reduce((sum, p) => sum + p.mean * p.mean, 0) / (pieces.length - 2);
  return seen > WANDER_VARIANCE_RATIO * expected && seen > 1e-10;
}

/** Straight between the pieces' centres, continued at the ends. */
function interpolatePieces(pieces: readonly Piece[], count: Int32Array): Float64Array {
  let p = 0;
  return Float64Array.from(count, (k) => {
    while (p < pieces.length - 2 && k > (pieces[p + 1] as Piece).at) p++;
    const a = pieces[p] as Piece;
    const b = pieces[p + 1] as Piece;
    return a.mean + ((k - a.at) / (b.at - a.at)) * (b.mean - a.mean);
  });
}
