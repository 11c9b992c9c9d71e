/** Mantissas of a step that people read without arithmetic (common practice, no source). */
const STEPS = [1, 2, 5] as const;

/**
 * Round values inside [low, high], ascending, at least `smallestStep` apart (same unit as the range).
 * Returns an empty list for an empty range.
 * @throws RangeError when a bound is not finite or the smallest step is not above 0.
 */
export const linearTicks = (low: number, high: number, smallestStep: number): number[] => {
  if (!Number.isFinite(low) || !Number.isFinite(high))
    throw new RangeError(`linearTicks: bounds must be finite, got ${low} and ${high}`);
  if (!(smallestStep > 0)) throw new RangeError(`linearTicks: smallestStep must be > 0, got ${smallestStep}`);
  if (high < low) return [];
  const decade = Math.floor(Math.log10(smallestStep));
  const candidates = [decade, decade + 1].flatMap((power) => STEPS.map((mantissa) => ({ mantissa, power })));
  const slack = 1e-9;
  const chosen = candidates.find(
    ({ mantissa, power }) => mantissa * 10 ** power >= smallestStep * (1 - slack),
  );
  if (chosen === undefined) return [];
  const step = chosen.mantissa * 10 ** chosen.power;
  const first = Math.ceil(low / step - slack);
  const last = Math.floor(high / step + slack);
  // index * mantissa stays an integer, so 0.3 does not become 0.30000000000000004
  return Array.from({ length: Math.max(0, last - first + 1) }, (_, i) => {
    const whole = (first + i) * chosen.mantissa;
    return chosen.power < 0 ? whole / 10 ** -chosen.power : whole * 10 ** chosen.power;
  });
};
