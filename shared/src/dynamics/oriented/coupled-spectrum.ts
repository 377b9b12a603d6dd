import type { SymmetricEigen } from '../../algebra/eigen/symmetric.js';
import { nuclide } from '../../nuclides/nuclides.js';
import { eigenSmall, type CoupledSpins, type Ladder, type RaisingEntries } from './coupled-spins.js';
import type { DecayClasses } from './decay-classes.js';
import type { DensityPreparation } from './density-preparation.js';
import type { DirectionalSpectrum } from './directional-spectrum.js';

/** What every form of the spectrum of coupled spins shares: eigenstates and <a|In+|b> along one direction. */
class LadderSolver {
  readonly transitions: number;
  readonly classes: number;
  readonly ladders: readonly Ladder[];
  /** 3/(dim I(I+1)) of the observed isotope. */
  readonly scale: number;
  private readonly eigen: SymmetricEigen[];
  private readonly needed: readonly number[];
  private readonly matrix: Float64Array;
  private readonly half: Float64Array;
  private readonly elements: Float64Array[];

  constructor(
    readonly coupled: CoupledSpins,
    observe: string,
    { lineWidths, classOf }: DecayClasses,
  ) {
    this.classes = lineWidths.length;
    const { classes } = this;
    const { spin } = nuclide(observe);
    this.scale = 3 / (coupled.dimension * spin * (spin + 1));
    this.ladders = coupled.ladders(observe, classOf, classes);
    const sizeOf = (block: number) => coupled.blocks[block].states.length;
    this.transitions = this.ladders.reduce((sum, { upper, lower }) => sum + sizeOf(upper) * sizeOf(lower), 0);
    this.needed = [...new Set(this.ladders.flatMap(({ upper, lower }) => [upper, lower]))];
    const largest = Math.max(...this.needed.map(sizeOf));
    this.eigen = [];
    this.matrix = new Float64Array(largest * largest);
    this.half = new Float64Array(largest);
    this.elements = Array.from({ length: classes }, () => new Float64Array(largest * largest));
  }

  /**
   * Calls `visit` for each ladder along `direction` with the eigenstates and, for each class, <a|In+|b> summed over its nuclei
   * (row a of the upper block, column b of the lower).
   */
  solve(
    direction: Float64Array,
    visit: (ladder: Ladder, upper: SymmetricEigen, lower: SymmetricEigen, elements: Float64Array[]) => void,
  ): void {
    const { coupled, eigen, matrix } = this;
    coupled.turnTo(direction[0], direction[1], direction[2]);
    for (const block of this.needed) {
      coupled.fillBlock(block, matrix);
      eigen[block] = eigenSmall(matrix, coupled.blocks[block].states.length);
    }
    for (const ladder of this.ladders) {
      const [upper, lower] = [eigen[ladder.upper], eigen[ladder.lower]];
      ladder.raising.forEach((entries, c) => this.fillElements(entries, upper, lower, this.elements[c]));
      visit(ladder, upper, lower, this.elements);
    }
  }

  private fillElements(entries: RaisingEntries, upper: SymmetricEigen, lower: SymmetricEigen, out: Float64Array): void {
    const { half } = this;
    const { i, j, factor } = entries;
    const [n, m] = [upper.values.length, lower.values.length];
    for (let a = 0; a < n; a++) {
      half.fill(0, 0, m);
      for (let e = 0; e < i.length; e++) half[j[e]] += factor[e] * upper.vectors[a * n + i[e]];
      for (let b = 0; b < m; b++) {
        let sum = 0;
        for (let l = 0; l < m; l++) sum += half[l] * lower.vectors[b * m + l];
        out[a * m + b] = sum;
      }
    }
  }
}

/**
 * Coupled spins after pulses only, where rho holds transverse magnetisation of all observed spins alike: amplitudes
 * 3/(2 dim I(I+1)) <a|In+|b> <b|F-|a> at E_a - E_b, one channel for each class of line widths.
 */
export function pulsedSpectrum(coupled: CoupledSpins, observe: string, decay: DecayClasses): DirectionalSpectrum {
  const solver = new LadderSolver(coupled, observe, decay);
  const { transitions, classes } = solver;
  return {
    transitions,
    channels: classes,
    evaluate(direction, frequency, amplitude) {
      let t = 0;
      solver.solve(direction, (_, upper, lower, elements) => {
        const [n, m] = [upper.values.length, lower.values.length];
        for (let a = 0; a < n; a++) {
          for (let b = 0; b < m; b++, t++) {
            frequency[t] = upper.values[a] - lower.values[b];
            let total = 0;
            for (const element of elements) total += element[a * m + b];
            for (let c = 0; c < classes; c++) {
              amplitude[c * transitions + t] = (solver.scale / 2) * total * elements[c][a * m + b];
            }
          }
        }
      });
    },
  };
}

/** Coupled spins after any preparation: a real and an imaginary channel for each class of line widths. */
export function preparedSpectrum(
  coupled: CoupledSpins,
  preparation: DensityPreparation,
  observe: string,
  decay: DecayClasses,
): DirectionalSpectrum {
  const solver = new LadderSolver(coupled, observe, decay);
  const { transitions, classes } = solver;
  return {
    transitions,
    channels: 2 * classes,
    evaluate(direction, frequency, amplitude) {
      const rho = preparation.prepare(direction);
      let t = 0;
      solver.solve(direction, (ladder, upper, lower, elements) => {
        const [up, low] = [coupled.blocks[ladder.upper].states, coupled.blocks[ladder.lower].states];
        const real = between(rho.real, lower, low, upper, up, coupled.dimension);
        const imag = between(rho.imag, lower, low, upper, up, coupled.dimension);
        const m = low.length;
        for (let a = 0; a < up.length; a++) {
          for (let b = 0; b < m; b++, t++) {
            frequency[t] = upper.values[a] - lower.values[b];
            for (let c = 0; c < classes; c++) {
              const factor = solver.scale * elements[c][a * m + b];
              amplitude[2 * c * transitions + t] = factor * real[a * m + b];
              amplitude[(2 * c + 1) * transitions + t] = factor * imag[a * m + b];
            }
          }
        }
      });
    },
  };
}

/** <b|rho|a> of the eigenstates of two blocks, row a, column b. */
function between(
  rho: Float64Array,
  lower: SymmetricEigen,
  low: Int32Array,
  upper: SymmetricEigen,
  up: Int32Array,
  dimension: number,
): Float64Array {
  const [n, m] = [up.length, low.length];
  const half = new Float64Array(n * m);
  for (let a = 0; a < n; a++) {
    for (let i = 0; i < n; i++) {
      const share = upper.vectors[a * n + i];
      for (let j = 0; j < m; j++) half[a * m + j] += share * rho[low[j] * dimension + up[i]];
    }
  }
  const out = new Float64Array(n * m);
  for (let a = 0; a < n; a++) {
    for (let b = 0; b < m; b++) {
      for (let j = 0; j < m; j++) out[a * m + b] += half[a * m + j] * lower.vectors[b * m + j];
    }
  }
  return out;
}
