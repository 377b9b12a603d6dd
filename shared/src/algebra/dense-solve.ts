import type { ComplexMatrix } from './dense.js';

/**
 * Solves A X = B in place by Gaussian elimination with partial pivoting: `b` becomes X, `a` is destroyed.
 *   a   n × n;  b   n × any
 * Throws a RangeError for a singular A.
 */
export function solveComplexInPlace(a: ComplexMatrix, b: ComplexMatrix): ComplexMatrix {
  const n = a.rows;
  if (a.columns !== n || b.rows !== n) throw new RangeError(`Shapes do not fit: solving with ${n} x ${a.columns}`);
  for (let k = 0; k < n; k++) {
    const pivot = pivotRow(a, k);
    swapRows(a, k, pivot);
    swapRows(b, k, pivot);
    for (let i = k + 1; i < n; i++) {
      const [re, im] = quotient(a, i * n + k, k * n + k);
      subtractRow(a, i, k, re, im, k + 1);
      subtractRow(b, i, k, re, im, 0);
    }
  }
  for (let k = n - 1; k >= 0; k--) {
    divideRow(b, k, a.real[k * n + k], a.imag[k * n + k]);
    for (let i = 0; i < k; i++) subtractRow(b, i, k, a.real[i * n + k], a.imag[i * n + k], 0);
  }
  return b;
}

/** Row at or below k with the largest entry in column k. */
function pivotRow(a: ComplexMatrix, k: number): number {
  let best = -1;
  let largest = 0;
  for (let i = k; i < a.rows; i++) {
    const p = i * a.columns + k;
    const size = Math.hypot(a.real[p], a.imag[p]);
    if (size > largest) [best, largest] = [i, size];
  }
  if (best < 0) throw new RangeError('The matrix is singular');
  return best;
}

function swapRows(m: ComplexMatrix, i: number, j: number): void {
  if (i === j) return;
  for (const part of [m.real, m.imag]) {
    for (let p = i * m.columns, q = j * m.columns, end = p + m.columns; p < end; p++, q++) {
      const kept = part[p];
      part[p] = part[q];
      part[q] = kept;
    }
  }
}

/** Entry p over entry q. */
function quotient({ real, imag }: ComplexMatrix, p: number, q: number): [number, number] {
  const size = real[q] * real[q] + imag[q] * imag[q];
  return [(real[p] * real[q] + imag[p] * imag[q]) / size, (imag[p] * real[q] - real[p] * imag[q]) / size];
}

/** Row i minus (re + i im) times row k, from column `from` on. */
function subtractRow(m: ComplexMatrix, i: number, k: number, re: number, im: number, from: number): void {
  if (re === 0 && im === 0) return;
  const { real, imag, columns } = m;
  for (let p = i * columns + from, q = k * columns + from, end = (i + 1) * columns; p < end; p++, q++) {
    real[p] -= re * real[q] - im * imag[q];
    imag[p] -= re * imag[q] + im * real[q];
  }
}

function divideRow({ real, imag, columns }: ComplexMatrix, k: number, re: number, im: number): void {
  const size = re * re + im * im;
  for (let p = k * columns, end = p + columns; p < end; p++) {
    const x = real[p];
    real[p] = (x * re + imag[p] * im) / size;
    imag[p] = (imag[p] * re - x * im) / size;
  }
}
