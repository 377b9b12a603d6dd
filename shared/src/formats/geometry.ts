/** Atoms of a structure as a geometry file gives them. */
export interface GeometryAtom {
  /** IUPAC symbol. */
  readonly element: string;
  /** Mass number where the file names an isotope. */
  readonly mass?: number;
  /** angstrom */
  readonly position: readonly [number, number, number];
}

export interface GeometryBond {
  /** Rows of `atoms`, counted from 0. */
  readonly a: number;
  readonly b: number;
}

export interface Geometry {
  readonly title: string;
  readonly atoms: readonly GeometryAtom[];
  /** Empty where the format has no bonds. */
  readonly bonds: readonly GeometryBond[];
  /** What the reader wants a person to know. */
  readonly warnings: readonly string[];
}

/** Largest file, in characters, and most atoms that the readers take. */
export const GEOMETRY_LIMITS = { characters: 1_000_000, atoms: 5_000 } as const;

/** A geometry file that was refused. `line` counts from 1; 0 is the file as a whole. */
export class GeometryRefused extends Error {
  constructor(
    readonly line: number,
    readonly reason: string,
  ) {
    super(line > 0 ? `line ${line}: ${reason}` : reason);
    this.name = 'GeometryRefused';
  }
}

// prettier-ignore
const SYMBOLS =
  ('H He Li Be B C N O F Ne Na Mg Al Si P S Cl Ar K Ca Sc Ti V Cr Mn Fe Co Ni Cu Zn Ga Ge As Se Br Kr Rb Sr Y Zr Nb Mo Tc ' +
  'Ru Rh Pd Ag Cd In Sn Sb Te I Xe Cs Ba La Ce Pr Nd Pm Sm Eu Gd Tb Dy Ho Er Tm Yb Lu Hf Ta W Re Os Ir Pt Au Hg Tl Pb Bi ' +
  'Po At Rn Fr Ra Ac Th Pa U Np Pu Am Cm Bk Cf Es Fm Md No Lr Rf Db Sg Bh Hs Mt Ds Rg Cn Nh Fl Mc Lv Ts Og').split(' ');
const KNOWN = new Set(SYMBOLS);

/** Splits a file into lines. Throws GeometryRefused beyond the size limit. */
export function linesOf(text: string): string[] {
  if (text.length > GEOMETRY_LIMITS.characters) {
    throw new GeometryRefused(
      0,
      `the file has ${text.length} characters; at most ${GEOMETRY_LIMITS.characters} are read`,
    );
  }
  return text.replace(/^\uFEFF/, '').split(/\r\n|\r|\n/);
}

/** Element and isotope of a symbol, of D or T, or of an atomic number. Throws GeometryRefused naming `line`. */
export function elementOf(name: string, line: number): Pick<GeometryAtom, 'element' | 'mass'> {
  const symbol = /^\d+$/.test(name)
    ? SYMBOLS[Number(name) - 1]
    : name.charAt(0).toUpperCase() + name.slice(1).toLowerCase();
  if (symbol === 'D') return { element: 'H', mass: 2 };
  if (symbol === 'T') return { element: 'H', mass: 3 };
  if (symbol === undefined || !KNOWN.has(symbol)) throw new GeometryRefused(line, `'${name}' is not an element`);
  return { element: symbol };
}

const DECIMAL = /^[+-]?(\d+\.?\d*|\.\d+)([eE][+-]?\d+)?$/;

/** Three coordinates. Throws GeometryRefused naming `line`. */
export function positionOf(fields: readonly string[], line: number): [number, number, number] {
  const numbers = ['x', 'y', 'z'].map((axis, i) => {
    const field = (fields[i] ?? '').trim();
    const value = DECIMAL.test(field) ? Number(field) : NaN;
    if (!Number.isFinite(value)) throw new GeometryRefused(line, `${axis} is '${field}', not a number`);
    return value;
  });
  return [numbers[0], numbers[1], numbers[2]];
}

/** Throws GeometryRefused for a number of atoms that is no count or beyond the limit. */
export function requireAtomCount(count: number, line: number): void {
  if (!Number.isInteger(count) || count < 1) throw new GeometryRefused(line, 'the number of atoms must be 1 or more');
  if (count > GEOMETRY_LIMITS.atoms) {
    throw new GeometryRefused(line, `${count} atoms; at most ${GEOMETRY_LIMITS.atoms} are read`);
  }
}

/** The bond of two atoms numbered from 1. Throws GeometryRefused where one does not exist. */
export function bondBetween(a: number | null, b: number | null, atoms: number, line: number): GeometryBond {
  for (const end of [a, b]) {
    if (end === null || end < 1 || end > atoms) {
      throw new GeometryRefused(line, `a bond joins two of the ${atoms} atoms, not '${end ?? ''}'`);
    }
  }
  return { a: a! - 1, b: b! - 1 };
}

/** A number without sign or point, or null. */
export function wholeNumber(field: string): number | null {
  return /^\s*\d+\s*$/.test(field) ? Number(field) : null;
}

/** Two atoms closer than this, in angstrom, can't both be right. */
const COINCIDENT = 0.01;

/** Warnings about a structure whose distances may not be those of a molecule. */
export function geometryWarnings(atoms: readonly GeometryAtom[]): string[] {
  const warnings: string[] = [];
  if (atoms.length > 3 && atoms.every(({ position }) => position[2] === 0)) {
    warnings.push('every z is 0: if this is a drawing, its distances are not those of the molecule');
  }
  const seen = new Map<string, number>();
  atoms.forEach(({ position }, i) => {
    const key = position.map((value) => Math.round(value / COINCIDENT)).join();
    const twin = seen.get(key);
    if (twin !== undefined) warnings.push(`atoms ${twin + 1} and ${i + 1} lie on one another`);
    else seen.set(key, i);
  });
  return warnings;
}

/**
 * Groups atoms that no distance tells apart: equal element and equal sorted distances to the atoms of each element, within
 * `tolerance` angstrom. Equivalence by symmetry implies it; the reverse holds for all but contrived structures.
 * Returns a label for each atom, 0 for the first group met.
 */
export function equivalentAtoms(atoms: readonly GeometryAtom[], tolerance = 0.02): number[] {
  const profiles = atoms.map((atom) => distanceProfile(atom, atoms));
  const leaders: number[] = [];
  return atoms.map(({ element }, i) => {
    const same = leaders.findIndex(
      (leader) => atoms[leader].element === element && agree(profiles[leader], profiles[i], tolerance),
    );
    return same >= 0 ? same : leaders.push(i) - 1;
  });
}

type Profile = ReadonlyMap<string, readonly number[]>;

function distanceProfile(atom: GeometryAtom, atoms: readonly GeometryAtom[]): Profile {
  const profile = new Map<string, number[]>();
  for (const other of atoms) {
    const list = profile.get(other.element) ?? [];
    list.push(distanceBetween(atom.position, other.position));
    profile.set(other.element, list);
  }
  for (const list of profile.values()) list.sort((a, b) => a - b);
  return profile;
}

function agree(a: Profile, b: Profile, tolerance: number): boolean {
  return [...a].every(([element, list]) => {
    const other = b.get(element)!;
    return list.every((distance, k) => Math.abs(distance - other[k]) <= tolerance);
  });
}

export function distanceBetween(a: readonly number[], b: readonly number[]): number {
  return Math.hypot(a[0] - b[0], a[1] - b[1], a[2] - b[2]);
}
