import type { Experiment } from '../../documents/experiment.schema.js';
import type { SpinSystem } from '../../documents/system.schema.js';
import { offsetsOf } from '../../interactions/carriers.js';
import { nuclide } from '../../nuclides/nuclides.js';
import { scansOf, type ScanStep } from '../../sequence/steps.js';
import { rateMatrix } from '../exchange/rate-matrix.js';
import { observedFragments } from './fragments.js';
import { LANCZOS_CUBE, MOST_LANCZOS } from './open-evolution.js';
import { nucleusRates } from './random-field.js';

/** Work of `solveLiouville`, estimated from dimensions before anything is built. */
export interface LiouvilleCost {
  seconds: number;
  bytes: number;
  /** States of the product basis of the largest fragment. */
  basis: number;
  /** Coherences, over all exchange states, that are detected from it. */
  detected: number;
}

/**
 * Bytes kept for each element of rho, for each detected coherence (its row of the generator, or its stick), and for each element of
 * the vectors of a Lanczos recursion. Counted from the code.
 */
const ELEMENT_BYTES = 48;
const ROW_BYTES = 1200;
const STICK_BYTES = 100;
const VECTOR_BYTES = 16;
/**
 * Seconds: for each coherence and radian in Krylov steps, for each element of rho and step, for each cubed size of a group of
 * states once and in a step, and for each stick. Measured; not derived.
 */
const COHERENCE_SECONDS = 2.5e-7;
const ELEMENT_SECONDS = 2e-7;
const EIGEN_CUBE = 6e-9;
const TRANSFORM_CUBE = 2e-9;
const STICK_SECONDS = 2e-7;

/** An upper estimate: groups count by their largest total spin, or written out where relaxation tells their nuclei apart. */
export function liouvilleCost(system: SpinSystem, experiment: Experiment): LiouvilleCost {
  const { acquisition } = experiment;
  const states = system.states?.length ?? 1;
  const steps = scansOf(experiment).flatMap((scan) => scan.steps);
  const cost: LiouvilleCost = {
    seconds: 1e-6 * acquisition.points,
    bytes: 200 * acquisition.points,
    basis: 1,
    detected: 0,
  };
  const offsets = offsetsOf(system, experiment, system.states?.[0]);
  for (const rows of observedFragments(system, experiment)) {
    const sizes = sizesOf(system, experiment, rows);
    const { basis, detected } = sizes;
    const radiansPerSecond = 2 * Math.PI * rows.reduce((sum, row) => sum + Math.abs(offsets[row]), 0);
    const open = isOpen(system, experiment, rows);
    const vectors = open && sizes.largest <= MOST_LANCZOS ? VECTOR_BYTES * sizes.largest ** 2 : 0;
    const bytes = ELEMENT_BYTES * states * basis ** 2 + (open ? ROW_BYTES : STICK_BYTES) * detected + vectors;
    cost.bytes = Math.max(cost.bytes, bytes);
    cost.seconds +=
      steps.length * ELEMENT_SECONDS * states * basis ** 2 +
      (open
        ? openSeconds(sizes, radiansPerSecond, steps, experiment, states)
        : states * closedSeconds(sizes, steps.length));
    cost.basis = Math.max(cost.basis, basis);
    cost.detected = Math.max(cost.detected, detected);
  }
  return cost;
}

/** Counts of one fragment. */
interface Sizes {
  basis: number;
  /** Detected coherences over all states, those in the largest block, and the sum of the cubes of all blocks. */
  detected: number;
  largest: number;
  cubes: number;
  /** Sum of the cubes of the groups of states of equal projections. */
  groupCubes: number;
}

function sizesOf(system: SpinSystem, experiment: Experiment, rows: readonly number[]): Sizes {
  const counts = new Map<string, number[]>();
  for (const row of rows) {
    const { isotope } = system.nuclei[row];
    counts.set(isotope, levelsOf(system, experiment, row).reduce(convolve, counts.get(isotope) ?? [1]));
  }
  const states = system.states?.length ?? 1;
  const sizes: Sizes = { basis: 1, detected: states, largest: states, cubes: states ** 3, groupCubes: 1 };
  const flips =
    experiment.relaxation === 'redfield' ||
    (experiment.relaxation === 't1-t2' && rows.some((row) => nucleusRates(system, experiment, row).r1 > 0));
  for (const [isotope, totals] of counts) {
    const pairs = totals.map((n, i) => n * (isotope === experiment.observe ? (totals[i + 1] ?? 0) : n));
    const all = sum(pairs);
    const blocks = flips ? [all] : pairs;
    sizes.basis *= sum(totals);
    sizes.detected *= all;
    sizes.largest *= Math.max(...blocks);
    sizes.cubes *= sum(blocks.map((n) => n ** 3));
    sizes.groupCubes *= sum(totals.map((n) => n ** 3));
  }
  return sizes;
}

function isOpen(system: SpinSystem, experiment: Experiment, rows: readonly number[]): boolean {
  if (experiment.relaxation === 'redfield') return true;
  if (rateMatrix(system, experiment.temperature).some((rate) => rate !== 0)) return true;
  if (experiment.relaxation !== 't1-t2') return false;
  return rows.some((row) => {
    const { r1, r2 } = nucleusRates(system, experiment, row);
    return r1 + r2 > 0;
  });
}

/** Eigenstates once, turning rho into them and back in every step, and the sticks. */
function closedSeconds({ groupCubes, detected }: Sizes, steps: number): number {
  return (EIGEN_CUBE + steps * TRANSFORM_CUBE) * groupCubes + STICK_SECONDS * detected;
}

/** A signal for each acquisition, as much for each delay, and all coherences at once while a field is on. */
function openSeconds(
  { basis, detected, largest, cubes }: Sizes,
  radiansPerSecond: number,
  steps: readonly ScanStep[],
  { acquisition }: Experiment,
  states: number,
): number {
  const recursions = largest > MOST_LANCZOS ? Infinity : LANCZOS_CUBE * cubes;
  const whole = states * basis ** 2;
  const driven = whole > MOST_LANCZOS ? Infinity : 4 * LANCZOS_CUBE * whole ** 3;
  const krylov = (size: number, t: number) => size * radiansPerSecond * t * COHERENCE_SECONDS;
  return sum(
    steps.map((step) => {
      if ('acquire' in step) return Math.min(krylov(detected, acquisition.points / acquisition.width), recursions);
      // Orders -1 and 1, real and imaginary parts.
      if ('delay' in step) return Math.min(krylov(2 * detected, step.delay), 4 * recursions);
      if ('saturate' in step) return Math.min(krylov(whole, step.saturate.seconds), driven);
      if ('pulse' in step && step.pulse.seconds) return Math.min(krylov(whole, step.pulse.seconds), driven);
      return 0;
    }),
  );
}

function sum(values: readonly number[]): number {
  return values.reduce((total, value) => total + value, 0);
}

/** Levels of each spin that a nucleus brings into the basis. */
function levelsOf(system: SpinSystem, experiment: Experiment, row: number): number[] {
  const { isotope, count } = system.nuclei[row];
  const { spin } = nuclide(isotope);
  const { r1, r2 } = nucleusRates(system, experiment, row);
  const apart = experiment.relaxation === 'redfield' || (experiment.relaxation === 't1-t2' && r1 + r2 > 0);
  return apart ? new Array<number>(count).fill(2 * spin + 1) : [2 * spin * count + 1];
}

/** Numbers of states by total projection after one more spin with `levels` levels. */
function convolve(sizes: number[], levels: number): number[] {
  const next = new Array<number>(sizes.length + levels - 1).fill(0);
  sizes.forEach((n, i) => {
    for (let l = 0; l < levels; l++) next[i + l] += n;
  });
  return next;
}
