import type { Euler } from '../documents/system.schema.js';
import { complexMatrix, realMatrix, type ComplexMatrix, type RealMatrix } from './dense.js';
import { factorial } from './factorial.js';
import type { Matrix3 } from './rotation.js';

/**
 * Rotation matrices of angular momentum j (integer or half-integer) with Condon-Shortley phases; rows m' and columns m run
 * from +j down to -j (D. A. Varshalovich, A. N. Moskalev, V. K. Khersonskii, Quantum Theory of Angular Momentum, 1988, ch. 4).
 */

const RADIANS = Math.PI / 180;

/** d^j_{m'm}(beta) = <j m'| exp(-i beta Jy) |j m>, beta in degrees, by Wigner's sum over factorials; meant for j up to about 10. */
export function smallWigner(j: number, beta: number): RealMatrix {
  const size = 2 * j + 1;
  const out = realMatrix(size, size);
  const [cosine, sine] = [Math.cos((beta * RADIANS) / 2), Math.sin((beta * RADIANS) / 2)];
  for (let row = 0; row < size; row++) {
    for (let column = 0; column < size; column++) {
      out.data[row * size + column] = smallWignerElement(j, j - row, j - column, cosine, sine);
    }
  }
  return out;
}

function smallWignerElement(j: number, row: number, column: number, cosine: number, sine: number): number {
  const norm = factorial(j + row) * factorial(j - row) * factorial(j + column) * factorial(j - column);
  let sum = 0;
  for (let k = Math.max(0, column - row); k <= Math.min(j + column, j - row); k++) {
    const denominator = factorial(j + column - k) * factorial(k) * factorial(row - column + k) * factorial(j - row - k);
    const sign = (row - column + k) % 2 === 0 ? 1 : -1;
    sum += (sign * cosine ** (2 * j + column - row - 2 * k) * sine ** (row - column + 2 * k)) / denominator;
  }
  return Math.sqrt(norm) * sum;
}

/** D^j_{m'm}(a, b, g) = exp(-i m' a) d^j_{m'm}(b) exp(-i m g), angles in degrees: the representation of Rz(a) Ry(b) Rz(g). */
export function wignerD(j: number, [alpha, beta, gamma]: Readonly<Euler>): ComplexMatrix {
  const small = smallWigner(j, beta);
  const out = complexMatrix(small.rows, small.columns);
  small.data.forEach((d, p) => {
    const [row, column] = [j - Math.floor(p / small.columns), j - (p % small.columns)];
    const phase = -(row * alpha + column * gamma) * RADIANS;
    out.real[p] = d * Math.cos(phase);
    out.imag[p] = d * Math.sin(phase);
  });
  return out;
}

/**
 * Rank-2 spherical components A_q, q = +2 down to -2, of a symmetric Cartesian tensor:
 * A_0 = (3 Tzz - Tr T)/sqrt 6, A_+-1 = -+(Txz +- i Tyz), A_+-2 = (Txx - Tyy)/2 +- i Txy. Like spherical harmonics of a turned
 * direction, the turned tensor has A'_q = sum over p of conj(D^2_{qp}) A_p. The sum of |A_q|^2 is that of the squares of the
 * traceless part of T.
 */
export function sphericalComponents(tensor: Matrix3): ComplexMatrix {
  const [xx, xy, xz, , yy, yz, , , zz] = tensor;
  return complexMatrix(
    5,
    1,
    Float64Array.of((xx - yy) / 2, -xz, (2 * zz - xx - yy) / Math.sqrt(6), xz, (xx - yy) / 2),
    Float64Array.of(xy, -yz, 0, -yz, -xy),
  );
}
