import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { systemOf } from '../../../test/documents.js';
import { forwardRate, rateMatrix } from './rate-matrix.js';

const positive = fc.double({ min: 0.05, max: 1, noNaN: true });
const rate = fc.double({ min: 0, max: 1e6, noNaN: true });

/** Three states in a ring. */
const rings = fc.tuple(fc.tuple(positive, positive, positive), fc.tuple(rate, rate, rate)).map(([weights, rates]) => {
  const total = weights.reduce((sum, w) => sum + w, 0);
  return systemOf({
    nuclei: [{ id: 'H', isotope: '1H', shift: 1 }],
    states: weights.map((w, s) => ({ id: `s${s}`, population: w / total })),
    exchange: rates.map((k, s) => ({ from: `s${s}`, to: `s${(s + 1) % 3}`, rate: k })),
  });
});

describe('rateMatrix', () => {
  it('keeps the number of molecules, the populations and the detailed balance of every pair', () => {
    fc.assert(
      fc.property(rings, (system) => {
        const k = rateMatrix(system, 300);
        const p = system.states!.map(({ population }) => population);
        const largest = Math.max(1, ...k.map(Math.abs));
        for (let s = 0; s < 3; s++) {
          expect(Math.abs(k[s] + k[3 + s] + k[6 + s]) / largest).toBeLessThan(1e-12);
          expect(Math.abs(k[3 * s] * p[0] + k[3 * s + 1] * p[1] + k[3 * s + 2] * p[2]) / largest).toBeLessThan(1e-12);
          for (let r = 0; r < 3; r++) {
            expect(Math.abs(k[3 * r + s] * p[s] - k[3 * s + r] * p[r]) / largest).toBeLessThan(1e-12);
            if (r !== s) expect(k[3 * r + s]).toBeGreaterThanOrEqual(0);
          }
        }
      }),
    );
  });

  it('is one zero without states', () => {
    expect([...rateMatrix(systemOf({ nuclei: [{ id: 'H', isotope: '1H', shift: 1 }] }), 300)]).toEqual([0]);
  });
});

describe('forwardRate', () => {
  it('is k_B T/h without a barrier: 6.212e12 s^-1 at 298.15 K (handbook value)', () => {
    const k = forwardRate({ from: 'a', to: 'b', eyring: { enthalpy: 0, entropy: 0 } }, 298.15);
    expect(k / 6.2124e12).toBeCloseTo(1, 4);
  });

  it('grows e-fold when the entropy grows by R', () => {
    const at = (entropy: number) => forwardRate({ from: 'a', to: 'b', eyring: { enthalpy: 50, entropy } }, 280);
    expect(at(8.31446261815324) / at(0)).toBeCloseTo(Math.E, 9);
  });
});
