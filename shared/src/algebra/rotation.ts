import type { Euler } from '../documents/system.schema.js';

/**
 * Rotations of space and of Cartesian tensors.
 *   storage   3 x 3 matrices are row-major Float64Arrays of nine numbers
 *   sense     active: R turns the object, the axes stay
 */
export type Matrix3 = Float64Array;

const RADIANS = Math.PI / 180;

/** R(a, b, g) = Rz(a) Ry(b) Rz(g) of angles in degrees (M. E. Rose, Elementary Theory of Angular Momentum, 1957, ch. IV). */
export function rotationMatrix([alpha, beta, gamma]: Readonly<Euler>): Matrix3 {
  const [ca, sa] = [Math.cos(alpha * RADIANS), Math.sin(alpha * RADIANS)];
  const [cb, sb] = [Math.cos(beta * RADIANS), Math.sin(beta * RADIANS)];
  const [cg, sg] = [Math.cos(gamma * RADIANS), Math.sin(gamma * RADIANS)];
  // prettier-ignore
  return Float64Array.of(
    ca * cb * cg - sa * sg, -ca * cb * sg - sa * cg, ca * sb,
    sa * cb * cg + ca * sg, -sa * cb * sg + ca * cg, sa * sb,
    -sb * cg,               sb * sg,                 cb,
  );
}

/** Angles in degrees whose `rotationMatrix` is the proper rotation R; b in 0..180, and g = 0 where only a + g or a - g counts. */
export function eulerAngles(rotation: Matrix3): Euler {
  const beta = Math.atan2(Math.hypot(rotation[2], rotation[5]), rotation[8]);
  if (Math.sin(beta) < 1e-12) {
    const alpha = Math.atan2(-rotation[1], rotation[4]);
    return [alpha / RADIANS, beta / RADIANS, 0];
  }
  const alpha = Math.atan2(rotation[5], rotation[2]);
  const gamma = Math.atan2(rotation[7], -rotation[6]);
  return [alpha / RADIANS, beta / RADIANS, gamma / RADIANS];
}

/** a b */
export function multiply3(a: Matrix3, b: Matrix3): Matrix3 {
  const out = new Float64Array(9);
  for (let i = 0; i < 9; i += 3) {
    for (let j = 0; j < 3; j++) out[i + j] = a[i] * b[j] + a[i + 1] * b[3 + j] + a[i + 2] * b[6 + j];
  }
  return out;
}

export function transpose3(a: Matrix3): Matrix3 {
  return Float64Array.of(a[0], a[3], a[6], a[1], a[4], a[7], a[2], a[5], a[8]);
}

/** The turned tensor R T R^T. */
export function rotateTensor(rotation: Matrix3, tensor: Matrix3): Matrix3 {
  return multiply3(multiply3(rotation, tensor), transpose3(rotation));
}

/** The tensor with principal values x, y, z along the axes that `euler` turns the frame's axes to. */
export function tensorFromPrincipal(principal: readonly [number, number, number], euler: Readonly<Euler>): Matrix3 {
  const [x, y, z] = principal;
  return rotateTensor(rotationMatrix(euler), Float64Array.of(x, 0, 0, 0, y, 0, 0, 0, z));
}

/** Unit vector of polar angles theta (from z) and phi (from x), degrees. */
export function unitVector(theta: number, phi: number): [number, number, number] {
  const sine = Math.sin(theta * RADIANS);
  return [sine * Math.cos(phi * RADIANS), sine * Math.sin(phi * RADIANS), Math.cos(theta * RADIANS)];
}

/** Sum over i, j of a_ij b_ij. */
export function innerProduct3(a: Matrix3, b: Matrix3): number {
  let sum = 0;
  for (let p = 0; p < 9; p++) sum += a[p] * b[p];
  return sum;
}
