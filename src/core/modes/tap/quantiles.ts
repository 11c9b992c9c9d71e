/** Quantiles that the tap-to-tap intervals need. */

/**
 * Upper 95 % two-sided quantile of Student's t (Cornish-Fisher expansion, Abramowitz & Stegun 26.7.5; tabled where that is poor).
 * @param freedom degrees of freedom, >= 1
 */
export function studentQuantile95(freedom: number): number {
  if (!(freedom >= 1)) throw new RangeError(`freedom must be >= 1, got ${freedom}`);
  const tabled = STUDENT_95[freedom - 1];
  if (tabled !== undefined) return tabled;
  const z = 1.959964;
  return (
    z +
    (z ** 3 + z) / (4 * freedom) +
    (5 * z ** 5 + 16 * z ** 3 + 3 * z) / (96 * freedom ** 2) +
    (3 * z ** 7 + 19 * z ** 5 + 17 * z ** 3 - 15 * z) / (384 * freedom ** 3)
  );
}

/** t(0.975) for 1 to 5 degrees of freedom; standard table (e.g. Abramowitz & Stegun, table 26.10). */
const STUDENT_95 = [12.7062, 4.3027, 3.1824, 2.7764, 2.5706] as const;

/** Upper quantile of chi-squared by its cube root (Wilson & Hilferty 1931); z is the standard normal quantile. */
export function chiSquaredQuantile(freedom: number, z: number): number {
  if (!(freedom > 0)) throw new RangeError(`freedom must be > 0, got ${freedom}`);
  const h = 2 / (9 * freedom);
  return freedom * Math.max(1 - h + z * Math.sqrt(h), 0) ** 3;
}
