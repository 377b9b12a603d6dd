/**
 * Reduction of a real symmetric matrix to tridiagonal form by Householder reflections
 * (Martin, Reinsch & Wilkinson, Numer. Math. 11 (1968) 181).
 *   A = Q T Q^T, Q = H(n-1) ... H(2) H(1), H(i) = 1 - tau v v^T
 *   storage   row-major, the lower triangle of A is read; on return row i holds v of H(i) in its entries 0..i-1, with
 *             v[i-1] = 1, so that the reflections come off the last row first and the rest is always a leading block
 */
export interface Tridiagonal {
  /** n entries */
  readonly diagonal: Float64Array;
  /** n entries, entry i couples i and i + 1; the last is unused */
  readonly offDiagonal: Float64Array;
}

/** Reduces `a` in place and fills `tau` (n entries, entry i belongs to H(i)). O(n^3), unblocked: for small matrices. */
export function reduceToTridiagonal(a: Float64Array, n: number, tau: Float64Array, out: Tridiagonal): void {
  const w = new Float64Array(n);
  for (let i = n - 1; i > 0; i--) {
    const v = a.subarray(i * n, i * n + i);
    out.diagonal[i] = a[i * n + i];
    tau[i] = reflect(v, out.offDiagonal, i - 1);
    if (tau[i] !== 0) updateLeadingBlock(a, n, v, tau[i], w);
  }
  if (n > 0) out.diagonal[0] = a[0];
}

/**
 * Turns `v` into the vector of the reflection that maps it onto its last component; writes that component to
 * target[index] and returns tau (0 if there is nothing to reflect).
 */
export function reflect(v: Float64Array, target: Float64Array, index: number): number {
  const last = v.length - 1;
  let squares = 0;
  for (let k = 0; k < last; k++) squares += v[k] * v[k];
  const alpha = v[last];
  v[last] = 1;
  if (squares === 0) {
    target[index] = alpha;
    return 0;
  }
  const norm = Math.sqrt(alpha * alpha + squares);
  const beta = alpha >= 0 ? -norm : norm;
  const scale = 1 / (alpha - beta);
  for (let k = 0; k < last; k++) v[k] *= scale;
  target[index] = beta;
  return (beta - alpha) / beta;
}

/** A <- H A H on the lower triangle of the leading block that `v` spans: A - v w^T - w v^T, w = tau (A v - (tau/2)(v.Av) v). */
function updateLeadingBlock(a: Float64Array, n: number, v: Float64Array, tau: number, w: Float64Array): void {
  const m = v.length;
  w.fill(0, 0, m);
  for (let i = 0; i < m; i++) {
    const row = i * n;
    const vi = v[i];
    let sum = a[row + i] * vi;
    for (let j = 0; j < i; j++) {
      sum += a[row + j] * v[j];
      w[j] += a[row + j] * vi;
    }
    w[i] += sum;
  }
  let overlap = 0;
  for (let i = 0; i < m; i++) overlap += w[i] * v[i];
  const shift = (tau * overlap) / 2;
  for (let i = 0; i < m; i++) w[i] = tau * (w[i] - shift * v[i]);
  for (let i = 0; i < m; i++) {
    const row = i * n;
    const vi = v[i];
    const wi = w[i];
    for (let j = 0; j <= i; j++) a[row + j] -= vi * w[j] + wi * v[j];
  }
}

/** Turns rows of eigenvectors of T into rows of eigenvectors of A: each row x becomes Q x. */
export function applyReflections(a: Float64Array, n: number, tau: Float64Array, rows: Float64Array): void {
  for (let i = 2; i < n; i++) {
    if (tau[i] === 0) continue;
    const v = i * n;
    for (let row = 0; row < n * n; row += n) {
      let overlap = 0;
      for (let k = 0; k < i; k++) overlap += a[v + k] * rows[row + k];
      overlap *= tau[i];
      for (let k = 0; k < i; k++) rows[row + k] -= overlap * a[v + k];
    }
  }
}
