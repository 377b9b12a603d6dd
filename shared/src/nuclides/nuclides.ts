import { NUCLIDE_TABLE, type Nuclide } from './nuclide-table.js';

const BY_ISOTOPE = new Map(NUCLIDE_TABLE.map((row) => [row.isotope, row]));

export const ISOTOPES: readonly string[] = NUCLIDE_TABLE.map((row) => row.isotope);

export function isIsotope(name: string): boolean {
  return BY_ISOTOPE.has(name);
}

/** The row of `isotope`, written as mass number and symbol, '13C'. Throws a RangeError for a name that is not in the table. */
export function nuclide(isotope: string): Nuclide {
  const row = BY_ISOTOPE.get(isotope);
  if (!row) throw new RangeError(`'${isotope}' is not an NMR-active nuclide of the table`);
  return row;
}

/** Number of Zeeman levels, 2I + 1. */
export function multiplicity(isotope: string): number {
  return 2 * nuclide(isotope).spin + 1;
}

/** Frequency in MHz at delta = 0 beside a 1H frequency of `protonMHz` (unified scale, IUPAC 2001). Unsigned. */
export function larmorMHz(isotope: string, protonMHz: number): number {
  return (nuclide(isotope).xi / 100) * protonMHz;
}
