import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { equivalentAtoms, GEOMETRY_LIMITS, GeometryRefused, type Geometry } from './geometry.js';
import { readMolfile } from './molfile.js';
import { readXyz } from './xyz.js';

/** Line and reason of a refusal. */
function refusal(read: () => unknown): [line: number, reason: string] {
  try {
    read();
  } catch (error) {
    if (error instanceof GeometryRefused) return [error.line, error.reason];
    throw error;
  }
  throw new Error('was read');
}

const distance = ({ atoms }: Geometry, a: number, b: number) =>
  Math.hypot(...atoms[a].position.map((x, axis) => x - atoms[b].position[axis]));

/** Water with 0.9578 angstrom bonds and an angle of 104.48 degrees: coordinates computed from these. */
const WATER = [
  '3',
  'water, own coordinates',
  'O   0.000000   0.000000   0.000000',
  'H   0.757220   0.586514   0.000000  0.41',
  '1  -0.757220   0.586514   0.000000',
  '',
].join('\r\n');

describe('readXyz', () => {
  it('reads elements by symbol and by number, and coordinates', () => {
    const water = readXyz(WATER);
    expect(water.title).toBe('water, own coordinates');
    expect(water.atoms.map(({ element }) => element)).toEqual(['O', 'H', 'H']);
    expect(distance(water, 0, 1)).toBeCloseTo(0.9578, 4);
    expect(distance(water, 1, 2)).toBeCloseTo(2 * 0.9578 * Math.sin((52.24 * Math.PI) / 180), 4);
    expect(equivalentAtoms(water.atoms)).toEqual([0, 1, 1]);
  });

  it('knows deuterium', () => {
    expect(readXyz('1\n\nD 0 0 1').atoms).toEqual([{ element: 'H', mass: 2, position: [0, 0, 1] }]);
  });

  it.each([
    ['', 1, 'not a number of atoms'],
    ['two\n\nH 0 0 0', 1, 'not a number of atoms'],
    ['0\n\n', 1, '1 or more'],
    ['2\n\nH 0 0 0', 4, 'only 1 follow'],
    ['1\n\nH 0 0 0\nH 0 0 1', 4, 'there is more'],
    ['1\n\nQq 0 0 0', 3, 'not an element'],
    ['1\n\nH 0 0', 3, 'three coordinates'],
    ['2\n\nH 0 0 0\nH 0 0 1.0.0', 4, "z is '1.0.0'"],
    ['1\n\nH 0 0x10 0', 3, "y is '0x10'"],
    ['1\n\nH 0 0 1e999', 3, "z is '1e999'"],
    [`${GEOMETRY_LIMITS.atoms + 1}\n\n`, 1, 'at most'],
    ['1\n\nH 0 0 0' + ' '.repeat(GEOMETRY_LIMITS.characters), 0, 'at most'],
  ])('refuses %j naming line %i', (text, line, reason) => {
    const [where, why] = refusal(() => readXyz(text));
    expect(where).toBe(line);
    expect(why).toContain(reason);
  });

  it('gives back any structure that was written', () => {
    const coordinate = fc.double({ min: -99, max: 99, noNaN: true }).map((value) => value + 0);
    const atom = fc.record({
      element: fc.constantFrom('H', 'C', 'Cl', 'Na'),
      position: fc.tuple(coordinate, coordinate, coordinate),
    });
    fc.assert(
      fc.property(fc.array(atom, { minLength: 1, maxLength: 20 }), (atoms) => {
        const lines = atoms.map(({ element, position }) => `${element} ${position.join('  ')}`);
        expect(readXyz([atoms.length, 'title', ...lines].join('\n')).atoms).toEqual(atoms);
      }),
    );
  });

  it('warns about drawings and about atoms on one another', () => {
    const flat = readXyz('4\n\nC 0 0 0\nC 1 0 0\nC 0 1 0\nC 0 1 0');
    expect(flat.warnings).toHaveLength(2);
    expect(flat.warnings[1]).toBe('atoms 3 and 4 lie on one another');
  });
});

/** Chloromethane with idealised tetrahedral angles, own coordinates, columns as the CTfile description has them. */
const V2000 = [
  'chloromethane',
  '  own     0101202600003D',
  '',
  '  5  4  0  0  0  0  0  0  0  0999 V2000',
  '    0.0000    0.0000    0.0000 C   0  0',
  '    1.7800    0.0000    0.0000 Cl  0  0',
  '   -0.3633    1.0276    0.0000 H   0  0',
  '   -0.3633   -0.5138    0.8899 H   0  0',
  '   -0.3633   -0.5138   -0.8899 H   0  0',
  '  1  2  1  0',
  '  1  3  1  0',
  '  1  4  1  0',
  '  1  5  1  0',
  'M  ISO  2   1  13   5   2',
  'M  END',
  '$$$$',
];

const V3000 = [
  'chloromethane',
  '  own     0101202600003D',
  '',
  '  0  0  0     0  0            999 V3000',
  'M  V30 BEGIN CTAB',
  'M  V30 COUNTS 5 4 0 0 0',
  'M  V30 BEGIN ATOM',
  'M  V30 1 C 0 0 0 0 MASS=13',
  'M  V30 2 Cl 1.78 0 0 0',
  'M  V30 13 H -0.3633 1.0276 0 0',
  'M  V30 4 H -0.3633 -0.5138 -',
  'M  V30 0.8899 0',
  'M  V30 5 H -0.3633 -0.5138 -0.8899 0 MASS=2',
  'M  V30 END ATOM',
  'M  V30 BEGIN BOND',
  'M  V30 1 1 1 2',
  'M  V30 2 1 1 13',
  'M  V30 3 1 1 4',
  'M  V30 4 1 1 5',
  'M  V30 END BOND',
  'M  V30 END CTAB',
  'M  END',
];

const changed = (lines: readonly string[], line: number, text: string) =>
  lines.map((old, i) => (i === line - 1 ? text : old)).join('\n');

describe('readMolfile', () => {
  it('reads V2000 and V3000 alike', () => {
    const [old, young] = [readMolfile(V2000.join('\n')), readMolfile(V3000.join('\n'))];
    expect(old).toEqual(young);
    expect(old.title).toBe('chloromethane');
    expect(old.atoms[0]).toEqual({ element: 'C', mass: 13, position: [0, 0, 0] });
    expect(old.atoms[4].mass).toBe(2);
    expect(old.bonds).toEqual([1, 2, 3, 4].map((b) => ({ a: 0, b })));
    for (const hydrogen of [2, 3, 4]) expect(distance(old, 0, hydrogen)).toBeCloseTo(1.09, 3);
    expect(equivalentAtoms(old.atoms)).toEqual([0, 1, 2, 2, 2]);
  });

  it.each([
    [changed(V2000, 4, 'five'), 4, 'numbers of atoms and bonds'],
    [changed(V2000, 4, '  6  4  0     0  0              1 V2000'), 10, "x is '1  2  1'"],
    [changed(V2000, 6, '    1.7800    0.0000    0.0000 Qq  0  0'), 6, 'not an element'],
    [changed(V2000, 7, '   -0.3633    1.o276    0.0000 H   0  0'), 7, 'y is'],
    [changed(V2000, 8, '   -0.3633   -0.5138    0.8899'), 8, 'element is missing'],
    [changed(V2000, 12, '  1  9  1  0'), 12, 'two of the 5 atoms'],
    [V2000.slice(0, 8).join('\n'), 9, 'only 4 follow'],
    [V2000.slice(0, 12).join('\n'), 13, 'only 3 follow'],
    [V2000.slice(0, 14).join('\n'), 14, 'M  END'],
    [changed(V3000, 6, 'M  V30 COUNT 5 4'), 4, 'COUNTS'],
    [changed(V3000, 6, 'M  V30 COUNTS 6 4 0 0 0'), 14, '6 lines between'],
    [changed(V3000, 9, 'M  V30 1 Cl 1.78 0 0 0'), 9, 'number of its own'],
    [changed(V3000, 10, 'M  V30 3 H -0.3633 nought 0 0'), 10, "y is 'nought'"],
    [changed(V3000, 17, 'M  V30 2 1 1 99'), 17, 'two of the 5 atoms'],
    [V3000.slice(0, 20).join('\n'), 20, 'M  END'],
    ['', 4, 'numbers of atoms and bonds'],
  ])('refuses a malformed file naming its line (%#)', (text, line, reason) => {
    const [where, why] = refusal(() => readMolfile(text));
    expect(why).toContain(reason);
    expect(where).toBe(line);
  });
});

describe('whatever the file', () => {
  it('is read or refused by line, nothing else', () => {
    const damage = fc.record({
      line: fc.nat(),
      column: fc.nat(),
      length: fc.integer({ min: 0, max: 6 }),
      text: fc.string({ maxLength: 6 }),
    });
    const files = [V2000.join('\n'), V3000.join('\n'), WATER];
    fc.assert(
      fc.property(fc.constantFrom(...files), fc.array(damage, { minLength: 1, maxLength: 4 }), (file, damages) => {
        const lines = file.split(/\r?\n/);
        for (const { line, column, length, text } of damages) {
          const old = lines[line % lines.length];
          const at = column % (old.length + 1);
          lines[line % lines.length] = old.slice(0, at) + text + old.slice(at + length);
        }
        const damaged = lines.join('\n');
        for (const read of [readMolfile, readXyz]) {
          try {
            const { atoms } = read(damaged);
            expect(atoms.every(({ position }) => position.every(Number.isFinite))).toBe(true);
          } catch (error) {
            expect(error).toBeInstanceOf(GeometryRefused);
            expect((error as GeometryRefused).line).toBeLessThanOrEqual(damaged.split(/\r\n|\r|\n/).length + 1);
          }
        }
      }),
      { numRuns: 300 },
    );
  });
});
