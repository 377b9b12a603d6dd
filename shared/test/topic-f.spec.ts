import { describe, expect, it } from 'vitest';
import { clebschGordan } from '../src/algebra/clebsch-gordan.js';
import { addScaledInto, complexMatrix, multiplyComplex, trace, type ComplexMatrix } from '../src/algebra/dense.js';
import { eigenHermitian } from '../src/algebra/eigen/hermitian.js';
import { eigenSymmetric } from '../src/algebra/eigen/symmetric.js';
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
import { eigenGroup, evolveClosed } from '../src/dynamics/liouville/closed-evolution.js';
import { Density } from '../src/dynamics/liouville/density.js';
import { generatorOf } from '../src/dynamics/liouville/generator.js';
import { sparseHamiltonian } from '../src/dynamics/liouville/hamiltonian.js';
import { applyPulse } from '../src/dynamics/liouville/rotations.js';
import { coherenceBlocks, raising, spinSpace, type SpinSpace } from '../src/dynamics/liouville/spin-space.js';
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

/** So many spins in one class. */
function spaceOf(spins: readonly number[]): SpinSpace {
  return spinSpace(
    spins.map((spin, row) => ({ row, isotope: '1H', spin })),
    spins.map(() => 0),
  );
}

/** Iz and I+ of one particle as dense matrices, from the elements that the engine uses. */
function operatorsOf(space: SpinSpace, p: number): Record<'x' | 'y' | 'z', ComplexMatrix> {
  const { dimension: n, particles, projections, strides } = space;
  const [x, y, z] = [complexMatrix(n, n), complexMatrix(n, n), complexMatrix(n, n)];
  for (let state = 0; state < n; state++) {
    const m = projections[state * particles.length + p];
    z.real[state * n + state] = m;
    const up = raising(particles[p].spin, m) / 2;
    if (up === 0) continue;
    const target = state - strides[p];
    x.real[target * n + state] = x.real[state * n + target] = up;
    y.imag[target * n + state] = -up;
    y.imag[state * n + target] = up;
  }
  return { x, y, z };
}

describe('F01 Spin matrices', () => {
  type Expected = {
    raising_elements_from_top: number[];
    Casimir: number;
    Tr_Iz2: number;
    Tr_IpIm: number;
    Tr_Iz4: number;
    dimension: number;
  };
  const cases = referenceCases<{ I: number }, Expected>('F01').filter(({ expected }) => 'Casimir' in expected);

  it.each(cases)('$id', ({ inputs: { I }, expected, tolerance }) => {
    const space = spaceOf([I]);
    expect(space.dimension).toBe(expected.dimension);
    const elements = expected.raising_elements_from_top.map((_, k) => raising(I, I - k - 1));
    expectWithin(elements, expected.raising_elements_from_top, 1e-9);
    const { x, y, z } = operatorsOf(space, 0);
    const [xx, yy, zz] = [x, y, z].map((axis) => multiplyComplex(axis, axis));
    const casimir = addScaledInto(addScaledInto(zz, xx, 1), yy, 1);
    casimir.real.forEach((value, p) =>
      expect(value).toBeCloseTo(p % (space.dimension + 1) === 0 ? expected.Casimir : 0, 9),
    );
    const squares = multiplyComplex(z, z);
    expectWithin([trace(squares)[0]], [expected.Tr_Iz2], tolerance.abs);
    expectWithin([trace(multiplyComplex(squares, squares))[0]], [expected.Tr_Iz4], tolerance.abs);
    expectWithin([trace(xx)[0] + trace(yy)[0]], [expected.Tr_IpIm], tolerance.abs);
    // [Ix, Iy] = i Iz
    const commutator = addScaledInto(multiplyComplex(x, y), multiplyComplex(y, x), -1);
    commutator.imag.forEach((value, p) => expect(Math.abs(value - z.real[p])).toBeLessThan(tolerance.abs));
  });
});

describe('F02 Product-operator evolution', () => {
  type Step = [kind: string, value: number | string, seconds: number];
  const space = spaceOf([0.5, 0.5]);

  /** The operator of a name like I1x or 2I1yI2z. */
  function productOperator(name: string): ComplexMatrix {
    const factors = Array.from(
      name.matchAll(/I([12])([xyz])/g),
      ([, spin, axis]) => operatorsOf(space, +spin - 1)[axis as 'x'],
    );
    const product = factors.reduce(multiplyComplex);
    return addScaledInto(complexMatrix(4, 4), product, name.startsWith('2') ? 2 : 1);
  }

  function apply(rho: ComplexMatrix, [kind, value, seconds]: Step): ComplexMatrix {
    if (kind === 'pulse') {
      const density = new Density(1, 4);
      density.real.set(rho.real);
      density.imag.set(rho.imag);
      const [axis, degrees] = [String(value)[0], +String(value).slice(1)];
      applyPulse(density, space, '1H', (degrees * Math.PI) / 180, axis === 'x' ? 0 : Math.PI / 2);
      return complexMatrix(4, 4, density.real, density.imag);
    }
    const offsets = Float64Array.of(kind === 'offset1' ? +value : 0, 0);
    const couplings = kind === 'J' ? [{ a: 0, b: 1, j: +value, like: false }] : [];
    const states = eigenGroup(sparseHamiltonian(space, offsets, couplings), Uint32Array.of(0, 1, 2, 3));
    const { real, imag } = evolveClosed(states, states, rho, seconds);
    return complexMatrix(4, 4, real, imag);
  }

  it.each(referenceCases<{ start: string; steps: Step[] }, Record<string, number>>('F02'))(
    '$id',
    ({ inputs, expected, tolerance }) => {
      const rho = inputs.steps.reduce(apply, productOperator(inputs.start));
      const sum = complexMatrix(4, 4);
      for (const [name, value] of Object.entries(expected)) addScaledInto(sum, productOperator(name), value);
      expectWithin(rho.real, [...sum.real], tolerance.abs);
      expectWithin(rho.imag, [...sum.imag], tolerance.abs);
    },
  );
});

describe('F06 Liouvillian spectrum', () => {
  type Expected = { H_eigenvalues: number[]; L_eigenvalues_sorted: number[]; Liouville_dimension: number };

  it.each(referenceCases<{ nu_Hz: number[]; J_Hz: number }, Expected>('F06'))(
    '$id',
    ({ inputs, expected, tolerance }) => {
      const space = spaceOf([0.5, 0.5]);
      const h = sparseHamiltonian(space, Float64Array.from(inputs.nu_Hz), [{ a: 0, b: 1, j: inputs.J_Hz, like: true }]);
      const dense = new Float64Array(16);
      for (let r = 0; r < 4; r++)
        for (let p = h.start[r]; p < h.start[r + 1]; p++) dense[r * 4 + h.columns[p]] = h.values[p];
      expectWithin(eigenSymmetric(dense, 4).values, expected.H_eigenvalues, tolerance.abs);
      const all = Array.from({ length: 16 }, (_, i) => i);
      const coherences = { kets: Uint32Array.from(all, (i) => i >> 2), bras: Uint32Array.from(all, (i) => i & 3) };
      const generator = generatorOf(4, coherences, [h], undefined, new Float64Array(1));
      // The generator is -2 pi i times the commutation superoperator, a real matrix.
      const commutation = complexMatrix(16, 16);
      for (let r = 0; r < 16; r++) {
        for (let p = generator.start[r]; p < generator.start[r + 1]; p++) {
          commutation.real[r * 16 + generator.columns[p]] = -generator.imag[p] / (2 * Math.PI);
        }
      }
      expect(generator.size).toBe(expected.Liouville_dimension);
      expectWithin(eigenHermitian(commutation).values, expected.L_eigenvalues_sorted, tolerance.abs);
    },
  );
});

describe('F08 Normalisation and counting', () => {
  type Expected = {
    dimension: number;
    single_quantum_transitions: number;
    first_order_lines: number;
    Tr_Fz2: number;
    states_per_Mz: number[];
  };

  it.each(referenceCases<{ N: number }, Expected>('F08'))('$id', ({ inputs: { N }, expected }) => {
    const space = spaceOf(new Array<number>(N).fill(0.5));
    expect(space.dimension).toBe(expected.dimension);
    const single = coherenceBlocks(space, false).filter(({ orders }) => orders[0] === -1);
    expect(single.reduce((sum, { kets }) => sum + kets.length, 0)).toBe(expected.single_quantum_transitions);
    const flips = ({ kets, bras }: { kets: Uint32Array; bras: Uint32Array }) =>
      Array.from(kets).filter((ket, i) => isPowerOfTwo(ket ^ bras[i])).length;
    expect(single.reduce((sum, block) => sum + flips(block), 0)).toBe(expected.first_order_lines);
    expect(space.totals.reduce((sum, m) => sum + m * m, 0)).toBe(expected.Tr_Fz2);
    const perTotal = Array.from({ length: N + 1 }, (_, k) => space.totals.filter((m) => m === N / 2 - k).length);
    expect(perTotal).toEqual(expected.states_per_Mz);
  });
});

function isPowerOfTwo(bits: number): boolean {
  return bits !== 0 && (bits & (bits - 1)) === 0;
}
