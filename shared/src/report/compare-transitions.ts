import { adjoint, complexMatrix, multiplyComplex, type ComplexMatrix } from '../algebra/dense.js';
import { eigenHermitian } from '../algebra/eigen/hermitian.js';
import { connected, type Link } from '../dynamics/liouville/fragments.js';

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
 * largest overlap of their states, degenerate levels of `approximate` being resolved by `exact` first. Sets of basis states that
 * neither joins are treated apart.
 */
export function compareTransitions(
  exact: ComplexMatrix,
  approximate: ComplexMatrix,
  lowering: ComplexMatrix,
): TransitionComparison {
  const sets = separateSets(exact, approximate).map((members) => matchedLevels(exact, approximate, members));
  const lines = sets.flatMap((upper) => sets.flatMap((lower) => linesBetween(lower, upper, lowering)));
  const strongest = lines.reduce((most, { expected }) => Math.max(most, expected), 0);
  const seen = lines.filter(({ expected }) => expected >= FAINTEST * strongest && expected > 0);
  return {
    displacement: seen.reduce((most, { shift }) => Math.max(most, Math.abs(shift)), 0),
    intensity: seen.reduce((most, { expected, found }) => Math.max(most, Math.abs(found - expected) / strongest), 0),
  };
}

interface ComparedLine {
  /** Intensities under the approximate and the exact Hamiltonian. */
  readonly expected: number;
  readonly found: number;
  /** Hz, exact less approximate. */
  readonly shift: number;
}

/** One set of basis states with its levels under both Hamiltonians, counterparts in one order. */
interface MatchedLevels {
  readonly members: readonly number[];
  readonly from: Levels;
  readonly to: Levels;
}

function matchedLevels(exact: ComplexMatrix, approximate: ComplexMatrix, members: readonly number[]): MatchedLevels {
  const inside = block(exact, members, members);
  const from = resolved(eigenstates(block(approximate, members, members)), inside);
  const to = eigenstates(inside);
  const partner = matchStates(from.states, to.states);
  const n = members.length;
  const sorted = complexMatrix(n, n);
  partner.forEach((k, i) => setColumns(sorted, i, columns(to.states, k, k + 1)));
  return { members, from, to: { energies: Float64Array.from(partner, (k) => to.energies[k]), states: sorted } };
}

/** Lines from the levels of `upper` to those of `lower`. */
function linesBetween(lower: MatchedLevels, upper: MatchedLevels, lowering: ComplexMatrix): ComparedLine[] {
  const between = block(lowering, lower.members, upper.members);
  if (between.real.every((x) => x === 0)) return [];
  const before = intensities(lower.from.states, between, upper.from.states);
  const after = intensities(lower.to.states, between, upper.to.states);
  const m = upper.members.length;
  return Array.from(before, (expected, p) => {
    const [i, j] = [Math.floor(p / m), p % m];
    const frequency = (levels: 'from' | 'to') => upper[levels].energies[j] - lower[levels].energies[i];
    return { expected, found: after[p], shift: frequency('to') - frequency('from') };
  });
}

/** Smallest sets of basis states that no element of either matrix leaves. */
function separateSets(a: ComplexMatrix, b: ComplexMatrix): number[][] {
  const n = a.rows;
  const links: Link[] = [];
  for (let p = 0; p < n * n; p++) {
    if (a.real[p] !== 0 || a.imag[p] !== 0 || b.real[p] !== 0 || b.imag[p] !== 0) {
      links.push({ a: Math.floor(p / n), b: p % n });
    }
  }
  return connected(n, links);
}

function block(m: ComplexMatrix, rows: readonly number[], across: readonly number[]): ComplexMatrix {
  const out = complexMatrix(rows.length, across.length);
  rows.forEach((row, i) => {
    across.forEach((column, j) => {
      out.real[i * across.length + j] = m.real[row * m.columns + column];
      out.imag[i * across.length + j] = m.imag[row * m.columns + column];
    });
  });
  return out;
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
function intensities(lower: ComplexMatrix, lowering: ComplexMatrix, upper: ComplexMatrix): Float64Array {
  return squares(multiplyComplex(adjoint(lower), multiplyComplex(lowering, upper)));
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
