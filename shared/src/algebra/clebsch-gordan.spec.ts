import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { clebschGordan } from './clebsch-gordan.js';
import { smallWigner } from './wigner.js';

const spin = fc.constantFrom(0, 0.5, 1, 1.5, 2, 2.5);
const projections = (j: number) => Array.from({ length: 2 * j + 1 }, (_, k) => j - k);
const totals = (j1: number, j2: number) => Array.from({ length: 2 * Math.min(j1, j2) + 1 }, (_, k) => j1 + j2 - k);

describe('clebschGordan', () => {
  it('is an orthogonal change of basis', () => {
    fc.assert(
      fc.property(spin, spin, (j1, j2) => {
        const states = totals(j1, j2).flatMap((j) => projections(j).map((m) => [j, m]));
        for (const [j, m] of states) {
          for (const [k, n] of states) {
            let overlap = 0;
            for (const m1 of projections(j1)) {
              for (const m2 of projections(j2))
                overlap += clebschGordan(j1, m1, j2, m2, j, m) * clebschGordan(j1, m1, j2, m2, k, n);
            }
            expect(overlap).toBeCloseTo(j === k && m === n ? 1 : 0, 12);
          }
        }
      }),
      { numRuns: 20 },
    );
  });

  it('has the Condon-Shortley phase: <j1 j1 j2 j-j1 | j j> > 0', () => {
    fc.assert(
      fc.property(spin, spin, (j1, j2) => {
        for (const j of totals(j1, j2)) expect(clebschGordan(j1, j1, j2, j - j1, j, j)).toBeGreaterThan(0);
      }),
    );
  });

  it('couples rotations: d^j1 d^j2 reduces to d^j', () => {
    // Clebsch-Gordan series (Varshalovich et al. 1988, ch. 4), here for 1 x 1/2 and 2 x 1.
    const element = (j: number, row: number, column: number, beta: number) =>
      smallWigner(j, beta).data[(j - row) * (2 * j + 1) + j - column];
    for (const [j1, j2] of [
      [1, 0.5],
      [2, 1],
    ]) {
      for (const [m1, n1, m2, n2] of [
        [1, 0, 0.5, -0.5],
        [0, 0, 0.5, 0.5],
        [-1, 1, -0.5, 0.5],
      ].map(([a, b, c, d]) => [a, b, c * 2 * j2, d * 2 * j2])) {
        let series = 0;
        for (const j of totals(j1, j2)) {
          if (Math.abs(m1 + m2) > j || Math.abs(n1 + n2) > j) continue;
          series +=
            clebschGordan(j1, m1, j2, m2, j, m1 + m2) *
            clebschGordan(j1, n1, j2, n2, j, n1 + n2) *
            element(j, m1 + m2, n1 + n2, 71);
        }
        expect(series).toBeCloseTo(element(j1, m1, n1, 71) * element(j2, m2, n2, 71), 13);
      }
    }
  });

  it('is zero where the numbers do not couple', () => {
    expect(clebschGordan(1, 1, 1, 0, 1, 0)).toBe(0);
    expect(clebschGordan(1, 0, 1, 0, 3, 0)).toBe(0);
    expect(clebschGordan(1, 2, 1, -1, 1, 1)).toBe(0);
    expect(clebschGordan(0.5, 0.5, 0.5, 0.5, 0.5, 1)).toBe(0);
  });
});
