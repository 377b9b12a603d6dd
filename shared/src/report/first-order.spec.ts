import { describe, expect, it } from 'vitest';
import { experimentOf, protonPair, systemOf } from '../../test/documents.js';
import { estimateFirstOrderDisplacement, firstOrderReading } from './first-order.js';

describe('first-order reading', () => {
  it('is exact for an AB quartet: lines at (sqrt(D^2 + J^2) +- J)/2, intensities 1 -+ J/sqrt(D^2 + J^2)', () => {
    // J. A. Pople, W. G. Schneider, H. J. Bernstein, High-Resolution NMR, 1959, ch. 6.
    for (const [difference, j] of [
      [100, 10],
      [30, 12],
      [20, -7],
    ]) {
      const entry = firstOrderReading(protonPair(difference, j), experimentOf());
      const root = Math.hypot(difference, j);
      expect(entry.computed).toBe('exact-difference');
      expect(entry.hz).toBeCloseTo((root - difference) / 2, 8);
      expect(estimateFirstOrderDisplacement(protonPair(difference, j), experimentOf())).toBeCloseTo(entry.hz, 8);
      const intensity = +/intensities by ([\d.]+) %/.exec(entry.detail)![1] / 100;
      expect(Math.abs(intensity - Math.abs(j) / root)).toBeLessThan(0.005);
    }
  });

  it('estimates within a factor of two of the exact difference for ABX-like chains', () => {
    for (const gap of [20, 40, 80, 200]) {
      const system = systemOf({
        nuclei: [0, 1, 2.7].map((k, row) => ({ id: `H${row}`, isotope: '1H', shift: 4 + (k * gap) / 400 })),
        couplings: [
          { between: ['H0', 'H1'], j: 9 },
          { between: ['H1', 'H2'], j: 6 },
        ],
      });
      const ratio =
        estimateFirstOrderDisplacement(system, experimentOf()) / firstOrderReading(system, experimentOf()).hz;
      expect(ratio).toBeGreaterThan(0.5);
      expect(ratio).toBeLessThan(2);
    }
  });

  it('is nothing for equivalent nuclei and for an isolated methyl group', () => {
    expect(firstOrderReading(protonPair(0, 12), experimentOf()).hz).toBeCloseTo(0, 8);
    const methyl = systemOf({ nuclei: [{ id: 'M', isotope: '1H', shift: 1, count: 3 }] });
    expect(firstOrderReading(methyl, experimentOf()).hz).toBe(0);
  });

  it('warns where lines move by more than their width', () => {
    const strong = firstOrderReading(protonPair(20, 12), experimentOf({ lineWidth: 0.5 }));
    expect(strong.hz).toBeGreaterThan(strong.warnAbove);
    const weak = firstOrderReading(protonPair(600, 7), experimentOf({ lineWidth: 0.5 }));
    expect(weak.hz).toBeLessThan(weak.warnAbove);
  });

  it('falls back to the estimate for large fragments', () => {
    const nuclei = Array.from({ length: 8 }, (_, k) => ({ id: `H${k}`, isotope: '1H', shift: 1 + k }));
    const couplings = nuclei.slice(1).map(({ id }, k) => ({ between: [`H${k}`, id] as [string, string], j: 7 }));
    const entry = firstOrderReading(systemOf({ nuclei, couplings }), experimentOf());
    expect(entry.computed).toBe('estimate');
    expect(entry.hz).toBeCloseTo(2 * ((Math.hypot(400, 7) - 400) / 2), 8);
  });
});
