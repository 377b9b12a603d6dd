import type { Experiment } from '../documents/experiment.schema.js';
import type { SpinSystem } from '../documents/system.schema.js';
import { offsetsOf, signedLarmorHz } from '../interactions/carriers.js';
import { couplingsOf, isDecoupled } from '../interactions/scalar.js';
import { dipolarCouplingsOf } from '../interactions/tensors.js';
import { nuclide } from '../nuclides/nuclides.js';

/** The range in which a nucleus's lines can stand, Hz from the carrier. */
export interface Extent {
  readonly id: string;
  readonly low: number;
  readonly high: number;
}

/**
 * For each observed nucleus, over all states: its offset with the whole width of its multiplet and, in solids, of its shift tensor,
 * its dipolar couplings and its first-order quadrupolar pattern. An outer bound in first order.
 */
export function extents(system: SpinSystem, experiment: Experiment): Extent[] {
  const oriented = experiment.sample.kind !== 'solution';
  return system.nuclei.flatMap(({ id, isotope }, row) => {
    if (isotope !== experiment.observe) return [];
    let [low, high] = [Infinity, -Infinity];
    for (const state of system.states ?? [undefined]) {
      const offset = offsetsOf(system, experiment, state)[row];
      const reach = couplingsOf(system, experiment.decouple, state)
        .filter(({ a, b }) => a === row || b === row)
        .reduce(
          (sum, { a, b, j }) => sum + Math.abs(j) * spinOf(system, a + b - row),
          oriented ? anisotropicReach(row, system, experiment) : 0,
        );
      low = Math.min(low, offset - reach);
      high = Math.max(high, offset + reach);
    }
    return [{ id, low, high }];
  });
}

function anisotropicReach(row: number, system: SpinSystem, experiment: Experiment): number {
  const { csa, quadrupole, isotope } = system.nuclei[row];
  const { spin } = nuclide(isotope);
  let reach = (2 / 3) * (csa?.span ?? 0) * 1e-6 * Math.abs(signedLarmorHz(isotope, experiment));
  // Outermost satellites: (I - 1/2) times the splitting constant 3 CQ/(2I(2I-1)).
  if (quadrupole) reach += ((spin - 0.5) * 3 * Math.abs(quadrupole.cq)) / (2 * spin * (2 * spin - 1));
  for (const { a, b, tensor, like } of dipolarCouplingsOf(system)) {
    const other = a + b - row;
    if ((a !== row && b !== row) || isDecoupled(isotope, system.nuclei[other].isotope, experiment.decouple)) continue;
    const constant = Math.sqrt(tensor.reduce((sum, x) => sum + x * x, 0) / 6);
    reach += (like ? 1.5 : 1) * 2 * constant * spinOf(system, other);
  }
  return reach;
}

function spinOf(system: SpinSystem, row: number): number {
  return nuclide(system.nuclei[row].isotope).spin * system.nuclei[row].count;
}
