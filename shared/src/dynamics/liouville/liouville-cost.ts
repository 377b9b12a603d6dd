import type { Experiment } from '../../documents/experiment.schema.js';
import type { SpinSystem } from '../../documents/system.schema.js';
import { offsetsOf } from '../../interactions/carriers.js';
import { nuclide } from '../../nuclides/nuclides.js';
import { scansOf } from '../../sequence/steps.js';
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

/** Bytes kept for each element of rho, and for each detected coherence with its row of the generator. Counted from the code. */
const ELEMENT_BYTES = 48;
const COHERENCE_BYTES = 1200;
/** Seconds for each coherence and radian of the signal, and for each element of rho and step. Measured; not derived. */
const COHERENCE_SECONDS = 2.5e-7;
const ELEMENT_SECONDS = 2e-7;

/** An upper estimate: groups count by their largest total spin, or written out where relaxation tells their nuclei apart. */
export function liouvilleCost(system: SpinSystem, experiment: Experiment): LiouvilleCost {
  const { acquisition, observe } = experiment;
  const states = system.states?.length ?? 1;
  const duration = acquisition.points / acquisition.width;
  const steps = scansOf(experiment).reduce((sum, scan) => sum + scan.steps.length, 0);
  const cost: LiouvilleCost = {
    seconds: 1e-6 * acquisition.points,
    bytes: 200 * acquisition.points,
    basis: 1,
    detected: 0,
  };
  const offsets = offsetsOf(system, experiment, system.states?.[0]);
  for (const rows of observedFragments(system, experiment)) {
    const counts = new Map<string, number[]>();
    let basis = 1;
    for (const row of rows) {
      const { isotope } = system.nuclei[row];
      const levels = levelsOf(system, experiment, row);
      basis *= levels.reduce((product, level) => product * level, 1);
      counts.set(isotope, levels.reduce(convolve, counts.get(isotope) ?? [1]));
    }
    let detected = states;
    for (const [isotope, sizes] of counts) {
      detected *= sizes.reduce((sum, n, i) => sum + n * (isotope === observe ? (sizes[i + 1] ?? 0) : n), 0);
    }
    const spread = rows.reduce((sum, row) => sum + Math.abs(offsets[row]), 0);
    const radians = 2 * Math.PI * spread * duration;
    cost.bytes = Math.max(cost.bytes, ELEMENT_BYTES * states * basis ** 2 + COHERENCE_BYTES * detected);
    const recursion = detected > MOST_LANCZOS ? Infinity : LANCZOS_CUBE * detected ** 3;
    cost.seconds +=
      steps * ELEMENT_SECONDS * states * basis ** 2 + Math.min(detected * radians * COHERENCE_SECONDS, recursion);
    cost.basis = Math.max(cost.basis, basis);
    cost.detected = Math.max(cost.detected, detected);
  }
  return cost;
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
