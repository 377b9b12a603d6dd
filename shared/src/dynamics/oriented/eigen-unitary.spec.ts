import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { adjoint, complexIdentity, complexMatrix, multiplyComplex, type ComplexMatrix } from '../../algebra/dense.js';
import { expmDense } from '../../algebra/expm-dense.js';
import { eigenUnitary } from './eigen-unitary.js';

/** exp(i A) of a Hermitian A made of `numbers`. */
function unitaryFrom(n: number, numbers: readonly number[]): ComplexMatrix {
  const exponent = complexMatrix(n, n);
  for (let i = 0, next = 0; i < n; i++) {
    for (let j = 0; j <= i; j++) {
      const [re, im] = [numbers[next++ % numbers.length], i === j ? 0 : numbers[next++ % numbers.length]];
      [exponent.real[i * n + j], exponent.imag[i * n + j]] = [-im, re];
      [exponent.real[j * n + i], exponent.imag[j * n + i]] = [im, re];
    }
  }
  return expmDense(exponent);
}

/** sum_k x_k exp(i angle_k) x_k^+ */
function rebuild({ angles, vectors }: ReturnType<typeof eigenUnitary>): ComplexMatrix {
  const n = angles.length;
  const columns = complexMatrix(n, n);
  const turned = complexMatrix(n, n);
  for (let k = 0; k < n; k++) {
    for (let i = 0; i < n; i++) {
      const [re, im] = [vectors.real[k * n + i], vectors.imag[k * n + i]];
      [columns.real[i * n + k], columns.imag[i * n + k]] = [re, im];
      turned.real[i * n + k] = re * Math.cos(angles[k]) - im * Math.sin(angles[k]);
      turned.imag[i * n + k] = re * Math.sin(angles[k]) + im * Math.cos(angles[k]);
    }
  }
  return multiplyComplex(turned, adjoint(columns));
}

function expectEqual(a: ComplexMatrix, b: ComplexMatrix): void {
  a.real.forEach((value, p) => expect(Math.abs(value - b.real[p])).toBeLessThan(1e-11));
  a.imag.forEach((value, p) => expect(Math.abs(value - b.imag[p])).toBeLessThan(1e-11));
}

describe('eigenUnitary', () => {
  it('rebuilds any unitary matrix from its eigenvectors', () => {
    const numbers = fc.array(fc.double({ min: -4, max: 4, noNaN: true }), { minLength: 3, maxLength: 30 });
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 6 }), numbers, (n, values) => {
        const u = unitaryFrom(n, values);
        expectEqual(rebuild(eigenUnitary(u)), u);
      }),
    );
  });

  it('takes degenerate eigenvalues, at either end of the circle', () => {
    expectEqual(rebuild(eigenUnitary(complexIdentity(4))), complexIdentity(4));
    const minus = complexMatrix(3, 3, Float64Array.of(-1, 0, 0, 0, -1, 0, 0, 0, 1));
    expectEqual(rebuild(eigenUnitary(minus)), minus);
  });
});
