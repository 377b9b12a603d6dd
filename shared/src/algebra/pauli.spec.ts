import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { addScaledInto, complexMatrix, multiplyComplex } from './dense.js';
import { expmDense } from './expm-dense.js';
import {
  IDENTITY,
  matrixOfPauli,
  multiplyPauli,
  rotationOfSpinor,
  rotationVector,
  SIGMA_X,
  SIGMA_Y,
  SIGMA_Z,
  spinorRotation,
  type PauliElement,
} from './pauli.js';
import { multiply3, rotationMatrix, unitVector } from './rotation.js';

const value = fc.double({ min: -2, max: 2, noNaN: true });
const quadruple = fc.tuple(value, value, value, value);
const element: fc.Arbitrary<PauliElement> = fc.record({ real: quadruple, imag: quadruple });
const axis = fc
  .tuple(fc.double({ min: 0, max: 180, noNaN: true }), fc.double({ min: -180, max: 180, noNaN: true }))
  .map(([theta, phi]) => unitVector(theta, phi));
const angle = fc.double({ min: -10, max: 10, noNaN: true });

const expectEqual = (a: ArrayLike<number>, b: ArrayLike<number>, digits = 12) =>
  Array.from(a).forEach((x, p) => expect(x).toBeCloseTo(b[p], digits));

describe('Pauli algebra', () => {
  it('multiplies as the 2 x 2 matrices do', () => {
    fc.assert(
      fc.property(element, element, (a, b) => {
        const expected = multiplyComplex(matrixOfPauli(a), matrixOfPauli(b));
        const product = matrixOfPauli(multiplyPauli(a, b));
        expectEqual(product.real, expected.real);
        expectEqual(product.imag, expected.imag);
      }),
    );
  });

  it('is associative with 1 as identity', () => {
    fc.assert(
      fc.property(element, element, element, (a, b, c) => {
        const left = multiplyPauli(multiplyPauli(a, b), c);
        const right = multiplyPauli(a, multiplyPauli(b, c));
        expectEqual([...left.real, ...left.imag], [...right.real, ...right.imag]);
        for (const same of [multiplyPauli(IDENTITY, a), multiplyPauli(a, IDENTITY)]) {
          expectEqual([...same.real, ...same.imag], [...a.real, ...a.imag]);
        }
      }),
    );
  });

  it('exponentiates to the turn of a spin 1/2', () => {
    fc.assert(
      fc.property(axis, angle, ([x, y, z], theta) => {
        const generator = complexMatrix(2, 2);
        for (const [size, sigma] of [
          [x, SIGMA_X],
          [y, SIGMA_Y],
          [z, SIGMA_Z],
        ] as const) {
          const { real, imag } = matrixOfPauli(sigma);
          // -i theta/2 times sigma
          const turned = complexMatrix(
            2,
            2,
            imag,
            Float64Array.from(real, (u) => -u),
          );
          addScaledInto(generator, turned, (size * theta) / 2);
        }
        const expected = expmDense(generator);
        const spinor = matrixOfPauli(spinorRotation([x, y, z], theta));
        expectEqual(spinor.real, expected.real);
        expectEqual(spinor.imag, expected.imag);
      }),
    );
  });
});

describe('rotationOfSpinor', () => {
  it('maps products to products, and a spinor and its negative to one rotation', () => {
    fc.assert(
      fc.property(axis, angle, axis, angle, (n, a, m, b) => {
        const [u, v] = [spinorRotation(n, a), spinorRotation(m, b)];
        expectEqual(rotationOfSpinor(multiplyPauli(u, v)), multiply3(rotationOfSpinor(u), rotationOfSpinor(v)));
        expectEqual(rotationOfSpinor(spinorRotation(n, a + 2 * Math.PI)), rotationOfSpinor(u));
      }),
    );
  });

  it('agrees with the Euler matrix', () => {
    fc.assert(
      fc.property(angle, angle, angle, (a, b, g) => {
        const [z, y]: [number, number, number][] = [
          [0, 0, 1],
          [0, 1, 0],
        ];
        const spinor = multiplyPauli(multiplyPauli(spinorRotation(z, a), spinorRotation(y, b)), spinorRotation(z, g));
        const degrees = (x: number) => (x * 180) / Math.PI;
        expectEqual(rotationOfSpinor(spinor), rotationMatrix([degrees(a), degrees(b), degrees(g)]));
      }),
    );
  });

  it('is undone by rotationVector', () => {
    fc.assert(
      fc.property(axis, fc.double({ min: 0.01, max: 6.27, noNaN: true }), (n, theta) => {
        expectEqual(
          rotationVector(spinorRotation(n, theta)),
          n.map((x) => x * theta),
          9,
        );
      }),
    );
    expectEqual(rotationVector(IDENTITY), [0, 0, 0]);
  });
});
