import { applyReflections, reduceToTridiagonal } from './householder.js';
import { tridiagonalQl } from './tridiagonal-ql.js';

/** Eigenvalues in ascending order and orthonormal eigenvectors of a real symmetric n × n matrix. */
export interface SymmetricEigen {
  /** n entries */
  readonly values: Float64Array;
  /** n × n, row-major: ROW k is the eigenvector of values[k], entries vectors[k * n .. k * n + n - 1] */
  readonly vectors: Float64Array;
}

/**
 * Diagonalises the real symmetric matrix `a` (n × n, row-major, only the lower triangle is read, left as it is).
 * Values are exact to a few rounding errors of the largest one. Throws a RangeError if an entry is not finite.
 */
export function eigenSymmetric(a: Float64Array, n: number): SymmetricEigen {
  const work = a.slice(0, n * n);
  const scale = scaleToSafeRange(work);
  const values = new Float64Array(n);
  const offDiagonal = new Float64Array(n);
  const tau = new Float64Array(n);
  const vectors = new Float64Array(n * n);
  for (let i = 0; i < n; i++) vectors[i * n + i] = 1;
  reduceToTridiagonal(work, n, tau, { diagonal: values, offDiagonal });
  tridiagonalQl(values, offDiagonal, n, vectors, 0, n, n);
  applyReflections(work, n, tau, vectors);
  if (scale !== 1) for (let i = 0; i < n; i++) values[i] *= scale;
  return { values, vectors };
}

/** Sizes between which no square of an entry and no sum of squares overflows or is lost. */
const SAFE_LOW = 1e-120;
const SAFE_HIGH = 1e120;

/** Divides `a` by its largest entry if that lies outside the safe range; returns the divisor, else 1. */
function scaleToSafeRange(a: Float64Array): number {
  let largest = 0;
  for (let p = 0; p < a.length; p++) {
    const size = Math.abs(a[p]);
    if (!(size <= Number.MAX_VALUE)) throw new RangeError(`Entry ${p} of the matrix is ${a[p]}`);
    if (size > largest) largest = size;
  }
  if (largest === 0 || (largest > SAFE_LOW && largest < SAFE_HIGH)) return 1;
  for (let p = 0; p < a.length; p++) a[p] /= largest;
  return largest;
}
