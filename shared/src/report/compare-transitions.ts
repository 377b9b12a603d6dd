import { adjoint, complexMatrix, multiplyComplex, type ComplexMatrix } from '../algebra/dense.js';
import { eigenHermitian } from '../algebra/eigen/hermitian.js';

/** How far the lines of one Hamiltonian lie from those of another. */
export interface TransitionComparison {
  /** Largest distance between a line and its counterpart, Hz. */
  readonly displacement: number;
  /** Largest difference in intensity, as a fraction of the strongest line. */
  readonly intensity: number;
}

/** Lines weaker than this fraction of the strongest are not looked at. */
const FAINTEST = 0.01;
/** Levels closer than this, Hz, count as degenerate. */
const DEGENERATE = 1e-5;

/**
 * Compares the lines that `lowering` allows under `approximate` with their counterparts under `exact`: levels correspond by the
 * largest overlap of their states, degenerate levels of `approximate` being resolved by `exact` first.
 */
export function compareTransitions(
  exact: ComplexMatrix,
  approximate: ComplexMatrix,
  lowering: ComplexMatrix,
): TransitionComparison {
  const from = resolved(eigenstates(approximate), exact);
  const to = eigenstates(exact);
  const partner = matchStates(from.states, to.states);
  const [before, after] = [intensities(from.states, lowering), intensities(to.states, lowering)];
  const strongest = before.reduce((most, value) => Math.max(most, value), 0);
  const n = exact.rows;
  let [displacement, intensity] = [0, 0];
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) {
      const expected = before[i * n + j];
      if (expected < FAINTEST * strongest) continue;
      const shift = to.energies[partner[j]] - to.energies[partner[i]] - (from.energies[j] - from.energies[i]);
      displacement = Math.max(displacement, Math.abs(shift));
      intensity = Math.max(intensity, Math.abs(after[partner[i] * n + partner[j]] - expected) / strongest);
    }
  }
  return { displacement, intensity };
}

/** Eigenstates as columns. */
interface Levels {
  readonly energies: Float64Array;
  readonly states: ComplexMatrix;
}

function eigenstates(hamiltonian: ComplexMatrix): Levels {
  const { values, vectors } = eigenHermitian(hamiltonian);
  const conjugated = adjoint(vectors);
  for (let p = 0; p < conjugated.imag.length; p++) conjugated.imag[p] = -conjugated.imag[p];
  return { energies: values, states: conjugated };
}

/** Turns the states within each degenerate set so that `exact` is diagonal there. */
function resolved({ energies, states }: Levels, exact: ComplexMatrix): Levels {
  const n = energies.length;
  const turned = complexMatrix(n, n, states.real.slice(), states.imag.slice());
  for (let first = 0, last = 0; first < n; first = last) {
    do last++;
    while (last < n && energies[last] - energies[last - 1] < DEGENERATE);
    if (last - first === 1) continue;
    const set = columns(states, first, last);
    const inside = multiplyComplex(adjoint(set), multiplyComplex(exact, set));
    setColumns(turned, first, multiplyComplex(set, eigenstates(inside).states));
  }
  return { energies, states: turned };
}

function columns(m: ComplexMatrix, first: number, last: number): ComplexMatrix {
  const width = last - first;
  const pick = (part: Float64Array) =>
    Float64Array.from(
      { length: m.rows * width },
      (_, p) => part[Math.floor(p / width) * m.columns + first + (p % width)],
    );
  return complexMatrix(m.rows, width, pick(m.real), pick(m.imag));
}

function setColumns(m: ComplexMatrix, first: number, set: ComplexMatrix): void {
  for (let row = 0; row < m.rows; row++) {
    for (let k = 0; k < set.columns; k++) {
      m.real[row * m.columns + first + k] = set.real[row * set.columns + k];
      m.imag[row * m.columns + first + k] = set.imag[row * set.columns + k];
    }
  }
}

/** |<i| lowering |j>|^2 for all pairs of states. */
function intensities(states: ComplexMatrix, lowering: ComplexMatrix): Float64Array {
  return squares(multiplyComplex(adjoint(states), multiplyComplex(lowering, states)));
}

function squares({ real, imag }: ComplexMatrix): Float64Array {
  return real.map((value, p) => value * value + imag[p] * imag[p]);
}

/** For each column of `from` the column of `to` that it overlaps most, each taken once, the largest overlaps first. */
function matchStates(from: ComplexMatrix, to: ComplexMatrix): Int32Array {
  const n = from.rows;
  const overlaps = squares(multiplyComplex(adjoint(from), to));
  const order = Array.from(overlaps.keys()).sort((p, q) => overlaps[q] - overlaps[p]);
  const partner = new Int32Array(n).fill(-1);
  const taken = new Uint8Array(n);
  for (const p of order) {
    const [i, k] = [Math.floor(p / n), p % n];
    if (partner[i] >= 0 || taken[k] === 1) continue;
    partner[i] = k;
    taken[k] = 1;
  }
  return partner;
}
