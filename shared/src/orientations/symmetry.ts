import { eigenSymmetric } from '../algebra/eigen/symmetric.js';
import { multiply3, transpose3, type Matrix3 } from '../algebra/rotation.js';

/**
 * The part of the sphere that stands for all of it. High-field frequencies are even in the field direction, so a hemisphere
 * always does; where every tensor shares its principal axes, reflections leave one octant.
 */
export type Domain = 'octant' | 'hemisphere';

export interface Symmetry {
  /** Rows are the axes of the frame, in the frame of the tensors: a tensor there is F T F^T. */
  readonly frame: Matrix3;
  readonly domain: Domain;
}

const IDENTITY: Matrix3 = Float64Array.of(1, 0, 0, 0, 1, 0, 0, 0, 1);

/** Off-diagonal elements below this share of a tensor's largest element count as zero. */
const ALIGNED = 1e-10;

/** Frame of the principal axes of the first tensor with an orientation, and the domain that the other tensors leave. */
export function symmetryOf(tensors: readonly Matrix3[]): Symmetry {
  const first = tensors.find((tensor) => !isScalar(tensor));
  if (!first) return { frame: IDENTITY, domain: 'octant' };
  const frame = isDiagonal(first) ? IDENTITY : eigenSymmetric(first, 3).vectors;
  const turned = tensors.map((tensor) => inFrame(frame, tensor));
  return { frame, domain: turned.every(isDiagonal) ? 'octant' : 'hemisphere' };
}

/** F T F^T */
export function inFrame(frame: Matrix3, tensor: Matrix3): Matrix3 {
  return multiply3(multiply3(frame, tensor), transpose3(frame));
}

function isScalar(tensor: Matrix3): boolean {
  const small = ALIGNED * largest(tensor);
  const equal = Math.abs(tensor[0] - tensor[4]) <= small && Math.abs(tensor[4] - tensor[8]) <= small;
  return equal && isDiagonal(tensor);
}

function isDiagonal(tensor: Matrix3): boolean {
  const small = ALIGNED * largest(tensor);
  return [1, 2, 5].every((p) => Math.abs(tensor[p]) <= small);
}

function largest(tensor: Matrix3): number {
  return tensor.reduce((most, value) => Math.max(most, Math.abs(value)), 0);
}
