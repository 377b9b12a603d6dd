import { describe, expect, it } from 'vitest';
import { dipolarPairs } from './dipolar-from-geometry.js';

describe('dipolarPairs', () => {
  const nuclei = [
    { id: 'C', isotope: '13C', position: [0, 0, 0] },
    { id: 'Ha', isotope: '1H', position: [0, 0, 1.09] },
    { id: 'Hb', isotope: '1H', position: [0, 0, -1.09] },
    { id: 'N', isotope: '15N', position: [30, 0, 0] },
  ] as const;

  it('lists the pairs within the cut-off, nearest first', () => {
    const pairs = dipolarPairs(nuclei, 5);
    expect(pairs.map(({ between }) => between.join())).toEqual(['C,Ha', 'C,Hb', 'Ha,Hb']);
    expect(pairs[2].distance).toBeCloseTo(2.18, 12);
    // Reference check E04-2: 13C and 1H at 1.09 angstrom.
    expect(Math.abs(pairs[0].constant / -23328.18 - 1)).toBeLessThan(2e-6);
    // The cube of twice the distance.
    expect(dipolarPairs([nuclei[0], { ...nuclei[1], position: [0, 0, 2.18] }], 5)[0].constant).toBeCloseTo(
      pairs[0].constant / 8,
      6,
    );
    expect(dipolarPairs(nuclei, 1)).toEqual([]);
    expect(dipolarPairs(nuclei, 100)).toHaveLength(6);
  });

  it('refuses two nuclei at one place', () => {
    expect(() => dipolarPairs([nuclei[0], { ...nuclei[1], position: [0, 0, 0] }], 5)).toThrow('C and Ha');
  });
});
