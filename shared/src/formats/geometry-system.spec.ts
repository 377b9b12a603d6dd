import { describe, expect, it } from 'vitest';
import { parseSystem } from '../documents/parse.js';
import { systemFromGeometry } from './geometry-system.js';
import { readXyz } from './xyz.js';

/** Methane with 1.09 angstrom bonds along the diagonals of a cube, one hydrogen replaced by deuterium. */
const METHANE = readXyz(
  [
    '5',
    'methane',
    'C 0 0 0',
    'H 0.6293 0.6293 0.6293',
    'H -0.6293 -0.6293 0.6293',
    'H -0.6293 0.6293 -0.6293',
    'D 0.6293 -0.6293 -0.6293',
  ].join('\n'),
);

describe('systemFromGeometry', () => {
  it('makes a sound spin system of the chosen elements', () => {
    const { nuclei, couplings, pairs, equivalence } = systemFromGeometry(METHANE, { H: '1H', C: '13C' }, 1.5);
    const system = parseSystem({ format: 'heddle.spin-system/1', name: 'methane', nuclei, couplings });
    expect(system.nuclei.map(({ id, isotope }) => `${id} ${isotope}`)).toEqual([
      'C1 13C',
      'H1 1H',
      'H2 1H',
      'H3 1H',
      'H4 2H',
    ]);
    expect(pairs).toHaveLength(4);
    for (const { between, distance } of pairs) {
      expect(between[0]).toBe('C1');
      expect(distance).toBeCloseTo(1.09, 4);
    }
    expect(equivalence).toEqual([0, 1, 1, 1, 1]);
  });

  it('leaves out other elements and reaches as far as the cut-off', () => {
    const { nuclei, pairs } = systemFromGeometry(METHANE, { H: '1H' }, 2);
    expect(nuclei).toHaveLength(4);
    expect(pairs).toHaveLength(6);
    // H-H distances in a tetrahedron are 2 sqrt(2/3) of the bond.
    for (const { distance } of pairs) expect(distance).toBeCloseTo(1.09 * 2 * Math.sqrt(2 / 3), 4);
  });

  it('refuses what is no nuclide', () => {
    expect(() => systemFromGeometry(METHANE, { C: '12C' }, 2)).toThrow("'12C'");
  });
});
