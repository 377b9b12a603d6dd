import type { Experiment } from '../../documents/experiment.schema.js';
import type { SpinSystem } from '../../documents/system.schema.js';
import { couplingsOf } from '../../interactions/scalar.js';
import { observedParts } from './clusters.js';
import { sectorSpins } from './sector-spins.js';
import { spectatorFields } from './spectator-fields.js';

/** Work of `solveBlocks`, counted exactly before it is done; seconds are for one core of a machine of 2020. */
export interface BlocksCost {
  seconds: number;
  bytes: number;
  blocks: number;
  largestBlock: number;
  transitions: number;
}

/** Seconds for each unit of n^3 of a diagonalisation and of a product, for each stick and FID point. Measured; not derived. */
const SECONDS = { eigen: 7e-10, product: 1.5e-10, stick: 1.2e-7, point: 1.5e-6 };
/** Doubles kept at once for each entry of the largest block, and bytes for each stick and FID point. Counted from the code. */
const ENTRY_DOUBLES = 14;
const STICK_BYTES = 48;
const POINT_BYTES = 200;

/**
 * A block is a product over clusters of the states with one projection, so that sums over blocks of n, n^3 and of products
 * of neighbours are products of sums over each cluster.
 */
export function blocksCost(system: SpinSystem, experiment: Experiment): BlocksCost {
  const { points } = experiment.acquisition;
  const cost = { seconds: points * SECONDS.point, bytes: 0, blocks: 0, largestBlock: 0, transitions: 0 };
  const isotopes = system.nuclei.map(({ isotope }) => isotope);
  for (const state of system.states ?? [undefined]) {
    const couplings = couplingsOf(system, experiment.decouple, state);
    for (const part of observedParts(isotopes, couplings, experiment.observe)) {
      const fields = spectatorFields(system, part, couplings).length;
      for (const { spins } of sectorSpins(system, part)) {
        const sizes = clusterSizes(spins, part.cluster);
        const cubes = product(sizes.slice(1).map((counts) => total(counts, (n) => n ** 3)));
        const neighbours = (power: number) =>
          total(sizes[0], (n, i) => (i + 1 < sizes[0].length ? n * sizes[0][i + 1] ** power : 0));
        const transitions =
          fields * neighbours(1) * product(sizes.slice(1).map((counts) => total(counts, (n) => n ** 2)));
        cost.blocks += fields * product(sizes.map((counts) => counts.length));
        cost.transitions += transitions;
        cost.largestBlock = Math.max(cost.largestBlock, product(sizes.map((counts) => Math.max(...counts))));
        cost.seconds += fields * cubes * total(sizes[0], (n) => n ** 3) * SECONDS.eigen;
        cost.seconds += fields * cubes * neighbours(2) * SECONDS.product + transitions * SECONDS.stick;
      }
    }
  }
  cost.bytes = 8 * ENTRY_DOUBLES * cost.largestBlock ** 2 + STICK_BYTES * cost.transitions + POINT_BYTES * points;
  return cost;
}

/** For each cluster, the number of product states at each projection, highest first. */
function clusterSizes(spins: readonly number[], cluster: readonly number[]): number[][] {
  const sizes: number[][] = [];
  spins.forEach((spin, p) => {
    const old = sizes[cluster[p]] ?? [1];
    const next = new Array<number>(old.length + 2 * spin).fill(0);
    old.forEach((states, i) => {
      for (let l = 0; l <= 2 * spin; l++) next[i + l] += states;
    });
    sizes[cluster[p]] = next;
  });
  return sizes;
}

function product(values: readonly number[]): number {
  return values.reduce((result, value) => result * value, 1);
}

function total(values: readonly number[], of: (value: number, index: number) => number): number {
  return values.reduce((sum, value, index) => sum + of(value, index), 0);
}
