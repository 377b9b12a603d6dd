import type { Experiment } from '../documents/experiment.schema.js';
import type { Approximation } from '../documents/result.js';
import type { SpinSystem } from '../documents/system.schema.js';
import { offsetsOf } from '../interactions/carriers.js';
import { couplingsOf } from '../interactions/scalar.js';
import { compareTransitions } from './compare-transitions.js';
import { coupledFragments } from './fragments.js';
import { denseHamiltonian, loweringOperator, mainState, spinSpace } from './spin-hamiltonian.js';
import { hertz, percent } from './text.js';
import { finestDetail } from './widths.js';

/** Fragments up to this dimension are compared exactly. */
export const EXACT_DIMENSION = 64;
/** Pairs named in the detail. */
const NAMED_PAIRS = 6;

/** One strongly or weakly coupled pair of like nuclei. */
export interface PairStrength {
  readonly between: readonly [string, string];
  readonly j: number;
  /** Difference of the resonance frequencies, Hz. */
  readonly difference: number;
  /** |J| over the difference; Infinity for equal shifts. */
  readonly ratio: number;
}

/** Every J-coupled pair of like nuclei with different shifts that the observed isotope is part of, the strongest coupled first. */
export function pairStrengths(system: SpinSystem, experiment: Experiment): PairStrength[] {
  const state = mainState(system);
  const offsets = offsetsOf(system, experiment, state);
  return couplingsOf(system, experiment.decouple, state)
    .filter(({ a, b, like }) => like && offsets[a] !== offsets[b] && system.nuclei[a].isotope === experiment.observe)
    .map(({ a, b, j }) => {
      const difference = Math.abs(offsets[a] - offsets[b]);
      const between: [string, string] = [system.nuclei[a].id, system.nuclei[b].id];
      return { between, j, difference, ratio: Math.abs(j) / difference };
    })
    .sort((p, q) => q.ratio - p.ratio);
}

/**
 * Estimated displacement of a nucleus's lines by strong coupling, Hz: (sqrt(D^2 + J^2) - D)/2 of an AB pair, exact for it
 * (J. A. Pople, W. G. Schneider, H. J. Bernstein, High-Resolution NMR, 1959, ch. 6), summed over the partners.
 */
export function estimateFirstOrderDisplacement(system: SpinSystem, experiment: Experiment): number {
  const sums = new Map<string, number>();
  const counts = new Map(system.nuclei.map(({ id, count }) => [id, count]));
  for (const { between, j, difference } of pairStrengths(system, experiment)) {
    const displacement = (Math.hypot(difference, j) - difference) / 2;
    between.forEach((id, end) => sums.set(id, (sums.get(id) ?? 0) + displacement * counts.get(between[1 - end])!));
  }
  return Math.max(0, ...sums.values());
}

/** What is lost by reading the spectrum as multiplets of first order; the engine itself does not make this approximation. */
export function firstOrderReading(system: SpinSystem, experiment: Experiment): Approximation {
  const pairs = pairStrengths(system, experiment);
  const fragments = coupledFragments(system, experiment, false);
  const exact = fragments.every((fragment) => spinSpace(fragment).dimension <= EXACT_DIMENSION);
  let [hz, intensity] = [0, 0];
  if (exact) {
    for (const fragment of fragments) {
      const comparison = compareFirstOrder(fragment, experiment);
      hz = Math.max(hz, comparison.displacement);
      intensity = Math.max(intensity, comparison.intensity);
    }
  } else hz = estimateFirstOrderDisplacement(system, experiment);
  const named = pairs.slice(0, NAMED_PAIRS).map(({ between, ratio }) => `${between.join('-')} ${ratio.toPrecision(2)}`);
  const strengths = named.length > 0 ? `J/\u0394\u03bd: ${named.join(', ')}. ` : '';
  const loss = exact ? `intensities by ${percent(intensity)}` : 'intensities not compared';
  return {
    id: 'first-order-reading',
    title: 'Reading the multiplets as first order',
    made: false,
    hz,
    computed: exact ? 'exact-difference' : 'estimate',
    warnAbove: finestDetail(system, experiment),
    detail: `${strengths}Lines read by first-order rules are off by up to ${hertz(hz)}, ${loss}; the computed lines are not.`,
  };
}

function compareFirstOrder(fragment: SpinSystem, experiment: Experiment) {
  const [exact, firstOrder] = (['high-field', 'first-order'] as const).map((reading) =>
    denseHamiltonian(fragment, experiment, reading, 'rotating', null),
  );
  return compareTransitions(exact, firstOrder, loweringOperator(fragment, experiment.observe));
}
