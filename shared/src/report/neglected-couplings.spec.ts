import { describe, expect, it } from 'vitest';
import { dipolarConstantHz } from '../interactions/tensors.js';
import { experimentOf, systemOf } from '../../test/documents.js';
import { neglectedCouplings } from './neglected-couplings.js';

describe('neglected couplings', () => {
  const system = systemOf({
    nuclei: [
      { id: 'A', isotope: '1H', shift: 1, position: [0, 0, 0] },
      { id: 'B', isotope: '1H', shift: 2, position: [0, 0, 2] },
      { id: 'C', isotope: '1H', shift: 3, position: [0, 3, 2] },
    ],
    couplings: [{ between: ['A', 'B'], dipolar: 'positions' }],
    tumbling: { tauC: 1e-9 },
  });

  it('finds the strongest pair without a coupling in a solid', () => {
    const entry = neglectedCouplings(system, experimentOf({ sample: { kind: 'powder', orientations: 10 } }))!;
    expect(entry.hz).toBeCloseTo(3 * Math.abs(dipolarConstantHz('1H', '1H', 3)), 6);
    expect(entry.detail).toContain('2 pairs');
    expect(neglectedCouplings(system, experimentOf())).toBeNull();
  });

  it('gives the width that they would add to Redfield relaxation', () => {
    const entry = neglectedCouplings(system, experimentOf({ relaxation: 'redfield' }))!;
    expect(entry.computed).toBe('exact-difference');
    // The rate of C alone: (b^2/20)(5 tauC + 9 j(w) + 6 j(2w)) from B and from A (A. Abragam 1961, ch. VIII).
    const [tauC, w] = [1e-9, 2 * Math.PI * 400e6];
    const j = (x: number) => tauC / (1 + (x * tauC) ** 2);
    const rate = (distance: number) =>
      ((2 * Math.PI * dipolarConstantHz('1H', '1H', distance)) ** 2 / 20) * (5 * tauC + 9 * j(w) + 6 * j(2 * w));
    expect(entry.hz / ((rate(3) + rate(Math.hypot(3, 2))) / Math.PI)).toBeCloseTo(1, 9);
  });
});
