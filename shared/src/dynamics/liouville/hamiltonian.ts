import type { ScalarCoupling } from '../../interactions/scalar.js';
import { raising, type Particle, type SpinSpace } from './spin-space.js';

/** A real symmetric sparse matrix in the Zeeman basis by rows, Hz. */
export interface SparseHamiltonian {
  readonly start: Uint32Array;
  readonly columns: Uint32Array;
  readonly values: Float64Array;
}

/** A field along x on some particles, nutation in Hz. */
export interface DrivingField {
  readonly nutationHz: number;
  readonly drives: (particle: Particle) => boolean;
}

/** H = sum nu Iz + sum J (Iz Iz, with flip-flops for like isotopes) + nutation Ix, `offsets` and `couplings` by rows of the system. */
export function sparseHamiltonian(
  space: SpinSpace,
  offsets: Float64Array,
  couplings: readonly ScalarCoupling[],
  field?: DrivingField,
): SparseHamiltonian {
  const { particles, dimension, strides, projections } = space;
  const count = particles.length;
  const pairs = pairsOf(space, couplings);
  const start = new Uint32Array(dimension + 1);
  const columns: number[] = [];
  const values: number[] = [];
  for (let state = 0; state < dimension; state++) {
    const m = projections.subarray(state * count, (state + 1) * count);
    let diagonal = 0;
    for (let p = 0; p < count; p++) diagonal += offsets[particles[p].row] * m[p];
    for (const { p, q, j } of pairs) diagonal += j * m[p] * m[q];
    columns.push(state);
    values.push(diagonal);
    for (const { p, q, j, like } of pairs) {
      if (!like) continue;
      const [sp, sq] = [particles[p].spin, particles[q].spin];
      const up = (raising(sp, m[p]) * raising(sq, -m[q]) * j) / 2;
      const down = (raising(sp, -m[p]) * raising(sq, m[q]) * j) / 2;
      if (up !== 0) {
        columns.push(state - strides[p] + strides[q]);
        values.push(up);
      }
      if (down !== 0) {
        columns.push(state + strides[p] - strides[q]);
        values.push(down);
      }
    }
    for (let p = 0; field && p < count; p++) {
      if (!field.drives(particles[p])) continue;
      const { spin } = particles[p];
      const [up, down] = [raising(spin, m[p]), raising(spin, -m[p])];
      if (up !== 0) {
        columns.push(state - strides[p]);
        values.push((field.nutationHz / 2) * up);
      }
      if (down !== 0) {
        columns.push(state + strides[p]);
        values.push((field.nutationHz / 2) * down);
      }
    }
    start[state + 1] = columns.length;
  }
  return { start, columns: Uint32Array.from(columns), values: Float64Array.from(values) };
}

/** A coupling between two particles. */
interface Pair {
  p: number;
  q: number;
  j: number;
  like: boolean;
}

function pairsOf({ particles }: SpinSpace, couplings: readonly ScalarCoupling[]): Pair[] {
  return couplings.flatMap(({ a, b, j, like }) =>
    particles.flatMap((first, p) =>
      particles.flatMap((second, q) => (first.row === a && second.row === b ? [{ p, q, j, like }] : [])),
    ),
  );
}
