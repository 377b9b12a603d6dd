import { complexMatrix, type ComplexMatrix } from '../../algebra/dense.js';
import { expmDense } from '../../algebra/expm-dense.js';
import type { ComplexArray } from '../../run/solved.js';
import type { Density } from './density.js';
import { raising, type SpinSpace } from './spin-space.js';

/** exp(-i flip (Ix cos phase + Iy sin phase)) of one spin, angles in radians. */
export function pulseMatrix(spin: number, flip: number, phase: number): ComplexMatrix {
  const n = 2 * spin + 1;
  const generator = complexMatrix(n, n);
  for (let k = 0; k + 1 < n; k++) {
    // <m+1| Ix cos + Iy sin |m> = I+ (cos - i sin)/2; the generator is -i flip times that.
    const half = (flip * raising(spin, spin - k - 1)) / 2;
    generator.real[k * n + k + 1] = -half * Math.sin(phase);
    generator.imag[k * n + k + 1] = -half * Math.cos(phase);
    generator.real[(k + 1) * n + k] = half * Math.sin(phase);
    generator.imag[(k + 1) * n + k] = -half * Math.cos(phase);
  }
  return expmDense(generator);
}

/** rho <- U rho U+ with U the product of one rotation for each particle of `isotope`. */
export function applyPulse(rho: Density, space: SpinSpace, isotope: string, flip: number, phase: number): void {
  const rotations = new Map<number, ComplexMatrix>();
  space.particles.forEach((particle, p) => {
    if (particle.isotope !== isotope || particle.spin === 0) return;
    let u = rotations.get(particle.spin);
    if (!u) rotations.set(particle.spin, (u = pulseMatrix(particle.spin, flip, phase)));
    rotateParticle(rho, u, space.strides[p]);
  });
}

/** Mixes the levels of one particle, `stride` states apart: kets by U, bras by its conjugate. */
function rotateParticle(rho: Density, u: ComplexMatrix, stride: number): void {
  const { dimension, states } = rho;
  const rows = states * dimension;
  const levels = u.rows;
  const scratch = { real: new Float64Array(levels), imag: new Float64Array(levels) };
  // Kets: elements stride * dimension apart; the states of exchange lie on top of one another.
  for (let outer = 0; outer < rows; outer += stride * levels) {
    for (let inner = 0; inner < stride; inner++) {
      for (let column = 0; column < dimension; column++) {
        mix(rho, (outer + inner) * dimension + column, stride * dimension, u, 1, scratch);
      }
    }
  }
  for (let row = 0; row < rows; row++) {
    for (let outer = 0; outer < dimension; outer += stride * levels) {
      for (let inner = 0; inner < stride; inner++) mix(rho, row * dimension + outer + inner, stride, u, -1, scratch);
    }
  }
}

/** x_i <- sum_k u_ik x_k over elements `step` apart from `first` on, u conjugated where `sign` is -1. */
function mix(
  { real, imag }: Density,
  first: number,
  step: number,
  u: ComplexMatrix,
  sign: 1 | -1,
  scratch: ComplexArray,
): void {
  const n = u.rows;
  for (let i = 0, p = 0; i < n; i++) {
    let re = 0;
    let im = 0;
    for (let k = 0, at = first; k < n; k++, at += step, p++) {
      const ui = sign * u.imag[p];
      re += u.real[p] * real[at] - ui * imag[at];
      im += u.real[p] * imag[at] + ui * real[at];
    }
    scratch.real[i] = re;
    scratch.imag[i] = im;
  }
  for (let i = 0, at = first; i < n; i++, at += step) {
    real[at] = scratch.real[i];
    imag[at] = scratch.imag[i];
  }
}

/** rho <- Rz rho Rz+ with Rz = exp(-i angle Fz) of one isotope, angle in radians. */
export function rotateAboutZ(rho: Density, space: SpinSpace, isotope: string, angle: number): void {
  if (angle === 0) return;
  const totals = isotopeTotals(space, isotope);
  const { real, imag, states, dimension } = rho;
  for (let s = 0, at = 0; s < states; s++) {
    for (let ket = 0; ket < dimension; ket++) {
      for (let bra = 0; bra < dimension; bra++, at++) {
        const turn = -angle * (totals[ket] - totals[bra]);
        const [cos, sin] = [Math.cos(turn), Math.sin(turn)];
        const re = real[at];
        real[at] = cos * re - sin * imag[at];
        imag[at] = cos * imag[at] + sin * re;
      }
    }
  }
}

/** Total projection of one isotope in every state. */
export function isotopeTotals({ particles, projections, dimension }: SpinSpace, isotope: string): Float64Array {
  return Float64Array.from({ length: dimension }, (_, state) =>
    particles.reduce(
      (sum, particle, p) => sum + (particle.isotope === isotope ? projections[state * particles.length + p] : 0),
      0,
    ),
  );
}
