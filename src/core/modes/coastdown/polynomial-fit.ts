import { backSubstitute, choleskyInPlace, forwardSubstitute } from '../../signal/linear-algebra.ts';

/** Weighted least-squares polynomial in u (about -1..1): coefficients of u⁰, u¹... */
export function weightedPolynomial(
  u: ArrayLike<number>,
  values: ArrayLike<number>,
  weights: ArrayLike<number>,
  order: number,
): number[] {
  const size = order + 1;
  const a = new Float64Array(size * size);
  const b = new Float64Array(size);
  for (let k = 0; k < u.length; k++) {
    const w = weights[k] as number;
    if (w === 0) continue;
    const powers = Array.from({ length: size }, (_, j) => (u[k] as number) ** j);
    for (let i = 0; i < size; i++) {
      b[i] = (b[i] as number) + w * (powers[i] as number) * (values[k] as number);
      for (let j = 0; j <= i; j++)
        a[i * size + j] = (a[i * size + j] as number) + w * (powers[i] as number) * (powers[j] as number);
    }
  }
  choleskyInPlace(a, size);
  forwardSubstitute(a, size, b);
  backSubstitute(a, size, b);
  return [...b];
}

/** The same against outliers: weights fall off beyond `scale` (Cauchy), a few rounds. */
export function robustPolynomial(
  u: ArrayLike<number>,
  values: ArrayLike<number>,
  weights: ArrayLike<number>,
  order: number,
  scale: number,
): number[] {
  let own = Float64Array.from(weights);
  let coefficients = weightedPolynomial(u, values, own, order);
  for (let round = 0; round < 8; round++) {
    own = Float64Array.from(weights, (w, k) => {
      const off = ((values[k] as number) - polynomialAt(coefficients, u[k] as number)) / scale;
      return (w as number) / (1 + off * off);
    });
    coefficients = weightedPolynomial(u, values, own, order);
  }
  return coefficients;
}

export function polynomialAt(coefficients: readonly number[], u: number): number {
  let value = 0;
  for (let j = coefficients.length - 1; j >= 0; j--) value = value * u + (coefficients[j] as number);
  return value;
}
