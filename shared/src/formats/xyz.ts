import {
  elementOf,
  GeometryRefused,
  geometryWarnings,
  linesOf,
  positionOf,
  requireAtomCount,
  type Geometry,
  type GeometryAtom,
} from './geometry.js';

/**
 * Reads an XYZ file: the number of atoms, a line of text, then an element (symbol or atomic number) and three coordinates in
 * angstrom for each atom; what follows them on a line is passed over. Throws GeometryRefused, which names the line.
 */
export function readXyz(text: string): Geometry {
  const lines = linesOf(text);
  const count = Number((lines[0] ?? '').trim() || NaN);
  if (Number.isNaN(count)) throw new GeometryRefused(1, `'${(lines[0] ?? '').trim()}' is not a number of atoms`);
  requireAtomCount(count, 1);
  const atoms = Array.from({ length: count }, (_, i) => readAtom(lines[i + 2], i + 3, count, i));
  const extra = lines.findIndex((line, i) => i >= count + 2 && line.trim() !== '');
  if (extra >= 0) throw new GeometryRefused(extra + 1, `line 1 says ${count} atoms, but there is more`);
  return { title: (lines[1] ?? '').trim(), atoms, bonds: [], warnings: geometryWarnings(atoms) };
}

function readAtom(line: string | undefined, number: number, count: number, read: number): GeometryAtom {
  if (line === undefined || line.trim() === '') {
    throw new GeometryRefused(number, `line 1 says ${count} atoms, but only ${read} follow`);
  }
  const [name, ...fields] = line.trim().split(/\s+/);
  if (fields.length < 3) throw new GeometryRefused(number, 'an element and three coordinates are needed');
  return { ...elementOf(name, number), position: positionOf(fields, number) };
}
