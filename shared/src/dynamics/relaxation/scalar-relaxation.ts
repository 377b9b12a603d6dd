import { spectralDensity } from './redfield.js';

/** Times in s of a partner that a nucleus is J-coupled to; frequencies in Hz. */
export interface ScalarPartner {
  readonly spin: number;
  readonly j: number;
  readonly t1: number;
  readonly t2: number;
  readonly frequencyDifference: number;
}

/**
 * Rates in s^-1 by J to a partner that relaxes with t1, t2, of the second kind (A. Abragam, Principles of Nuclear Magnetism, 1961,
 * ch. VIII). Holds where the partner is faster than the splitting, 2 pi |J| t1 << 1.
 */
export function scalarRelaxation({ spin, j, t1, t2, frequencyDifference }: ScalarPartner): { r1: number; r2: number } {
  const strength = ((2 * Math.PI * j) ** 2 * spin * (spin + 1)) / 3;
  const flips = spectralDensity(t2, frequencyDifference);
  return { r1: 2 * strength * flips, r2: strength * (t1 + flips) };
}
