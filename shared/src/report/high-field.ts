import { rotationMatrix, type Matrix3 } from '../algebra/rotation.js';
import type { Experiment } from '../documents/experiment.schema.js';
import type { Approximation } from '../documents/result.js';
import type { Nucleus, SpinSystem } from '../documents/system.schema.js';
import { signedLarmorHz } from '../interactions/carriers.js';
import { couplingsOf, isDecoupled } from '../interactions/scalar.js';
import { dipolarCouplingsOf } from '../interactions/tensors.js';
import { nuclide } from '../nuclides/nuclides.js';
import { compareTransitions } from './compare-transitions.js';
import { coupledFragments } from './fragments.js';
import { denseHamiltonian, loweringOperator, mainState, spinSpace } from './spin-hamiltonian.js';
import { hertz } from './text.js';
import { finestDetail } from './widths.js';

/** Largest dimension of a fragment that is diagonalised in the laboratory frame, for one orientation and for many. */
const EXACT_DIMENSION = { single: 64, many: 16 } as const;

/** What dropping the terms that do not commute with the Zeeman interaction leaves out. */
export function highFieldTruncation(system: SpinSystem, experiment: Experiment): Approximation {
  const orientations = orientationsOf(experiment);
  const oriented = orientations[0] !== null;
  const fragments = coupledFragments(system, experiment, oriented);
  const limit = orientations.length > 1 ? EXACT_DIMENSION.many : EXACT_DIMENSION.single;
  const exact = fragments.every((fragment) => spinSpace(fragment).dimension <= limit);
  const estimate = estimateHighFieldTruncation(system, experiment);
  const hz = exact && estimate > 0 ? exactTruncation(fragments, experiment, orientations) : estimate;
  const secondOrder = experiment.quadrupoleOrder === 2 && system.nuclei.some(({ quadrupole }) => quadrupole);
  const kept = oriented && secondOrder ? 'Quadrupolar levels are kept to second order. ' : '';
  const how = exact
    ? `the complete Hamiltonian in the laboratory frame moves a line by up to ${hertz(hz)} (second-order estimate ${hertz(estimate)})`
    : `second-order perturbation theory moves a line by up to ${hertz(hz)}`;
  return {
    id: 'high-field-truncation',
    title: 'High-field truncation',
    made: true,
    hz,
    computed: exact ? 'exact-difference' : 'estimate',
    warnAbove: finestDetail(system, experiment),
    detail: `${kept}Only terms that commute with the Zeeman interaction act; ${how}${
      orientations.length > 1 ? `, over ${orientations.length} static orientations` : ''
    }.`,
  };
}

/** Orientations to compare at; [null] for a solution. */
function orientationsOf({ sample }: Experiment): (Matrix3 | null)[] {
  if (sample.kind === 'solution') return [null];
  if (sample.kind === 'crystal') return [rotationMatrix(sample.euler)];
  const [tilts, turns] = [
    [0, 30, 60, 90, 120, 150],
    [0, 45, 90, 135],
  ];
  return tilts.flatMap((tilt) => turns.map((turn) => rotationMatrix([0, tilt, turn])));
}

function exactTruncation(
  fragments: readonly SpinSystem[],
  experiment: Experiment,
  orientations: readonly (Matrix3 | null)[],
): number {
  let largest = 0;
  for (const fragment of fragments) {
    const lowering = loweringOperator(fragment, experiment.observe);
    for (const orientation of orientations) {
      const [complete, kept] = (['complete', 'high-field'] as const).map((reading) =>
        denseHamiltonian(fragment, experiment, reading, 'laboratory', orientation),
      );
      largest = Math.max(largest, compareTransitions(complete, kept, lowering).displacement);
    }
  }
  return largest;
}

/**
 * Largest displacement of a line of the observed isotope by the truncated terms to second order, Hz. Each nucleus feels a field
 * across the main one, of its shift tensor, its partners' dipolar fields and (to cross terms, if its own second order is kept)
 * its quadrupole, which moves its frequency by field^2/(2 nu0); flip-flop and double-flip terms add their square over the
 * difference and the sum of the two frequencies (M. Mehring, Principles of High Resolution NMR in Solids, 1983, ch. 2).
 */
export function estimateHighFieldTruncation(system: SpinSystem, experiment: Experiment): number {
  const shifts = system.nuclei.map((nucleus, row) =>
    nucleus.isotope === experiment.observe ? truncationOf(row, system, experiment) : 0,
  );
  return Math.max(...shifts);
}

function truncationOf(row: number, system: SpinSystem, experiment: Experiment): number {
  const own = system.nuclei[row];
  const larmor = (nucleus: Nucleus) => signedLarmorHz(nucleus.isotope, experiment);
  const oriented = experiment.sample.kind !== 'solution';
  let across = oriented ? ((own.csa?.span ?? 0) * 1e-6 * Math.abs(larmor(own))) / 2 : 0;
  let pairs = 0;
  for (const { other, j, d } of partners(row, system, experiment, oriented)) {
    const scale = (spinOf(own) + 0.5) ** 2 * (spinOf(other) + 0.5) ** 2;
    const [difference, sum] = [Math.abs(larmor(own) - larmor(other)), Math.abs(larmor(own) + larmor(other))];
    // Half the coefficient of I+S- + I-S+: J/2, or up to d/2 for the dipolar term.
    if (difference > 0) pairs += (scale * (Math.abs(j) / 2 + Math.abs(d) / 2) ** 2) / difference;
    // 3/4 d is the largest coefficient of I+S+.
    pairs += (scale * (0.75 * d) ** 2) / (sum || Math.abs(larmor(own)));
    across += 1.5 * Math.abs(d) * spinOf(other);
    if (oriented && other.quadrupole) pairs += (1.5 * Math.abs(d * other.quadrupole.cq)) / Math.abs(larmor(other));
  }
  const nu0 = Math.abs(larmor(own));
  return (
    across ** 2 / (2 * nu0) + pairs + (oriented ? quadrupolarTerms(own, across, nu0, experiment.quadrupoleOrder) : 0)
  );
}

/** Own quadrupole: second order if that is dropped, else third order and the cross term with the other fields across. */
function quadrupolarTerms(nucleus: Nucleus, across: number, nu0: number, order: 1 | 2): number {
  if (!nucleus.quadrupole) return 0;
  const spin = spinOf(nucleus);
  // Splitting constant 3 CQ/(2I(2I-1)).
  const splitting = (3 * Math.abs(nucleus.quadrupole.cq)) / (2 * spin * (2 * spin - 1));
  const squared = (splitting ** 2 / nu0) * (spin * (spin + 1) - 0.75);
  return (order === 1 ? squared : (squared * splitting) / nu0) + (2 * splitting * across) / nu0;
}

function partners(row: number, system: SpinSystem, experiment: Experiment, oriented: boolean) {
  const { nuclei } = system;
  const found = new Map<number, { other: Nucleus; j: number; d: number }>();
  const at = (other: number) => {
    if (!found.has(other)) found.set(other, { other: nuclei[other], j: 0, d: 0 });
    return found.get(other)!;
  };
  for (const { a, b, j } of couplingsOf(system, experiment.decouple, mainState(system))) {
    if (a === row || b === row) at(a + b - row).j = j;
  }
  for (const { a, b, tensor } of oriented ? dipolarCouplingsOf(system) : []) {
    const active = !isDecoupled(nuclei[a].isotope, nuclei[b].isotope, experiment.decouple);
    // The axial tensor d (3 e e - 1) has 6 d^2 as the sum of its squares.
    if (active && (a === row || b === row))
      at(a + b - row).d = Math.sqrt(tensor.reduce((sum, x) => sum + x * x, 0) / 6);
  }
  return found.values();
}

/** A group acts as its highest total spin. */
function spinOf({ isotope, count }: Nucleus): number {
  return nuclide(isotope).spin * count;
}
