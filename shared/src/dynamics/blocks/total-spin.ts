/** One irreducible component of a group of equivalent spins: total spin and how often it occurs. */
export interface TotalSpinComponent {
  readonly spin: number;
  readonly multiplicity: number;
}

/**
 * Number of product states of `count` spins `spin` with total projection m: entry i belongs to m = count spin - i,
 * from +count spin down to -count spin in steps of one.
 */
export function projectionCounts(spin: number, count: number): number[] {
  const levels = 2 * spin + 1;
  let counts = [1];
  for (let k = 0; k < count; k++) {
    const next = new Array<number>(counts.length + levels - 1).fill(0);
    counts.forEach((states, i) => {
      for (let l = 0; l < levels; l++) next[i + l] += states;
    });
    counts = next;
  }
  return counts;
}

/**
 * Reduction of `count` equivalent spins into total spins (Clebsch-Gordan series), highest first: the multiplicity of K is
 * the number of states with m = K less that with m = K + 1.
 */
export function totalSpinComponents(spin: number, count: number): TotalSpinComponent[] {
  const counts = projectionCounts(spin, count);
  const components: TotalSpinComponent[] = [];
  for (let i = 0; count * spin - i >= 0; i++) {
    const multiplicity = counts[i] - (i > 0 ? counts[i - 1] : 0);
    if (multiplicity > 0) components.push({ spin: count * spin - i, multiplicity });
  }
  return components;
}
