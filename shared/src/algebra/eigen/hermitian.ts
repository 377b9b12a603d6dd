import { complexMatrix, type ComplexMatrix } from '../dense.js';
import { tridiagonalQl } from './tridiagonal-ql.js';

/** Eigenvalues in ascending order and orthonormal eigenvectors of a complex Hermitian n × n matrix. */
export interface HermitianEigen {
  readonly values: Float64Array;
  /** ROW k holds the components of the eigenvector of values[k] (not conjugated): A_ij = sum_k x_ki values_k conj(x_kj) */
  readonly vectors: ComplexMatrix;
}

/**
 * Diagonalises a Hermitian matrix (only the lower triangle is read, left as it is): Householder reflections to a
 * Hermitian tridiagonal form, phases that make it real, then the real tridiagonal solver
 * (Golub & Van Loan, Matrix Computations, ch. 8). Entries must be finite and of ordinary size (1e-120 .. 1e120).
 */
export function eigenHermitian(a: ComplexMatrix): HermitianEigen {
  const n = a.rows;
  if (a.columns !== n) throw new RangeError(`Shapes do not fit: eigenvalues of a ${n} x ${a.columns} matrix`);
  const work = complexMatrix(n, n, a.real.slice(), a.imag.slice());
  const values = new Float64Array(n);
  const tau = new Float64Array(n);
  const coupling = complexMatrix(1, n);
  reduce(work, values, coupling, tau);

  const offDiagonal = new Float64Array(n);
  const phase = realise(coupling, offDiagonal);
  const rows = new Float64Array(n * n);
  for (let i = 0; i < n; i++) rows[i * n + i] = 1;
  tridiagonalQl(values, offDiagonal, n, rows, 0, n, n);

  const vectors = complexMatrix(n, n);
  for (let k = 0, p = 0; k < n; k++) {
    for (let i = 0; i < n; i++, p++) {
      vectors.real[p] = rows[p] * phase.real[i];
      vectors.imag[p] = rows[p] * phase.imag[i];
    }
  }
  applyReflections(work, tau, vectors);
  return { values, vectors };
}

/**
 * Tridiagonal form of `work`, last row first. H(i) = 1 - tau v v†, v left in row i, entries 0..i-1;
 * coupling entry i - 1 is T(i-1, i).
 */
function reduce(work: ComplexMatrix, diagonal: Float64Array, coupling: ComplexMatrix, tau: Float64Array): void {
  const n = work.rows;
  const w = complexMatrix(1, n);
  for (let i = n - 1; i >= 0; i--) {
    const row = i * n;
    diagonal[i] = work.real[row + i];
    if (i === 0) break;
    for (let j = 0; j < i; j++) work.imag[row + j] = -work.imag[row + j];
    tau[i] = reflect(work, row, i, coupling);
    if (tau[i] !== 0) updateLeadingBlock(work, row, i, tau[i], w);
  }
}

/** Turns the column c held in entries row..row+length-1 into v; coupling[length - 1] = last entry of H c; returns tau. */
function reflect(work: ComplexMatrix, row: number, length: number, coupling: ComplexMatrix): number {
  const { real, imag } = work;
  const last = row + length - 1;
  let squares = 0;
  for (let p = row; p < last; p++) squares += real[p] * real[p] + imag[p] * imag[p];
  const size = Math.hypot(real[last], imag[last]);
  coupling.real[length - 1] = real[last];
  coupling.imag[length - 1] = imag[last];
  if (squares === 0) return 0;
  const norm = Math.sqrt(squares + size * size);
  const cosine = size === 0 ? 1 : real[last] / size;
  const sine = size === 0 ? 0 : imag[last] / size;
  coupling.real[length - 1] = -norm * cosine;
  coupling.imag[length - 1] = -norm * sine;
  real[last] += norm * cosine;
  imag[last] += norm * sine;
  return 2 / (squares + (size + norm) ** 2);
}

/** A <- H A H on the lower triangle of the leading m × m block: A - v w† - w v†, w = tau (A v - (tau/2)(v†Av) v). */
function updateLeadingBlock(work: ComplexMatrix, v: number, m: number, tau: number, w: ComplexMatrix): void {
  const { real, imag, columns: n } = work;
  w.real.fill(0);
  w.imag.fill(0);
  for (let i = 0; i < m; i++) {
    const row = i * n;
    const vr = real[v + i];
    const vi = imag[v + i];
    let re = real[row + i] * vr;
    let im = real[row + i] * vi;
    for (let j = 0; j < i; j++) {
      const ar = real[row + j];
      const ai = imag[row + j];
      re += ar * real[v + j] - ai * imag[v + j];
      im += ar * imag[v + j] + ai * real[v + j];
      w.real[j] += ar * vr + ai * vi;
      w.imag[j] += ar * vi - ai * vr;
    }
    w.real[i] += re;
    w.imag[i] += im;
  }
  let overlap = 0;
  for (let i = 0; i < m; i++) overlap += w.real[i] * real[v + i] + w.imag[i] * imag[v + i];
  const shift = (tau * overlap) / 2;
  for (let i = 0; i < m; i++) {
    w.real[i] = tau * (w.real[i] - shift * real[v + i]);
    w.imag[i] = tau * (w.imag[i] - shift * imag[v + i]);
  }
  for (let i = 0; i < m; i++) {
    const row = i * n;
    const vr = real[v + i];
    const vi = imag[v + i];
    const wr = w.real[i];
    const wi = w.imag[i];
    for (let j = 0; j <= i; j++) {
      const vjr = real[v + j];
      const vji = imag[v + j];
      real[row + j] -= vr * w.real[j] + vi * w.imag[j] + wr * vjr + wi * vji;
      imag[row + j] -= vi * w.real[j] - vr * w.imag[j] + wi * vjr - wr * vji;
    }
  }
}

/** Sizes of the couplings, and the diagonal phases P for which P† T P is real. */
function realise(coupling: ComplexMatrix, offDiagonal: Float64Array): ComplexMatrix {
  const n = coupling.columns;
  const phase = complexMatrix(1, n);
  if (n > 0) phase.real[0] = 1;
  for (let i = 0; i + 1 < n; i++) {
    const re = coupling.real[i];
    const im = coupling.imag[i];
    const size = Math.hypot(re, im);
    offDiagonal[i] = size;
    const cosine = size === 0 ? 1 : re / size;
    const sine = size === 0 ? 0 : im / size;
    phase.real[i + 1] = phase.real[i] * cosine + phase.imag[i] * sine;
    phase.imag[i + 1] = phase.imag[i] * cosine - phase.real[i] * sine;
  }
  return phase;
}

/** Each row x of `rows` becomes H(n-1) ... H(1) x. */
function applyReflections(work: ComplexMatrix, tau: Float64Array, rows: ComplexMatrix): void {
  const { real, imag, columns: n } = work;
  for (let i = 1; i < n; i++) {
    if (tau[i] === 0) continue;
    const v = i * n;
    for (let row = 0; row < n * n; row += n) {
      let re = 0;
      let im = 0;
      for (let k = 0; k < i; k++) {
        re += real[v + k] * rows.real[row + k] + imag[v + k] * rows.imag[row + k];
        im += real[v + k] * rows.imag[row + k] - imag[v + k] * rows.real[row + k];
      }
      re *= tau[i];
      im *= tau[i];
      for (let k = 0; k < i; k++) {
        rows.real[row + k] -= re * real[v + k] - im * imag[v + k];
        rows.imag[row + k] -= re * imag[v + k] + im * real[v + k];
      }
    }
  }
}
