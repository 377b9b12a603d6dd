import {
  bondBetween,
  elementOf,
  GeometryRefused,
  geometryWarnings,
  linesOf,
  positionOf,
  requireAtomCount,
  wholeNumber,
  type Geometry,
  type GeometryAtom,
  type GeometryBond,
} from './geometry.js';
import { readV3000Table } from './molfile-v3000.js';

/**
 * Reads an MDL molfile, V2000 or V3000 (Dassault Systemes, CTfile Formats; first molecule of an SD file too): elements,
 * isotopes, coordinates in angstrom and which atoms are bonded. Throws GeometryRefused, which names the line.
 */
export function readMolfile(text: string): Geometry {
  const lines = linesOf(text);
  const counts = lines[3] ?? '';
  const table = counts.includes('V3000') ? readV3000Table(lines) : readV2000Table(lines, counts);
  return { title: (lines[0] ?? '').trim(), ...table, warnings: geometryWarnings(table.atoms) };
}

/** Columns of the counts line and of atom and bond lines are fixed: three characters a number, ten a coordinate. */
function readV2000Table(lines: readonly string[], counts: string): Pick<Geometry, 'atoms' | 'bonds'> {
  const [atomCount, bondCount] = [0, 3].map((from) => wholeNumber(counts.slice(from, from + 3)));
  if (atomCount === null || bondCount === null) {
    throw new GeometryRefused(4, 'the fourth line of a molfile starts with the numbers of atoms and bonds');
  }
  requireAtomCount(atomCount, 4);
  const atoms = Array.from({ length: atomCount }, (_, i) => readAtom(lines[i + 4], i + 5, atomCount, i));
  const firstBond = 4 + atomCount;
  const bonds = Array.from({ length: bondCount }, (_, i) => {
    const number = firstBond + i + 1;
    return readBond(lines[number - 1], number, atomCount, bondCount, i);
  });
  return { atoms: withIsotopes(lines, firstBond + bondCount, atoms), bonds };
}

function readAtom(line: string | undefined, number: number, count: number, read: number): GeometryAtom {
  if (line === undefined || line.startsWith('M  ')) {
    throw new GeometryRefused(number, `line 4 says ${count} atoms, but only ${read} follow`);
  }
  const position = positionOf([line.slice(0, 10), line.slice(10, 20), line.slice(20, 30)], number);
  const name = line.slice(31, 34).trim();
  if (name === '') throw new GeometryRefused(number, 'the element is missing in columns 32 to 34');
  return { ...elementOf(name, number), position };
}

function readBond(line: string | undefined, number: number, atoms: number, count: number, read: number): GeometryBond {
  if (line === undefined || line.startsWith('M  ')) {
    throw new GeometryRefused(number, `line 4 says ${count} bonds, but only ${read} follow`);
  }
  return bondBetween(wholeNumber(line.slice(0, 3)), wholeNumber(line.slice(3, 6)), atoms, number);
}

/** The atoms with the mass numbers of `M  ISO` lines, up to `M  END`, which must be there. */
function withIsotopes(lines: readonly string[], from: number, atoms: readonly GeometryAtom[]): GeometryAtom[] {
  const result = [...atoms];
  for (let i = from; i < lines.length; i++) {
    if (lines[i].startsWith('M  END')) return result;
    if (!lines[i].startsWith('M  ISO')) continue;
    const fields = lines[i].slice(9).trim().split(/\s+/).map(wholeNumber);
    for (let k = 0; k + 1 < fields.length; k += 2) {
      const [atom, mass] = [fields[k], fields[k + 1]];
      if (atom === null || mass === null || atom < 1 || atom > atoms.length) {
        throw new GeometryRefused(i + 1, 'M  ISO names pairs of an atom and a mass number');
      }
      result[atom - 1] = { ...result[atom - 1], mass };
    }
  }
  throw new GeometryRefused(lines.length, 'the file ends without a line M  END');
}
