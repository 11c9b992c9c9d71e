/** Two-sided 95 % quantiles of Student's t for 1 to 30 degrees of freedom (tabulated; equal to a computed inverse, see test). */
const QUANTILES_95 = [
  12.706, 4.303, 3.182, 2.776, 2.571, 2.447, 2.365, 2.306, 2.262, 2.228, 2.201, 2.179, 2.16, 2.145, 2.131,
  2.12, 2.11, 2.101, 2.093, 2.086, 2.08, 2.074, 2.069, 2.064, 2.06, 2.056, 2.052, 2.048, 2.045, 2.042,
];

/** Half-width of a 95 % interval in standard errors; beyond 30 degrees of freedom by the leading term of its expansion. */
export function studentQuantile95(degreesOfFreedom: number): number {
  if (!(degreesOfFreedom >= 1))
    throw new RangeError(`degreesOfFreedom must be >= 1, got ${degreesOfFreedom}`);
  const tabulated = QUANTILES_95[Math.floor(degreesOfFreedom) - 1];
  return tabulated ?? 1.95996 + 2.3723 / degreesOfFreedom + 2.8225 / degreesOfFreedom ** 2;
}
