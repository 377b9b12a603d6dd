import { eigenSymmetric } from '../../algebra/eigen/symmetric.js';
import { productWithTransposed } from '../../algebra/kernels/product.js';
import type { ComplexArray } from '../../run/solved.js';
import { StickGrid } from '../../spectrum/stick-grid.js';
import type { Density } from './density.js';
import type { SparseHamiltonian } from './hamiltonian.js';

/** Eigenstates of H on a set of basis states that it keeps to themselves. */
export interface EigenGroup {
  readonly members: Uint32Array;
  readonly energies: Float64Array;
  /** Row k is eigenstate k; and the transposed. */
  readonly vectors: Float64Array;
  readonly transposed: Float64Array;
}

/** Diagonalises the part of H between `members`, which must be closed under H. */
export function eigenGroup(h: SparseHamiltonian, members: Uint32Array): EigenGroup {
  const n = members.length;
  const place = new Map(Array.from(members, (state, i) => [state, i]));
  const dense = new Float64Array(n * n);
  members.forEach((state, i) => {
    for (let p = h.start[state]; p < h.start[state + 1]; p++) dense[i * n + place.get(h.columns[p])!] += h.values[p];
  });
  const { values, vectors } = eigenSymmetric(dense, n);
  const transposed = new Float64Array(n * n);
  for (let k = 0; k < n; k++) for (let i = 0; i < n; i++) transposed[i * n + k] = vectors[k * n + i];
  return { members, energies: values, vectors, transposed };
}

/** Vk X Vb^T of a real ket x bra matrix: into the eigenstates of both groups. */
export function toEigenstates(ket: EigenGroup, bra: EigenGroup, x: Float64Array): Float64Array {
  const [n, m] = [ket.members.length, bra.members.length];
  return productWithTransposed(ket.vectors, productWithTransposed(bra.vectors, x, m, n, m), n, m, n);
}

/** Vk^T X Vb: back into the product basis. */
export function fromEigenstates(ket: EigenGroup, bra: EigenGroup, x: Float64Array): Float64Array {
  const [n, m] = [ket.members.length, bra.members.length];
  return productWithTransposed(ket.transposed, productWithTransposed(bra.transposed, x, m, n, m), n, m, n);
}

/** exp(-2 pi i H t) X exp(2 pi i H t) of one ket x bra matrix. */
export function evolveClosed(ket: EigenGroup, bra: EigenGroup, x: ComplexArray, t: number): ComplexArray {
  const real = toEigenstates(ket, bra, x.real);
  const imag = toEigenstates(ket, bra, x.imag);
  const m = bra.members.length;
  for (let a = 0, at = 0; a < ket.members.length; a++) {
    for (let b = 0; b < m; b++, at++) {
      const angle = -2 * Math.PI * (ket.energies[a] - bra.energies[b]) * t;
      const [cos, sin] = [Math.cos(angle), Math.sin(angle)];
      const re = real[at];
      real[at] = cos * re - sin * imag[at];
      imag[at] = cos * imag[at] + sin * re;
    }
  }
  return { real: fromEigenstates(ket, bra, real), imag: fromEigenstates(ket, bra, imag) };
}

/** rho_s <- U rho_s U+ with U = exp(-2 pi i H t), H real symmetric. */
export function driveClosed(rho: Density, s: number, h: SparseHamiltonian, t: number): void {
  const n = rho.dimension;
  const all = eigenGroup(
    h,
    Uint32Array.from({ length: n }, (_, state) => state),
  );
  const from = s * n * n;
  const x = { real: rho.real.subarray(from, from + n * n), imag: rho.imag.subarray(from, from + n * n) };
  const out = evolveClosed(all, all, x, t);
  rho.real.set(out.real, from);
  rho.imag.set(out.imag, from);
}

/** Adds the FID of sticks with complex amplitudes. */
export function addSticks(
  signal: ComplexArray,
  hz: Float64Array,
  real: Float64Array,
  imag: Float64Array,
  points: number,
  width: number,
): void {
  const parts = [real, imag].map((amplitude) => {
    const grid = new StickGrid(points, width);
    grid.add(hz, amplitude);
    const fid = { real: new Float64Array(points), imag: new Float64Array(points) };
    grid.addTo(fid);
    return fid;
  });
  for (let k = 0; k < points; k++) {
    signal.real[k] += parts[0].real[k] - parts[1].imag[k];
    signal.imag[k] += parts[0].imag[k] + parts[1].real[k];
  }
}
