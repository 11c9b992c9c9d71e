/**
 * Where a spectrum stands out of its surroundings: running median as background, then the strongest rise over windows of
 * many widths (a scan statistic: log-likelihood ratio of one raised level in exponential ordinates).
 */

/** Ordinates averaged before the median is taken, so that the median is close to the mean; more where the record is long. */
const LEAST_BLOCK_BINS = 8;
const MOST_BLOCKS = 256;
/** Half width of the background window: this share of the frequency, and at least so many Hz. */
const BACKGROUND_SHARE = 0.4;
const BACKGROUND_LEAST_HZ = 0.8;
/** Fewest blocks in the background window. */
const BACKGROUND_LEAST_BLOCKS = 9;
/** Widest rise looked for, half width over frequency: a damping ratio of 12 %. */
const WIDEST_SHARE = 0.12;

export interface Rise {
  readonly bin: number;
  readonly halfWidthBins: number;
  /** The window of the scan, before it was shrunk to the peak. */
  readonly scanBin: number;
  readonly scanHalfWidthBins: number;
  /** Mean level over the background. */
  readonly ratio: number;
  readonly logLikelihood: number;
}

/** Background of bins first..last (same indexing), by a running median of block means. */
export function background(values: Float64Array, first: number, last: number, stepHz: number): Float64Array {
  const blockBins = Math.max(LEAST_BLOCK_BINS, Math.ceil((last - first + 1) / MOST_BLOCKS));
  const blockCount = Math.max(1, Math.floor((last - first + 1) / blockBins));
  const means = Float64Array.from({ length: blockCount }, (_, b) => {
    let sum = 0;
    for (let i = 0; i < blockBins; i++) sum += values[Math.min(last, first + b * blockBins + i)] as number;
    return sum / blockBins;
  });
  const medians = means.map((_, b) => {
    const frequencyHz = (first + (b + 0.5) * blockBins) * stepHz;
    const reach = Math.max(BACKGROUND_SHARE * frequencyHz, BACKGROUND_LEAST_HZ) / (blockBins * stepHz);
    const half = Math.max(Math.round(reach), BACKGROUND_LEAST_BLOCKS >> 1);
    const window = means.slice(Math.max(0, b - half), Math.min(blockCount, b + half + 1)).sort();
    return Math.max(window[window.length >> 1] as number, Number.MIN_VALUE);
  });
  const out = new Float64Array(values.length);
  for (let k = first; k <= last; k++) {
    const at = Math.max(0, Math.min(blockCount - 1, (k - first + 0.5) / blockBins - 0.5));
    const i = Math.min(blockCount - 1, Math.floor(at));
    const j = Math.min(blockCount - 1, i + 1);
    const share = at - i;
    out[k] = (1 - share) * (medians[i] as number) + share * (medians[j] as number);
  }
  return out;
}

/**
 * Strongest rise of values over their background.
 * @param levels ordinate over background, mean 1 where nothing stands out
 * @param weight independent exponential ordinates per bin (axes times pieces)
 * @param isTaken windows that have been looked at
 */
export function strongestRise(
  levels: Float64Array,
  first: number,
  last: number,
  weight: number,
  isTaken: (bin: number, halfWidthBins: number) => boolean,
): Rise | undefined {
  const sums = new Float64Array(last + 2);
  for (let k = first; k <= last; k++) sums[k + 1] = (sums[k] as number) + (levels[k] as number);
  let best: Rise | undefined;
  for (let half = 0; half <= WIDEST_SHARE * last; half = Math.max(half + 1, Math.round(half * 1.4))) {
    const stride = Math.max(1, Math.floor(half / 4));
    for (let bin = first + half; bin <= last - half; bin += stride) {
      if (half > 2 && half > WIDEST_SHARE * bin) continue;
      const n = 2 * half + 1;
      const ratio = ((sums[bin + half + 1] as number) - (sums[bin - half] as number)) / n;
      if (!(ratio > 1)) continue;
      const logLikelihood = weight * n * (ratio - 1 - Math.log(ratio));
      if (best && logLikelihood <= best.logLikelihood) continue;
      if (!isTaken(bin, half))
        best = { bin, halfWidthBins: half, scanBin: bin, scanHalfWidthBins: half, ratio, logLikelihood };
    }
  }
  return best && sharpened(best, sums, first, last);
}

/** The widest window wins on a strong peak, skirts and all: shrink it to the stretch that holds half of the excess. */
function sharpened(rise: Rise, sums: Float64Array, first: number, last: number): Rise {
  const low = Math.max(first, rise.bin - rise.halfWidthBins);
  const high = Math.min(last, rise.bin + rise.halfWidthBins);
  const excess = (from: number, to: number): number =>
    (sums[to + 1] as number) - (sums[from] as number) - (to - from + 1);
  const whole = excess(low, high);
  for (let width = 1; width < high - low; width = Math.max(width + 1, Math.round(width * 1.25))) {
    let bestAt = low;
    let most = -Infinity;
    for (let from = low; from + width - 1 <= high; from++) {
      const here = excess(from, from + width - 1);
      if (here > most) {
        most = here;
        bestAt = from;
      }
    }
    if (most >= whole / 2) {
      const halfWidthBins = Math.max(0, Math.round((width - 1) / 2));
      return { ...rise, bin: Math.min(last, bestAt + halfWidthBins), halfWidthBins, ratio: 1 + most / width };
    }
  }
  return rise;
}
