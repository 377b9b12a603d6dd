import { innerProduct3, type Matrix3 } from '../../algebra/rotation.js';
import type { Experiment } from '../../documents/experiment.schema.js';
import type { SpinSystem } from '../../documents/system.schema.js';
import type { RunContext } from '../../run/context.js';
import { refuseBeyond } from '../../run/limits.js';
import { scansOf, type ScanStep } from '../../sequence/steps.js';
import { decayClasses } from './decay-classes.js';
import { isCommuting, joined, observedClusters, type SpinCluster } from './oriented-spins.js';
import { decouplingSettings, pulsedState } from './preparation.js';
import { highestOrder } from './sidebands.js';

/** Work of `solveOriented`, estimated before it is done; seconds are for one core of a machine of 2020. */
export interface OrientedCost {
  seconds: number;
  bytes: number;
  orientations: number;
  transitions: number;
  largestBlock: number;
}

/** Seconds for each unit of work. Measured; not derived. */
const SECONDS = {
  /** a transition at a direction, interpolated over its share of triangles */
  interpolated: 6e-7,
  /** a rotor phase of a closed form */
  phase: 4e-8,
  /** a sideband or line added to the signal */
  line: 5e-8,
  /** n^3 of a diagonalisation, and of a step of a propagator */
  eigen: 2e-8,
  step: 1.6e-7,
  /** an element of the diagonal for each term */
  term: 3e-9,
  /** a block visited */
  block: 4e-7,
  /** n^3 of a complex product of the whole dimension */
  product: 1.2e-8,
  point: 3e-6,
};
/** Directions beside those asked for: shared rows, and the smaller set. */
const OVERHEAD = 1.3;
/** Rows of nodes kept at once. */
const ROWS = 5;

/** Sums over the independent clusters. Nothing of the size of the product basis is made. */
export function orientedCost(system: SpinSystem, experiment: Experiment): OrientedCost {
  const { sample, acquisition } = experiment;
  const settings = decouplingSettings(experiment);
  const orientations = 'orientations' in sample ? sample.orientations : 1;
  const pulsed = pulsedState(experiment) !== null;
  const classes = decayClasses(system, experiment).lineWidths.length;
  const cost = { seconds: acquisition.points * SECONDS.point, bytes: 0, orientations, transitions: 0, largestBlock: 1 };
  for (const state of system.states ?? [undefined]) {
    const decoupled = pulsed ? settings[settings.length - 1] : [];
    for (const cluster of observedClusters(system, experiment, decoupled, state)) {
      const counts = blockCounts(cluster, experiment.observe);
      const closed = pulsed && isCommuting(cluster);
      const { seconds, transitions, bytes } = closed
        ? closedCost(cluster, counts, experiment)
        : coupledCost(cluster, counts, experiment, pulsed);
      cost.seconds += (orientations === 1 ? 1 : OVERHEAD * orientations) * seconds;
      cost.transitions += transitions;
      if (!closed) cost.largestBlock = Math.max(cost.largestBlock, counts.largest);
      cost.bytes += bytes + 8 * ROWS * Math.sqrt(orientations) * transitions * (1 + classes * (pulsed ? 1 : 2));
    }
  }
  cost.bytes += 200 * acquisition.points * classes;
  return cost;
}

/** Throws an EngineError TOO_LARGE with the estimate where it breaks the context's limits. */
export function refuseTooLarge(system: SpinSystem, experiment: Experiment, context: RunContext): void {
  const cost = orientedCost(system, experiment);
  const why = `${cost.orientations} orientations, ${cost.transitions} transitions, largest block ${cost.largestBlock}`;
  refuseBeyond(cost, context, why, cost.largestBlock > LARGE_BLOCK ? 'nuclei' : 'sample.orientations');
}

/** From this size of a block on it is the system rather than the number of orientations that makes a run long. */
const LARGE_BLOCK = 100;

interface Work {
  /** for one direction */
  readonly seconds: number;
  readonly transitions: number;
  readonly bytes: number;
}

/** Closed forms; about a quarter of the directions stand for all by symmetry. */
function closedCost(cluster: SpinCluster, { own }: BlockCounts, { sample }: Experiment): Work {
  if (sample.kind !== 'spinning')
    return { seconds: (own * SECONDS.interpolated) / 4, transitions: own, bytes: 200 * own };
  const orders = highestOrder(frequencyRange(cluster), sample.rateHz);
  const lines = own * (2 * orders + 1);
  return {
    seconds: own * 4 * orders * SECONDS.phase + lines * SECONDS.line,
    transitions: lines,
    bytes: 200 * own + 80 * orders * own,
  };
}

function coupledCost(cluster: SpinCluster, counts: BlockCounts, experiment: Experiment, pulsed: boolean): Work {
  const { dimension, cubes, squares, blocks, transitions } = counts;
  const { sample } = experiment;
  const terms = dimension * (cluster.spins.length + cluster.pairs.length);
  const bytes = 8 * terms + 200 * transitions + 16 * 12 * (pulsed ? 0 : dimension ** 2);
  if (sample.kind === 'spinning') {
    const range = frequencyRange(cluster) / sample.rateHz;
    const steps = Math.max(32, 2 * highestOrder(range, 1), 6 * range);
    const step = cubes * SECONDS.step + 2 * (terms * SECONDS.term + blocks * SECONDS.block);
    return { seconds: steps * (step + transitions * SECONDS.line), transitions, bytes: bytes + 48 * steps * squares };
  }
  const products = pulsed
    ? 0
    : scansOf(experiment).reduce((sum, { steps }) => sum + steps.map(productsOf).reduce(add, 0), 0);
  const prepared = products * dimension ** 3;
  const seconds =
    cubes * SECONDS.eigen +
    terms * SECONDS.term +
    blocks * SECONDS.block +
    transitions * SECONDS.interpolated +
    prepared * SECONDS.product;
  return { seconds, transitions, bytes };
}

/** Products of the whole dimension that a step takes: two about a propagator, and those of an exponential. */
function productsOf(step: ScanStep): number {
  const driven = 'saturate' in step || ('pulse' in step && step.pulse.seconds !== undefined);
  return driven ? 20 : 2;
}

function add(a: number, b: number): number {
  return a + b;
}

interface BlockCounts {
  readonly dimension: number;
  readonly blocks: number;
  readonly largest: number;
  /** Sums of the squares and cubes of the blocks' sizes. */
  readonly squares: number;
  readonly cubes: number;
  /** Products of the sizes of blocks joined by the observed In+. */
  readonly transitions: number;
  /** Transitions of product states of the spins coupled to each observed one. */
  readonly own: number;
}

/** A block is a product over sets of coupled like spins of their states with one projection. */
function blockCounts({ spins, pairs }: SpinCluster, observe: string): BlockCounts {
  const label = joined(
    spins.length,
    pairs.filter(({ like }) => like),
  );
  const sets = [...new Set(label)].map((name) => {
    const members = spins.filter((_, k) => label[k] === name);
    return { observed: members[0].isotope === observe, sizes: members.reduce(withSpin, [1]) };
  });
  const over = (power: number) => sets.map(({ sizes }) => sizes.reduce((sum, n) => sum + n ** power, 0));
  const product = (values: readonly number[]) => values.reduce((all, value) => all * value, 1);
  const squares = product(over(2));
  const transitions = sets.reduce((sum, { observed, sizes }, s) => {
    const steps = sizes.reduce((all, n, i) => all + n * (sizes[i + 1] ?? 0), 0);
    return observed ? sum + (steps * squares) / over(2)[s] : sum;
  }, 0);
  const own = spins.reduce((sum, { isotope, spin }, k) => {
    if (isotope !== observe) return sum;
    const partners = pairs.flatMap(({ a, b }) => (a === k ? [b] : b === k ? [a] : []));
    return sum + 2 * spin * product(partners.map((p) => 2 * spins[p].spin + 1));
  }, 0);
  return {
    dimension: product(over(1)),
    blocks: product(over(0)),
    largest: product(sets.map(({ sizes }) => Math.max(...sizes))),
    squares,
    cubes: product(over(3)),
    transitions,
    own,
  };
}

/** Numbers of states by projection after one more spin. */
function withSpin(sizes: number[], { spin }: { spin: number }): number[] {
  const next = new Array<number>(sizes.length + 2 * spin).fill(0);
  sizes.forEach((states, i) => {
    for (let l = 0; l <= 2 * spin; l++) next[i + l] += states;
  });
  return next;
}

/** About the range of the single-quantum frequencies over the sphere, Hz. */
function frequencyRange({ spins, pairs }: SpinCluster): number {
  const norm = (tensor: Matrix3 | null) => (tensor ? Math.sqrt(2 * innerProduct3(tensor, tensor)) : 0);
  const offsets = spins.map(({ offset }) => offset);
  const spreads = spins.map(({ spin, shift, quadrupole }, k) => {
    const couplings = pairs.filter(({ a, b }) => a === k || b === k);
    const coupling = couplings.reduce((sum, { j, dipolar }) => sum + Math.abs(j) + norm(dipolar), 0);
    return norm(shift) + 1.5 * (2 * spin - 1) * norm(quadrupole) + coupling;
  });
  return Math.max(...offsets) - Math.min(...offsets) + Math.max(...spreads);
}
