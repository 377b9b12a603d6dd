import type { Matrix3 } from '../../algebra/rotation.js';
import type { SpinSystem } from '../../documents/system.schema.js';
import type { Frame } from '../../interactions/carriers.js';
import { dipolarCouplingsOf, quadrupolarTensorHz, shiftTensorHz } from '../../interactions/tensors.js';

/** One interaction that tumbling modulates. The tensor is symmetric and traceless, in Hz, in the molecular frame. */
export type Mechanism =
  | { readonly kind: 'dipolar'; readonly a: number; readonly b: number; readonly tensor: Matrix3 }
  | { readonly kind: 'shift' | 'quadrupolar'; readonly a: number; readonly tensor: Matrix3 };

/** Every dipolar coupling, shift tensor and quadrupole of the system; a and b are rows of `system.nuclei`. */
export function mechanismsOf(system: SpinSystem, frame: Frame): Mechanism[] {
  const dipolar = dipolarCouplingsOf(system).map(({ a, b, tensor }): Mechanism => ({ kind: 'dipolar', a, b, tensor }));
  const single = system.nuclei.flatMap((nucleus, a): Mechanism[] => {
    const [shift, quadrupolar] = [shiftTensorHz(nucleus, frame), quadrupolarTensorHz(nucleus)];
    return [
      ...(shift ? [{ kind: 'shift' as const, a, tensor: shift }] : []),
      ...(quadrupolar ? [{ kind: 'quadrupolar' as const, a, tensor: quadrupolar }] : []),
    ];
  });
  return [...dipolar, ...single];
}

/**
 * The tensor as five numbers along an orthonormal basis of symmetric traceless tensors: the scalar product of two such
 * quintuples is the sum over i, j of T_ij U_ij.
 */
export function quintuple(tensor: Matrix3): Float64Array {
  const [xx, xy, xz, , yy, yz, , , zz] = tensor;
  return Float64Array.of(
    Math.SQRT2 * xy,
    Math.SQRT2 * xz,
    Math.SQRT2 * yz,
    (xx - yy) / Math.SQRT2,
    (2 * zz - xx - yy) / Math.sqrt(6),
  );
}
