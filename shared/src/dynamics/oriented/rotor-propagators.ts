import { complexMatrix, type ComplexMatrix } from '../../algebra/dense.js';
import type { CoupledSpins } from './coupled-spins.js';
import { eigenUnitary } from './eigen-unitary.js';
import type { RotorCone } from './rotor.js';

/** Periodic parts of the Floquet states of one block: |a>(theta) exp(-2 pi i energy_a t) solves the equation of motion. */
export interface FloquetStates {
  /** Quasi-energies, Hz. */
  readonly energies: Float64Array;
  /** Component i of state a at rotor phase 2 pi k/steps: entry (k * size + a) * size + i. */
  readonly real: Float64Array;
  readonly imag: Float64Array;
}

/** Gauss-Legendre points of a step, as fractions of it. */
const POINTS = [0.5 - Math.sqrt(3) / 6, 0.5 + Math.sqrt(3) / 6];

/**
 * Propagates blocks through one rotor period in equal steps by the Magnus expansion to fourth order with two Gauss points a
 * step (A. Iserles & S. P. Norsett, Phil. Trans. R. Soc. A 357, 983 (1999)):
 *   U -> exp(-i pi h (H1 + H2) + (2 pi h)^2 sqrt(3)/12 [H1, H2]) U,  H in Hz.
 */
export class RotorPropagators {
  private readonly sizes: readonly number[];
  private readonly states: readonly FloquetStates[];
  private readonly propagators: readonly { real: Float64Array; imag: Float64Array }[];
  private readonly fields: readonly [Float64Array, Float64Array][];
  private readonly scratch: StepScratch;

  /** `blocks` are those that are needed. */
  constructor(
    private readonly coupled: CoupledSpins,
    private readonly blocks: readonly number[],
    private readonly steps: number,
    private readonly rate: number,
  ) {
    this.sizes = blocks.map((block) => coupled.blocks[block].states.length);
    this.states = this.sizes.map((n) => ({
      energies: new Float64Array(n),
      real: new Float64Array(steps * n * n),
      imag: new Float64Array(steps * n * n),
    }));
    const room = () =>
      this.sizes.map((n) => ({
        real: new Float64Array((steps + 1) * n * n),
        imag: new Float64Array((steps + 1) * n * n),
      }));
    this.propagators = room();
    this.fields = this.sizes.map((n) => [new Float64Array(n * n), new Float64Array(n * n)]);
    this.scratch = stepScratch(Math.max(...this.sizes));
  }

  /** The Floquet states of each block for a rotor axis given by the cone; overwritten by the next call. */
  statesAbout(cone: RotorCone): readonly FloquetStates[] {
    this.propagators.forEach(({ real, imag }, b) => {
      const n = this.sizes[b];
      real.fill(0, 0, n * n);
      imag.fill(0, 0, n * n);
      for (let i = 0; i < n; i++) real[i * (n + 1)] = 1;
    });
    for (let k = 0; k < this.steps; k++) {
      POINTS.forEach((point, which) => this.turnTo((2 * Math.PI * (k + point)) / this.steps, cone, which));
      this.blocks.forEach((_, b) => this.step(b, k));
    }
    this.blocks.forEach((_, b) => this.findStates(b));
    return this.states;
  }

  private turnTo(theta: number, { along, cosine, sine }: RotorCone, which: number): void {
    const [c, s] = [Math.cos(theta), Math.sin(theta)];
    this.coupled.turnTo(
      along[0] + c * cosine[0] + s * sine[0],
      along[1] + c * cosine[1] + s * sine[1],
      along[2] + c * cosine[2] + s * sine[2],
    );
    this.blocks.forEach((block, b) => this.coupled.fillBlock(block, this.fields[b][which]));
  }

  private step(b: number, k: number): void {
    const n = this.sizes[b];
    const { real, imag } = this.propagators[b];
    const mean = fillExponent(this.fields[b], n, (2 * Math.PI) / (this.rate * this.steps), this.scratch);
    if (n === 2) applyRotation(real, imag, 4 * k, this.scratch);
    else applyExponential(n, real, imag, k * n * n, this.scratch);
    const [c, s] = [Math.cos(mean), -Math.sin(mean)];
    for (let p = (k + 1) * n * n; p < (k + 2) * n * n; p++) {
      const re = real[p];
      real[p] = c * re - s * imag[p];
      imag[p] = s * re + c * imag[p];
    }
  }

  private findStates(b: number): void {
    const n = this.sizes[b];
    const { steps } = this;
    const { real, imag } = this.propagators[b];
    const states = this.states[b];
    const { angles, vectors } = eigenUnitary(periodOf(n, steps, real, imag));
    for (let a = 0; a < n; a++) {
      states.energies[a] = (-angles[a] * this.rate) / (2 * Math.PI);
      for (let k = 0; k < steps; k++) {
        const turn = (-angles[a] * k) / steps;
        const c = Math.cos(turn);
        const s = Math.sin(turn);
        for (let i = 0; i < n; i++) {
          let re = 0;
          let im = 0;
          for (let l = 0, p = (k * n + i) * n, q = a * n; l < n; l++, p++, q++) {
            re += real[p] * vectors.real[q] - imag[p] * vectors.imag[q];
            im += real[p] * vectors.imag[q] + imag[p] * vectors.real[q];
          }
          states.real[(k * n + a) * n + i] = c * re - s * im;
          states.imag[(k * n + a) * n + i] = s * re + c * im;
        }
      }
    }
  }
}

function periodOf(n: number, steps: number, real: Float64Array, imag: Float64Array): ComplexMatrix {
  const [from, to] = [steps * n * n, (steps + 1) * n * n];
  return complexMatrix(n, n, real.slice(from, to), imag.slice(from, to));
}

/** Room for the exponent -i S + K, S symmetric and K antisymmetric, and for the terms of its series. */
interface StepScratch {
  readonly symmetric: Float64Array;
  readonly antisymmetric: Float64Array;
  readonly term: [Float64Array, Float64Array];
  readonly next: [Float64Array, Float64Array];
}

function stepScratch(n: number): StepScratch {
  const room = () => new Float64Array(n * n);
  return { symmetric: room(), antisymmetric: room(), term: [room(), room()], next: [room(), room()] };
}

/** Sets the exponent for `turn` = 2 pi h from the lower triangles of H1 and H2; returns the mean of S, which is taken out. */
function fillExponent(
  [first, second]: [Float64Array, Float64Array],
  n: number,
  turn: number,
  { symmetric, antisymmetric }: StepScratch,
): number {
  let mean = 0;
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < i; j++) {
      first[j * n + i] = first[i * n + j];
      second[j * n + i] = second[i * n + j];
    }
    mean += (turn / 2 / n) * (first[i * (n + 1)] + second[i * (n + 1)]);
  }
  const factor = (turn * turn * Math.sqrt(3)) / 12;
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) {
      symmetric[i * n + j] = (turn / 2) * (first[i * n + j] + second[i * n + j]) - (i === j ? mean : 0);
      let commutator = 0;
      if (i !== j)
        for (let l = 0; l < n; l++)
          commutator += first[i * n + l] * second[l * n + j] - second[i * n + l] * first[l * n + j];
      antisymmetric[i * n + j] = factor * commutator;
    }
  }
  return mean;
}

/**
 * `applyExponential` for two states, the most common case, in closed form: with S = a sz + b sx and K = i k sy in Pauli matrices
 * it is a rotation by 2r about (b, -k, a), r^2 = a^2 + b^2 + k^2.
 */
function applyRotation(real: Float64Array, imag: Float64Array, from: number, scratch: StepScratch): void {
  const a = scratch.symmetric[0];
  const b = scratch.symmetric[1];
  const k = scratch.antisymmetric[1];
  const r = Math.sqrt(a * a + b * b + k * k);
  const c = Math.cos(r);
  const s = r === 0 ? 1 : Math.sin(r) / r;
  for (let j = 0; j < 2; j++) {
    const ur = real[from + j];
    const ui = imag[from + j];
    const lr = real[from + 2 + j];
    const li = imag[from + 2 + j];
    real[from + 4 + j] = c * ur + s * (a * ui + k * lr + b * li);
    imag[from + 4 + j] = c * ui + s * (k * li - a * ur - b * lr);
    real[from + 6 + j] = c * lr + s * (b * ui - k * ur - a * li);
    imag[from + 6 + j] = c * li + s * (a * lr - k * ui - b * ur);
  }
}

/** U at `from` + n^2 becomes exp(-i S + K) times U at `from`, by the Taylor series. */
function applyExponential(n: number, real: Float64Array, imag: Float64Array, from: number, scratch: StepScratch): void {
  const { symmetric: S, antisymmetric: K } = scratch;
  let [term, next] = [scratch.term, scratch.next];
  const size = n * n;
  for (let p = 0; p < size; p++) {
    real[from + size + p] = term[0][p] = real[from + p];
    imag[from + size + p] = term[1][p] = imag[from + p];
  }
  for (let order = 1; order <= MOST_TERMS; order++) {
    const [re0, im0] = term;
    const [re1, im1] = next;
    re1.fill(0, 0, size);
    im1.fill(0, 0, size);
    for (let i = 0, p = 0; i < n; i++) {
      for (let l = 0; l < n; l++, p++) {
        const s = S[p] / order;
        const k = K[p] / order;
        if (s === 0 && k === 0) continue;
        for (let q = i * n, r = l * n; r < (l + 1) * n; q++, r++) {
          re1[q] += s * im0[r] + k * re0[r];
          im1[q] += k * im0[r] - s * re0[r];
        }
      }
    }
    let largest = 0;
    for (let p = 0; p < size; p++) {
      real[from + size + p] += re1[p];
      imag[from + size + p] += im1[p];
      largest = Math.max(largest, Math.abs(re1[p]), Math.abs(im1[p]));
    }
    if (largest < NEGLIGIBLE) return;
    const spent = term;
    term = next;
    next = spent;
  }
}

/** The series of an exponent below 2 is at rounding error by then; steps are chosen so. */
const MOST_TERMS = 40;
const NEGLIGIBLE = 1e-14;
