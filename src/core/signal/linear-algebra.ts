/** Small dense symmetric systems, stored row by row in Float64Array. For sizes up to about 40. */

/** Pivots below this share of their (unit-scaled) diagonal count as linearly dependent; double rounding, our own choice. */
const DEPENDENT_PIVOT = 1e-11;

/**
 * Cholesky factor L (lower) of a symmetric positive semi-definite matrix, in place.
 * Dependent columns get a zero column: their unknown is then taken as zero by the solvers below.
 * @param a size*size, row by row; the lower triangle is read and replaced by L
 * @returns number of independent columns
 */
export function choleskyInPlace(a: Float64Array, size: number): number {
  let rank = 0;
  for (let j = 0; j < size; j++) {
    const diagonal = a[j * size + j]!;
    let pivot = diagonal;
    for (let k = 0; k < j; k++) pivot -= a[j * size + k]! * a[j * size + k]!;
    if (!(pivot > DEPENDENT_PIVOT * diagonal) || !(diagonal > 0)) {
      for (let i = j; i < size; i++) a[i * size + j] = 0;
      continue;
    }
    rank++;
    const root = Math.sqrt(pivot);
    a[j * size + j] = root;
    const inverse = 1 / root;
    for (let i = j + 1; i < size; i++) {
      let sum = a[i * size + j]!;
      for (let k = 0; k < j; k++) sum -= a[i * size + k]! * a[j * size + k]!;
      a[i * size + j] = sum * inverse;
    }
  }
  return rank;
}

/** Solves L v = b in place; zero pivots give zero. */
export function forwardSubstitute(lower: Float64Array, size: number, b: Float64Array, offset = 0): void {
  for (let i = 0; i < size; i++) {
    const pivot = lower[i * size + i]!;
    if (pivot === 0) {
      b[offset + i] = 0;
      continue;
    }
    let sum = b[offset + i]!;
    for (let k = 0; k < i; k++) sum -= lower[i * size + k]! * b[offset + k]!;
    b[offset + i] = sum / pivot;
  }
}

/** Solves Lᵀ x = v in place; zero pivots give zero. */
export function backSubstitute(lower: Float64Array, size: number, b: Float64Array, offset = 0): void {
  for (let i = size - 1; i >= 0; i--) {
    const pivot = lower[i * size + i]!;
    if (pivot === 0) {
      b[offset + i] = 0;
      continue;
    }
    let sum = b[offset + i]!;
    for (let k = i + 1; k < size; k++) sum -= lower[k * size + i]! * b[offset + k]!;
    b[offset + i] = sum / pivot;
  }
}

/** Inverse of a symmetric positive definite matrix; undefined when it is singular. */
export function symmetricInverse(a: Float64Array, size: number): Float64Array | undefined {
  const lower = a.slice();
  if (choleskyInPlace(lower, size) < size) return undefined;
  const inverse = new Float64Array(size * size);
  const column = new Float64Array(size);
  for (let j = 0; j < size; j++) {
    column.fill(0);
    column[j] = 1;
    forwardSubstitute(lower, size, column);
    backSubstitute(lower, size, column);
    for (let i = 0; i < size; i++) inverse[i * size + j] = column[i]!;
  }
  return inverse;
}

/**
 * Principal direction of a symmetric 1x1 to 3x3 matrix: unit eigenvector of its largest eigenvalue
 * (Jacobi rotations, 1846). The sign makes the largest component positive.
 */
export function principalDirection(matrix: readonly (readonly number[])[]): number[] {
  const size = matrix.length;
  const a = matrix.map((row) => [...row]);
  const v = a.map((_, i) => a.map((__, j) => (i === j ? 1 : 0)));
  for (let sweep = 0; sweep < 30; sweep++) {
    for (let p = 0; p < size; p++) {
      for (let q = p + 1; q < size; q++) rotate(a, v, p, q);
    }
  }
  let best = 0;
  for (let i = 1; i < size; i++) if (a[i]![i]! > a[best]![best]!) best = i;
  const direction = v.map((row) => row[best]!);
  const largest = direction.reduce((m, x) => (Math.abs(x) > Math.abs(m) ? x : m), 0);
  return largest < 0 ? direction.map((x) => -x) : direction;
}

function rotate(a: number[][], v: number[][], p: number, q: number): void {
  const off = a[p]![q]!;
  if (off === 0) return;
  const theta = (a[q]![q]! - a[p]![p]!) / (2 * off);
  const t = (theta >= 0 ? 1 : -1) / (Math.abs(theta) + Math.hypot(theta, 1));
  const c = 1 / Math.hypot(t, 1);
  const s = t * c;
  for (const row of [...a, ...v]) {
    const x = row[p]!;
    const y = row[q]!;
    row[p] = c * x - s * y;
    row[q] = s * x + c * y;
  }
  for (let k = 0; k < a.length; k++) {
    const x = a[p]![k]!;
    const y = a[q]![k]!;
    a[p]![k] = c * x - s * y;
    a[q]![k] = s * x + c * y;
  }
}
