import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { ComplexArray } from '../run/solved.js';
import { complexMatrix, multiplyComplex } from './dense.js';
import { expmDense } from './expm-dense.js';
import { expAction, sampleSignals } from './krylov.js';
import { applySparseInto, rowSumNorm, SparseComplexBuilder } from './sparse.js';

const N = 40;

/** A damped chain: imaginary frequencies on the diagonal, hopping beside it, losses, all from one seed. */
const chains = fc.record({
  spread: fc.double({ min: 1, max: 400, noNaN: true }),
  hopping: fc.double({ min: 0, max: 100, noNaN: true }),
  loss: fc.double({ min: 0, max: 30, noNaN: true }),
});

function chain({ spread, hopping, loss }: { spread: number; hopping: number; loss: number }) {
  const builder = new SparseComplexBuilder(N);
  const dense = complexMatrix(N, N);
  const add = (r: number, c: number, re: number, im: number) => {
    builder.add(c, re, im);
    dense.real[r * N + c] += re;
    dense.imag[r * N + c] += im;
  };
  for (let r = 0; r < N; r++) {
    add(r, r, -loss * (1 + Math.sin(r)), spread * Math.sin(3 * r + 1));
    if (r > 0) add(r, r - 1, loss / 4, hopping);
    if (r + 1 < N) add(r, r + 1, loss / 3, hopping);
    // A second share of one place adds to the first.
    add(r, r, 0, spread / 10);
    builder.endRow();
  }
  return { sparse: builder.finish(), dense };
}

function vector(): ComplexArray {
  return {
    real: Float64Array.from({ length: N }, (_, k) => Math.cos(k)),
    imag: Float64Array.from({ length: N }, (_, k) => Math.sin(k * k)),
  };
}

function denseTimes(a: ReturnType<typeof complexMatrix>, v: ComplexArray): ComplexArray {
  return multiplyComplex(a, complexMatrix(N, 1, v.real.slice(), v.imag.slice()));
}

function largestDifference(a: ComplexArray, b: ComplexArray): number {
  return a.real.reduce((most, x, k) => Math.max(most, Math.hypot(x - b.real[k], a.imag[k] - b.imag[k])), 0);
}

function scaledBy(a: ReturnType<typeof complexMatrix>, t: number) {
  return complexMatrix(
    N,
    N,
    a.real.map((x) => x * t),
    a.imag.map((x) => x * t),
  );
}

describe('sparse matrices', () => {
  it('multiply as the dense ones do, and bound the size of the product', () => {
    fc.assert(
      fc.property(chains, (parts) => {
        const { sparse, dense } = chain(parts);
        const out = { real: new Float64Array(N), imag: new Float64Array(N) };
        applySparseInto(out, sparse, vector());
        expect(largestDifference(out, denseTimes(dense, vector()))).toBeLessThan(1e-10);
        const [largest, bound] = [Math.max(...out.real.map((x, k) => Math.hypot(x, out.imag[k]))), rowSumNorm(sparse)];
        expect(largest).toBeLessThanOrEqual(bound * Math.SQRT2);
      }),
    );
  });
});

describe('expAction', () => {
  it('is exp(A t) v by the dense exponential', () => {
    fc.assert(
      fc.property(chains, fc.double({ min: 0, max: 0.5, noNaN: true }), (parts, t) => {
        const { sparse, dense } = chain(parts);
        const expected = denseTimes(expmDense(scaledBy(dense, t)), vector());
        expect(largestDifference(expAction(sparse, vector(), t, 1e-11), expected)).toBeLessThan(1e-8);
      }),
      { numRuns: 30 },
    );
  });

  it('counts its products, which grow with time', () => {
    const { sparse } = chain({ spread: 300, hopping: 50, loss: 2 });
    const products = [0.1, 1].map((t) => {
      const counts = { products: 0 };
      expAction(sparse, vector(), t, 1e-10, counts);
      return counts.products;
    });
    expect(products[0]).toBeGreaterThan(0);
    expect(products[1]).toBeGreaterThan(3 * products[0]);
  });
});

describe('sampleSignals', () => {
  it('samples what the powers of one dense step give', () => {
    fc.assert(
      fc.property(chains, (parts) => {
        const { sparse, dense } = chain(parts);
        const probe = Float64Array.from({ length: N }, (_, k) => 1 / (k + 1));
        const sampling = { dwell: 2e-3, points: 60 };
        const [signal] = sampleSignals(sparse, vector(), [probe], sampling, 1e-10, { products: 0 });
        const step = expmDense(scaledBy(dense, sampling.dwell));
        let v = vector();
        for (let k = 0; k < sampling.points; k++) {
          const re = probe.reduce((sum, p, i) => sum + p * v.real[i], 0);
          const im = probe.reduce((sum, p, i) => sum + p * v.imag[i], 0);
          expect(Math.hypot(signal.real[k] - re, signal.imag[k] - im)).toBeLessThan(1e-8);
          v = denseTimes(step, v);
        }
      }),
      { numRuns: 20 },
    );
  });
});
