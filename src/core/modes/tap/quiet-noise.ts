/** Length of the stretches looked at, s: several samples of noise, little of a slow ring-down. Our own choice. */
const STRETCH_S = 0.25;
/** Stretches ranked: this share of the quietest stands for the noise. */
const QUIET_SHARE = 0.15;
/** Standard normal quantile of that share, by which a low quantile of white noise reads too little. */
const QUIET_SHARE_Z = 1.036;
/** 1 + 2 (squared correlations of second differences, -2/3 and 1/6): how much less a stretch tells than its length. */
const SECOND_DIFFERENCE_CORRELATION = 35 / 18;

/**
 * First guess of the noise variance per axis, (m/s²)², from second differences over the quietest stretches.
 * Slow motion cancels in a second difference, white noise is multiplied by six. It is a start only: the fits replace it.
 * @param stepMps2 rounding step per axis; its own variance step²/12 is the least there can be
 */
export function quietNoiseVariance(
  y: readonly Float64Array[],
  rateHz: number,
  stepMps2: readonly number[],
): number[] {
  const width = Math.max(8, Math.round(STRETCH_S * rateHz));
  return y.map((values, axis) => {
    const variances: number[] = [];
    for (let start = 0; start + width <= values.length; start += width) {
      let sum = 0;
      for (let i = start + 1; i < start + width - 1; i++) {
        const d = values[i - 1]! - 2 * values[i]! + values[i + 1]!;
        sum += d * d;
      }
      variances.push(sum / (6 * (width - 2)));
    }
    variances.sort((a, b) => a - b);
    const spread = Math.sqrt((2 * SECOND_DIFFERENCE_CORRELATION) / (width - 2));
    const quiet =
      (variances[Math.floor(QUIET_SHARE * variances.length)] ?? 0) * Math.exp(QUIET_SHARE_Z * spread);
    return Math.max(quiet, (stepMps2[axis] ?? 0) ** 2 / 12, 1e-14);
  });
}
