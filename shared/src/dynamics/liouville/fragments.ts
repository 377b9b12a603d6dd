import type { Experiment } from '../../documents/experiment.schema.js';
import type { SpinSystem } from '../../documents/system.schema.js';
import { couplingsOf } from '../../interactions/scalar.js';

/** A pair of nuclei that act on one another, by rows of the system. */
export interface Link {
  readonly a: number;
  readonly b: number;
}

/** All pairs joined by J in any state, decoupled or not, and by relaxation where dipolar terms relax. */
export function linksOf(system: SpinSystem, { relaxation }: Experiment): Link[] {
  const scalar = (system.states ?? [undefined]).flatMap((state) => couplingsOf(system, [], state));
  if (relaxation !== 'redfield') return scalar;
  const row = new Map(system.nuclei.map(({ id }, index) => [id, index]));
  const dipolar = system.couplings.filter((coupling) => coupling.dipolar !== undefined);
  return [...scalar, ...dipolar.map(({ between: [a, b] }) => ({ a: row.get(a)!, b: row.get(b)! }))];
}

/** Rows of the nuclei of each connected fragment that holds an observed nucleus. */
export function observedFragments(system: SpinSystem, experiment: Experiment): number[][] {
  return connected(system.nuclei.length, linksOf(system, experiment)).filter((rows) =>
    rows.some((row) => system.nuclei[row].isotope === experiment.observe),
  );
}

/** Connected components of 0..count-1, members ascending. */
export function connected(count: number, links: readonly Link[]): number[][] {
  const root = Array.from({ length: count }, (_, i) => i);
  const find = (i: number): number => (root[i] === i ? i : (root[i] = find(root[i])));
  for (const { a, b } of links) root[Math.max(find(a), find(b))] = Math.min(find(a), find(b));
  const groups = new Map<number, number[]>();
  for (let i = 0; i < count; i++) groups.set(find(i), [...(groups.get(find(i)) ?? []), i]);
  return [...groups.values()];
}
