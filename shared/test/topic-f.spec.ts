import { describe, expect, it } from 'vitest';
import { clebschGordan } from '../src/algebra/clebsch-gordan.js';
import { multiplyComplex } from '../src/algebra/dense.js';
import {
  matrixOfPauli,
  multiplyPauli,
  rotationOfSpinor,
  rotationVector,
  SIGMA_X,
  SIGMA_Y,
  spinorRotation,
} from '../src/algebra/pauli.js';
import { innerProduct3, tensorFromPrincipal } from '../src/algebra/rotation.js';
import { smallWigner, sphericalComponents, wignerD } from '../src/algebra/wigner.js';
import { referenceCases } from './reference/catalogue.js';

type Vector = [number, number, number];

function expectWithin(actual: ArrayLike<number>, expected: readonly number[], bound: number): void {
  expect(actual.length).toBe(expected.length);
  expected.forEach((value, p) => expect(Math.abs(actual[p] - value)).toBeLessThanOrEqual(bound));
}

describe('F03 Wigner small d', () => {
  it.each(referenceCases<{ j: number; beta_deg: number }, { rows_m_prime_from_j_down: number[][] }>('F03'))(
    '$id',
    ({ inputs, expected, tolerance }) => {
      expectWithin(
        smallWigner(inputs.j, inputs.beta_deg).data,
        expected.rows_m_prime_from_j_down.flat(),
        tolerance.abs,
      );
    },
  );
});

describe('F04 Clebsch-Gordan coefficients', () => {
  type Numbers = [number, number, number, number, number, number];
  it.each(referenceCases<{ j1_m1_j2_m2_j_m: Numbers[] }, { values: number[]; squares: number[] }>('F04'))(
    '$id',
    ({ inputs, expected, tolerance }) => {
      const values = inputs.j1_m1_j2_m2_j_m.map((numbers) => clebschGordan(...numbers));
      expectWithin(values, expected.values, tolerance.abs);
      expectWithin(
        values.map((value) => value ** 2),
        expected.squares,
        tolerance.abs,
      );
    },
  );
});

describe('F05 Rotation of a rank-2 tensor', () => {
  type Expected = { matrix: number[][]; trace: number; frobenius2: number };
  it.each(referenceCases<{ principal: Vector; euler_zyz_deg: Vector }, Expected>('F05'))(
    '$id',
    ({ inputs, expected, tolerance }) => {
      const tensor = tensorFromPrincipal(inputs.principal, inputs.euler_zyz_deg);
      expectWithin(tensor, expected.matrix.flat(), tolerance.abs);
      expectWithin([tensor[0] + tensor[4] + tensor[8]], [expected.trace], tolerance.abs);
      expectWithin([innerProduct3(tensor, tensor)], [expected.frobenius2], tolerance.abs);
      // The spherical route: the components of a tensor in its own axes are real, so that conj(D) A = conj(D A).
      const own = sphericalComponents(tensorFromPrincipal(inputs.principal, [0, 0, 0]));
      const turned = multiplyComplex(wignerD(2, inputs.euler_zyz_deg), own);
      const { real, imag } = sphericalComponents(tensor);
      expectWithin(turned.real, [...real], tolerance.abs);
      expectWithin(
        turned.imag.map((x) => -x),
        [...imag],
        tolerance.abs,
      );
    },
  );
});

describe('F07 Exponentials of spin 1/2', () => {
  type Rotation = { U_real: number[][]; U_imag: number[][]; image_of_Iz_xyz: Vector };
  const cases = referenceCases<{ axis: Vector; angle_deg: number }, Rotation>('F07').filter(
    ({ inputs }) => 'axis' in inputs,
  );

  it.each(cases)('$id', ({ inputs, expected, tolerance }) => {
    const spinor = spinorRotation(inputs.axis, (inputs.angle_deg * Math.PI) / 180);
    expectWithin(matrixOfPauli(spinor).real, expected.U_real.flat(), tolerance.abs);
    expectWithin(matrixOfPauli(spinor).imag, expected.U_imag.flat(), tolerance.abs);
    const rotation = rotationOfSpinor(spinor);
    expectWithin([rotation[2], rotation[5], rotation[8]], expected.image_of_Iz_xyz, tolerance.abs);
  });

  it('F07-4 product of two small turns', () => {
    type Combined = { exact_rotation_vector: Vector; first_order: Vector; with_half_commutator: Vector };
    const [{ expected, tolerance }] = referenceCases<unknown, Combined>('F07-4');
    // exp(-i 0.1 Ix) exp(-i 0.2 Iy)
    const product = multiplyPauli(spinorRotation([1, 0, 0], 0.1), spinorRotation([0, 1, 0], 0.2));
    const exact = rotationVector(product);
    expectWithin(exact, expected.exact_rotation_vector, tolerance.abs);
    const distance = (from: Vector) => Math.hypot(...from.map((x, i) => x - exact[i]));
    expect(distance(expected.with_half_commutator)).toBeLessThan(distance(expected.first_order) / 10);
  });
});

describe('F01-9 Pauli matrices', () => {
  it('sx sy = i sz, and they anticommute', () => {
    expect(multiplyPauli(SIGMA_X, SIGMA_Y)).toEqual({ real: [0, 0, 0, 0], imag: [0, 0, 0, 1] });
    expect(multiplyPauli(SIGMA_Y, SIGMA_X).imag[3]).toBe(-1);
    expect(multiplyPauli(SIGMA_X, SIGMA_X)).toEqual({ real: [1, 0, 0, 0], imag: [0, 0, 0, 0] });
  });
});
