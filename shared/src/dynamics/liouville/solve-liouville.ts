import type { Experiment } from '../../documents/experiment.schema.js';
import type { SpinSystem } from '../../documents/system.schema.js';
import { nuclide } from '../../nuclides/nuclides.js';
import type { RunContext } from '../../run/context.js';
import { refuseBeyond } from '../../run/limits.js';
import type { ComplexArray, Solved } from '../../run/solved.js';
import { scansOf } from '../../sequence/steps.js';
import { ensemblesOf, isClosed } from './ensemble.js';
import { observedFragments } from './fragments.js';
import { liouvilleCost } from './liouville-cost.js';
import { ScanRunner, type DetectionClass } from './scan-runner.js';

/**
 * Any sequence on a solution, with exchange and relaxation, exactly: each fragment by itself, in composite Liouville space
 * restricted to the coherences that can reach the receiver, or by eigenstates where neither relaxation nor exchange acts.
 *   s(t) = sum over scans, fragments, nuclei of exp(-pi L_n t) i exp(-i receiver) 3/(dim I(I+1)) Tr(In+ rho(t))
 * Throws an EngineError TOO_LARGE when it would break the context's limits.
 */
export function solveLiouville(system: SpinSystem, experiment: Experiment, context: RunContext): Solved {
  const cost = liouvilleCost(system, experiment);
  refuseBeyond(cost, context, `${cost.basis} basis states, ${cost.detected} detected coherences`);
  const { points } = experiment.acquisition;
  const scans = scansOf(experiment);
  const ensembles = observedFragments(system, experiment).flatMap((rows) => ensemblesOf(system, experiment, rows));
  const fid = { real: new Float64Array(points), imag: new Float64Array(points) };
  const dimensions = { ensembles: ensembles.length, scans: scans.length, largestMatrix: 0, products: 0 };
  let done = 0;
  const total = ensembles.length * scans.length;
  for (const ensemble of ensembles) {
    const detection = detectionClasses(system, experiment, new Set(ensemble.space.particles.map(({ row }) => row)));
    const runner = new ScanRunner(ensemble, detection, context);
    for (const { steps, weight } of scans) {
      const signals = runner.run(steps, (fraction) => context.tick((done + fraction) / total));
      addWeighted(fid, signals, detection, weight * ensemble.weight * normalisation(experiment), experiment);
      context.tick(++done / total);
    }
    dimensions.largestMatrix = Math.max(dimensions.largestMatrix, runner.largestMatrix);
    dimensions.products += runner.counts.products;
  }
  const closed = ensembles.every(isClosed);
  return {
    fid,
    method: closed
      ? 'density operator stepped through the sequence among eigenstates of blocks'
      : `composite Liouville space of ${system.states?.length ?? 1} states, restricted to the orders that are detected; each block by ` +
        'Lanczos recursion, Krylov steps or a dense exponential, the cheapest by the cost model',
    dimensions,
    approximations: [],
    warnings: [],
  };
}

/** 3/(I(I+1)), with Tr In+ In- of the whole fragment in `ensemble.weight`. */
function normalisation({ observe }: Experiment): number {
  const { spin } = nuclide(observe);
  return 3 / (spin * (spin + 1));
}

/** Observed nuclei by line width, which decays the signal only in "line-width". */
function detectionClasses(system: SpinSystem, experiment: Experiment, rows: ReadonlySet<number>): DetectionClass[] {
  const classes = new Map<number, number[]>();
  system.nuclei.forEach(({ isotope, lineWidth }, row) => {
    if (isotope !== experiment.observe || !rows.has(row)) return;
    const width = experiment.relaxation === 'line-width' ? (lineWidth ?? experiment.lineWidth) : 0;
    classes.set(width, [...(classes.get(width) ?? []), row]);
  });
  return [...classes].map(([lineWidth, members]) => ({ lineWidth, rows: members }));
}

function addWeighted(
  fid: ComplexArray,
  signals: readonly ComplexArray[],
  detection: readonly DetectionClass[],
  weight: number,
  { acquisition }: Experiment,
): void {
  signals.forEach(({ real, imag }, c) => {
    const { lineWidth } = detection[c];
    for (let k = 0; k < acquisition.points; k++) {
      const factor = weight * Math.exp((-Math.PI * lineWidth * k) / acquisition.width);
      fid.real[k] += factor * real[k];
      fid.imag[k] += factor * imag[k];
    }
  });
}
