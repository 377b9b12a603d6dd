import { sortedPair, splitPair } from '../documents/system.rules.js';
import type { ExchangeState, SpinSystem } from '../documents/system.schema.js';

/** One J coupling in force. Like isotopes couple by J Ia.Ib, unlike ones by J Iaz Ibz. */
export interface ScalarCoupling {
  /** Rows of `system.nuclei`, a < b. */
  readonly a: number;
  readonly b: number;
  /** Hz, signed, not zero. */
  readonly j: number;
  readonly like: boolean;
}

/** Whether ideal decoupling of `decoupled` takes away the couplings between two isotopes. */
export function isDecoupled(first: string, second: string, decoupled: readonly string[]): boolean {
  return first !== second && (decoupled.includes(first) || decoupled.includes(second));
}

/** The J couplings that act in `state` while `decoupled` isotopes are decoupled. */
export function couplingsOf(system: SpinSystem, decoupled: readonly string[], state?: ExchangeState): ScalarCoupling[] {
  const row = new Map(system.nuclei.map((nucleus, index) => [nucleus.id, index]));
  const values = new Map(system.couplings.map(({ between: [a, b], j }) => [sortedPair(a, b), j]));
  for (const [key, j] of Object.entries(state?.j ?? {})) values.set(sortedPair(...splitPair(key)!), j);
  const couplings: ScalarCoupling[] = [];
  for (const [pair, j] of values) {
    const [first, second] = pair.split(',').map((id) => row.get(id)!);
    const [a, b] = first < second ? [first, second] : [second, first];
    const [isotopeA, isotopeB] = [system.nuclei[a].isotope, system.nuclei[b].isotope];
    if (j === 0 || isDecoupled(isotopeA, isotopeB, decoupled)) continue;
    couplings.push({ a, b, j, like: isotopeA === isotopeB });
  }
  return couplings.sort((p, q) => p.a - q.a || p.b - q.b);
}
