import { complexMatrix, type ComplexMatrix } from '../../algebra/dense.js';
import { solveComplexInPlace } from '../../algebra/dense-solve.js';
import { eigenHermitian } from '../../algebra/eigen/hermitian.js';

/** Eigenvalues exp(i angle) of a unitary matrix; row k of `vectors` is the eigenvector of angles[k]. */
export interface UnitaryEigen {
  readonly angles: Float64Array;
  readonly vectors: ComplexMatrix;
}

/**
 * Diagonalises a unitary n x n matrix through the Hermitian matrix i (1 - W)(1 + W)^-1, W = exp(-i cut) U, whose eigenvalues
 * are tan((angle - cut)/2) (A. Cayley's transform). Of n + 1 evenly spaced cuts at least one keeps all angles at a distance of
 * pi/(n + 1) from where the tangent diverges.
 */
export function eigenUnitary(u: ComplexMatrix): UnitaryEigen {
  const n = u.rows;
  if (n === 1) {
    return {
      angles: Float64Array.of(Math.atan2(u.imag[0], u.real[0])),
      vectors: complexMatrix(1, 1, Float64Array.of(1)),
    };
  }
  const largest = 2 * n * Math.tan(Math.PI / 2 - Math.PI / (2 * n + 2));
  for (let trial = 0; trial <= n; trial++) {
    const cut = (2 * Math.PI * trial) / (n + 1);
    const hermitian = cayley(u, cut);
    if (!hermitian || norm(hermitian) > largest) continue;
    const { values, vectors } = eigenHermitian(hermitian);
    return { angles: values.map((tangent) => cut + 2 * Math.atan(tangent)), vectors };
  }
  throw new RangeError('The matrix to be diagonalised is not unitary');
}

/** i (1 - W)(1 + W)^-1 = i (1 + W)^-1 (1 - W); null where 1 + W is singular. */
function cayley(u: ComplexMatrix, cut: number): ComplexMatrix | null {
  const n = u.rows;
  const [c, s] = [Math.cos(cut), Math.sin(cut)];
  const [sum, out] = [complexMatrix(n, n), complexMatrix(n, n)];
  for (let p = 0; p < n * n; p++) {
    const unit = p % (n + 1) === 0 ? 1 : 0;
    const re = c * u.real[p] + s * u.imag[p];
    const im = c * u.imag[p] - s * u.real[p];
    sum.real[p] = unit + re;
    sum.imag[p] = im;
    // i (1 - W)
    out.real[p] = im;
    out.imag[p] = unit - re;
  }
  try {
    solveComplexInPlace(sum, out);
    flushTiny(out.real);
    flushTiny(out.imag);
    return out;
  } catch (error) {
    if (error instanceof RangeError) return null;
    throw error;
  }
}

/** The Hermitian solver takes entries of ordinary size; these are far below rounding. */
function flushTiny(entries: Float64Array): void {
  for (let p = 0; p < entries.length; p++) if (Math.abs(entries[p]) < 1e-100) entries[p] = 0;
}

function norm(a: ComplexMatrix): number {
  return a.real.reduce((sum, value, p) => Math.max(sum, Math.hypot(value, a.imag[p])), 0);
}
