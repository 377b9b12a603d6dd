import { complexMatrix, type ComplexMatrix } from './dense.js';
import type { Matrix3 } from './rotation.js';

/**
 * The algebra of 2 x 2 matrices in the basis 1, sx, sy, sz: an element w + x sx + y sy + z sz has complex coefficients,
 * kept as two quadruples.
 */
export interface PauliElement {
  readonly real: readonly [w: number, x: number, y: number, z: number];
  readonly imag: readonly [w: number, x: number, y: number, z: number];
}

const NONE: [number, number, number, number] = [0, 0, 0, 0];

export const IDENTITY: PauliElement = { real: [1, 0, 0, 0], imag: NONE };
export const SIGMA_X: PauliElement = { real: [0, 1, 0, 0], imag: NONE };
export const SIGMA_Y: PauliElement = { real: [0, 0, 1, 0], imag: NONE };
export const SIGMA_Z: PauliElement = { real: [0, 0, 0, 1], imag: NONE };

/** (a0 + a.s)(b0 + b.s) = a0 b0 + a.b + (a0 b + b0 a + i a x b).s */
export function multiplyPauli(a: PauliElement, b: PauliElement): PauliElement {
  const rr = realProduct(a.real, b.real);
  const ii = realProduct(a.imag, b.imag);
  const ri = realProduct(a.real, b.imag);
  const ir = realProduct(a.imag, b.real);
  const combine = (f: (k: number) => number): [number, number, number, number] => [f(0), f(1), f(2), f(3)];
  return {
    real: combine((k) => rr.even[k] - ii.even[k] - ri.odd[k] - ir.odd[k]),
    imag: combine((k) => ri.even[k] + ir.even[k] + rr.odd[k] - ii.odd[k]),
  };
}

type Quadruple = readonly [number, number, number, number];

/** Product of two elements with real coefficients: `even` + i `odd`. */
function realProduct([a0, a1, a2, a3]: Quadruple, [b0, b1, b2, b3]: Quadruple): { even: Quadruple; odd: Quadruple } {
  return {
    even: [a0 * b0 + a1 * b1 + a2 * b2 + a3 * b3, a0 * b1 + b0 * a1, a0 * b2 + b0 * a2, a0 * b3 + b0 * a3],
    odd: [0, a2 * b3 - a3 * b2, a3 * b1 - a1 * b3, a1 * b2 - a2 * b1],
  };
}

/** exp(-i angle n.s/2) = cos(angle/2) - i n.s sin(angle/2), angle in radians, n a unit vector: the turn of a spin 1/2 about n. */
export function spinorRotation([x, y, z]: readonly [number, number, number], angle: number): PauliElement {
  const sine = Math.sin(angle / 2);
  return { real: [Math.cos(angle / 2), 0, 0, 0], imag: [0, -x * sine, -y * sine, -z * sine] };
}

/** Rotation vector (axis times angle in radians, angle in 0..2 pi) of a unitary element of determinant 1. */
export function rotationVector({ real, imag }: PauliElement): [number, number, number] {
  const sine = Math.hypot(imag[1], imag[2], imag[3]);
  const scale = sine === 0 ? 2 : (2 * Math.atan2(sine, real[0])) / sine;
  return [-imag[1] * scale, -imag[2] * scale, -imag[3] * scale];
}

/** The rotation R of space that a unitary element u of determinant 1 makes: u (v.s) u^-1 = (R v).s (Euler-Rodrigues). */
export function rotationOfSpinor({ real, imag }: PauliElement): Matrix3 {
  const [w, x, y, z] = [real[0], -imag[1], -imag[2], -imag[3]];
  // prettier-ignore
  return Float64Array.of(
    w * w + x * x - y * y - z * z, 2 * (x * y - w * z), 2 * (x * z + w * y),
    2 * (x * y + w * z), w * w - x * x + y * y - z * z, 2 * (y * z - w * x),
    2 * (x * z - w * y), 2 * (y * z + w * x), w * w - x * x - y * y + z * z,
  );
}

/** The element as a 2 x 2 matrix in the basis alpha, beta. */
export function matrixOfPauli({ real: [w, x, y, z], imag: [u, a, b, c] }: PauliElement): ComplexMatrix {
  return complexMatrix(2, 2, Float64Array.of(w + z, x + b, x - b, w - z), Float64Array.of(u + c, a - y, a + y, u - c));
}
