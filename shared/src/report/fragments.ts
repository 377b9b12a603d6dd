import type { Experiment } from '../documents/experiment.schema.js';
import type { SpinSystem } from '../documents/system.schema.js';
import { couplingsOf, isDecoupled } from '../interactions/scalar.js';
import { dipolarCouplingsOf } from '../interactions/tensors.js';
import { mainState } from './spin-hamiltonian.js';

/**
 * The parts of a system that no coupling in force joins, each a system of its own, those without the observed isotope left out.
 * Dipolar couplings join only where `dipolar` is set.
 */
export function coupledFragments(system: SpinSystem, experiment: Experiment, dipolar: boolean): SpinSystem[] {
  const parent = system.nuclei.map((_, row) => row);
  const root = (row: number): number => (parent[row] === row ? row : root(parent[row]));
  const bonds: { a: number; b: number }[] = couplingsOf(system, experiment.decouple, mainState(system));
  if (dipolar) {
    const isotope = (row: number) => system.nuclei[row].isotope;
    bonds.push(
      ...dipolarCouplingsOf(system).filter(({ a, b }) => !isDecoupled(isotope(a), isotope(b), experiment.decouple)),
    );
  }
  for (const { a, b } of bonds) parent[root(a)] = root(b);
  const parts = new Map<number, number[]>();
  system.nuclei.forEach((_, row) => parts.set(root(row), [...(parts.get(root(row)) ?? []), row]));
  return [...parts.values()]
    .map((rows) => subsystem(system, rows))
    .filter(({ nuclei }) => nuclei.some(({ isotope }) => isotope === experiment.observe));
}

/** The nuclei `rows` with the couplings among them, and the states' overrides that concern them. */
export function subsystem(system: SpinSystem, rows: readonly number[]): SpinSystem {
  const nuclei = rows.map((row) => system.nuclei[row]);
  const ids = new Set(nuclei.map(({ id }) => id));
  const keep = (values: Record<string, number>) =>
    Object.fromEntries(Object.entries(values).filter(([key]) => key.split(',').every((id) => ids.has(id.trim()))));
  return {
    ...system,
    nuclei,
    couplings: system.couplings.filter(({ between }) => between.every((id) => ids.has(id))),
    states: system.states?.map((state) => ({ ...state, shifts: keep(state.shifts), j: keep(state.j) })),
  };
}
