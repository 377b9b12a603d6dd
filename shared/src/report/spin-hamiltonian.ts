import { addScaledInto, complexMatrix, multiplyComplex, type ComplexMatrix } from '../algebra/dense.js';
import { rotateTensor, type Matrix3 } from '../algebra/rotation.js';
import type { Experiment } from '../documents/experiment.schema.js';
import type { ExchangeState, SpinSystem } from '../documents/system.schema.js';
import { offsetsOf, shiftIn, signedLarmorHz } from '../interactions/carriers.js';
import { couplingsOf, isDecoupled } from '../interactions/scalar.js';
import { dipolarCouplingsOf, quadrupolarTensorHz, shiftTensorHz } from '../interactions/tensors.js';
import { nuclide } from '../nuclides/nuclides.js';

/**
 * Small dense Hamiltonians in Hz that keep more or less of the physics, to be compared with each other:
 *   first-order   only the z parts of J, none between nuclei of one shift
 *   high-field    what the engine takes: secular couplings, shift and quadrupolar terms by the experiment
 *   complete      everything, in the laboratory frame
 * A group of equivalent nuclei stands as one spin, its highest total spin, which has all lines of its multiplet.
 */
export type Reading = 'first-order' | 'high-field' | 'complete';

/** Where the Zeeman term counts from: the carriers, or zero field. */
export type ZeemanFrame = 'rotating' | 'laboratory';

export interface SpinSpace {
  /** Spin quantum number by row of `system.nuclei`. */
  readonly spins: readonly number[];
  readonly dimension: number;
}

export function spinSpace(system: SpinSystem): SpinSpace {
  const spins = system.nuclei.map(({ isotope, count }) => nuclide(isotope).spin * count);
  return { spins, dimension: spins.reduce((product, spin) => product * (2 * spin + 1), 1) };
}

/** The state that most of the sample is in; undefined without exchange. */
export function mainState(system: SpinSystem): ExchangeState | undefined {
  return system.states?.reduce((most, state) => (state.population > most.population ? state : most));
}

/** The Hamiltonian in Hz; `orientation` turns the molecule into the laboratory, null for a solution. */
export function denseHamiltonian(
  system: SpinSystem,
  experiment: Experiment,
  reading: Reading,
  zeeman: ZeemanFrame,
  orientation: Matrix3 | null,
): ComplexMatrix {
  const sum = new OperatorSum(spinSpace(system));
  const state = mainState(system);
  const offsets = offsetsOf(system, experiment, state);
  system.nuclei.forEach((nucleus, row) => {
    const laboratory = signedLarmorHz(nucleus.isotope, experiment) * (1 + shiftIn(nucleus, state) * 1e-6);
    sum.addVector(row, [0, 0, zeeman === 'rotating' ? offsets[row] : laboratory]);
  });
  for (const { a, b, j, like } of couplingsOf(system, experiment.decouple, state)) {
    if (reading === 'first-order' && like && offsets[a] === offsets[b]) continue;
    const isotropic = reading === 'complete' || (reading === 'high-field' && like);
    sum.addProduct(a, b, isotropic ? diagonal(j, j, j) : diagonal(0, 0, j));
  }
  if (orientation) addAnisotropy(sum, system, experiment, reading, orientation);
  return sum.matrix;
}

/** Sum of I- over the nuclei of the observed isotope. */
export function loweringOperator(system: SpinSystem, observe: string): ComplexMatrix {
  const space = spinSpace(system);
  const sum = new OperatorSum(space);
  system.nuclei.forEach(({ isotope }, row) => {
    if (isotope !== observe) return;
    const [x, y] = cartesianSpin(space.spins[row]);
    // I- = Ix - i Iy, real in the Zeeman basis.
    sum.addLocal(row, addScaledInto(complexMatrix(x.rows, x.rows, x.real.slice(), x.imag.slice()), timesI(y), -1));
  });
  return sum.matrix;
}

function addAnisotropy(
  sum: OperatorSum,
  system: SpinSystem,
  experiment: Experiment,
  reading: Reading,
  orientation: Matrix3,
): void {
  const complete = reading === 'complete';
  for (const { a, b, tensor, like } of dipolarCouplingsOf(system)) {
    if (isDecoupled(system.nuclei[a].isotope, system.nuclei[b].isotope, experiment.decouple)) continue;
    const turned = rotateTensor(orientation, tensor);
    const zz = turned[8];
    sum.addProduct(a, b, complete ? turned : like ? diagonal(-zz / 2, -zz / 2, zz) : diagonal(0, 0, zz));
  }
  system.nuclei.forEach((nucleus, row) => {
    const shift = shiftTensorHz(nucleus, experiment);
    if (shift) {
      const turned = rotateTensor(orientation, shift);
      sum.addVector(row, complete ? [turned[2], turned[5], turned[8]] : [0, 0, turned[8]]);
    }
    const quadrupolar = quadrupolarTensorHz(nucleus);
    if (!quadrupolar) return;
    const turned = rotateTensor(orientation, quadrupolar);
    const whole = quadratic(sum.space.spins[row], turned);
    if (complete) sum.addLocal(row, whole);
    else
      sum.addLocal(
        row,
        highFieldLevels(whole, experiment.quadrupoleOrder, signedLarmorHz(nucleus.isotope, experiment)),
      );
  });
}

/** Diagonal of V, and to second order sum over n of |V_mn|^2/(nu0 (m - n)) for each level. */
function highFieldLevels(v: ComplexMatrix, order: 1 | 2, larmor: number): ComplexMatrix {
  const size = v.rows;
  const levels = complexMatrix(size, size);
  for (let k = 0; k < size; k++) {
    levels.real[k * size + k] = v.real[k * size + k];
    for (let l = 0; order === 2 && l < size; l++) {
      if (l === k) continue;
      const square = v.real[k * size + l] ** 2 + v.imag[k * size + l] ** 2;
      levels.real[k * size + k] += square / (larmor * (l - k)); // m - n = l - k: rows run from m = I down
    }
  }
  return levels;
}

/** I.T.I of one spin. */
function quadratic(spin: number, tensor: Matrix3): ComplexMatrix {
  const axes = cartesianSpin(spin);
  const sum = complexMatrix(axes[0].rows, axes[0].rows);
  tensor.forEach((value, p) => addScaledInto(sum, multiplyComplex(axes[Math.floor(p / 3)], axes[p % 3]), value));
  return sum;
}

function diagonal(x: number, y: number, z: number): Matrix3 {
  return Float64Array.of(x, 0, 0, 0, y, 0, 0, 0, z);
}

function timesI(m: ComplexMatrix): ComplexMatrix {
  return complexMatrix(
    m.rows,
    m.columns,
    Float64Array.from(m.imag, (x) => -x),
    m.real,
  );
}

/** Ix, Iy, Iz of one spin, m from I down. */
function cartesianSpin(spin: number): [ComplexMatrix, ComplexMatrix, ComplexMatrix] {
  const size = 2 * spin + 1;
  const [x, y, z] = [complexMatrix(size, size), complexMatrix(size, size), complexMatrix(size, size)];
  for (let k = 0; k < size; k++) {
    const m = spin - k;
    z.real[k * size + k] = m;
    if (k === 0) continue;
    const ladder = Math.sqrt(spin * (spin + 1) - m * (m + 1)) / 2;
    x.real[(k - 1) * size + k] = x.real[k * size + k - 1] = ladder;
    y.imag[(k - 1) * size + k] = -ladder;
    y.imag[k * size + k - 1] = ladder;
  }
  return [x, y, z];
}

/** A sum of products of one-spin operators in the product basis, the first nucleus slowest. */
class OperatorSum {
  readonly matrix: ComplexMatrix;
  private readonly axes: [ComplexMatrix, ComplexMatrix, ComplexMatrix][];
  private readonly strides: number[];

  constructor(readonly space: SpinSpace) {
    this.matrix = complexMatrix(space.dimension, space.dimension);
    this.axes = space.spins.map(cartesianSpin);
    let stride = space.dimension;
    this.strides = space.spins.map((spin) => (stride /= 2 * spin + 1));
  }

  /** v.I of one nucleus. */
  addVector(row: number, vector: readonly [number, number, number]): void {
    vector.forEach((value, axis) => value !== 0 && this.add(value, row, this.axes[row][axis], row, ONE));
  }

  /** Ia.T.Ib */
  addProduct(a: number, b: number, tensor: Matrix3): void {
    tensor.forEach((value, p) => {
      if (value !== 0) this.add(value, a, this.axes[a][Math.floor(p / 3)], b, this.axes[b][p % 3]);
    });
  }

  addLocal(row: number, operator: ComplexMatrix): void {
    this.add(1, row, operator, row, ONE);
  }

  /** Adds value times the product of an operator of nucleus a and one of nucleus b. */
  private add(value: number, a: number, left: ComplexMatrix, b: number, right: ComplexMatrix): void {
    const { dimension } = this.space;
    const { real, imag } = this.matrix;
    const [strideA, strideB, n, m] = [this.strides[a], this.strides[b], left.rows, right.rows];
    for (let column = 0; column < dimension; column++) {
      const fromA = Math.floor(column / strideA) % n;
      const fromB = Math.floor(column / strideB) % m;
      for (let toA = 0, p = fromA; toA < n; toA++, p += n) {
        if (left.real[p] === 0 && left.imag[p] === 0) continue;
        for (let toB = 0, q = fromB; toB < m; toB++, q += m) {
          const at = (column + (toA - fromA) * strideA + (toB - fromB) * strideB) * dimension + column;
          real[at] += value * (left.real[p] * right.real[q] - left.imag[p] * right.imag[q]);
          imag[at] += value * (left.real[p] * right.imag[q] + left.imag[p] * right.real[q]);
        }
      }
    }
  }
}

/** Stands for the second nucleus where there is only one. */
const ONE = complexMatrix(1, 1, Float64Array.of(1));
