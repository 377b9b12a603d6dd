import type { Experiment } from '../documents/experiment.schema.js';
import type { SpinSystem } from '../documents/system.schema.js';
import { connected, type Link } from '../dynamics/liouville/fragments.js';
import { couplingsOf, isDecoupled } from '../interactions/scalar.js';
import { dipolarCouplingsOf } from '../interactions/tensors.js';
import { mainState } from './spin-hamiltonian.js';

/**
 * The parts of a system that no coupling in force joins, each a system of its own, those without the observed isotope left out.
 * Dipolar couplings join only where `dipolar` is set.
 */
export function coupledFragments(system: SpinSystem, experiment: Experiment, dipolar: boolean): SpinSystem[] {
  const links: Link[] = couplingsOf(system, experiment.decouple, mainState(system));
  if (dipolar) {
    const isotope = (row: number) => system.nuclei[row].isotope;
    links.push(
      ...dipolarCouplingsOf(system).filter(({ a, b }) => !isDecoupled(isotope(a), isotope(b), experiment.decouple)),
    );
  }
  return connected(system.nuclei.length, links)
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
