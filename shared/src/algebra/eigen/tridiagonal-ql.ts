/**
 * Eigenvalues and eigenvectors of a real symmetric tridiagonal matrix by implicit QL steps with Wilkinson's shift
 * (Bowdler, Martin, Reinsch & Wilkinson, Numer. Math. 11 (1968) 293). Best below some 30 rows.
 */

/** Steps allowed for one eigenvalue; two to three are usual (common practice). */
const MAX_STEPS = 60;

/** Below this a coupling's square is lost to underflow: sqrt of the smallest normal double. */
const SMALLEST_SQUARABLE = 1.5e-154;

/**
 * Diagonalises T in place.
 *   diagonal      n entries, on return the eigenvalues, ascending
 *   offDiagonal   n - 1 entries or more, entry i couples i and i + 1; destroyed
 *   vectors       n rows of `width` entries from `start` on, `stride` apart; on return row k holds the old rows combined
 *                 by eigenvector k (the identity gives the eigenvectors of T as rows)
 */
export function tridiagonalQl(
  diagonal: Float64Array,
  offDiagonal: Float64Array,
  n: number,
  vectors: Float64Array,
  start: number,
  stride: number,
  width: number,
): void {
  const floor = Math.max(Number.EPSILON ** 2 * largest(diagonal, offDiagonal, n), SMALLEST_SQUARABLE);
  for (let low = 0; low < n - 1; low++) {
    for (let steps = 0; ; steps++) {
      const high = firstSplit(diagonal, offDiagonal, low, n, floor);
      if (high === low) break;
      if (steps === MAX_STEPS) throw new RangeError('The QL iteration did not converge');
      qlStep(diagonal, offDiagonal, low, high, vectors, start, stride, width);
    }
  }
  sortAscending(diagonal, n, vectors, start, stride, width);
}

/** The end of the unreduced block that begins at `low`; couplings below `floor` or lost beside the diagonal split. */
function firstSplit(diagonal: Float64Array, offDiagonal: Float64Array, low: number, n: number, floor: number): number {
  let high = low;
  while (high < n - 1) {
    const scale = Math.abs(diagonal[high]) + Math.abs(diagonal[high + 1]);
    if (Math.abs(offDiagonal[high]) <= Number.EPSILON * scale + floor) break;
    high++;
  }
  return high;
}

function largest(diagonal: Float64Array, offDiagonal: Float64Array, n: number): number {
  let norm = Math.abs(diagonal[n - 1] ?? 0);
  for (let i = 0; i < n - 1; i++) norm = Math.max(norm, Math.abs(diagonal[i]), Math.abs(offDiagonal[i]));
  return norm;
}

/** One implicit QL sweep over the block low..high, each rotation applied to two rows of `vectors`. */
function qlStep(
  diagonal: Float64Array,
  offDiagonal: Float64Array,
  low: number,
  high: number,
  vectors: Float64Array,
  start: number,
  stride: number,
  width: number,
): void {
  const half = (diagonal[low + 1] - diagonal[low]) / (2 * offDiagonal[low]);
  const root = Math.sqrt(half * half + 1);
  let g = diagonal[high] - diagonal[low] + offDiagonal[low] / (half + (half >= 0 ? root : -root));
  let cosine = 1;
  let sine = 1;
  let shift = 0;
  for (let i = high - 1; i >= low; i--) {
    const f = sine * offDiagonal[i];
    const b = cosine * offDiagonal[i];
    const r = Math.sqrt(f * f + g * g);
    if (i + 1 < high) offDiagonal[i + 1] = r;
    if (r === 0) {
      diagonal[i + 1] -= shift;
      return;
    }
    sine = f / r;
    cosine = g / r;
    g = diagonal[i + 1] - shift;
    const t = (diagonal[i] - g) * sine + 2 * cosine * b;
    shift = sine * t;
    diagonal[i + 1] = g + shift;
    g = cosine * t - b;
    const lower = start + i * stride;
    for (let p = lower, q = lower + stride; p < lower + width; p++, q++) {
      const x = vectors[p];
      const y = vectors[q];
      vectors[q] = sine * x + cosine * y;
      vectors[p] = cosine * x - sine * y;
    }
  }
  diagonal[low] -= shift;
  offDiagonal[low] = g;
}

function sortAscending(
  values: Float64Array,
  n: number,
  vectors: Float64Array,
  start: number,
  stride: number,
  width: number,
): void {
  for (let i = 0; i < n - 1; i++) {
    let least = i;
    for (let j = i + 1; j < n; j++) if (values[j] < values[least]) least = j;
    if (least === i) continue;
    [values[i], values[least]] = [values[least], values[i]];
    const p = start + i * stride;
    const q = start + least * stride;
    for (let k = 0; k < width; k++) {
      const kept = vectors[p + k];
      vectors[p + k] = vectors[q + k];
      vectors[q + k] = kept;
    }
  }
}
