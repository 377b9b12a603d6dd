import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { adjoint, complexMatrix, multiply, multiplyComplex } from './dense.js';
import { expmDense } from './expm-dense.js';
import { innerProduct3, multiply3, eulerAngles, rotateTensor, rotationMatrix } from './rotation.js';
import { smallWigner, sphericalComponents, wignerD } from './wigner.js';

const spin = fc.constantFrom(0, 0.5, 1, 1.5, 2, 3, 4.5);
const angle = fc.double({ min: -360, max: 360, noNaN: true });
const euler = fc.tuple(angle, angle, angle);
const expectEqual = (a: Float64Array, b: Float64Array, digits: number) =>
  a.forEach((x, p) => expect(x).toBeCloseTo(b[p], digits));

describe('smallWigner', () => {
  it('has the tabulated elements', () => {
    // Particle Data Group, table of Clebsch-Gordan coefficients, spherical harmonics and d functions.
    const beta = 37;
    const [c, s] = [Math.cos((beta * Math.PI) / 180), Math.sin((beta * Math.PI) / 180)];
    expect(smallWigner(1, beta).data[1]).toBeCloseTo(-s / Math.SQRT2, 14);
    expect(smallWigner(2, beta).data[2]).toBeCloseTo((Math.sqrt(6) / 4) * s * s, 14);
    expect(smallWigner(2, beta).data[12]).toBeCloseTo((3 * c * c - 1) / 2, 14);
    expect(smallWigner(1.5, beta).data[0]).toBeCloseTo(((1 + c) / 2) * Math.cos((beta * Math.PI) / 360), 14);
  });

  it('is exp(-i beta Jy), exponentiated independently', () => {
    fc.assert(
      fc.property(spin, angle, (j, beta) => {
        const size = 2 * j + 1;
        const generator = complexMatrix(size, size);
        for (let k = 0; k + 1 < size; k++) {
          // <m+1| J+ |m> = sqrt(j(j+1) - m(m+1)); -i Jy = -(J+ - J-)/2.
          const m = j - k - 1;
          const element = (Math.sqrt(j * (j + 1) - m * (m + 1)) / 2) * ((beta * Math.PI) / 180);
          generator.real[k * size + k + 1] = -element;
          generator.real[(k + 1) * size + k] = element;
        }
        expectEqual(smallWigner(j, beta).data, expmDense(generator).real, 11);
      }),
      { numRuns: 30 },
    );
  });

  it('adds angles', () => {
    fc.assert(
      fc.property(spin, angle, angle, (j, a, b) => {
        expectEqual(multiply(smallWigner(j, a), smallWigner(j, b)).data, smallWigner(j, a + b).data, 10);
      }),
    );
  });
});

describe('wignerD', () => {
  it('is unitary', () => {
    fc.assert(
      fc.property(spin, euler, (j, angles) => {
        const product = multiplyComplex(wignerD(j, angles), adjoint(wignerD(j, angles)));
        const size = 2 * j + 1;
        product.real.forEach((x, p) => expect(x).toBeCloseTo(p % (size + 1) === 0 ? 1 : 0, 11));
        product.imag.forEach((x) => expect(x).toBeCloseTo(0, 11));
      }),
    );
  });

  it('represents products of rotations, for integer j', () => {
    fc.assert(
      fc.property(fc.constantFrom(1, 2), euler, euler, (j, first, second) => {
        const product = multiplyComplex(wignerD(j, first), wignerD(j, second));
        const whole = wignerD(j, eulerAngles(multiply3(rotationMatrix(first), rotationMatrix(second))));
        expectEqual(product.real, whole.real, 9);
        expectEqual(product.imag, whole.imag, 9);
      }),
    );
  });
});

describe('sphericalComponents', () => {
  const value = fc.double({ min: -10, max: 10, noNaN: true });
  const traceless = fc
    .tuple(value, value, value, value, value)
    .map(([a, b, c, d, e]) => Float64Array.of(a, b, c, b, d, e, c, e, -a - d));

  it('turns by the Wigner matrix as the Cartesian tensor turns by R', () => {
    fc.assert(
      fc.property(traceless, euler, (tensor, angles) => {
        const turned = sphericalComponents(rotateTensor(rotationMatrix(angles), tensor));
        const { real, imag } = sphericalComponents(tensor);
        const conjugate = complexMatrix(
          5,
          1,
          real,
          Float64Array.from(imag, (x) => -x),
        );
        const expected = multiplyComplex(wignerD(2, angles), conjugate);
        expectEqual(turned.real, expected.real, 9);
        expectEqual(
          turned.imag,
          expected.imag.map((x) => -x),
          9,
        );
      }),
    );
  });

  it('keeps the sum of squares', () => {
    fc.assert(
      fc.property(traceless, (tensor) => {
        const { real, imag } = sphericalComponents(tensor);
        const squares = [...real, ...imag].reduce((sum, x) => sum + x * x, 0);
        expect(squares).toBeCloseTo(innerProduct3(tensor, tensor), 9);
      }),
    );
  });
});
