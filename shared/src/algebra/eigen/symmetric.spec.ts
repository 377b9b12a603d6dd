import fc from 'fast-check';
import { EigenvalueDecomposition, Matrix } from 'ml-matrix';
import { describe, expect, it } from 'vitest';
import { eigenSymmetric } from './symmetric.js';

/** Symmetric n x n matrix of seeded numbers in -1..1 (a linear congruential generator, so that failures repeat). */
function seeded(n: number, seed: number): Float64Array {
  const a = new Float64Array(n * n);
  let state = seed;
  for (let i = 0; i < n; i++) {
    for (let j = 0; j <= i; j++) {
      state = (Math.imul(state, 1664525) + 1013904223) >>> 0;
      a[i * n + j] = a[j * n + i] = state / 2 ** 31 - 1;
    }
  }
  return a;
}

/** Largest entries of A v - value v and of V V^T - 1, over all eigenvectors. */
function residuals(a: Float64Array, n: number) {
  const { values, vectors } = eigenSymmetric(a, n);
  let [equation, orthonormality] = [0, 0];
  for (let k = 0; k < n; k++) {
    const v = vectors.subarray(k * n, (k + 1) * n);
    for (let i = 0; i < n; i++) {
      let sum = -values[k] * v[i];
      for (let j = 0; j < n; j++) sum += a[i * n + j] * v[j];
      equation = Math.max(equation, Math.abs(sum));
    }
    for (let l = 0; l <= k; l++) {
      let sum = k === l ? -1 : 0;
      for (let i = 0; i < n; i++) sum += v[i] * vectors[l * n + i];
      orthonormality = Math.max(orthonormality, Math.abs(sum));
    }
  }
  return { values, equation, orthonormality };
}

describe('eigenSymmetric', () => {
  it.each([1, 2, 3, 31, 32, 33, 40, 64, 65, 100, 150, 257])(
    'solves A v = a v with orthonormal vectors, n = %d',
    (n) => {
      const { values, equation, orthonormality } = residuals(seeded(n, n), n);
      expect(equation).toBeLessThan(1e-12 * n);
      expect(orthonormality).toBeLessThan(1e-12);
      expect([...values].every((value, k) => k === 0 || value >= values[k - 1])).toBe(true);
    },
  );

  it.each([20, 90])('agrees with ml-matrix on the eigenvalues, n = %d', (n) => {
    const a = seeded(n, 7);
    const square = Matrix.from1DArray(n, n, a);
    const expected = new EigenvalueDecomposition(square, { assumeSymmetric: true }).realEigenvalues.sort(
      (x, y) => x - y,
    );
    eigenSymmetric(a, n).values.forEach((value, k) => expect(value).toBeCloseTo(expected[k], 11));
  });

  it.each([
    ['a zero matrix', () => 0],
    ['a unit matrix', (i: number, j: number) => (i === j ? 1 : 0)],
    ['a matrix of rank one', () => 1],
    ['a chain with equal links', (i: number, j: number) => (Math.abs(i - j) === 1 ? 1 : 0)],
    ['degenerate blocks', (i: number, j: number) => (i >> 2 === j >> 2 ? 3 : 0)],
    [
      'entries that span twelve decades',
      (i: number, j: number) => (i === j ? 10 ** (-i / 8) : 10 ** (-(i + j) / 8 - 1)),
    ],
  ])('keeps vectors orthonormal for %s', (_name, entry) => {
    const n = 96;
    const a = Float64Array.from({ length: n * n }, (_, p) => entry(Math.floor(p / n), p % n));
    const { equation, orthonormality } = residuals(a, n);
    expect(equation).toBeLessThan(1e-11);
    expect(orthonormality).toBeLessThan(1e-12);
  });

  it('has the closed eigenvalues of a chain, 2 cos(pi k/(n + 1)) (Toeplitz tridiagonal, a textbook formula)', () => {
    const n = 70;
    const a = new Float64Array(n * n);
    for (let i = 1; i < n; i++) a[i * n + i - 1] = a[(i - 1) * n + i] = 1;
    eigenSymmetric(a, n).values.forEach((value, k) =>
      expect(value).toBeCloseTo(2 * Math.cos((Math.PI * (n - k)) / (n + 1)), 12),
    );
  });

  it('keeps trace and Frobenius norm, at any scale', () => {
    fc.assert(
      fc.property(
        fc.integer({ min: 1, max: 60 }),
        fc.integer(),
        fc.integer({ min: -150, max: 150 }),
        (n, seed, power) => {
          const scale = 10 ** power;
          const a = seeded(n, seed).map((x) => x * scale);
          const { values } = eigenSymmetric(a, n);
          let [trace, norm, sum, squares] = [0, 0, 0, 0];
          for (let i = 0; i < n; i++) trace += a[i * n + i] / scale;
          for (const x of a) norm += (x / scale) ** 2;
          for (const x of values) {
            sum += x / scale;
            squares += (x / scale) ** 2;
          }
          expect(sum).toBeCloseTo(trace, 10);
          expect(squares).toBeCloseTo(norm, 8);
        },
      ),
      { numRuns: 60 },
    );
  });

  it('reads the lower triangle only and leaves its argument as it is', () => {
    const a = seeded(50, 3);
    const lower = a.slice();
    for (let i = 0; i < 50; i++) for (let j = i + 1; j < 50; j++) lower[i * 50 + j] = Number.MAX_VALUE / 1e200;
    const before = lower.slice();
    expect(eigenSymmetric(lower, 50).values[7]).toBeCloseTo(eigenSymmetric(a, 50).values[7], 12);
    expect(lower).toEqual(before);
  });

  it('throws on an entry that is not finite', () => {
    expect(() => eigenSymmetric(Float64Array.of(1, 0, NaN, 1), 2)).toThrow(RangeError);
  });
});
