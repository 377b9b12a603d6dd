import type { SpinSystem } from '../../documents/system.schema.js';
import { signedLarmorHz, type Frame } from '../../interactions/carriers.js';
import { nuclide } from '../../nuclides/nuclides.js';
import { mechanismsOf, quintuple, type Mechanism } from './mechanisms.js';
import { rankTwoParts, type LadderOperator, type OperatorPart } from './rank-two-operators.js';

/**
 * Redfield's relaxation superoperator for isotropic tumbling with one correlation time
 * (A. G. Redfield, IBM J. Res. Dev. 1 (1957) 19; M. Goldman, J. Magn. Reson. 149 (2001) 160):
 *
 *   Gamma rho = (2 pi)^2/5 sum over p of j(w_p) sum over mechanisms x, y of (Tx : Ty) [Ax_p, [Ay_p+, rho]]
 *
 * where Ax_p is the part of mechanism x's rank-2 spin operators that changes the order of every isotope by p, w_p the sum of
 * signed Larmor frequencies that goes with it, and Tx : Ty the sum over the elements of the two tensors. A symmetric traceless
 * tensor is a quintuple, so that the sum over all pairs of mechanisms is a scalar product of five sums over mechanisms. All
 * operators are real in the Zeeman basis and the set is closed under transposition, which leaves
 *
 *   Gamma rho = M rho + rho M - sum over p, k of L_pk rho L_pk^T,   M = 1/2 sum over p, k of L_pk L_pk^T.
 */

/** The five operators L_p1..L_p5 of one p, by column in the Zeeman basis of the whole system; they share their pattern. */
export interface RedfieldTerm {
  /** Column c holds entries `start[c]` to `start[c + 1]`. */
  readonly start: Uint32Array;
  readonly rows: Uint32Array;
  /** Five numbers an entry. */
  readonly values: Float64Array;
}

/** Spectral density j = tauC/(1 + w^2 tauC^2), s. */
export function spectralDensity(tauC: number, hz: number): number {
  return tauC / (1 + (2 * Math.PI * hz * tauC) ** 2);
}

/**
 * The operators of Gamma, s^-1/2, in the product basis of the system's nuclei (groups written out, the first nucleus slowest,
 * m from +I down). Needs `tumbling`; without mechanisms the list is empty.
 */
export function redfieldTerms(system: SpinSystem, frame: Frame): RedfieldTerm[] {
  const space = productSpace(system);
  const tauC = system.tumbling!.tauC;
  const builders = new Map<string, TermBuilder>();
  for (const mechanism of mechanismsOf(system, frame)) {
    const weights = quintuple(mechanism.tensor);
    for (const part of partsOf(mechanism, system)) {
      const orders = ordersOf(part, mechanism, system);
      const key = JSON.stringify([...orders]);
      let builder = builders.get(key);
      if (!builder) builders.set(key, (builder = new TermBuilder(space.dimension, rateFactor(orders, frame, tauC))));
      addPart(builder, space, mechanism, part, weights);
    }
  }
  return [...builders.values()].map((builder) => builder.finish());
}

/** The parts of a mechanism's rank-2 operators, for the spins of its nuclei. */
export function partsOf(mechanism: Mechanism, system: SpinSystem): OperatorPart[] {
  const spinOf = (row: number) => nuclide(system.nuclei[row].isotope).spin;
  const { kind, a } = mechanism;
  return rankTwoParts(kind, spinOf(a), spinOf(kind === 'dipolar' ? mechanism.b : a));
}

/** Change of the order of each isotope by one part, isotopes without change left out, sorted. */
export function ordersOf(part: OperatorPart, mechanism: Mechanism, system: SpinSystem): [string, number][] {
  const orders = new Map<string, number>();
  const add = (row: number, order: number) => {
    const { isotope } = system.nuclei[row];
    orders.set(isotope, (orders.get(isotope) ?? 0) + order);
  };
  add(mechanism.a, part.first.order);
  if (mechanism.kind === 'dipolar' && part.second) add(mechanism.b, part.second.order);
  return [...orders].filter(([, order]) => order !== 0).sort(([p], [q]) => (p < q ? -1 : 1));
}

/** (2 pi)^2/5 j(w_p) for p given by isotope: the factor of [A, [A+, rho]] for tensors in Hz. */
export function rateFactor(orders: readonly [string, number][], frame: Frame, tauC: number): number {
  const hz = orders.reduce((sum, [isotope, order]) => sum + order * signedLarmorHz(isotope, frame), 0);
  return ((2 * Math.PI) ** 2 / 5) * spectralDensity(tauC, hz);
}

/** The Zeeman basis of all nuclei, groups written out. */
interface ProductSpace {
  readonly dimension: number;
  /** By row of `system.nuclei`: levels of one spin, and the step in the basis from one of its levels to the next. */
  readonly levels: number[];
  readonly strides: number[];
}

function productSpace(system: SpinSystem): ProductSpace {
  const levels = system.nuclei.map(({ isotope }) => 2 * nuclide(isotope).spin + 1);
  const strides = new Array<number>(levels.length);
  let dimension = 1;
  for (let row = levels.length - 1; row >= 0; row--) {
    strides[row] = dimension;
    dimension *= levels[row] ** system.nuclei[row].count;
  }
  return { dimension, levels, strides };
}

/** Adds one part of a mechanism, times its quintuple, to the operators of its p. A mechanism's nuclei have count 1. */
function addPart(
  builder: TermBuilder,
  space: ProductSpace,
  mechanism: Mechanism,
  part: OperatorPart,
  weights: Float64Array,
): void {
  const rowB = mechanism.kind === 'dipolar' ? mechanism.b : -1;
  for (let column = 0; column < space.dimension; column++) {
    let factor = element(part.first, column, space, mechanism.a);
    let target = column - part.first.order * space.strides[mechanism.a];
    if (part.second) {
      factor *= element(part.second, column, space, rowB);
      target -= part.second.order * space.strides[rowB];
    }
    if (factor !== 0) builder.add(target, column, factor, weights);
  }
}

function element({ elements }: LadderOperator, state: number, { strides, levels }: ProductSpace, row: number): number {
  return elements[Math.floor(state / strides[row]) % levels[row]];
}

/** Collects the five operators of one p. */
class TermBuilder {
  private readonly entries: Map<number, Float64Array>[];

  constructor(
    private readonly dimension: number,
    private readonly rate: number,
  ) {
    this.entries = Array.from({ length: dimension }, () => new Map<number, Float64Array>());
  }

  add(row: number, column: number, factor: number, weights: Float64Array): void {
    const entries = this.entries[column];
    let values = entries.get(row);
    if (!values) entries.set(row, (values = new Float64Array(5)));
    for (let k = 0; k < 5; k++) values[k] += factor * weights[k];
  }

  /** [A,[A+,rho]] + [A+,[A,rho]] of the pair p, -p makes L = sqrt 2 A of each. */
  finish(): RedfieldTerm {
    const count = this.entries.reduce((sum, column) => sum + column.size, 0);
    const term = {
      start: new Uint32Array(this.dimension + 1),
      rows: new Uint32Array(count),
      values: new Float64Array(5 * count),
    };
    const scale = Math.sqrt(2 * this.rate);
    let at = 0;
    this.entries.forEach((column, c) => {
      for (const [row, values] of column) {
        term.rows[at] = row;
        for (let k = 0; k < 5; k++) term.values[5 * at + k] = scale * values[k];
        at++;
      }
      term.start[c + 1] = at;
    });
    return term;
  }
}
