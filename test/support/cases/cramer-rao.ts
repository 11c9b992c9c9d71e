/**
 * Cramér-Rao bounds by numeric Fisher information.
 * Time domain: signal in white noise of known variance, linear amplitudes projected out (Kay 1993, ch. 3).
 * Frequency domain: Whittle (1953), J = T · integral of (d ln S)(d ln S)' df over the band.
 */

/** Inverse of a small symmetric positive matrix (Gauss-Jordan); throws where singular. */
export function inverseMatrix(matrix: readonly (readonly number[])[]): number[][] {
  const n = matrix.length;
  const a = matrix.map((row, i) => [...row, ...row.map((_, j) => (i === j ? 1 : 0))]);
  for (let c = 0; c < n; c++) {
    let best = c;
    for (let r = c + 1; r < n; r++)
      if (Math.abs((a[r] as number[])[c] as number) > Math.abs((a[best] as number[])[c] as number)) best = r;
    [a[c], a[best]] = [a[best] as number[], a[c] as number[]];
    const pivot = (a[c] as number[])[c] as number;
    if (!(Math.abs(pivot) > 0)) throw new RangeError('matrix must be invertible');
    a[c] = (a[c] as number[]).map((v) => v / pivot);
    for (let r = 0; r < n; r++) {
      if (r === c) continue;
      const factor = (a[r] as number[])[c] as number;
      if (factor !== 0)
        a[r] = (a[r] as number[]).map((v, k) => v - factor * ((a[c] as number[])[k] as number));
    }
  }
  return a.map((row) => row.slice(n));
}

const dot = (a: Float64Array, b: Float64Array): number => {
  let sum = 0;
  for (let i = 0; i < a.length; i++) sum += (a[i] as number) * (b[i] as number);
  return sum;
};

/** Orthonormal basis of the given columns (modified Gram-Schmidt, dependent ones dropped). */
function orthonormalBasis(columns: readonly Float64Array[]): Float64Array[] {
  const basis: Float64Array[] = [];
  for (const column of columns) {
    const v = column.slice();
    const before = Math.sqrt(dot(v, v));
    for (let pass = 0; pass < 2; pass++)
      for (const q of basis) {
        const c = dot(q, v);
        for (let i = 0; i < v.length; i++) v[i] = (v[i] as number) - c * (q[i] as number);
      }
    const norm = Math.sqrt(dot(v, v));
    if (norm > 1e-9 * before) basis.push(v.map((x) => x / norm));
  }
  return basis;
}

/**
 * Standard deviations of shared non-linear parameters.
 * @param derivatives [parameter][axis] d(signal)/d(parameter), length n each
 * @param linear columns whose amplitudes are free on each axis
 */
export function signalBounds(
  derivatives: readonly (readonly Float64Array[])[],
  linear: readonly Float64Array[],
  varianceOfNoise: number,
): number[] {
  const basis = orthonormalBasis(linear);
  const rest = derivatives.map((axes) =>
    axes.map((d) => {
      const r = d.slice();
      for (const q of basis) {
        const c = dot(q, r);
        for (let i = 0; i < r.length; i++) r[i] = (r[i] as number) - c * (q[i] as number);
      }
      return r;
    }),
  );
  const fisher = rest.map((a) =>
    rest.map((b) => a.reduce((sum, axis, i) => sum + dot(axis, b[i] as Float64Array), 0) / varianceOfNoise),
  );
  return inverseMatrix(fisher).map((row, i) => Math.sqrt(row[i] as number));
}

/**
 * Standard deviations of the parameters of a power spectral density (Whittle 1953).
 * @param logDensity natural logarithm of the density at f for given parameters
 */
export function whittleBounds(
  logDensity: (frequencyHz: number, parameters: readonly number[]) => number,
  parameters: readonly number[],
  bandHz: readonly [number, number],
  durationS: number,
  stepHz: number,
): number[] {
  const p = parameters.length;
  const fisher = Array.from({ length: p }, () => new Array<number>(p).fill(0));
  const steps = parameters.map((v) => Math.max(Math.abs(v), 1e-9) * 1e-5);
  for (let f = bandHz[0] + stepHz / 2; f < bandHz[1]; f += stepHz) {
    const slope = parameters.map((v, i) => {
      const h = steps[i] as number;
      const at = (value: number): number =>
        logDensity(
          f,
          parameters.map((w, j) => (j === i ? value : w)),
        );
      return (at(v + h) - at(v - h)) / (2 * h);
    });
    for (let i = 0; i < p; i++)
      for (let j = 0; j < p; j++)
        (fisher[i] as number[])[j] =
          ((fisher[i] as number[])[j] as number) +
          durationS * stepHz * (slope[i] as number) * (slope[j] as number);
  }
  return inverseMatrix(fisher).map((row, i) => Math.sqrt(row[i] as number));
}
