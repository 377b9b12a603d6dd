import type { Experiment } from '../documents/experiment.schema.js';
import type { Approximation } from '../documents/result.js';
import type { SpinSystem } from '../documents/system.schema.js';
import { relaxationNumbers } from '../dynamics/relaxation/relaxation-numbers.js';
import { isDecoupled } from '../interactions/scalar.js';
import { dipolarConstantHz } from '../interactions/tensors.js';
import { hertz } from './text.js';
import { finestDetail } from './widths.js';

/** A pair of nuclei with positions but without a dipolar coupling. */
interface NeglectedPair {
  readonly between: [string, string];
  /** Largest splitting that it could make in a solid, Hz: 2 |d|, for like nuclei 3 |d|. */
  readonly splitting: number;
  readonly observed: boolean;
}

/** Dipolar couplings that the positions imply and the system does not list. null where dipolar couplings do not act. */
export function neglectedCouplings(system: SpinSystem, experiment: Experiment): Approximation | null {
  const redfield = experiment.relaxation === 'redfield';
  if (experiment.sample.kind === 'solution' && !redfield) return null;
  const pairs = neglectedPairs(system, experiment.observe).filter(
    ({ observed, between }) => redfield || (observed && inForce(system, experiment, between)),
  );
  const hz = redfield ? addedWidth(system, experiment, pairs) : Math.max(0, ...pairs.map(({ splitting }) => splitting));
  const strongest = pairs.sort((p, q) => q.splitting - p.splitting).slice(0, 6);
  const named = strongest.map(({ between }) => between.join('-')).join(', ');
  return {
    id: 'neglected-couplings',
    title: 'Dipolar couplings not listed',
    made: pairs.length > 0,
    hz,
    computed: redfield ? 'exact-difference' : 'estimate',
    warnAbove: finestDetail(system, experiment),
    detail:
      pairs.length === 0
        ? 'Every pair of nuclei with positions has its dipolar coupling.'
        : `${pairs.length} pairs with positions have no dipolar coupling (${named}); they would ${
            redfield ? `broaden lines by up to ${hertz(hz)}` : `split lines by up to ${hertz(hz)}`
          }.`,
  };
}

function neglectedPairs({ nuclei, couplings }: SpinSystem, observe: string): NeglectedPair[] {
  const listed = (a: string, b: string) =>
    couplings.some(({ between, dipolar }) => dipolar !== undefined && between.includes(a) && between.includes(b));
  return nuclei.flatMap((a, k) =>
    nuclei.slice(0, k).flatMap((b): NeglectedPair[] => {
      if (!a.position || !b.position || a.count > 1 || b.count > 1 || listed(a.id, b.id)) return [];
      const distance = Math.hypot(...a.position.map((x, axis) => x - b.position![axis]));
      const constant = Math.abs(dipolarConstantHz(a.isotope, b.isotope, distance));
      const splitting = (a.isotope === b.isotope ? 3 : 2) * constant;
      return [{ between: [b.id, a.id], splitting, observed: [a.isotope, b.isotope].includes(observe) }];
    }),
  );
}

function inForce({ nuclei }: SpinSystem, { decouple }: Experiment, between: readonly [string, string]): boolean {
  const [a, b] = between.map((id) => nuclei.find((nucleus) => nucleus.id === id)!.isotope);
  return !isDecoupled(a, b, decouple);
}

/** Largest width that the pairs would add to an observed nucleus. */
function addedWidth(system: SpinSystem, experiment: Experiment, pairs: readonly NeglectedPair[]): number {
  const more = pairs.map(({ between }) => ({ between, j: 0, dipolar: 'positions' as const }));
  const widths = (of: SpinSystem) => relaxationNumbers(of, experiment).map(({ lineWidth }) => lineWidth ?? 0);
  const [without, complete] = [widths(system), widths({ ...system, couplings: [...system.couplings, ...more] })];
  return Math.max(
    0,
    ...complete.map((width, row) => (system.nuclei[row].isotope === experiment.observe ? width - without[row] : 0)),
  );
}
