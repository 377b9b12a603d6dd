import type { Experiment } from '../../documents/experiment.schema.js';
import type { Approximation } from '../../documents/result.js';
import type { SpinSystem } from '../../documents/system.schema.js';
import type { RunContext } from '../../run/context.js';
import type { ComplexArray, Solved } from '../../run/solved.js';
import { foldingWarning } from '../../spectrum/folding-warning.js';
import { orientationApproximation, rotorPhaseApproximation, spectralDistanceHz } from './convergence.js';
import { runPart } from './job.js';
import { orientedCost, refuseTooLarge } from './oriented-cost.js';
import { planOf, type Plan } from './plan.js';
import type { PulsedState } from './preparation.js';
import { SignalSum } from './signal-sum.js';

/** What one part of a run found: its share of the FID, and of that of the smaller set of orientations. */
export interface PartialSignal {
  readonly fine: ComplexArray;
  readonly coarse: ComplexArray;
  readonly folded: number;
}

/** The most parts that a run is worth being cut into, and the shortest part worth the trouble, s. */
const MOST_PARTS = 64;
const SHORTEST_PART = 0.25;

/** Into how many parts a run is worth being cut: 1 where there is nothing to average over. */
export function planParts(system: SpinSystem, experiment: Experiment): number {
  if (!('orientations' in experiment.sample)) return 1;
  const { seconds } = orientedCost(system, experiment);
  return Math.min(MOST_PARTS, Math.ceil(seconds / SHORTEST_PART));
}

/** Does one part of a run; the parts may be done anywhere and in any order. */
export function simulatePart(
  system: SpinSystem,
  experiment: Experiment,
  part: number,
  parts: number,
  context: RunContext,
): PartialSignal {
  refuseTooLarge(system, experiment, context);
  return signalOf(planOf(system, experiment), experiment, part, parts, context);
}

/** The whole signal of its parts. */
export function mergeParts(system: SpinSystem, experiment: Experiment, partials: readonly PartialSignal[]): Solved {
  return solvedOf(planOf(system, experiment), system, experiment, partials);
}

/** Simulates a crystal, a static powder or a spinning powder. Throws EngineError UNSUPPORTED or TOO_LARGE. */
export function solveOriented(system: SpinSystem, experiment: Experiment, context: RunContext): Solved {
  refuseTooLarge(system, experiment, context);
  const plan = planOf(system, experiment);
  return solvedOf(plan, system, experiment, [signalOf(plan, experiment, 0, 1, context)]);
}

function signalOf(plan: Plan, experiment: Experiment, part: number, parts: number, context: RunContext): PartialSignal {
  const sum = new SignalSum(experiment, plan.classes, plan.pulsed === null);
  runPart(plan.jobs, part, parts, sum, (fraction) => context.tick(fraction));
  return { fine: sum.fidOf(sum.fine), coarse: sum.fidOf(sum.coarse), folded: sum.folded };
}

function solvedOf(plan: Plan, system: SpinSystem, experiment: Experiment, partials: readonly PartialSignal[]): Solved {
  const { sample, acquisition } = experiment;
  const fine = total(partials.map((partial) => partial.fine));
  const orientations = Math.max(...plan.jobs.map((job) => job.orientations));
  const transitions = plan.jobs.reduce((sum, job) => sum + job.transitions, 0);
  const approximations: Approximation[] = [];
  if (sample.kind !== 'crystal') {
    const coarse = total(partials.map((partial) => partial.coarse));
    const resolution = Math.max(acquisition.width / acquisition.points, ...plan.classes.lineWidths);
    const hz = spectralDistanceHz(fine, coarse, acquisition.width);
    approximations.push(orientationApproximation(hz, orientations, resolution));
  }
  if (sample.kind === 'spinning' && sample.gammas !== undefined)
    approximations.push(rotorPhaseApproximation(sample.gammas));
  const folded = partials.reduce((sum, partial) => sum + partial.folded, 0);
  return {
    fid: plan.pulsed ? scaled(fine, plan.pulsed) : fine,
    method: methodOf(plan, experiment),
    dimensions: { orientations, transitions },
    approximations,
    warnings: foldingWarning(folded, system, experiment),
  };
}

function methodOf({ coupled }: Plan, { sample }: Experiment): string {
  if (sample.kind === 'spinning') {
    return coupled
      ? 'Floquet states of the rotor period, exact average over rotor phases'
      : 'Fourier series of the rotor-modulated phase, exact average over rotor phases';
  }
  const states = coupled ? 'eigenstates of blocks of the product basis' : 'transition frequencies in closed form';
  return sample.kind === 'powder' ? `${states}, interpolated over triangles of the sphere` : states;
}

function total(fids: readonly ComplexArray[]): ComplexArray {
  const [first, ...rest] = fids;
  const sum = { real: first.real.slice(), imag: first.imag.slice() };
  for (const { real, imag } of rest) {
    for (let k = 0; k < real.length; k++) {
      sum.real[k] += real[k];
      sum.imag[k] += imag[k];
    }
  }
  return sum;
}

function scaled({ real, imag }: ComplexArray, factor: PulsedState): ComplexArray {
  return {
    real: real.map((value, k) => value * factor.real - imag[k] * factor.imag),
    imag: imag.map((value, k) => value * factor.real + real[k] * factor.imag),
  };
}
