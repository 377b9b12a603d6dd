import type { SpinSystem } from '../../documents/system.schema.js';
import type { Frame } from '../../interactions/carriers.js';
import { nuclide } from '../../nuclides/nuclides.js';
import { ladderOperators } from './rank-two-operators.js';
import { redfieldMatrix, type Coherences } from './redfield-matrix.js';
import { redfieldTerms, type RedfieldTerm } from './redfield.js';
import type { SparseRows } from './sparse-rows.js';

/**
 * Matrix elements of Gamma between operators of one spin, s^-1. Different mechanisms do not interfere in them, so that each is a
 * sum over fragments of one or two nuclei.
 */

/** A part of the system: `rows` of `system.nuclei`, with the mechanisms that `of` lets through. */
interface Fragment {
  readonly rows: readonly number[];
  readonly system: SpinSystem;
}

export interface OneSpinRates {
  /** R_nm of dIz_n/dt = -sum over m of R_nm (Iz_m - equilibrium), row-major over `system.nuclei`. */
  readonly longitudinal: Float64Array;
  /** Decay of each I-. */
  readonly transverse: Float64Array;
}

export function oneSpinRates(system: SpinSystem, frame: Frame): OneSpinRates {
  const n = system.nuclei.length;
  const longitudinal = new Float64Array(n * n);
  const transverse = new Float64Array(n);
  for (const { rows, system: part } of fragments(system)) {
    const levels = rows.map((_, k) => projections(part, k));
    const terms = redfieldTerms(part, frame);
    const decays = new Map<string, SingleQuantum>();
    rows.forEach((row, k) => {
      const size = norm(levels[k]);
      rows.forEach((other, l) => (longitudinal[row * n + other] += exchanged(terms, levels[k], levels[l]) / size));
      const { isotope } = part.nuclei[k];
      if (!decays.has(isotope)) decays.set(isotope, singleQuantum(part, k, terms));
      const decay = decays.get(isotope)!;
      const lowering = loweringElements(part, k, decay.set);
      transverse[row] += overlap(decay, lowering, lowering);
    });
  }
  return { longitudinal, transverse };
}

/** Tr(X Gamma Y) of diagonal X and Y: 1/2 sum over the entries L_rc of |L_rc|^2 (x_r - x_c)(y_r - y_c). */
function exchanged(terms: readonly RedfieldTerm[], x: Float64Array, y: Float64Array): number {
  let sum = 0;
  for (const { start, rows, values } of terms) {
    for (let c = 0; c < x.length; c++) {
      for (let p = start[c]; p < start[c + 1]; p++) {
        const steps = (x[rows[p]] - x[c]) * (y[rows[p]] - y[c]);
        if (steps === 0) continue;
        for (let k = 5 * p; k < 5 * p + 5; k++) sum += (values[k] * values[k] * steps) / 2;
      }
    }
  }
  return sum;
}

/** Rate from I- of a nucleus to its antiphase I- Sz beside a dipolar partner, both operators normalised alike (2 I- Sz for S = 1/2). */
export function crossCorrelatedRate(system: SpinSystem, frame: Frame, row: number, partner: number): number {
  const part = fragmentOf(system, [row, partner], true);
  const decay = singleQuantum(part, 0, redfieldTerms(part, frame));
  const lowering = loweringElements(part, 0, decay.set);
  const other = projections(part, 1);
  const antiphase = lowering.map((element, i) => element * other[decay.set.kets[i]]);
  return overlap(decay, antiphase, lowering) * Math.sqrt(norm(antiphase) / norm(lowering));
}

/** x.Gamma y / sum of x^2 over a closed set of coherences. */
function overlap({ gamma: { start, columns, values } }: SingleQuantum, x: Float64Array, y: Float64Array): number {
  let sum = 0;
  for (let i = 0; i < x.length; i++) {
    for (let p = start[i]; p < start[i + 1]; p++) sum += x[i] * values[p] * y[columns[p]];
  }
  return sum / norm(x);
}

function norm(x: Float64Array): number {
  return x.reduce((sum, value) => sum + value * value, 0);
}

/** The system taken apart into pairs with a dipolar coupling and single nuclei with their own tensors. */
function fragments(system: SpinSystem): Fragment[] {
  const row = new Map(system.nuclei.map(({ id }, index) => [id, index]));
  const pairs = system.couplings.flatMap(({ between, dipolar }) => {
    const rows = between.map((id) => row.get(id)!);
    return dipolar === undefined ? [] : [{ rows, system: fragmentOf(system, rows, false) }];
  });
  const single = system.nuclei.flatMap(({ csa, quadrupole }, index) =>
    csa || quadrupole ? [{ rows: [index], system: fragmentOf(system, [index], true) }] : [],
  );
  return [...pairs, ...single];
}

/** The nuclei `rows` and the coupling between them; their own tensors only where `tensors` is set. */
function fragmentOf(system: SpinSystem, rows: readonly number[], tensors: boolean): SpinSystem {
  const nuclei = rows.map((row) =>
    tensors ? system.nuclei[row] : { ...system.nuclei[row], csa: undefined, quadrupole: undefined },
  );
  const ids = nuclei.map(({ id }) => id);
  return {
    ...system,
    nuclei,
    couplings: system.couplings.filter(({ between }) => between.every((id) => ids.includes(id))),
  };
}

/** Levels m of nucleus `row` in each state of the product basis. */
function projections(part: SpinSystem, row: number): Float64Array {
  const levels = part.nuclei.map(({ isotope }) => 2 * nuclide(isotope).spin + 1);
  const stride = levels.slice(row + 1).reduce((product, size) => product * size, 1);
  const dimension = levels.reduce((product, size) => product * size, 1);
  return Float64Array.from(
    { length: dimension },
    (_, state) => (levels[row] - 1) / 2 - (Math.floor(state / stride) % levels[row]),
  );
}

/** A closed set of coherences with Gamma on it. */
interface SingleQuantum {
  readonly set: Coherences;
  readonly gamma: SparseRows;
}

/** All |r><c| of order -1 of the nucleus's isotope and 0 of the others. */
function singleQuantum(part: SpinSystem, own: number, terms: readonly RedfieldTerm[]): SingleQuantum {
  const { isotope } = part.nuclei[own];
  const all = part.nuclei.map((nucleus, row) => ({
    order: nucleus.isotope === isotope,
    levels: projections(part, row),
  }));
  const orderOf = (r: number, c: number, of: boolean) =>
    all.reduce((sum, { order, levels }) => sum + (order === of ? levels[r] - levels[c] : 0), 0);
  const [kets, bras]: [number[], number[]] = [[], []];
  const dimension = all[0].levels.length;
  for (let r = 0; r < dimension; r++) {
    for (let c = 0; c < dimension; c++) {
      if (orderOf(r, c, true) !== -1 || orderOf(r, c, false) !== 0) continue;
      kets.push(r);
      bras.push(c);
    }
  }
  const set = { kets, bras };
  return { set, gamma: redfieldMatrix(terms, dimension, set) };
}

/** <ket| I- |bra> of one nucleus, the others unchanged. */
function loweringElements(part: SpinSystem, own: number, { kets, bras }: Coherences): Float64Array {
  const { spin } = nuclide(part.nuclei[own].isotope);
  const { minus } = ladderOperators(spin);
  const levels = part.nuclei.map((_, row) => projections(part, row));
  return Float64Array.from({ length: kets.length }, (_, i) => {
    const [ket, bra] = [kets[i], bras[i]];
    const alone = levels.every((m, row) => (row === own ? m[ket] === m[bra] - 1 : m[ket] === m[bra]));
    return alone ? minus.elements[spin - levels[own][bra]] : 0;
  });
}
