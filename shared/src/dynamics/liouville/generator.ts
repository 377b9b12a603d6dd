import { SparseComplexBuilder, type SparseComplex } from '../../algebra/sparse.js';
import type { SparseRows } from '../relaxation/sparse-rows.js';
import type { SparseHamiltonian } from './hamiltonian.js';
import type { CoherenceBlock } from './spin-space.js';

/**
 * The generator of d rho/dt = -2 pi i [H_s, rho_s] - Gamma rho_s + sum_s' k_ss' rho_s' on one block of coherences, for all
 * exchange states at once: state s, coherence i is row s * coherences + i (composite Liouville space, G. Binsch, J. Am. Chem.
 * Soc. 91 (1969) 1304). `hamiltonians` one a state, `relaxation` the same in every state, `rates` columns summing to zero.
 * With a `source` the last row and column are one more, for d rho/dt = L rho + source with a last element that stays 1.
 */
export function generatorOf(
  dimension: number,
  block: Pick<CoherenceBlock, 'kets' | 'bras'>,
  hamiltonians: readonly SparseHamiltonian[],
  relaxation: SparseRows | undefined,
  rates: Float64Array,
  source?: Float64Array,
): SparseComplex {
  const { kets, bras } = block;
  const count = kets.length;
  const states = hamiltonians.length;
  const index = new Map<number, number>();
  for (let i = 0; i < count; i++) index.set(kets[i] * dimension + bras[i], i);
  const builder = new SparseComplexBuilder(states * count + (source ? 1 : 0));
  hamiltonians.forEach(({ start, columns, values }, s) => {
    const base = s * count;
    for (let i = 0; i < count; i++) {
      const [ket, bra] = [kets[i], bras[i]];
      for (let p = start[ket]; p < start[ket + 1]; p++) {
        builder.add(base + index.get(columns[p] * dimension + bra)!, 0, -2 * Math.PI * values[p]);
      }
      for (let p = start[bra]; p < start[bra + 1]; p++) {
        builder.add(base + index.get(ket * dimension + columns[p])!, 0, 2 * Math.PI * values[p]);
      }
      if (relaxation) {
        for (let p = relaxation.start[i]; p < relaxation.start[i + 1]; p++) {
          builder.add(base + relaxation.columns[p], -relaxation.values[p], 0);
        }
      }
      for (let other = 0; other < states; other++) {
        const rate = rates[s * states + other];
        if (rate !== 0) builder.add(other * count + i, rate, 0);
      }
      if (source && source[base + i] !== 0) builder.add(states * count, source[base + i], 0);
      builder.endRow();
    }
  });
  if (source) builder.endRow();
  return builder.finish();
}
