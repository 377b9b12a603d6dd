/**
 * Eigenvalues and eigenvectors of a real symmetric tridiagonal matrix by divide and conquer (Cuppen, Numer. Math. 36 (1981) 177;
 * Gu & Eisenstat, SIAM J. Matrix Anal. Appl. 16 (1995) 172): T is cut in two halves and a rank-one rest, the halves are solved,
 * and the rest couples them through a secular equation. Eigenvectors that the rest hardly touches are deflated: they stay as
 * they are, and so does the cost. What remains is matrix products.
 */
import type { Kernels, KernelWorkspace, Slab } from '../kernels/kernels.js';
import { SecularEquation } from './secular.js';
import { tridiagonalQl } from './tridiagonal-ql.js';

/** Blocks of up to this many rows are left to the QL method. Found by trial on random matrices; not derived. */
const LEAF_ROWS = 28;
/** Deflation threshold in units of the norm, 8 unit roundoffs, as Gu & Eisenstat. */
const DEFLATION = 4 * Number.EPSILON;

/** Where a row of the half-solved problem has entries. */
const LEFT = 0;
const BOTH = 1;
const RIGHT = 2;

export interface TridiagonalEigen {
  /** Rows of `vectors` in ascending order of their eigenvalues. */
  readonly order: Int32Array;
  /** Eigenvectors left untouched by the merges, summed over all of them. */
  readonly deflated: number;
}

/** Doubles that `divideAndConquer` takes from its workspace for n rows, `ld` entries apart. */
export function divideAndConquerRoom(n: number, ld: number): number {
  return 2 * n * ld;
}

/**
 * Diagonalises T. On return diagonal[k] is the eigenvalue of row k of `vectors` (n rows of n entries, `ld` entries apart);
 * `order` sorts them. `offDiagonal` (entry i couples i and i + 1) is destroyed. Entries must be of ordinary size.
 */
export function divideAndConquer(
  diagonal: Float64Array,
  offDiagonal: Float64Array,
  n: number,
  vectors: Slab,
  ld: number,
  workspace: KernelWorkspace,
): TridiagonalEigen {
  let norm = 0;
  for (let i = 0; i < n; i++) norm = Math.max(norm, Math.abs(diagonal[i]), i + 1 < n ? Math.abs(offDiagonal[i]) : 0);
  if (norm === 0) norm = 1;
  for (let i = 0; i < n; i++) {
    diagonal[i] /= norm;
    offDiagonal[i] /= norm;
  }
  vectors.data.fill(0, 0, n * ld);
  const solver = new Merger(diagonal, n, vectors, ld, workspace);
  solver.solve(0, n, offDiagonal);
  for (let i = 0; i < n; i++) diagonal[i] *= norm;
  return { order: solver.order, deflated: solver.deflated };
}

/** The halves being merged, rows and columns low..high of one matrix of eigenvectors. */
class Merger {
  readonly order: Int32Array;
  deflated = 0;
  private readonly kernels: Kernels;
  private readonly scratch: number;
  /** Distances of roots and poles, then the eigenvectors of the rank-one update. */
  private readonly update: Slab;
  /** Rows of the halves, gathered by kind. */
  private readonly gathered: Slab;
  private readonly coupling: Float64Array;
  private readonly poles: Float64Array;
  private readonly squares: Float64Array;
  private readonly weights: Float64Array;
  private readonly roots: Float64Array;
  private readonly rows: Int32Array;
  private readonly place: Int32Array;
  private readonly kind: Uint8Array;

  constructor(
    private readonly values: Float64Array,
    n: number,
    private readonly vectors: Slab,
    private readonly ld: number,
    workspace: KernelWorkspace,
  ) {
    this.kernels = workspace.kernels;
    this.scratch = workspace.scratch;
    this.update = workspace.take(n * ld);
    this.gathered = workspace.take(n * ld);
    this.order = new Int32Array(n);
    this.coupling = new Float64Array(n);
    this.poles = new Float64Array(n);
    this.squares = new Float64Array(n);
    this.weights = new Float64Array(n);
    this.roots = new Float64Array(n);
    this.rows = new Int32Array(n);
    this.place = new Int32Array(n);
    this.kind = new Uint8Array(n);
  }

  solve(low: number, high: number, offDiagonal: Float64Array): void {
    const size = high - low;
    if (size <= LEAF_ROWS) {
      this.solveLeaf(low, size, offDiagonal);
      return;
    }
    const middle = low + (size >> 1);
    const cut = offDiagonal[middle - 1];
    this.values[middle - 1] -= Math.abs(cut);
    this.values[middle] -= Math.abs(cut);
    this.solve(low, middle, offDiagonal);
    this.solve(middle, high, offDiagonal);
    this.merge(low, middle, high, cut);
  }

  private solveLeaf(low: number, size: number, offDiagonal: Float64Array): void {
    const { data } = this.vectors;
    const corner = low * this.ld + low;
    for (let i = 0; i < size; i++) {
      data[corner + i * (this.ld + 1)] = 1;
      this.order[low + i] = low + i;
    }
    tridiagonalQl(this.values.subarray(low), offDiagonal.subarray(low), size, data, corner, this.ld, size);
  }

  /** diag(halves) + |cut| u u^T, u = e(middle - 1) + sign(cut) e(middle), in the eigenvectors of the halves. */
  private merge(low: number, middle: number, high: number, cut: number): void {
    const rho = 2 * Math.abs(cut);
    this.mergeOrder(low, middle, high);
    this.projectCoupling(low, middle, high, cut < 0 ? -Math.SQRT1_2 : Math.SQRT1_2);
    const kept = this.deflate(low, middle, high, rho);
    this.deflated += high - low - kept;
    if (kept === 0) return;
    for (let j = 0; j < kept; j++) {
      const row = this.rows[j];
      this.poles[j] = this.values[row];
      this.squares[j] = this.coupling[row] ** 2;
    }
    const both = this.placeByKind(kept);
    this.solveSecular(kept, rho);
    this.formUpdate(kept);
    this.gather(low, middle, high, kept, both);
    this.multiply(low, middle, high, kept, both);
    this.finishOrder(low, high, kept);
  }

  /** Merges the ascending orders of the halves into `order`. */
  private mergeOrder(low: number, middle: number, high: number): void {
    const { order, values, rows } = this;
    for (let i = low, p = low, q = middle; i < high; i++) {
      const fromLeft = q === high || (p < middle && values[order[p]] <= values[order[q]]);
      rows[i] = fromLeft ? order[p++] : order[q++];
    }
    order.set(rows.subarray(low, high), low);
  }

  /** z: components of u (normalised) along the eigenvectors of the halves. */
  private projectCoupling(low: number, middle: number, high: number, rightFactor: number): void {
    const { data } = this.vectors;
    for (let row = low; row < middle; row++) this.coupling[row] = Math.SQRT1_2 * data[row * this.ld + middle - 1];
    for (let row = middle; row < high; row++) this.coupling[row] = rightFactor * data[row * this.ld + middle];
  }

  /**
   * Sorts out the rows that need no update: those with a negligible component of u, and one of each pair of nearly equal
   * values, after a rotation that takes its component. Leaves the kept rows, ascending, at the head of `rows` and the others
   * behind them; returns the number kept.
   */
  private deflate(low: number, middle: number, high: number, rho: number): number {
    const { order, values, coupling, rows, kind } = this;
    let norm = 0;
    for (let row = low; row < high; row++) {
      kind[row] = row < middle ? LEFT : RIGHT;
      norm = Math.max(norm, Math.abs(values[row]), Math.abs(coupling[row]));
    }
    const threshold = DEFLATION * norm;
    const size = high - low;
    let kept = 0;
    let end = size;
    let candidate = -1;
    for (let i = low; i < high; i++) {
      const row = order[i];
      if (rho * Math.abs(coupling[row]) <= threshold) {
        rows[--end] = row;
      } else if (candidate < 0) {
        candidate = row;
      } else {
        if (this.rotateIfClose(candidate, row, threshold, low, size)) rows[--end] = candidate;
        else rows[kept++] = candidate;
        candidate = row;
      }
    }
    if (candidate >= 0) rows[kept++] = candidate;
    return kept;
  }

  /** Moves the component of u from row p to row q if the coupling that this leaves between them is negligible. */
  private rotateIfClose(p: number, q: number, threshold: number, low: number, size: number): boolean {
    const { values, coupling, kind, ld, vectors } = this;
    const length = Math.hypot(coupling[p], coupling[q]);
    const cosine = coupling[q] / length;
    const sine = -coupling[p] / length;
    const gap = values[q] - values[p];
    if (Math.abs(gap * cosine * sine) > threshold) return false;
    coupling[q] = length;
    coupling[p] = 0;
    if (kind[p] !== kind[q]) kind[q] = BOTH;
    const at = (row: number) => vectors.at + 8 * (row * ld + low);
    this.kernels.rotate(size, at(p), at(q), cosine, sine);
    const lower = values[p] * cosine * cosine + values[q] * sine * sine;
    values[q] = values[p] * sine * sine + values[q] * cosine * cosine;
    values[p] = lower;
    return true;
  }

  /** Numbers the kept rows by kind (left, both, right) in `place`; returns where `both` begins and ends. */
  private placeByKind(kept: number): { begin: number; end: number } {
    const next = [0, 0, 0];
    for (let j = 0; j < kept; j++) next[this.kind[this.rows[j]]]++;
    const begin = next[LEFT];
    const end = begin + next[BOTH];
    next[LEFT] = 0;
    next[BOTH] = begin;
    next[RIGHT] = end;
    for (let j = 0; j < kept; j++) this.place[j] = next[this.kind[this.rows[j]]]++;
    return { begin, end };
  }

  /** Roots, and in row r of `update` the distances d_j - root_r. */
  private solveSecular(kept: number, rho: number): void {
    const equation = new SecularEquation(this.poles, this.squares, kept, rho);
    for (let r = 0; r < kept; r++) this.roots[r] = equation.root(r, this.update.data, r * this.ld);
  }

  /**
   * Row r of `update` becomes the eigenvector of root r, its entries placed by kind: z_j / (d_j - root_r), with the z for which
   * the roots found are exact (Gu & Eisenstat), so that the vectors are orthogonal however close the roots.
   */
  private formUpdate(kept: number): void {
    const { poles, weights, place, rows, coupling, ld } = this;
    const { data } = this.update;
    weights.fill(-1, 0, kept);
    for (let r = 0; r < kept; r++) {
      const pole = poles[r];
      const row = r * ld;
      for (let j = 0; j < r; j++) weights[j] *= data[row + j] / (poles[j] - pole);
      weights[r] *= data[row + r];
      for (let j = r + 1; j < kept; j++) weights[j] *= data[row + j] / (poles[j] - pole);
    }
    for (let j = 0; j < kept; j++) weights[j] = Math.sign(coupling[rows[j]]) * Math.sqrt(weights[j]);
    const vector = this.squares;
    for (let r = 0; r < kept; r++) {
      const row = r * ld;
      let squares = 0;
      for (let j = 0; j < kept; j++) {
        const entry = weights[j] / data[row + j];
        vector[j] = entry;
        squares += entry * entry;
      }
      const scale = 1 / Math.sqrt(squares);
      for (let j = 0; j < kept; j++) data[row + place[j]] = scale * vector[j];
    }
  }

  /** Copies the halves' rows out of the way: left parts of the kept rows by place, then right parts, then the deflated rows. */
  private gather(low: number, middle: number, high: number, kept: number, both: { begin: number; end: number }): void {
    const { rows, place, ld, weights, values } = this;
    const { data: from } = this.vectors;
    const { data: to } = this.gathered;
    const left = middle - low;
    const right = high - middle;
    const rightParts = both.end * left;
    for (let j = 0; j < kept; j++) {
      const row = rows[j] * ld;
      const at = place[j];
      if (at < both.end) to.set(from.subarray(row + low, row + middle), at * left);
      if (at >= both.begin) to.set(from.subarray(row + middle, row + high), rightParts + (at - both.begin) * right);
    }
    const whole = rightParts + (kept - both.begin) * right;
    for (let j = kept; j < high - low; j++) {
      const row = rows[j] * ld;
      to.set(from.subarray(row + low, row + high), whole + (j - kept) * (high - low));
      weights[j] = values[rows[j]];
    }
  }

  /** New eigenvectors = update · halves in rows low..low+kept, the deflated ones behind them. */
  private multiply(
    low: number,
    middle: number,
    high: number,
    kept: number,
    both: { begin: number; end: number },
  ): void {
    const { ld, kernels, scratch, update, gathered, vectors, values, roots, weights } = this;
    const left = middle - low;
    const right = high - middle;
    const size = high - low;
    const rowBytes = 8 * ld;
    for (let row = low; row < low + kept; row++) {
      vectors.data.fill(0, row * ld + low, row * ld + high);
      values[row] = roots[row - low];
    }
    const corner = vectors.at + 8 * (low * ld + low);
    kernels.addProduct(
      ...([kept, left, both.end, 1] as const),
      ...([update.at, rowBytes, 8] as const),
      ...([gathered.at, 8 * left, 8] as const),
      ...([corner, rowBytes, scratch] as const),
    );
    const rightParts = both.end * left;
    kernels.addProduct(
      ...([kept, right, kept - both.begin, 1] as const),
      ...([update.at + 8 * both.begin, rowBytes, 8] as const),
      ...([gathered.at + 8 * rightParts, 8 * right, 8] as const),
      ...([corner + 8 * left, rowBytes, scratch] as const),
    );
    const whole = rightParts + (kept - both.begin) * right;
    for (let j = kept; j < size; j++) {
      const at = whole + (j - kept) * size;
      vectors.data.set(gathered.data.subarray(at, at + size), (low + j) * ld + low);
      values[low + j] = weights[j];
    }
  }

  /** Merges the roots (ascending) with the deflated values into `order`. */
  private finishOrder(low: number, high: number, kept: number): void {
    const { order, values } = this;
    for (let row = low; row < high; row++) order[row] = row;
    order.subarray(low + kept, high).sort((p, q) => values[p] - values[q]);
    this.mergeOrder(low, low + kept, high);
  }
}
