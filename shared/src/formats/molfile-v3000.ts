import {
  bondBetween,
  elementOf,
  GeometryRefused,
  positionOf,
  requireAtomCount,
  wholeNumber,
  type Geometry,
  type GeometryAtom,
} from './geometry.js';

/** A V30 line after its continuations were joined, and where it starts. */
interface Statement {
  readonly words: readonly string[];
  readonly line: number;
}

const PREFIX = 'M  V30 ';

/** The connection table of a V3000 molfile. Atoms may be numbered freely. */
export function readV3000Table(lines: readonly string[]): Pick<Geometry, 'atoms' | 'bonds'> {
  const statements = statementsOf(lines);
  const counts = statements.find(({ words }) => words[0] === 'COUNTS');
  if (!counts) throw new GeometryRefused(4, 'a V3000 molfile has a COUNTS line');
  const [atomCount, bondCount] = [1, 2].map((k) => wholeNumber(counts.words[k] ?? ''));
  if (atomCount === null || bondCount === null) {
    throw new GeometryRefused(counts.line, 'COUNTS gives the numbers of atoms and bonds');
  }
  requireAtomCount(atomCount, counts.line);
  const atomLines = blockOf(statements, 'ATOM', atomCount, counts.line);
  const rows = new Map<number, number>();
  const atoms = atomLines.map((statement, row) => {
    const index = wholeNumber(statement.words[0] ?? '');
    if (index === null || rows.has(index))
      throw new GeometryRefused(statement.line, 'an atom starts with a number of its own');
    rows.set(index, row);
    return readAtom(statement);
  });
  const bonds = blockOf(statements, 'BOND', bondCount, counts.line).map(({ words, line }) => {
    const [a, b] = [2, 3].map((k) => rows.get(wholeNumber(words[k] ?? '') ?? 0));
    return bondBetween(a === undefined ? null : a + 1, b === undefined ? null : b + 1, atoms.length, line);
  });
  return { atoms, bonds };
}

/** index type x y z mapping [KEY=value ...] */
function readAtom({ words, line }: Statement): GeometryAtom {
  const element = elementOf(words[1] ?? '', line);
  const mass = words.find((word) => word.startsWith('MASS='));
  const position = positionOf(words.slice(2, 5), line);
  if (!mass) return { ...element, position };
  const number = wholeNumber(mass.slice(5));
  if (number === null) throw new GeometryRefused(line, `'${mass}' is not a mass number`);
  return { ...element, mass: number, position };
}

/** The statements between BEGIN name and END name; none where there are none to be. */
function blockOf(statements: readonly Statement[], name: string, count: number, countsLine: number): Statement[] {
  const at = (edge: string) => statements.findIndex(({ words }) => words[0] === edge && words[1] === name);
  const [begin, end] = [at('BEGIN'), at('END')];
  if (begin < 0 && count === 0) return [];
  if (begin < 0 || end < begin)
    throw new GeometryRefused(countsLine, `there is no block from BEGIN ${name} to END ${name}`);
  const found = statements.slice(begin + 1, end);
  if (found.length !== count) {
    const what = `${count} lines between BEGIN ${name} and END ${name}, but there are ${found.length}`;
    throw new GeometryRefused(statements[end].line, `COUNTS says ${what}`);
  }
  return found;
}

/** Lines `M  V30 ...`; a hyphen at the end continues on the next one. */
function statementsOf(lines: readonly string[]): Statement[] {
  const statements: Statement[] = [];
  let [joined, start] = ['', 0];
  for (let i = 4; i < lines.length; i++) {
    const line = lines[i].trimEnd();
    if (line.startsWith('M  END')) return statements;
    if (!line.startsWith(PREFIX)) {
      if (joined !== '') throw new GeometryRefused(i + 1, 'a continued line goes on with M  V30');
      continue;
    }
    if (joined === '') start = i + 1;
    const body = line.slice(PREFIX.length);
    joined += body.endsWith('-') ? body.slice(0, -1) : body;
    if (body.endsWith('-')) continue;
    statements.push({ words: joined.trim().split(/\s+/), line: start });
    joined = '';
  }
  throw new GeometryRefused(lines.length, 'the file ends without a line M  END');
}
