import { dipolarConstantHz } from './tensors.js';

/** A nucleus with a place. */
export interface PlacedNucleus {
  readonly id: string;
  readonly isotope: string;
  /** angstrom */
  readonly position: readonly [number, number, number];
}

/** Two nuclei near one another, and the dipolar constant that follows from their distance. */
export interface DipolarPair {
  readonly between: readonly [string, string];
  /** angstrom */
  readonly distance: number;
  /** Hz, negative for two protons */
  readonly constant: number;
}

/** The pairs of nuclei at most `cutOff` angstrom apart, nearest first. Throws a RangeError for two nuclei at one place. */
export function dipolarPairs(nuclei: readonly PlacedNucleus[], cutOff: number): DipolarPair[] {
  const pairs: DipolarPair[] = [];
  nuclei.forEach((b, k) => {
    for (const a of nuclei.slice(0, k)) {
      const distance = Math.hypot(...a.position.map((x, axis) => b.position[axis] - x));
      if (distance === 0) throw new RangeError(`${a.id} and ${b.id} are at one place`);
      if (distance > cutOff) continue;
      pairs.push({ between: [a.id, b.id], distance, constant: dipolarConstantHz(a.isotope, b.isotope, distance) });
    }
  });
  return pairs.sort((p, q) => p.distance - q.distance);
}
