import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { experimentOf, systemOf } from '../../../test/documents.js';
import { applySparseInto } from '../../algebra/sparse.js';
import type { ComplexArray } from '../../run/solved.js';
import { ensemblesOf, hamiltoniansOf, type Ensemble } from './ensemble.js';
import { generatorOf } from './generator.js';
import { coherenceBlocks } from './spin-space.js';

const hertz = fc.integer({ min: -200, max: 200 }).filter((value) => value !== 0);
const time = fc.double({ min: 0.01, max: 5, noNaN: true });

/** A proton pair beside a deuteron in two states, everything relaxing. */
const ensembles = fc
  .record({
    j: fc.tuple(hertz, hertz, hertz),
    shifts: fc.tuple(hertz, hertz),
    t1: fc.tuple(time, time, time),
    ratio: fc.double({ min: 0.05, max: 2, noNaN: true }),
    population: fc.double({ min: 0.05, max: 0.95, noNaN: true }),
    rate: fc.integer({ min: 0, max: 1e4 }),
  })
  .map(({ j, shifts, t1, ratio, population, rate }) => {
    const nucleus = (id: string, isotope: string, shift: number, n: number) => ({
      ...{ id, isotope, shift },
      ...{ t1: t1[n], t2: ratio * t1[n] },
    });
    const system = systemOf({
      nuclei: [nucleus('A', '1H', 5, 0), nucleus('B', '1H', 5.1, 1), nucleus('D', '2H', 5, 2)],
      couplings: [
        { between: ['A', 'B'], j: j[0] },
        { between: ['A', 'D'], j: j[1] },
        { between: ['B', 'D'], j: j[2] },
      ],
      states: [
        { id: 'p', population },
        { id: 'q', population: 1 - population, shifts: { A: 5 + shifts[0] / 400, B: 5 + shifts[1] / 400 } },
      ],
      exchange: [{ from: 'p', to: 'q', rate }],
    });
    return ensemblesOf(system, experimentOf({ relaxation: 't1-t2' }), [0, 1, 2])[0];
  });

/** The generator on all coherences: row (s n + ket) n + bra. */
function wholeGenerator(ensemble: Ensemble) {
  const n = ensemble.space.dimension;
  const kets = Uint32Array.from({ length: n * n }, (_, i) => Math.floor(i / n));
  const bras = Uint32Array.from({ length: n * n }, (_, i) => i % n);
  const { relaxation, rates } = ensemble;
  return generatorOf(n, { kets, bras }, hamiltoniansOf(ensemble, []), relaxation!({ kets, bras }), rates);
}

function times(generator: ReturnType<typeof generatorOf>, v: ComplexArray): ComplexArray {
  const out = { real: new Float64Array(generator.size), imag: new Float64Array(generator.size) };
  applySparseInto(out, generator, v);
  return out;
}

/** A Hermitian matrix of small whole numbers for each of two states. */
function hermitian(n: number): ComplexArray {
  const v = { real: new Float64Array(2 * n * n), imag: new Float64Array(2 * n * n) };
  for (let s = 0; s < 2; s++) {
    for (let a = 0; a < n; a++) {
      for (let b = 0; b < n; b++) {
        v.real[(s * n + a) * n + b] = ((a * b + s) % 7) - 3;
        v.imag[(s * n + a) * n + b] = ((a * a - b * b + 49 * 7) % 5) * Math.sign(a - b);
      }
    }
  }
  for (let s = 0; s < 2; s++) {
    for (let a = 0; a < n; a++) {
      for (let b = 0; b < a; b++) v.imag[(s * n + b) * n + a] = -v.imag[(s * n + a) * n + b];
    }
  }
  return v;
}

describe('generatorOf', () => {
  it('keeps the trace and Hermiticity of every density operator', () => {
    fc.assert(
      fc.property(ensembles, (ensemble) => {
        const n = ensemble.space.dimension;
        const rate = times(wholeGenerator(ensemble), hermitian(n));
        let trace = 0;
        for (let s = 0; s < 2; s++) {
          for (let a = 0; a < n; a++) {
            trace += rate.real[(s * n + a) * n + a];
            for (let b = 0; b < n; b++) {
              const [at, other] = [(s * n + a) * n + b, (s * n + b) * n + a];
              expect(Math.abs(rate.real[at] - rate.real[other])).toBeLessThan(1e-7);
              expect(Math.abs(rate.imag[at] + rate.imag[other])).toBeLessThan(1e-7);
            }
          }
        }
        expect(Math.abs(trace)).toBeLessThan(1e-7);
      }),
      { numRuns: 20 },
    );
  });

  it('leaves the unit operator shared out by population as it is', () => {
    fc.assert(
      fc.property(ensembles, (ensemble) => {
        const n = ensemble.space.dimension;
        const v = { real: new Float64Array(2 * n * n), imag: new Float64Array(2 * n * n) };
        for (let s = 0; s < 2; s++) {
          for (let a = 0; a < n; a++) v.real[(s * n + a) * n + a] = ensemble.populations[s];
        }
        const rate = times(wholeGenerator(ensemble), v);
        for (const x of [...rate.real, ...rate.imag]) expect(Math.abs(x)).toBeLessThan(1e-8);
      }),
      { numRuns: 20 },
    );
  });

  it('is symmetric between populations to the power of one half, and only ever damps', () => {
    fc.assert(
      fc.property(ensembles, (ensemble) => {
        const n = ensemble.space.dimension;
        const { size, start, columns, real, imag } = wholeGenerator(ensemble);
        const root = (row: number) => Math.sqrt(ensemble.populations[Math.floor(row / n / n)]);
        const entries = new Map<number, [number, number]>();
        for (let r = 0; r < size; r++) {
          for (let p = start[r]; p < start[r + 1]; p++) {
            const factor = root(columns[p]) / root(r);
            entries.set(r * size + columns[p], [factor * real[p], factor * imag[p]]);
          }
        }
        // The real part is a symmetric matrix that is not positive: try its quadratic form on a vector.
        let form = 0;
        for (const [at, [re, im]] of entries) {
          const [r, c] = [Math.floor(at / size), at % size];
          const [tr, ti] = entries.get(c * size + r)!;
          expect(Math.abs(re - tr) + Math.abs(im - ti)).toBeLessThan(1e-9 * (1 + Math.abs(re) + Math.abs(im)));
          form += Math.sin(r + 1) * re * Math.sin(c + 1);
        }
        expect(form).toBeLessThanOrEqual(0);
      }),
      { numRuns: 10 },
    );
  });

  it('keeps the orders of every isotope: blocks are closed and their sizes add up', () => {
    fc.assert(
      fc.property(ensembles, (ensemble) => {
        const blocks = coherenceBlocks(ensemble.space, false);
        const { relaxation, rates, space } = ensemble;
        const hamiltonians = hamiltoniansOf(ensemble, []);
        let total = 0;
        for (const block of blocks) {
          // Throws where a row leads out of the block.
          const part = generatorOf(space.dimension, block, hamiltonians, relaxation!(block), rates);
          expect(part.columns.every((column) => column < part.size)).toBe(true);
          total += block.kets.length;
        }
        expect(total).toBe(space.dimension ** 2);
        // Order -1 of two protons, C(4, 1) elements, times order 0 of a deuteron, 3.
        const detected = blocks.filter(({ orders }) => orders.join() === '-1,0');
        expect(detected.map(({ kets }) => kets.length)).toEqual([12]);
      }),
      { numRuns: 5 },
    );
  });
});
