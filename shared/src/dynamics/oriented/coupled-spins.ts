import { eigenSymmetric, type SymmetricEigen } from '../../algebra/eigen/symmetric.js';
import { innerProduct3, multiply3, type Matrix3 } from '../../algebra/rotation.js';
import { joined, type OrientedPair, type OrientedSpin, type SpinCluster } from './oriented-spins.js';
import { quadratic, quadrupolarShift } from './surfaces.js';

/** Product states among which the Hamiltonian acts: each set of like, coupled spins keeps its total projection. */
export interface Block {
  /** Product states, ascending; in a product state the first spin varies slowest and projections fall. */
  readonly states: Int32Array;
  /** Flip-flop elements below the diagonal: place = row * size + column, the pair, and <row|Ia+Ib- + Ia-Ib+|column>. */
  readonly flips: readonly { place: number; pair: number; factor: number }[];
}

/** <upper i|In+|lower j> of the observed spins of one class, entry by entry. */
export interface RaisingEntries {
  readonly i: Int32Array;
  readonly j: Int32Array;
  readonly factor: Float64Array;
}

/** Two blocks that the observed In+ join, with the elements of each class of line widths. */
export interface Ladder {
  readonly upper: number;
  readonly lower: number;
  readonly raising: readonly RaisingEntries[];
}

/**
 * A cluster in the product basis. `turnTo` sets the field direction; after that `energies` are the diagonal of the secular
 * Hamiltonian in Hz and `fillBlock` writes its blocks. With second-order quadrupolar shifts where asked for.
 */
export class CoupledSpins {
  readonly dimension: number;
  readonly spins: readonly OrientedSpin[];
  readonly blocks: readonly Block[];
  /** Diagonal of the Hamiltonian, by product state, Hz. */
  readonly energies: Float64Array;
  private readonly pairs: readonly OrientedPair[];
  private readonly strides: readonly number[];
  private readonly quadrupoles: readonly (QuadrupolarLevels | null)[];
  private readonly levels: readonly Float64Array[];
  /** Level of each spin in each product state. */
  private readonly places: readonly Uint8Array[];
  private readonly products: readonly Float64Array[];
  private readonly flipFlop: Float64Array;

  constructor(cluster: SpinCluster) {
    this.spins = cluster.spins;
    this.pairs = cluster.pairs;
    const sizes = this.spins.map(({ spin }) => 2 * spin + 1);
    this.strides = sizes.map((_, k) => sizes.slice(k + 1).reduce((product, size) => product * size, 1));
    this.dimension = sizes.reduce((product, size) => product * size, 1);
    this.energies = new Float64Array(this.dimension);
    this.quadrupoles = this.spins.map((spin) => spin.quadrupole && quadrupolarLevels(spin, spin.quadrupole));
    this.levels = sizes.map((size) => new Float64Array(size));
    this.places = sizes.map((_, k) => Uint8Array.from({ length: this.dimension }, (_, s) => this.levelOf(s, k)));
    this.flipFlop = new Float64Array(this.pairs.length);
    this.products = this.pairs.map(({ a, b }) =>
      Float64Array.from({ length: this.dimension }, (_, s) => this.projection(s, a) * this.projection(s, b)),
    );
    this.blocks = this.findBlocks();
  }

  /** Projection of spin k in a product state. */
  projection(state: number, k: number): number {
    return this.spins[k].spin - this.levelOf(state, k);
  }

  /** Sets the field along the unit vector (x, y, z), seen from the molecule. */
  turnTo(x: number, y: number, z: number): void {
    const { energies, spins, levels, places, pairs } = this;
    energies.fill(0);
    for (let k = 0; k < spins.length; k++) {
      const { spin, offset, shift } = spins[k];
      const own = levels[k];
      const zeeman = offset + (shift ? quadratic(shift, x, y, z) : 0);
      for (let l = 0; l < own.length; l++) own[l] = zeeman * (spin - l);
      this.quadrupoles[k]?.addTo(own, x, y, z);
      const place = places[k];
      for (let s = 0; s < energies.length; s++) energies[s] += own[place[s]];
    }
    for (let p = 0; p < pairs.length; p++) {
      const { j, dipolar, like } = pairs[p];
      const d = dipolar ? quadratic(dipolar, x, y, z) : 0;
      const product = this.products[p];
      for (let s = 0; s < energies.length; s++) energies[s] += (j + d) * product[s];
      this.flipFlop[p] = like ? j / 2 - d / 4 : 0;
    }
  }

  /** Largest sum of flip-flop elements in a row, a bound, along the field direction set last, Hz. */
  largestFlipFlop(): number {
    let largest = 0;
    for (const { states, flips } of this.blocks) {
      const rows = new Float64Array(states.length);
      for (const { place, pair, factor } of flips) {
        const size = Math.abs(this.flipFlop[pair] * factor);
        rows[Math.floor(place / states.length)] += size;
        rows[place % states.length] += size;
      }
      largest = rows.reduce((most, row) => Math.max(most, row), largest);
    }
    return largest;
  }

  /** Writes block `index`, size x size, row-major, to `out`: the lower triangle and the diagonal, zeros above. */
  fillBlock(index: number, out: Float64Array): void {
    const { states, flips } = this.blocks[index];
    const size = states.length;
    out.fill(0, 0, size * size);
    for (let i = 0; i < size; i++) out[i * size + i] = this.energies[states[i]];
    for (const { place, pair, factor } of flips) out[place] += this.flipFlop[pair] * factor;
  }

  /** `fillBlock` to a matrix of its own. */
  blockMatrix(index: number): Float64Array {
    const size = this.blocks[index].states.length;
    const out = new Float64Array(size * size);
    this.fillBlock(index, out);
    return out;
  }

  /** The pairs of blocks joined by In+ of the spins of `isotope`; `classOf` a row of the system, of `classes` line widths. */
  ladders(isotope: string, classOf: (row: number) => number, classes: number): Ladder[] {
    const home = this.homes();
    const ladders = new Map<string, { upper: number; lower: number; lists: RaisingList[] }>();
    for (let state = 0; state < this.dimension; state++) {
      this.spins.forEach(({ isotope: own, spin, row }, k) => {
        const m = this.projection(state, k);
        if (own !== isotope || m === spin) return;
        const [upper, lower] = [home[state - this.strides[k]], home[state]];
        const key = `${upper.block},${lower.block}`;
        const lists = ladders.get(key)?.lists ?? Array.from({ length: classes }, () => ({ i: [], j: [], factor: [] }));
        ladders.set(key, { upper: upper.block, lower: lower.block, lists });
        const list: RaisingList = lists[classOf(row)];
        list.i.push(upper.place);
        list.j.push(lower.place);
        list.factor.push(Math.sqrt(spin * (spin + 1) - m * (m + 1)));
      });
    }
    return [...ladders.values()].map(({ upper, lower, lists }) => ({
      upper,
      lower,
      raising: lists.map(({ i, j, factor }) => ({
        i: Int32Array.from(i),
        j: Int32Array.from(j),
        factor: Float64Array.from(factor),
      })),
    }));
  }

  private levelOf(state: number, k: number): number {
    return Math.floor(state / this.strides[k]) % (2 * this.spins[k].spin + 1);
  }

  /** Block and place in it of each product state. */
  private homes(): { block: number; place: number }[] {
    const home = new Array<{ block: number; place: number }>(this.dimension);
    this.blocks.forEach(({ states }, block) => states.forEach((state, place) => (home[state] = { block, place })));
    return home;
  }

  private findBlocks(): Block[] {
    const label = joined(
      this.spins.length,
      this.pairs.filter(({ like }) => like),
    );
    const byKey = new Map<string, number[]>();
    for (let state = 0; state < this.dimension; state++) {
      const totals = this.spins.map(() => 0);
      this.spins.forEach((_, k) => (totals[label[k]] += this.levelOf(state, k)));
      const key = totals.join();
      byKey.set(key, [...(byKey.get(key) ?? []), state]);
    }
    return [...byKey.values()].map((states) => ({ states: Int32Array.from(states), flips: this.flipsAmong(states) }));
  }

  private flipsAmong(states: readonly number[]): Block['flips'] {
    const place = new Map(states.map((state, index) => [state, index]));
    return this.pairs.flatMap(({ a, b, like }, pair) => {
      if (!like) return [];
      return states.flatMap((state, column) => {
        // Ia- Ib+ leads to a later state: the first spin varies slowest.
        const [ma, mb] = [this.projection(state, a), this.projection(state, b)];
        const [Ia, Ib] = [this.spins[a].spin, this.spins[b].spin];
        const factor = Math.sqrt((Ia * (Ia + 1) - ma * (ma - 1)) * (Ib * (Ib + 1) - mb * (mb + 1)));
        if (factor === 0) return [];
        const row = place.get(state + this.strides[a] - this.strides[b])!;
        return [{ place: row * states.length + column, pair, factor }];
      });
    });
  }
}

interface RaisingList {
  i: number[];
  j: number[];
  factor: number[];
}

interface QuadrupolarLevels {
  /** Adds the quadrupolar energies along (x, y, z) to the levels m = I .. -I, Hz. */
  addTo(levels: Float64Array, x: number, y: number, z: number): void;
}

function quadrupolarLevels(spin: OrientedSpin, Q: Matrix3): QuadrupolarLevels {
  const I = spin.spin;
  const square = multiply3(Q, Q);
  const invariant = innerProduct3(Q, Q);
  const ladder = Array.from({ length: 2 * I + 1 }, (_, l) => quadrupolarShift(spin, I - l));
  return {
    addTo(levels, x, y, z) {
      const q = quadratic(Q, x, y, z);
      const s = quadratic(square, x, y, z);
      for (let l = 0; l < levels.length; l++) {
        const m = I - l;
        const { single, double } = ladder[l];
        // n.adj(Q).n = n.Q^2.n - tr(Q^2)/2 for a traceless Q.
        levels[l] +=
          (q / 2) * (3 * m * m - I * (I + 1)) + single * (s - q * q) + double * (q * q - 4 * s + 2 * invariant);
      }
    },
  };
}

/** `eigenSymmetric` with the smallest cases written out. */
export function eigenSmall(a: Float64Array, n: number): SymmetricEigen {
  if (n === 1) return { values: Float64Array.of(a[0]), vectors: Float64Array.of(1) };
  if (n > 2) return eigenSymmetric(a, n);
  // Jacobi rotation, values ascending.
  const half = (a[0] - a[3]) / 2;
  const angle = Math.atan2(a[2], half) / 2;
  const [c, s] = [Math.cos(angle), Math.sin(angle)];
  const [mean, radius] = [(a[0] + a[3]) / 2, Math.hypot(half, a[2])];
  return { values: Float64Array.of(mean - radius, mean + radius), vectors: Float64Array.of(-s, c, c, s) };
}
