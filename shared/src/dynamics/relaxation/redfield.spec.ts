import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { systemOf } from '../../../test/documents.js';
import {
  addScaledInto,
  adjoint,
  complexMatrix,
  kron,
  multiplyComplex,
  type ComplexMatrix,
} from '../../algebra/dense.js';
import { rotateTensor, rotationMatrix } from '../../algebra/rotation.js';
import type { SpinSystem } from '../../documents/system.schema.js';
import { signedLarmorHz } from '../../interactions/carriers.js';
import { dipolarConstantHz } from '../../interactions/tensors.js';
import { nuclide } from '../../nuclides/nuclides.js';
import { mechanismsOf } from './mechanisms.js';
import { ladderOperators } from './rank-two-operators.js';
import { redfieldMatrix } from './redfield-matrix.js';
import { redfieldTerms } from './redfield.js';

const frame = { protonMHz: 400, observe: '1H', acquisition: { centre: 0, width: 1000, points: 16 } };

/** Gamma over all |r><c|, r slowest, as a dense row-major matrix. */
function fullGamma(system: SpinSystem): { gamma: Float64Array; dimension: number } {
  const terms = redfieldTerms(system, frame);
  const dimension = terms[0].start.length - 1;
  const states = Array.from({ length: dimension ** 2 }, (_, i) => i);
  const { start, columns, values } = redfieldMatrix(terms, dimension, {
    kets: states.map((i) => Math.floor(i / dimension)),
    bras: states.map((i) => i % dimension),
  });
  const gamma = new Float64Array(dimension ** 4);
  for (const i of states)
    for (let p = start[i]; p < start[i + 1]; p++) gamma[i * dimension ** 2 + columns[p]] = values[p];
  return { gamma, dimension };
}

/** Cartesian operators of every nucleus (no groups) in the product basis. */
function cartesianOperators(system: SpinSystem): ComplexMatrix[][] {
  const spins = system.nuclei.map(({ isotope }) => nuclide(isotope).spin);
  return spins.map((spin, row) =>
    cartesian(spin).map((operator) =>
      spins.reduce((product, other, k) => kron(product, k === row ? operator : identity(2 * other + 1)), identity(1)),
    ),
  );
}

function identity(size: number): ComplexMatrix {
  return complexMatrix(
    size,
    size,
    Float64Array.from({ length: size ** 2 }, (_, p) => (p % (size + 1) === 0 ? 1 : 0)),
  );
}

function cartesian(spin: number): ComplexMatrix[] {
  const size = 2 * spin + 1;
  const { z, plus } = ladderOperators(spin);
  const [x, y, zz] = [complexMatrix(size, size), complexMatrix(size, size), complexMatrix(size, size)];
  for (let k = 0; k < size; k++) {
    zz.real[k * size + k] = z.elements[k];
    if (k === 0) continue;
    // I+ |m> = element |m+1>: Ix = (I+ + I-)/2, Iy = (I+ - I-)/2i.
    x.real[(k - 1) * size + k] = x.real[k * size + k - 1] = plus.elements[k] / 2;
    y.imag[(k - 1) * size + k] = -plus.elements[k] / 2;
    y.imag[k * size + k - 1] = plus.elements[k] / 2;
  }
  return [x, y, zz];
}

/** Sums over an orientation set that is exact for products of two rank-2 tensors: equal steps of 72 degrees, five Gauss-Legendre nodes. */
function orientations(): { angles: [number, number, number]; weight: number }[] {
  // Nodes and weights: M. Abramowitz and I. A. Stegun, Handbook of Mathematical Functions, 1964, table 25.4.
  const nodes = [
    [0, 0.5688888888888889],
    [0.5384693101056831, 0.4786286704993665],
    [0.906179845938664, 0.2369268850561891],
  ].flatMap(([x, w]) =>
    x === 0
      ? [[x, w]]
      : [
          [x, w],
          [-x, w],
        ],
  );
  const steps = [0, 72, 144, 216, 288];
  return nodes.flatMap(([x, w]) =>
    steps.flatMap((a) =>
      steps.map((g) => ({
        angles: [a, (Math.acos(x) * 180) / Math.PI, g] as [number, number, number],
        weight: w / 2 / steps.length ** 2,
      })),
    ),
  );
}

/** Gamma by its definition: <[H_p,[H_p+,.]]> summed over orientations with H(Omega) written in Cartesian operators. */
function gammaByOrientations(system: SpinSystem): Float64Array {
  const operators = cartesianOperators(system);
  const dimension = operators[0][0].rows;
  const mechanisms = mechanismsOf(system, frame);
  const isotopes = [...new Set(system.nuclei.map(({ isotope }) => isotope))];
  const levels = isotopes.map((isotope) =>
    Float64Array.from({ length: dimension }, (_, k) =>
      operators.reduce(
        (m, own, row) => m + (system.nuclei[row].isotope === isotope ? own[2].real[k * (dimension + 1)] : 0),
        0,
      ),
    ),
  );
  const gamma = new Float64Array(dimension ** 4);
  for (const { angles, weight } of orientations()) {
    const hamiltonian = complexMatrix(dimension, dimension);
    for (const mechanism of mechanisms) {
      const tensor = rotateTensor(rotationMatrix(angles), mechanism.tensor);
      for (let i = 0; i < 3; i++) {
        for (let j = 0; j < 3; j++) {
          const first = operators[mechanism.a][i];
          if (mechanism.kind === 'shift') {
            if (j === 2) addScaledInto(hamiltonian, first, 2 * Math.PI * tensor[3 * i + j]);
            continue;
          }
          const second = operators[mechanism.kind === 'dipolar' ? mechanism.b : mechanism.a][j];
          addScaledInto(hamiltonian, multiplyComplex(first, second), 2 * Math.PI * tensor[3 * i + j]);
        }
      }
    }
    for (const part of splitByOrder(hamiltonian, levels)) {
      const hz = isotopes.reduce((sum, isotope, q) => sum + part.orders[q] * signedLarmorHz(isotope, frame), 0);
      const { tauC } = system.tumbling!;
      const density = tauC / (1 + (2 * Math.PI * hz * tauC) ** 2);
      const double = doubleCommutator(part.operator);
      for (let p = 0; p < gamma.length; p++) gamma[p] += weight * density * double.real[p];
    }
  }
  return gamma;
}

function splitByOrder(matrix: ComplexMatrix, levels: Float64Array[]) {
  const parts = new Map<string, { orders: number[]; operator: ComplexMatrix }>();
  for (let r = 0; r < matrix.rows; r++) {
    for (let c = 0; c < matrix.rows; c++) {
      const orders = levels.map((m) => m[r] - m[c]);
      const key = orders.join();
      if (!parts.has(key)) parts.set(key, { orders, operator: complexMatrix(matrix.rows, matrix.rows) });
      const { operator } = parts.get(key)!;
      operator.real[r * matrix.rows + c] = matrix.real[r * matrix.rows + c];
      operator.imag[r * matrix.rows + c] = matrix.imag[r * matrix.rows + c];
    }
  }
  return parts.values();
}

/** [A,[A+,.]] as a matrix over |r><c|, r slowest. */
function doubleCommutator(a: ComplexMatrix): ComplexMatrix {
  return multiplyComplex(commutation(a), commutation(adjoint(a)));
}

function commutation(a: ComplexMatrix): ComplexMatrix {
  const one = identity(a.rows);
  const transposed = adjoint(
    complexMatrix(
      a.rows,
      a.rows,
      a.real,
      Float64Array.from(a.imag, (x) => -x),
    ),
  );
  return addScaledInto(kron(a, one), kron(one, transposed), -1);
}

const mechanismRich: [string, SpinSystem][] = [
  [
    'two protons with shift tensors',
    systemOf({
      nuclei: [
        { id: 'A', isotope: '1H', shift: 1, position: [0, 0, 0], csa: { span: 20, skew: 0.3, euler: [10, 50, 70] } },
        { id: 'B', isotope: '1H', shift: 2, position: [1, 1, 1.2], csa: { span: 9, skew: -0.6, euler: [40, 20, 0] } },
      ],
      couplings: [{ between: ['A', 'B'], dipolar: 'positions' }],
      tumbling: { tauC: 1e-9 },
    }),
  ],
  [
    'an amide pair',
    systemOf({
      nuclei: [
        { id: 'N', isotope: '15N', shift: 120, csa: { span: 160, skew: 0.8, euler: [0, 17, 0] } },
        { id: 'H', isotope: '1H', shift: 8, csa: { span: 12, skew: 0, euler: [0, 90, 30] } },
      ],
      couplings: [{ between: ['N', 'H'], j: -92, dipolar: { constant: 11000, polar: [30, 60] } }],
      tumbling: { tauC: 4e-9 },
    }),
  ],
  [
    'a deuteron on carbon',
    systemOf({
      nuclei: [
        { id: 'C', isotope: '13C', shift: 77, csa: { span: 60, skew: 0.5 } },
        { id: 'D', isotope: '2H', shift: 7, quadrupole: { cq: 170e3, eta: 0.2, euler: [0, 40, 80] } },
      ],
      couplings: [{ between: ['C', 'D'], dipolar: { constant: -3500, polar: [20, 10] } }],
      tumbling: { tauC: 3e-10 },
    }),
  ],
];

describe('Gamma', () => {
  it.each(mechanismRich)('is the orientation average of its definition: %s', (_name, system) => {
    const { gamma } = fullGamma(system);
    const expected = gammaByOrientations(system);
    const largest = expected.reduce((most, x) => Math.max(most, Math.abs(x)), 0);
    expect(largest).toBeGreaterThan(0.01);
    gamma.forEach((x, p) => expect(Math.abs(x - expected[p])).toBeLessThan(1e-12 * largest));
  });

  const angle = fc.double({ min: 0, max: 180, noNaN: true });
  const randomSystem = fc
    .record({
      isotopes: fc.constantFrom(['1H', '1H'], ['13C', '1H'], ['15N', '1H'], ['1H', '14N'], ['23Na', '1H']),
      constant: fc.integer({ min: -20e3, max: 20e3 }),
      polar: fc.tuple(angle, angle),
      span: fc.integer({ min: 0, max: 300 }),
      euler: fc.tuple(angle, angle, angle),
      logTau: fc.double({ min: -12, max: -7, noNaN: true }),
    })
    .map(({ isotopes, constant, polar, span, euler, logTau }) =>
      systemOf({
        nuclei: isotopes.map((isotope, k) => ({
          id: `N${k}`,
          isotope,
          shift: 0,
          csa: { span, skew: 0.4, euler },
          ...(nuclide(isotope).spin > 0.5 ? { quadrupole: { cq: 4e5, eta: 0.5 } } : {}),
        })),
        couplings: [{ between: ['N0', 'N1'], dipolar: { constant, polar } }],
        tumbling: { tauC: 10 ** logTau },
      }),
    );

  it('is symmetric, keeps the trace and leaves the unit operator alone', () => {
    fc.assert(
      fc.property(randomSystem, (system) => {
        const { gamma, dimension } = fullGamma(system);
        const size = dimension ** 2;
        const largest = gamma.reduce((most, x) => Math.max(most, Math.abs(x)), 0);
        for (let i = 0; i < size; i++) {
          let [column, row] = [0, 0];
          for (let k = 0; k < dimension; k++) {
            column += gamma[k * (dimension + 1) * size + i];
            row += gamma[i * size + k * (dimension + 1)];
          }
          expect(Math.abs(column)).toBeLessThanOrEqual(1e-11 * largest);
          expect(Math.abs(row)).toBeLessThanOrEqual(1e-11 * largest);
          for (let j = 0; j < i; j++)
            expect(Math.abs(gamma[i * size + j] - gamma[j * size + i])).toBeLessThanOrEqual(1e-12 * largest);
        }
      }),
      { numRuns: 25 },
    );
  });

  it('never makes any operator grow: x.Gamma x >= 0', () => {
    fc.assert(
      fc.property(
        randomSystem,
        fc.array(fc.double({ min: -1, max: 1, noNaN: true }), { minLength: 7, maxLength: 7 }),
        (system, seeds) => {
          const { gamma, dimension } = fullGamma(system);
          const size = dimension ** 2;
          const x = Float64Array.from({ length: size }, (_, i) => Math.sin((i + 1) * (seeds[i % 7] + 2)));
          const largest = gamma.reduce((most, value) => Math.max(most, Math.abs(value)), 0);
          expect(quadraticForm(gamma, x, x)).toBeGreaterThanOrEqual(-1e-11 * size * largest);
        },
      ),
    );
  });

  it('relaxes only inside one order of each isotope, so that a closed set gives the same rates', () => {
    const [, system] = mechanismRich[1];
    const { gamma, dimension } = fullGamma(system);
    // 15N single-quantum, 1H order 0: |a,h><b,h|.
    const set = { kets: [0, 1], bras: [2, 3] };
    const { start, columns, values } = redfieldMatrix(redfieldTerms(system, frame), dimension, set);
    for (let i = 0; i < 2; i++) {
      for (let p = start[i]; p < start[i + 1]; p++) {
        const j = columns[p];
        const [from, to] = [set.kets[j] * dimension + set.bras[j], set.kets[i] * dimension + set.bras[i]];
        expect(values[p]).toBeCloseTo(gamma[to * dimension ** 2 + from], 10);
      }
    }
    const open = { kets: [0], bras: [2] };
    expect(() => redfieldMatrix(redfieldTerms(system, frame), dimension, open)).toThrow(RangeError);
  });

  it('leaves nuclei without mechanisms, groups included, as they are', () => {
    const pair = mechanismRich[1][1];
    const methyl = { id: 'M', isotope: '1H', shift: 1, count: 3 };
    const whole = systemOf({ ...pair, nuclei: [methyl, ...pair.nuclei] });
    const terms = redfieldTerms(whole, frame);
    expect(terms[0].start.length - 1).toBe(32);
    // Rate of 15N I- beside the populations of the methyl group: the same in all of them.
    const alone = redfieldMatrix(redfieldTerms(pair, frame), 4, { kets: [0, 1], bras: [2, 3] });
    const beside = redfieldMatrix(terms, 32, { kets: [20, 21], bras: [22, 23] });
    expect([...beside.values].map((x) => +x.toPrecision(12))).toEqual([...alone.values].map((x) => +x.toPrecision(12)));
  });
});

function quadraticForm(gamma: Float64Array, x: Float64Array, y: Float64Array): number {
  return x.reduce(
    (sum, value, i) => sum + value * y.reduce((row, other, j) => row + gamma[i * x.length + j] * other, 0),
    0,
  );
}

/** Tr(X+ Gamma Y)/Tr(X+ X) of real operators, s^-1. */
function rate(system: SpinSystem, x: ComplexMatrix, y: ComplexMatrix): number {
  const { gamma } = fullGamma(system);
  return quadraticForm(gamma, x.real, y.real) / x.real.reduce((sum, value) => sum + value * value, 0);
}

/** Ix and Iz of a nucleus; the rate of Ix is that of I-. */
function axes(system: SpinSystem, row: number): { x: ComplexMatrix; z: ComplexMatrix } {
  const [x, , z] = cartesianOperators(system)[row];
  return { x, z };
}

describe('closed formulas (j = tauC/(1 + w^2 tauC^2))', () => {
  const omega = (isotope: string) => 2 * Math.PI * signedLarmorHz(isotope, frame);
  const density = (tauC: number) => (w: number) => tauC / (1 + (w * tauC) ** 2);
  const expectRatio = (actual: number, expected: number) => expect(actual / expected).toBeCloseTo(1, 10);

  it('dipolar pair of unlike spins: I. Solomon, Phys. Rev. 99 (1955) 559', () => {
    for (const [isotope, tauC] of [
      ['13C', 1e-11],
      ['15N', 5e-9],
      ['31P', 1e-8],
    ] as const) {
      const system = systemOf({
        nuclei: [
          { id: 'X', isotope, shift: 0, position: [0, 0, 0] },
          { id: 'H', isotope: '1H', shift: 0, position: [0.5, 0.6, 0.7] },
        ],
        couplings: [{ between: ['X', 'H'], dipolar: 'positions' }],
        tumbling: { tauC },
      });
      const b2 = (2 * Math.PI * dipolarConstantHz(isotope, '1H', Math.hypot(0.5, 0.6, 0.7))) ** 2;
      const j = density(tauC);
      const [wX, wH] = [omega(isotope), omega('1H')];
      const [w0, w1, w2] = [(b2 / 10) * j(wX - wH), (3 / 20) * b2 * j(wX), (3 / 5) * b2 * j(wX + wH)];
      const [x, h] = [axes(system, 0), axes(system, 1)];
      expectRatio(rate(system, x.z, x.z), w0 + 2 * w1 + w2);
      expectRatio(rate(system, h.z, x.z), w2 - w0);
      const transverse = (b2 / 20) * (4 * tauC + j(wX - wH) + 3 * j(wX) + 6 * j(wH) + 6 * j(wX + wH));
      expectRatio(rate(system, x.x, x.x), transverse);
    }
  });

  it('two like spins: N. Bloembergen, E. M. Purcell, R. V. Pound, Phys. Rev. 73 (1948) 679', () => {
    const tauC = 2e-10;
    const system = systemOf({
      nuclei: [
        { id: 'A', isotope: '1H', shift: 0, position: [0, 0, 0] },
        { id: 'B', isotope: '1H', shift: 0, position: [0, 0, 1.78] },
      ],
      couplings: [{ between: ['A', 'B'], dipolar: 'positions' }],
      tumbling: { tauC },
    });
    const b2 = (2 * Math.PI * dipolarConstantHz('1H', '1H', 1.78)) ** 2;
    const [j, w] = [density(tauC), omega('1H')];
    const total = (key: 'x' | 'z') =>
      addScaledInto(addScaledInto(complexMatrix(4, 4), axes(system, 0)[key], 1), axes(system, 1)[key], 1);
    expectRatio(rate(system, total('z'), total('z')), (3 / 10) * b2 * (j(w) + 4 * j(2 * w)));
    expectRatio(rate(system, total('x'), total('x')), (3 / 20) * b2 * (3 * tauC + 5 * j(w) + 2 * j(2 * w)));
  });

  it('shift anisotropy, not axial: A. Abragam, Principles of Nuclear Magnetism, 1961, ch. VIII', () => {
    const tauC = 3e-9;
    const [delta, eta] = [-80, 0.6];
    // delta, eta -> span, skew by hand: z = -80, x = 64, y = 16.
    const system = systemOf({
      nuclei: [{ id: 'C', isotope: '13C', shift: 100, csa: { span: 144, skew: (3 * 16) / 144, euler: [20, 40, 60] } }],
      tumbling: { tauC },
    });
    const [j, w] = [density(tauC), omega('13C')];
    const square = (w * 1.5 * delta * 1e-6) ** 2 * (1 + eta ** 2 / 3);
    const { x, z } = axes(system, 0);
    expectRatio(rate(system, z, z), (2 / 15) * square * j(w));
    expectRatio(rate(system, x, x), (1 / 45) * square * (4 * tauC + 3 * j(w)));
  });

  it('quadrupolar spin 1 at any rate, spins up to 9/2 in extreme narrowing: Abragam 1961, ch. VIII', () => {
    const one = (tauC: number, eta: number) =>
      systemOf({ nuclei: [{ id: 'D', isotope: '2H', shift: 0, quadrupole: { cq: 167e3, eta } }], tumbling: { tauC } });
    const tauC = 5e-9;
    const [j, w] = [density(tauC), omega('2H')];
    const c2 = (2 * Math.PI * 167e3) ** 2 * (1 + 0.3 ** 2 / 3);
    const system = one(tauC, 0.3);
    const { x, z } = axes(system, 0);
    expectRatio(rate(system, z, z), (3 / 40) * c2 * (j(w) + 4 * j(2 * w)));
    expectRatio(rate(system, x, x), (3 / 80) * c2 * (3 * tauC + 5 * j(w) + 2 * j(2 * w)));
    for (const isotope of ['23Na', '27Al', '45Sc', '93Nb']) {
      const { spin } = nuclide(isotope);
      const narrow = systemOf({
        nuclei: [{ id: 'Q', isotope, shift: 0, quadrupole: { cq: 1e6, eta: 0.4 } }],
        tumbling: { tauC: 1e-15 },
      });
      const expected =
        ((3 * Math.PI ** 2) / 10) * ((2 * spin + 3) / (spin ** 2 * (2 * spin - 1))) * 1e12 * (1 + 0.16 / 3) * 1e-15;
      const own = axes(narrow, 0);
      expectRatio(rate(narrow, own.z, own.z), expected);
      expectRatio(rate(narrow, own.x, own.x), expected);
    }
  });

  it('cross-correlation of dipolar and shift terms: M. Goldman, J. Magn. Reson. 60 (1984) 437', () => {
    const tauC = 1e-8;
    for (const angle of [0, 17, 60]) {
      const system = systemOf({
        nuclei: [
          { id: 'N', isotope: '15N', shift: 0, csa: { span: 172, skew: 1, euler: [0, angle, 0] } },
          { id: 'H', isotope: '1H', shift: 0 },
        ],
        couplings: [
          { between: ['N', 'H'], dipolar: { constant: dipolarConstantHz('15N', '1H', 1.02), polar: [0, 0] } },
        ],
        tumbling: { tauC },
      });
      const [j, w] = [density(tauC), omega('15N')];
      const b = 2 * Math.PI * dipolarConstantHz('15N', '1H', 1.02);
      const legendre = (3 * Math.cos((angle * Math.PI) / 180) ** 2 - 1) / 2;
      const expected = (1 / 15) * Math.abs(b * w * 172e-6 * legendre) * (4 * tauC + 3 * j(w));
      const [n, h] = [axes(system, 0), axes(system, 1)];
      const antiphase = addScaledInto(complexMatrix(4, 4), multiplyComplex(n.x, h.z), 2);
      expectRatio(Math.abs(rate(system, antiphase, n.x)), expected);
    }
  });
});
