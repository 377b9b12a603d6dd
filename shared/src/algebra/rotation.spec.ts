import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  eulerAngles,
  innerProduct3,
  multiply3,
  rotateTensor,
  rotationMatrix,
  tensorFromPrincipal,
  transpose3,
  unitVector,
  type Matrix3,
} from './rotation.js';

const angle = fc.double({ min: -360, max: 360, noNaN: true });
const euler = fc.tuple(angle, angle, angle);
const value = fc.double({ min: -1000, max: 1000, noNaN: true });
const symmetric = fc
  .tuple(value, value, value, value, value, value)
  .map(([a, b, c, d, e, f]) => Float64Array.of(a, b, c, b, d, e, c, e, f));

const expectClose = (actual: Matrix3, expected: ArrayLike<number>, within: number) => {
  for (let p = 0; p < 9; p++) expect(Math.abs(actual[p] - expected[p])).toBeLessThanOrEqual(within);
};
const apply = (m: Matrix3, v: readonly number[]) =>
  [0, 3, 6].map((i) => m[i] * v[0] + m[i + 1] * v[1] + m[i + 2] * v[2]);
const determinant = (m: Matrix3) =>
  m[0] * (m[4] * m[8] - m[5] * m[7]) - m[1] * (m[3] * m[8] - m[5] * m[6]) + m[2] * (m[3] * m[7] - m[4] * m[6]);

describe('rotationMatrix', () => {
  it('turns vectors actively: the product of the three elementary rotations, the last angle first', () => {
    // Right-handed turns by 90 degrees: Rz takes x to y, Ry takes z to x.
    const close = (actual: number[], expected: number[]) =>
      actual.forEach((x, i) => expect(x).toBeCloseTo(expected[i], 14));
    close(apply(rotationMatrix([90, 0, 0]), [1, 0, 0]), [0, 1, 0]);
    close(apply(rotationMatrix([0, 0, 90]), [1, 0, 0]), [0, 1, 0]);
    close(apply(rotationMatrix([0, 90, 0]), [0, 0, 1]), [1, 0, 0]);
    fc.assert(
      fc.property(euler, ([a, b, g]) => {
        const product = multiply3(
          multiply3(rotationMatrix([a, 0, 0]), rotationMatrix([0, b, 0])),
          rotationMatrix([0, 0, g]),
        );
        expectClose(rotationMatrix([a, b, g]), product, 1e-14);
      }),
    );
  });

  it('takes z to the polar angles b, a', () => {
    fc.assert(
      fc.property(euler, ([a, b, g]) => {
        const turned = apply(rotationMatrix([a, b, g]), [0, 0, 1]);
        unitVector(b, a).forEach((x, i) => expect(turned[i]).toBeCloseTo(x, 13));
      }),
    );
  });

  it('is orthogonal with determinant 1', () => {
    fc.assert(
      fc.property(euler, (angles) => {
        const r = rotationMatrix(angles);
        expectClose(multiply3(r, transpose3(r)), [1, 0, 0, 0, 1, 0, 0, 0, 1], 1e-14);
        expect(determinant(r)).toBeCloseTo(1, 13);
      }),
    );
  });

  it('is inverted by eulerAngles, the poles included', () => {
    fc.assert(
      fc.property(fc.tuple(angle, fc.oneof(angle, fc.constantFrom(0, 180, -180, 360)), angle), (angles) => {
        const r = rotationMatrix(angles);
        expectClose(rotationMatrix(eulerAngles(r)), r, 1e-11);
      }),
    );
  });
});

describe('rotateTensor', () => {
  it('keeps symmetry, the trace and the sums of squares and cubes of the principal values', () => {
    fc.assert(
      fc.property(euler, symmetric, (angles, tensor) => {
        const turned = rotateTensor(rotationMatrix(angles), tensor);
        const size = 1e-12 * (1 + innerProduct3(tensor, tensor));
        expectClose(turned, transpose3(turned), size);
        expect(Math.abs(turned[0] + turned[4] + turned[8] - tensor[0] - tensor[4] - tensor[8])).toBeLessThan(1e-10);
        expect(Math.abs(innerProduct3(turned, turned) - innerProduct3(tensor, tensor))).toBeLessThanOrEqual(size);
        const cubes = (t: Matrix3) => innerProduct3(multiply3(t, t), t);
        expect(Math.abs(cubes(turned) - cubes(tensor))).toBeLessThanOrEqual(
          1e-12 * (1 + innerProduct3(tensor, tensor) ** 1.5),
        );
      }),
    );
  });

  it('has the principal values along the turned axes', () => {
    fc.assert(
      fc.property(euler, fc.tuple(value, value, value), (angles, principal) => {
        const tensor = tensorFromPrincipal(principal, angles);
        const r = rotationMatrix(angles);
        principal.forEach((size, k) => {
          const axis = [r[k], r[k + 3], r[k + 6]];
          apply(tensor, axis).forEach((x, i) => expect(Math.abs(x - size * axis[i])).toBeLessThan(1e-10));
        });
      }),
    );
  });
});
