import { withKernels } from '../kernels/kernels.js';
import { divideAndConquer, divideAndConquerRoom } from './divide-and-conquer.js';
import { applyReflectionsBlocked, blockedRoom, reduceToTridiagonalBlocked } from './householder-blocked.js';
import { applyReflections, reduceToTridiagonal } from './householder.js';
import { tridiagonalQl } from './tridiagonal-ql.js';

/** Eigenvalues in ascending order and orthonormal eigenvectors of a real symmetric n × n matrix. */
export interface SymmetricEigen {
  /** n entries */
  readonly values: Float64Array;
  /** n × n, row-major: ROW k is the eigenvector of values[k], entries vectors[k * n .. k * n + n - 1] */
  readonly vectors: Float64Array;
}

/** Up to this many rows the plain route is the faster one. Found by trial on random matrices; not derived. */
const PLAIN_ROWS = 32;

/**
 * Diagonalises the real symmetric matrix `a` (n × n, row-major, only the lower triangle is read, left as it is):
 * Householder reduction to tridiagonal form, then implicit QL for small matrices, divide and conquer for large ones.
 * Values are exact to a few rounding errors of the largest one. Throws a RangeError if an entry is not finite.
 */
export function eigenSymmetric(a: Float64Array, n: number): SymmetricEigen {
  const work = a.slice(0, n * n);
  const scale = scaleToSafeRange(work);
  const eigen = n <= PLAIN_ROWS ? solvePlain(work, n) : solveBlocked(work, n);
  if (scale !== 1) for (let i = 0; i < n; i++) eigen.values[i] *= scale;
  return eigen;
}

function solvePlain(work: Float64Array, n: number): SymmetricEigen {
  const values = new Float64Array(n);
  const offDiagonal = new Float64Array(n);
  const tau = new Float64Array(n);
  const vectors = new Float64Array(n * n);
  for (let i = 0; i < n; i++) vectors[i * n + i] = 1;
  reduceToTridiagonal(work, n, tau, { diagonal: values, offDiagonal });
  tridiagonalQl(values, offDiagonal, n, vectors, 0, n, n);
  applyReflections(work, n, tau, vectors);
  return { values, vectors };
}

function solveBlocked(work: Float64Array, n: number): SymmetricEigen {
  const ld = rowDistance(n);
  return withKernels(2 * n * ld + divideAndConquerRoom(n, ld) + blockedRoom(n, ld), (workspace) => {
    const matrix = workspace.take(n * ld);
    for (let i = 0; i < n; i++) matrix.data.set(work.subarray(i * n, (i + 1) * n), i * ld);
    const diagonal = new Float64Array(n);
    const offDiagonal = new Float64Array(n);
    const tau = new Float64Array(n);
    reduceToTridiagonalBlocked(matrix, n, ld, tau, { diagonal, offDiagonal }, workspace);
    const rows = workspace.take(n * ld);
    const { order } = divideAndConquer(diagonal, offDiagonal, n, rows, ld, workspace);
    applyReflectionsBlocked(matrix, n, ld, tau, rows, workspace);

    const values = new Float64Array(n);
    const vectors = new Float64Array(n * n);
    order.forEach((row, k) => {
      values[k] = diagonal[row];
      vectors.set(rows.data.subarray(row * ld, row * ld + n), k * n);
    });
    return { values, vectors };
  });
}

/** An odd multiple of four, so that rows are aligned and do not fall on the same cache lines. */
function rowDistance(n: number): number {
  return 4 * (Math.ceil(n / 4) | 1);
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
