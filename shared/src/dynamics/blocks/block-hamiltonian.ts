import { projection, type Sector } from './sector.js';

/** A coupling between two spins of a sector; `like` ones have flip-flop terms. */
export interface SectorCoupling {
  readonly p: number;
  readonly q: number;
  readonly j: number;
  readonly like: boolean;
}

/**
 * The Hamiltonian of one block in Hz, n x n, row-major, real symmetric:
 * H = sum_p nu_p Kpz + sum_pq J_pq [Kpz Kqz + (Kp+ Kq- + Kp- Kq+)/2 for like spins].
 */
export function blockHamiltonian(
  sector: Sector,
  codes: Int32Array,
  offsets: Float64Array,
  couplings: readonly SectorCoupling[],
): Float64Array {
  const n = codes.length;
  const { spins, stride, place } = sector;
  const h = new Float64Array(n * n);
  const m = new Float64Array(spins.length);
  for (let i = 0; i < n; i++) {
    let energy = 0;
    for (let p = 0; p < spins.length; p++) {
      m[p] = projection(sector, codes[i], p);
      energy += offsets[p] * m[p];
    }
    for (const { p, q, j, like } of couplings) {
      energy += j * m[p] * m[q];
      if (!like) continue;
      const up = raising(spins[p], m[p]) * lowering(spins[q], m[q]);
      if (up !== 0) setPair(h, n, i, place[codes[i] - stride[p] + stride[q]], (j / 2) * up);
    }
    h[i * n + i] = energy;
  }
  return h;
}

function setPair(h: Float64Array, n: number, i: number, k: number, value: number): void {
  h[i * n + k] += value;
  h[k * n + i] += value;
}

/** <m+1|K+|m> */
function raising(spin: number, m: number): number {
  return m < spin ? Math.sqrt(spin * (spin + 1) - m * (m + 1)) : 0;
}

/** <m-1|K-|m> */
export function lowering(spin: number, m: number): number {
  return m > -spin ? Math.sqrt(spin * (spin + 1) - m * (m - 1)) : 0;
}
