import type { ScanStep } from '../../sequence/steps.js';

/** Order of each isotope that can still reach the receiver; an isotope that is missing may have any. */
export type NeededOrders = ReadonlyMap<string, number>;

/** The detected order of the observed isotope. */
export const DETECTED = -1;

/**
 * For each step the orders that matter after it: from the receiver backwards, a pulse on an isotope lets any of its orders
 * through, a selection one, a spoil none but zero. `isotopeOf` tells the isotope of a nucleus.
 */
export function neededOrders(
  steps: readonly ScanStep[],
  isotopes: readonly string[],
  observe: string,
  isotopeOf: (nucleus: string) => string,
): NeededOrders[] {
  let needed = new Map(isotopes.map((isotope) => [isotope, isotope === observe ? DETECTED : 0]));
  const after = new Array<NeededOrders>(steps.length);
  for (let i = steps.length - 1; i >= 0; i--) {
    after[i] = needed;
    const step = steps[i];
    const next = new Map(needed);
    if ('pulse' in step) next.delete(step.pulse.on);
    else if ('saturate' in step) next.delete(isotopeOf(step.saturate.nucleus));
    else if ('select' in step) next.set(step.select.on, step.select.order);
    else if ('spoil' in step) for (const isotope of isotopes) next.set(isotope, 0);
    needed = next;
  }
  return after;
}
