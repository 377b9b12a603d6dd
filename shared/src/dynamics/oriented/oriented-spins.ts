import type { Matrix3 } from '../../algebra/rotation.js';
import type { Experiment } from '../../documents/experiment.schema.js';
import type { ExchangeState, SpinSystem } from '../../documents/system.schema.js';
import { offsetsOf, signedLarmorHz } from '../../interactions/carriers.js';
import { couplingsOf, isDecoupled } from '../../interactions/scalar.js';
import { dipolarCouplingsOf, quadrupolarTensorHz, shiftTensorHz } from '../../interactions/tensors.js';
import { nuclide } from '../../nuclides/nuclides.js';

/** One spin of an oriented sample; a group of equivalent nuclei is as many spins. */
export interface OrientedSpin {
  /** Row of `system.nuclei`, and its id. */
  readonly row: number;
  readonly id: string;
  readonly isotope: string;
  readonly spin: number;
  /** Hz from the carrier, isotropic. */
  readonly offset: number;
  /** Anisotropic part of the shift, Hz. */
  readonly shift: Matrix3 | null;
  /** H_Q = I.Q.I, Hz. */
  readonly quadrupole: Matrix3 | null;
  /** Signed Larmor frequency, Hz, that divides second-order terms; Infinity leaves them out. */
  readonly larmor: number;
}

/** The coupling of two spins, a < b: J and the dipolar tensor in Hz, with flip-flop terms between like ones. */
export interface OrientedPair {
  readonly a: number;
  readonly b: number;
  readonly j: number;
  readonly dipolar: Matrix3 | null;
  readonly like: boolean;
}

/** Spins that no coupling joins to any other spin, with their couplings. */
export interface SpinCluster {
  readonly spins: readonly OrientedSpin[];
  readonly pairs: readonly OrientedPair[];
}

/**
 * The independent clusters that hold observed spins, in `state`, while `decoupled` isotopes are decoupled. Tensors are in the
 * molecular frame.
 */
export function observedClusters(
  system: SpinSystem,
  experiment: Experiment,
  decoupled: readonly string[],
  state?: ExchangeState,
): SpinCluster[] {
  const spins = spinsOf(system, experiment, state);
  const pairs = pairsOf(system, spins, decoupled, state);
  const label = joined(spins.length, pairs);
  const observed = new Set(label.filter((_, index) => spins[index].isotope === experiment.observe));
  return [...observed].map((cluster) => {
    const members = spins.flatMap((_, index) => (label[index] === cluster ? [index] : []));
    return {
      spins: members.map((index) => spins[index]),
      pairs: pairs
        .filter(({ a }) => label[a] === cluster)
        .map((pair) => ({ ...pair, a: members.indexOf(pair.a), b: members.indexOf(pair.b) })),
    };
  });
}

/** A label for each of 0..count-1, equal for those that pairs join, directly or through others. */
export function joined(count: number, pairs: readonly { a: number; b: number }[]): number[] {
  const label = Array.from({ length: count }, (_, index) => index);
  for (const { a, b } of pairs) {
    const [kept, gone] = [label[a], label[b]];
    label.forEach((value, index) => (label[index] = value === gone ? kept : value));
  }
  return label;
}

function spinsOf(system: SpinSystem, experiment: Experiment, state?: ExchangeState): OrientedSpin[] {
  const offsets = offsetsOf(system, experiment, state);
  return system.nuclei.flatMap((nucleus, row) => {
    const { id, isotope, count } = nucleus;
    const spin: OrientedSpin = {
      row,
      id,
      isotope,
      spin: nuclide(isotope).spin,
      offset: offsets[row],
      shift: shiftTensorHz(nucleus, experiment),
      quadrupole: quadrupolarTensorHz(nucleus),
      larmor: experiment.quadrupoleOrder === 2 ? signedLarmorHz(isotope, experiment) : Infinity,
    };
    return new Array<OrientedSpin>(count).fill(spin);
  });
}

function pairsOf(
  system: SpinSystem,
  spins: readonly OrientedSpin[],
  decoupled: readonly string[],
  state?: ExchangeState,
): OrientedPair[] {
  const scalar = couplingsOf(system, decoupled, state);
  const dipolar = dipolarCouplingsOf(system).filter(
    ({ a, b }) => !isDecoupled(system.nuclei[a].isotope, system.nuclei[b].isotope, decoupled),
  );
  const pairs: OrientedPair[] = [];
  for (let b = 0; b < spins.length; b++) {
    for (let a = 0; a < b; a++) {
      const joins = (pair: { a: number; b: number }) => pair.a === spins[a].row && pair.b === spins[b].row;
      const j = scalar.find(joins)?.j ?? 0;
      const tensor = dipolar.find(joins)?.tensor ?? null;
      if (j !== 0 || tensor) pairs.push({ a, b, j, dipolar: tensor, like: spins[a].isotope === spins[b].isotope });
    }
  }
  return pairs;
}

/** The cluster's spins with the couplings that ideal decoupling of `decoupled` leaves. */
export function decoupledCluster({ spins, pairs }: SpinCluster, decoupled: readonly string[]): SpinCluster {
  return { spins, pairs: pairs.filter(({ a, b }) => !isDecoupled(spins[a].isotope, spins[b].isotope, decoupled)) };
}

/** Whether all terms of the cluster commute, so that product states stay product states: no two like spins are coupled. */
export function isCommuting(cluster: SpinCluster): boolean {
  return cluster.pairs.every(({ like }) => !like);
}

/** Every tensor of the cluster, for the symmetry of its average. */
export function tensorsOf({ spins, pairs }: SpinCluster): Matrix3[] {
  const tensors = [
    ...spins.flatMap(({ shift, quadrupole }) => [shift, quadrupole]),
    ...pairs.map(({ dipolar }) => dipolar),
  ];
  return tensors.filter((tensor) => tensor !== null);
}

/** The cluster with its tensors turned by `turn`. */
export function turnCluster(cluster: SpinCluster, turn: (tensor: Matrix3) => Matrix3): SpinCluster {
  const optional = (tensor: Matrix3 | null) => tensor && turn(tensor);
  return {
    spins: cluster.spins.map((s) => ({ ...s, shift: optional(s.shift), quadrupole: optional(s.quadrupole) })),
    pairs: cluster.pairs.map((pair) => ({ ...pair, dipolar: optional(pair.dipolar) })),
  };
}
