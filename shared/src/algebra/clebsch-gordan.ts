import { factorial } from './factorial.js';

/**
 * Clebsch-Gordan coefficient <j1 m1 j2 m2 | j m> with Condon-Shortley phases, by Racah's closed sum (D. A. Varshalovich,
 * A. N. Moskalev, V. K. Khersonskii, Quantum Theory of Angular Momentum, 1988, ch. 8); meant for small j. Quantum numbers
 * that can't couple give 0.
 */
export function clebschGordan(j1: number, m1: number, j2: number, m2: number, j: number, m: number): number {
  if (!couples(j1, m1, j2, m2, j, m)) return 0;
  const triangle =
    (factorial(j1 + j2 - j) * factorial(j + j1 - j2) * factorial(j + j2 - j1)) / factorial(j1 + j2 + j + 1);
  const shells = [j1 + m1, j1 - m1, j2 + m2, j2 - m2, j + m, j - m].reduce((product, n) => product * factorial(n), 1);
  let sum = 0;
  const first = Math.max(0, j2 - j - m1, j1 + m2 - j);
  const last = Math.min(j1 + j2 - j, j1 - m1, j2 + m2);
  for (let k = first; k <= last; k++) {
    const factors = [k, j1 + j2 - j - k, j1 - m1 - k, j2 + m2 - k, j - j2 + m1 + k, j - j1 - m2 + k];
    sum += (k % 2 === 0 ? 1 : -1) / factors.reduce((product, n) => product * factorial(n), 1);
  }
  return Math.sqrt((2 * j + 1) * triangle * shells) * sum;
}

function couples(j1: number, m1: number, j2: number, m2: number, j: number, m: number): boolean {
  const fits = (spin: number, projection: number) =>
    Math.abs(projection) <= spin && Number.isInteger(spin - projection);
  const inTriangle = j >= Math.abs(j1 - j2) && j <= j1 + j2 && Number.isInteger(j1 + j2 - j);
  return m1 + m2 === m && inTriangle && fits(j1, m1) && fits(j2, m2) && fits(j, m);
}
