import { GeometryRefused, ISOTOPES, nuclide, readMolfile, readXyz, type Geometry } from '@heddle/shared';

export type ReadGeometry = { geometry: Geometry } | { refusal: string };

/** Reads XYZ or MDL molfile text; which one it is, its first lines tell. The refusal names the line that is wrong. */
export function readGeometry(text: string): ReadGeometry {
  try {
    return { geometry: looksLikeXyz(text) ? readXyz(text) : readMolfile(text) };
  } catch (error) {
    if (error instanceof GeometryRefused) return { refusal: error.message };
    throw error;
  }
}

/** An XYZ file begins with the number of its atoms alone; a molfile has its counts in the fourth line. */
export function looksLikeXyz(text: string): boolean {
  return /^\uFEFF?\s*\d+\s*$/.test(text.split(/\r\n|\r|\n/, 1)[0]) && !/V[23]000/.test(text);
}

/** Elements of a structure, with the number of atoms of each, the most numerous first. */
export function elementsOf({ atoms }: Geometry): { element: string; count: number }[] {
  const counts = new Map<string, number>();
  for (const { element } of atoms) counts.set(element, (counts.get(element) ?? 0) + 1);
  return [...counts].map(([element, count]) => ({ element, count })).sort((a, b) => b.count - a.count);
}

/** Isotopes of an element that can be chosen; spins 1/2 first, since these are what is mostly meant. */
export function isotopesOf(element: string): string[] {
  return ISOTOPES.filter((isotope) => isotope.replace(/^\d+/, '') === element).sort(
    (a, b) => nuclide(a).spin - nuclide(b).spin,
  );
}
