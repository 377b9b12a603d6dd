import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { complexMatrix } from './dense.js';
import { spectralMeasure } from './eigen/complex-tridiagonal.js';
import { expmDense } from './expm-dense.js';
import { lanczosAction, lanczosSignal } from './lanczos.js';
import { SparseComplexBuilder, type SparseComplex } from './sparse.js';

/** A full complex symmetric matrix like those of spin dynamics: oscillations along the imaginary axis, decays to the left. */
function symmetricMatrix(size: number, seed: number, damping: number): SparseComplex {
  const random = generator(seed);
  const [real, imag] = [new Float64Array(size * size), new Float64Array(size * size)];
  for (let r = 0; r < size; r++) {
    for (let c = 0; c <= r; c++) {
      imag[r * size + c] = imag[c * size + r] = (r === c ? 20 : 2) * (random() - 0.5);
      if (r !== c) real[r * size + c] = real[c * size + r] = (damping * (random() - 0.5)) / size;
    }
    real[r * size + r] = -damping * (1 + random());
  }
  const builder = new SparseComplexBuilder(size);
  for (let r = 0; r < size; r++) {
    for (let c = 0; c < size; c++) builder.add(c, real[r * size + c], imag[r * size + c]);
    builder.endRow();
  }
  return builder.finish();
}

/** Numbers in 0..1 from a linear congruence (W. H. Press et al., Numerical Recipes, 1992, ch. 7). */
function generator(seed: number): () => number {
  let state = seed >>> 0;
  return () => (state = (Math.imul(state, 1664525) + 1013904223) >>> 0) / 2 ** 32;
}

/** p^T exp(A t) v by the dense exponential. */
function dense(
  a: SparseComplex,
  p: Float64Array,
  v: { real: Float64Array; imag: Float64Array },
  t: number,
): [number, number] {
  const n = a.size;
  const matrix = complexMatrix(n, n);
  for (let r = 0; r < n; r++) {
    for (let q = a.start[r]; q < a.start[r + 1]; q++) {
      matrix.real[r * n + a.columns[q]] = t * a.real[q];
      matrix.imag[r * n + a.columns[q]] = t * a.imag[q];
    }
  }
  const e = expmDense(matrix);
  let [re, im] = [0, 0];
  for (let r = 0, q = 0; r < n; r++) {
    for (let c = 0; c < n; c++, q++) {
      re += p[r] * (e.real[q] * v.real[c] - e.imag[q] * v.imag[c]);
      im += p[r] * (e.real[q] * v.imag[c] + e.imag[q] * v.real[c]);
    }
  }
  return [re, im];
}

describe('lanczosSignal', () => {
  const cases = fc.record({
    size: fc.integer({ min: 1, max: 24 }),
    seed: fc.integer({ min: 1, max: 1e6 }),
    damping: fc.constantFrom(0, 0.3, 5),
  });

  it('is p exp(A t) v for any p and v', () => {
    fc.assert(
      fc.property(cases, fc.boolean(), ({ size, seed, damping }, alike) => {
        const a = symmetricMatrix(size, seed, damping);
        const random = generator(seed + 1);
        const p = Float64Array.from({ length: size }, () => random() + 0.1);
        const v = alike
          ? { real: p.map((x) => 2 * x), imag: p.map((x) => -x) }
          : { real: p.map(() => random()), imag: p.map(() => random()) };
        const counts = { products: 0 };
        const signal = lanczosSignal(a, p, v, { dwell: 0.1, points: 20 }, counts)!;
        expect(counts.products).toBeLessThanOrEqual(alike ? size : 2 * size);
        for (const k of [0, 1, 7, 19]) {
          const [re, im] = dense(a, p, v, 0.1 * k);
          expect(Math.hypot(signal.real[k] - re, signal.imag[k] - im)).toBeLessThan(1e-8 * size);
        }
      }),
      { numRuns: 60 },
    );
  });

  it('stops early where the vector reaches only a part of the space', () => {
    const builder = new SparseComplexBuilder(6);
    for (let r = 0; r < 6; r++) {
      builder.add(r, -1, r < 3 ? 5 : -7);
      builder.endRow();
    }
    const counts = { products: 0 };
    const ones = new Float64Array(6).fill(1);
    const signal = lanczosSignal(
      builder.finish(),
      ones,
      { real: ones, imag: new Float64Array(6) },
      { dwell: 0.1, points: 3 },
      counts,
    )!;
    expect(counts.products).toBe(2);
    expect(signal.real[2]).toBeCloseTo(3 * Math.exp(-0.2) * (Math.cos(1) + Math.cos(1.4)), 12);
  });

  it('gives up where the product of the vector with itself vanishes', () => {
    const a = symmetricMatrix(2, 3, 1);
    // p + v = (1 + i, 1 - i): its product with itself is 0.
    const v = { real: new Float64Array(2), imag: Float64Array.of(1, -1) };
    expect(lanczosSignal(a, Float64Array.of(1, 1), v, { dwell: 0.1, points: 2 }, { products: 0 })).toBeNull();
  });
});

describe('lanczosAction', () => {
  it('is exp(A t) v', () => {
    fc.assert(
      fc.property(fc.integer({ min: 1, max: 16 }), fc.integer({ min: 1, max: 1e6 }), (size, seed) => {
        const a = symmetricMatrix(size, seed, 1);
        const random = generator(seed + 2);
        const v = {
          real: Float64Array.from({ length: size }, random),
          imag: Float64Array.from({ length: size }, random),
        };
        const t = 0.7;
        const found = lanczosAction(
          a,
          v,
          (re, im) => [Math.exp(re * t) * Math.cos(im * t), Math.exp(re * t) * Math.sin(im * t)],
          { products: 0 },
        )!;
        for (let k = 0; k < size; k++) {
          const unit = Float64Array.from({ length: size }, (_, i) => (i === k ? 1 : 0));
          const [re, im] = dense(a, unit, v, t);
          expect(Math.hypot(found.real[k] - re, found.imag[k] - im)).toBeLessThan(1e-8 * size);
        }
      }),
      { numRuns: 40 },
    );
  });
});

describe('spectralMeasure', () => {
  it('has the moments e1 T^k e1', () => {
    const [d, e] = [
      { real: Float64Array.of(-1, -2, -0.5, -3), imag: Float64Array.of(4, -1, 2, 7) },
      { real: Float64Array.of(0.1, 0.3, -0.2), imag: Float64Array.of(2, 1, 3) },
    ];
    const { real, imag, weightReal, weightImag } = spectralMeasure(4, d, e)!;
    let vector = [
      [1, 0],
      [0, 0],
      [0, 0],
      [0, 0],
    ];
    for (let power = 0; power < 6; power++) {
      let [re, im] = [0, 0];
      for (let k = 0; k < 4; k++) {
        let [wr, wi] = [weightReal[k], weightImag[k]];
        for (let q = 0; q < power; q++) [wr, wi] = [wr * real[k] - wi * imag[k], wr * imag[k] + wi * real[k]];
        re += wr;
        im += wi;
      }
      expect(re).toBeCloseTo(vector[0][0], 8);
      expect(im).toBeCloseTo(vector[0][1], 8);
      const times = (x: number, y: number, [re2, im2]: number[]) => [x * re2 - y * im2, x * im2 + y * re2];
      vector = vector.map((_, i) => {
        const terms = [times(d.real[i], d.imag[i], vector[i])];
        if (i > 0) terms.push(times(e.real[i - 1], e.imag[i - 1], vector[i - 1]));
        if (i < 3) terms.push(times(e.real[i], e.imag[i], vector[i + 1]));
        return [terms.reduce((sum, [x]) => sum + x, 0), terms.reduce((sum, [, y]) => sum + y, 0)];
      });
    }
  });
});
