import FFT from 'fft.js';
import { nuclide } from '../../nuclides/nuclides.js';
import { gaussProduct } from '../../orientations/gauss-product.js';
import type { Domain } from '../../orientations/symmetry.js';
import type { CoupledSpins, Ladder } from './coupled-spins.js';
import type { DecayClasses } from './decay-classes.js';
import type { Job } from './job.js';
import { rotorCone } from './rotor.js';
import { RotorPropagators, type FloquetStates } from './rotor-propagators.js';
import { highestOrder } from './sidebands.js';
import { quadratureJob, type Spinning } from './spinning-surfaces.js';
import type { TrianglePattern } from './triangle-pattern.js';

/**
 * A spinning powder of coupled spins. With q_ab^N the Fourier components round the rotor of <a|In+|b> between Floquet states and
 * Q_ab^N those of all observed spins, the mean over rotor phases is lines at energy_a - energy_b + N rate of intensity
 * q_ab^N conj(Q_ab^N) (M. H. Levitt & M. Eden, Mol. Phys. 95, 879 (1998)). Opposite rotor axes exchange the two factors, so that
 * over the hemisphere the real part counts.
 */
export function coupledSpinningJob(
  coupled: CoupledSpins,
  domain: Domain,
  observe: string,
  sample: Spinning,
  classes: DecayClasses,
  weight: number,
): Job {
  const { spin } = nuclide(observe);
  const scale = (3 * weight) / (2 * coupled.dimension * spin * (spin + 1));
  const ladders = coupled.ladders(observe, classes.classOf, classes.lineWidths.length);
  const steps = rotorSteps(coupled, ladders, sample.rateHz);
  const blocks = [...new Set(ladders.flatMap(({ upper, lower }) => [upper, lower]))];
  const propagators = new RotorPropagators(coupled, blocks, steps, sample.rateHz);
  const lines = new LadderLines(steps, sample.rateHz, classes.lineWidths.length);
  const cone = rotorCone(sample.angle);
  const sizeOf = (block: number) => coupled.blocks[block].states.length;
  const transitions = ladders.reduce((sum, { upper, lower }) => sum + sizeOf(upper) * sizeOf(lower), 0);
  return quadratureJob(sample.orientations, domain, transitions, (direction, share, patterns) => {
    cone.setAxis(direction);
    const states = propagators.statesAbout(cone);
    for (const ladder of ladders) {
      const [upper, lower] = [states[blocks.indexOf(ladder.upper)], states[blocks.indexOf(ladder.lower)]];
      lines.add(ladder, upper, lower, scale * share, patterns);
    }
  });
}

/** Steps of a period, a power of two: enough for all sidebands and for the propagators. */
function rotorSteps(coupled: CoupledSpins, ladders: readonly Ladder[], rate: number): number {
  const range = frequencyRange(coupled, ladders);
  const wanted = Math.max(2 * highestOrder(range, rate) + 2, STEPS_PER_TURN * (range / rate));
  let steps = 32;
  while (steps < wanted) steps *= 2;
  return steps;
}

/** Steps for each turn of the fastest coherence in a period. Found by trial: the lines are then exact to about 1e-6. */
const STEPS_PER_TURN = 4;
/** Directions that are tried for the range of frequencies, and what is allowed for those between. */
const TRIED = 64;
const ALLOWANCE = 1.15;

/** Range of the single-quantum frequencies over the sphere, flip-flop terms included, Hz. */
function frequencyRange(coupled: CoupledSpins, ladders: readonly Ladder[]): number {
  const { directions, count } = gaussProduct(TRIED, 'hemisphere');
  let [low, high, flips] = [Infinity, -Infinity, 0];
  for (let k = 0; k < count; k++) {
    coupled.turnTo(directions[3 * k], directions[3 * k + 1], directions[3 * k + 2]);
    flips = Math.max(flips, coupled.largestFlipFlop());
    for (const { upper, lower, raising } of ladders) {
      for (const { i, j } of raising) {
        for (let e = 0; e < i.length; e++) {
          const hz =
            coupled.energies[coupled.blocks[upper].states[i[e]]] - coupled.energies[coupled.blocks[lower].states[j[e]]];
          low = Math.min(low, hz);
          high = Math.max(high, hz);
        }
      }
    }
  }
  return ALLOWANCE * (high - low + 2 * flips);
}

/** Lines between the Floquet states of two blocks. */
class LadderLines {
  private readonly transform: FFT;
  private readonly series: Float64Array;
  private readonly components: Float64Array[];
  private readonly total: Float64Array;

  constructor(
    private readonly steps: number,
    private readonly rate: number,
    classes: number,
  ) {
    this.transform = new FFT(steps);
    this.series = new Float64Array(2 * steps);
    this.components = Array.from({ length: classes }, () => new Float64Array(2 * steps));
    this.total = new Float64Array(2 * steps);
  }

  add(
    ladder: Ladder,
    upper: FloquetStates,
    lower: FloquetStates,
    scale: number,
    patterns: readonly TrianglePattern[],
  ): void {
    const { steps, components, total } = this;
    const norm = scale / (steps * steps);
    for (let a = 0; a < upper.energies.length; a++) {
      for (let b = 0; b < lower.energies.length; b++) {
        total.fill(0);
        ladder.raising.forEach((_, c) => {
          this.fillComponents(ladder, c, upper, lower, a, b);
          for (let p = 0; p < 2 * steps; p++) total[p] += components[c][p];
        });
        const centre = upper.energies[a] - lower.energies[b];
        for (let k = 0; k < steps; k++) {
          const hz = centre + (k < steps / 2 ? k : k - steps) * this.rate;
          components.forEach((one, c) => {
            const intensity = norm * (one[2 * k] * total[2 * k] + one[2 * k + 1] * total[2 * k + 1]);
            if (Math.abs(intensity) > NEGLIGIBLE) patterns[c].addStick(hz, intensity);
          });
        }
      }
    }
  }

  /** Fourier components round the rotor of <a|In+|b> of class `c`, times the number of steps. */
  private fillComponents(
    ladder: Ladder,
    c: number,
    upper: FloquetStates,
    lower: FloquetStates,
    a: number,
    b: number,
  ): void {
    const { steps, series } = this;
    const { i, j, factor } = ladder.raising[c];
    const [n, m] = [upper.energies.length, lower.energies.length];
    for (let k = 0; k < steps; k++) {
      const from = (k * n + a) * n;
      const to = (k * m + b) * m;
      let re = 0;
      let im = 0;
      for (let e = 0; e < i.length; e++) {
        const ur = upper.real[from + i[e]];
        const ui = upper.imag[from + i[e]];
        const lr = lower.real[to + j[e]];
        const li = lower.imag[to + j[e]];
        re += factor[e] * (ur * lr + ui * li);
        im += factor[e] * (ur * li - ui * lr);
      }
      series[2 * k] = re;
      series[2 * k + 1] = im;
    }
    this.transform.transform(this.components[c], series);
  }
}

/** Lines below this many nuclei are left out. */
const NEGLIGIBLE = 1e-13;
