import { productWithTransposed } from '../../algebra/kernels/product.js';
import type { SymmetricEigen } from '../../algebra/eigen/symmetric.js';
import { lowering } from './block-hamiltonian.js';
import { projection, type Sector } from './sector.js';

/** Eigenstates of one block. */
export interface SolvedBlock extends SymmetricEigen {
  readonly codes: Int32Array;
}

/**
 * <lower b| sum_p Kp- |upper a> over the spins `lowered`, for all eigenstates of two neighbouring blocks of a ladder:
 * row a, column b.
 */
export function loweringMatrix(
  sector: Sector,
  upper: SolvedBlock,
  lower: SolvedBlock,
  lowered: readonly number[],
): Float64Array {
  const n = upper.codes.length;
  const m = lower.codes.length;
  const { source, target, factor } = loweringEntries(sector, upper.codes, lowered);
  const half = new Float64Array(n * m);
  for (let a = 0; a < n; a++) {
    const [from, to] = [a * n, a * m];
    for (let e = 0; e < source.length; e++) half[to + target[e]] += factor[e] * upper.vectors[from + source[e]];
  }
  return productWithTransposed(half, lower.vectors, n, m, m);
}

/** The operator in the product basis, entry by entry: from a place in the upper block to one in the lower. */
function loweringEntries(sector: Sector, codes: Int32Array, lowered: readonly number[]) {
  const source: number[] = [];
  const target: number[] = [];
  const factor: number[] = [];
  codes.forEach((code, place) => {
    for (const p of lowered) {
      const value = lowering(sector.spins[p], projection(sector, code, p));
      if (value === 0) continue;
      source.push(place);
      target.push(sector.place[code + sector.stride[p]]);
      factor.push(value);
    }
  });
  return { source: Int32Array.from(source), target: Int32Array.from(target), factor: Float64Array.from(factor) };
}

/** <k|Kpz|k> of every eigenstate k (rows) for the first `count` spins (columns). */
export function projectionsOf(sector: Sector, block: SolvedBlock, count: number): Float32Array {
  const n = block.codes.length;
  const m = new Float64Array(n * count);
  for (let i = 0; i < n; i++) for (let p = 0; p < count; p++) m[i * count + p] = projection(sector, block.codes[i], p);
  const out = new Float32Array(n * count);
  for (let k = 0; k < n; k++) {
    for (let i = 0; i < n; i++) {
      const share = block.vectors[k * n + i] ** 2;
      for (let p = 0; p < count; p++) out[k * count + p] += share * m[i * count + p];
    }
  }
  return out;
}
