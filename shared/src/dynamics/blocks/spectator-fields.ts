import type { ScalarCoupling } from '../../interactions/scalar.js';
import type { SpinSystem } from '../../documents/system.schema.js';
import { nuclide } from '../../nuclides/nuclides.js';
import { EngineError } from '../../run/context.js';
import type { ObservedPart } from './clusters.js';
import { projectionCounts } from './total-spin.js';

/** Offsets in Hz that spectators add to each nucleus of a part, and the share of the ensemble in which they do. */
export interface SpectatorField {
  readonly shifts: Float64Array;
  readonly weight: number;
}

/** Fields that agree within this are one; far below any line width or the merging distance of lines, Hz. */
const SAME_FIELD = 1e-9;

const MOST_FIELDS = 2 ** 20;
const TOO_MANY = `one cluster is split by its neighbours into more than ${MOST_FIELDS.toLocaleString('en')} multiplets`;

/** Every field that the projections of the part's spectators make, J m_spectator summed; equal ones joined. */
export function spectatorFields(
  system: SpinSystem,
  part: ObservedPart,
  couplings: readonly ScalarCoupling[],
): SpectatorField[] {
  let fields: SpectatorField[] = [{ shifts: new Float64Array(part.nuclei.length), weight: 1 }];
  for (const spectator of part.spectators) {
    const { isotope, count } = system.nuclei[spectator];
    const { spin } = nuclide(isotope);
    const counts = projectionCounts(spin, count);
    const total = (2 * spin + 1) ** count;
    const j = part.nuclei.map(
      (row) => couplings.find(({ a, b }) => (a === row && b === spectator) || (b === row && a === spectator))?.j ?? 0,
    );
    const joined = new Map<string, SpectatorField>();
    for (const { shifts, weight } of fields) {
      counts.forEach((states, i) => {
        const m = count * spin - i;
        const next = shifts.map((shift, p) => shift + j[p] * m);
        const key = Array.from(next, (shift) => Math.round(shift / SAME_FIELD)).join();
        const share = (joined.get(key)?.weight ?? 0) + (weight * states) / total;
        joined.set(key, { shifts: next, weight: share });
      });
    }
    fields = [...joined.values()];
    if (fields.length > MOST_FIELDS) throw new EngineError('TOO_LARGE', TOO_MANY, 'couplings');
  }
  return fields;
}
