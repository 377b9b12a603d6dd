/**
 * The reduction of `householder.ts` for large matrices: reflections are gathered in panels and the rest of the matrix is
 * updated once a panel, by matrix products (Dongarra, Sorensen & Hammarling, J. Comput. Appl. Math. 27 (1989) 215);
 * a panel of reflections is applied to eigenvectors as one product in the compact WY form
 * (Schreiber & Van Loan, SIAM J. Sci. Stat. Comput. 10 (1989) 53). Storage as in `householder.ts`, rows `ld` entries apart.
 */
import type { KernelWorkspace, Slab } from '../kernels/kernels.js';
import { reflect, type Tridiagonal } from './householder.js';

/** Reflections in a panel of the reduction, and rows updated at a time. Found by trial at 250 and 900 rows; not derived. */
const PANEL = 32;
const UPDATED_ROWS = 64;
/** Reflections applied to the eigenvectors at a time; found by trial likewise. */
const APPLIED = 64;

/** Doubles that both functions together take from a workspace for n rows, `ld` entries apart. */
export function blockedRoom(n: number, ld: number): number {
  return (3 * PANEL + 1) * ld + 4 * PANEL + 2 * APPLIED * ld + 2 * APPLIED * APPLIED + APPLIED * n;
}

/** Reduces the symmetric matrix in `a` (lower triangle) to tridiagonal form; fills `tau` and `out`. */
export function reduceToTridiagonalBlocked(
  a: Slab,
  n: number,
  ld: number,
  tau: Float64Array,
  out: Tridiagonal,
  { kernels, scratch, take }: KernelWorkspace,
): void {
  const rowBytes = 8 * ld;
  const row = (slab: Slab, i: number) => slab.at + i * rowBytes;
  /** PANEL rows v, PANEL rows w, and the rows v once more: rows 0.. and rows PANEL.. are (v, w) and (w, v). */
  const panel = take(3 * PANEL * ld);
  const wRows = row(panel, PANEL);
  const factors = take(2 * PANEL);

  for (let top = n - 1; top >= 0; top -= PANEL) {
    const count = Math.min(PANEL, top + 1);
    for (let k = 0; k < count; k++) {
      const i = top - k;
      for (let q = 0; q < k; q++) {
        factors.data[q] = -panel.data[(PANEL + q) * ld + i];
        factors.data[PANEL + q] = -panel.data[q * ld + i];
      }
      kernels.addRows(k, i + 1, panel.at, rowBytes, factors.at, row(a, i));
      kernels.addRows(k, i + 1, wRows, rowBytes, factors.at + 8 * PANEL, row(a, i));
      out.diagonal[i] = a.data[i * ld + i];
      if (i === 0) break;

      const v = a.data.subarray(i * ld, i * ld + i);
      tau[i] = reflect(v, out.offDiagonal, i - 1);
      panel.data.set(v, k * ld);
      const w = row(panel, PANEL + k);
      kernels.symmetricTimesVector(i, a.at, rowBytes, row(a, i), w);
      kernels.dotRows(k, i, wRows, rowBytes, row(a, i), factors.at);
      kernels.dotRows(k, i, panel.at, rowBytes, row(a, i), factors.at + 8 * PANEL);
      kernels.scale(2 * PANEL, -1, factors.at);
      kernels.addRows(k, i, panel.at, rowBytes, factors.at, w);
      kernels.addRows(k, i, wRows, rowBytes, factors.at + 8 * PANEL, w);
      kernels.scale(i, tau[i], w);
      factors.data[0] = (-tau[i] / 2) * kernels.dot(i, row(a, i), w);
      kernels.addRows(1, i, row(a, i), rowBytes, factors.at, w);
    }
    panel.data.copyWithin(2 * PANEL * ld, 0, PANEL * ld);
    for (let first = 0, rest = top + 1 - count; first < rest; first += UPDATED_ROWS) {
      const rows = Math.min(UPDATED_ROWS, rest - first);
      kernels.addProduct(
        ...([rows, first + rows, 2 * PANEL, -1] as const),
        ...([panel.at + 8 * first, 8, rowBytes] as const),
        ...([wRows, rowBytes, 8] as const),
        ...([row(a, first), rowBytes, scratch] as const),
      );
    }
  }
}

/** Each of the n rows x of `rows` becomes Q x; `a` and `tau` as the reduction left them (`a` is overwritten). */
export function applyReflectionsBlocked(
  a: Slab,
  n: number,
  ld: number,
  tau: Float64Array,
  rows: Slab,
  { kernels, scratch, take }: KernelWorkspace,
): void {
  const rowBytes = 8 * ld;
  const gram = take(APPLIED * APPLIED);
  const t = take(APPLIED * APPLIED);
  const combined = take(APPLIED * ld);
  const overlaps = take(APPLIED * n);
  const square = 8 * APPLIED;

  for (let first = 2; first < n; first += APPLIED) {
    const count = Math.min(APPLIED, n - first);
    const length = first + count - 1;
    const v = a.at + first * rowBytes;
    for (let i = first; i < first + count; i++) a.data.fill(0, i * ld + i, i * ld + length);
    gram.data.fill(0);
    kernels.addProduct(count, count, length, 1, v, rowBytes, 8, v, 8, rowBytes, gram.at, square, scratch);
    triangularFactor(gram.data, tau.subarray(first), count, t.data);
    combined.data.fill(0, 0, count * ld);
    kernels.addProduct(count, length, count, 1, t.at, 8, square, v, rowBytes, 8, combined.at, rowBytes, scratch);
    overlaps.data.fill(0);
    kernels.addProduct(n, count, length, 1, rows.at, rowBytes, 8, v, 8, rowBytes, overlaps.at, square, scratch);
    kernels.addProduct(
      n,
      length,
      count,
      -1,
      overlaps.at,
      square,
      8,
      combined.at,
      rowBytes,
      8,
      rows.at,
      rowBytes,
      scratch,
    );
  }
}

/** The lower triangular T of H(last) ... H(first) = 1 - V T V^T, from the overlaps V^T V; rows APPLIED apart. */
function triangularFactor(gram: Float64Array, tau: Float64Array, count: number, t: Float64Array): void {
  t.fill(0);
  for (let i = 0; i < count; i++) {
    const row = i * APPLIED;
    for (let j = 0; j < i; j++) {
      const factor = -tau[i] * gram[row + j];
      for (let k = 0, p = j * APPLIED; k <= j; k++, p++) t[row + k] += factor * t[p];
    }
    t[row + i] = tau[i];
  }
}
