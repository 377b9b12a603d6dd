import {
  addScaledInto,
  adjoint,
  complexIdentity,
  complexMatrix,
  kron,
  multiplyComplex,
  type ComplexMatrix,
} from '../../algebra/dense.js';
import { expmDense } from '../../algebra/expm-dense.js';
import type { Experiment, Step } from '../../documents/experiment.schema.js';
import { relativePolarisation, senseOf } from '../../interactions/carriers.js';
import { scansOf, type Scan, type ScanStep } from '../../sequence/steps.js';
import { eigenSmall, type CoupledSpins } from './coupled-spins.js';
import type { OrientedSpin } from './oriented-spins.js';
import { radians, receiverPhase } from './preparation.js';

type Pulse = Extract<Step, { pulse: unknown }>['pulse'];
type Saturation = Extract<Step, { saturate: unknown }>['saturate'];

/**
 * The density operator at the start of the signal, by propagation of rho_eq = sum (gamma/gamma_observed) Iz in the product
 * basis through the steps before it. Nothing relaxes during them.
 */
export class DensityPreparation {
  private readonly scans: readonly Scan[];
  private readonly equilibrium: ComplexMatrix;
  private readonly pulses = new Map<Pulse, ComplexMatrix>();
  private readonly settings = new Map<string, CoupledSpins>();

  /** `spinsWhile` gives the cluster under any setting of decoupling; all have the same spins. */
  constructor(
    private readonly experiment: Experiment,
    private readonly spinsWhile: (decoupled: readonly string[]) => CoupledSpins,
  ) {
    this.scans = scansOf(experiment);
    const coupled = this.coupled(experiment.decouple);
    const { spins, dimension } = coupled;
    const polarisations = spins.map(({ isotope }) => relativePolarisation(isotope, experiment.observe));
    this.equilibrium = complexMatrix(dimension, dimension);
    for (let s = 0; s < dimension; s++) {
      polarisations.forEach((polarisation, k) => {
        this.equilibrium.real[s * (dimension + 1)] += polarisation * coupled.projection(s, k);
      });
    }
  }

  /** Sum over the scans of weight i exp(-i receiver) rho for a field along `direction`. */
  prepare(direction: Float64Array): ComplexMatrix {
    const { dimension } = this.coupled(this.experiment.decouple);
    const sum = complexMatrix(dimension, dimension);
    for (const scan of this.scans) {
      let rho = this.equilibrium;
      let decoupled: readonly string[] = this.experiment.decouple;
      for (const step of scan.steps) {
        if ('decouple' in step) decoupled = step.decouple;
        else if (!('acquire' in step)) rho = this.after(step, rho, this.coupled(decoupled), direction);
      }
      addScaledInto(sum, turned(rho, radians(90 - receiverPhase(scan))), scan.weight);
    }
    return sum;
  }

  private coupled(decoupled: readonly string[]): CoupledSpins {
    const key = decoupled.join();
    const coupled = this.settings.get(key) ?? this.spinsWhile(decoupled);
    this.settings.set(key, coupled);
    return coupled;
  }

  private after(step: ScanStep, rho: ComplexMatrix, coupled: CoupledSpins, direction: Float64Array): ComplexMatrix {
    if ('delay' in step) {
      coupled.turnTo(direction[0], direction[1], direction[2]);
      return sandwich(evolution(coupled, step.delay), rho);
    }
    if ('spoil' in step) return keepWhere(rho, (row, column) => row === column);
    if ('select' in step) {
      const total = totals(coupled, step.select.on);
      return keepWhere(rho, (row, column) => total[row] - total[column] === step.select.order);
    }
    if ('pulse' in step && step.pulse.seconds === undefined) return sandwich(this.idealPulse(step.pulse, coupled), rho);
    const field =
      'pulse' in step ? this.pulseField(step.pulse) : 'saturate' in step ? saturation(step.saturate, coupled) : null;
    if (!field) return rho;
    coupled.turnTo(direction[0], direction[1], direction[2]);
    return sandwich(driven(coupled, field), rho);
  }

  private idealPulse(pulse: Pulse, { spins }: CoupledSpins): ComplexMatrix {
    const known = this.pulses.get(pulse);
    if (known) return known;
    const flip = radians(pulse.flip);
    const turn = spins
      .map((spin) => {
        const size = 2 * spin.spin + 1;
        return spin.isotope === pulse.on ? propagator(transverse(spin, pulse.phase), flip) : complexIdentity(size);
      })
      .reduce(kron);
    this.pulses.set(pulse, turn);
    return turn;
  }

  private pulseField({ on, flip, phase, seconds = 0, offsetHz = 0 }: Pulse): DrivingField {
    const shift = senseOf(on, this.experiment.observe) * offsetHz;
    return {
      isotope: on,
      drives: ({ isotope }) => isotope === on,
      nutation: flip / (360 * seconds),
      phase,
      shift,
      seconds,
    };
  }
}

/** A field of constant strength on some spins of an isotope. */
interface DrivingField {
  readonly isotope: string;
  readonly drives: (spin: OrientedSpin) => boolean;
  /** Hz */
  readonly nutation: number;
  /** degrees */
  readonly phase: number;
  /** Hz from the carrier, with the sense of precession. */
  readonly shift: number;
  readonly seconds: number;
}

/** A field on one nucleus at its isotropic shift; a cluster that does not hold it just evolves. */
function saturation({ nucleus, seconds, nutationHz }: Saturation, { spins }: CoupledSpins): DrivingField {
  const target = spins.find(({ id }) => id === nucleus);
  const drives = ({ id }: OrientedSpin) => id === nucleus;
  const { isotope, offset } = target ?? { isotope: '', offset: 0 };
  return { isotope, drives, nutation: nutationHz, phase: 0, shift: offset, seconds };
}

/** The propagator with all couplings and offsets on, in the frame of the field's own frequency, then back to that of the carrier. */
function driven(
  coupled: CoupledSpins,
  { isotope, drives, nutation, phase, shift, seconds }: DrivingField,
): ComplexMatrix {
  const { spins, dimension } = coupled;
  const total = totals(coupled, isotope);
  const hamiltonian = fullHamiltonian(coupled);
  for (let s = 0; s < dimension; s++) hamiltonian.real[s * (dimension + 1)] -= shift * total[s];
  spins.forEach((spin, k) => {
    if (!drives(spin)) return;
    const field = spins
      .map((other, l) => (l === k ? transverse(spin, phase) : complexIdentity(2 * other.spin + 1)))
      .reduce(kron);
    addScaledInto(hamiltonian, field, nutation);
  });
  const during = propagator(hamiltonian, 2 * Math.PI * seconds);
  for (let s = 0; s < dimension; s++) {
    const angle = -2 * Math.PI * shift * seconds * total[s];
    const [c, sine] = [Math.cos(angle), Math.sin(angle)];
    for (let p = s * dimension; p < (s + 1) * dimension; p++) {
      const re = during.real[p];
      during.real[p] = c * re - sine * during.imag[p];
      during.imag[p] = sine * re + c * during.imag[p];
    }
  }
  return during;
}

/** Ix cos(phase) + Iy sin(phase) of one spin, states m = I .. -I. */
function transverse({ spin: I }: OrientedSpin, phase: number): ComplexMatrix {
  const size = 2 * I + 1;
  const out = complexMatrix(size, size);
  for (let l = 0; l + 1 < size; l++) {
    const m = I - l;
    const half = Math.sqrt(I * (I + 1) - m * (m - 1)) / 2;
    const [upper, lower] = [l * size + l + 1, (l + 1) * size + l];
    out.real[upper] = out.real[lower] = half * Math.cos(radians(phase));
    out.imag[upper] = -half * Math.sin(radians(phase));
    out.imag[lower] = half * Math.sin(radians(phase));
  }
  return out;
}

/** exp(-i angle A) */
function propagator(a: ComplexMatrix, angle: number): ComplexMatrix {
  const exponent = complexMatrix(a.rows, a.rows);
  for (let p = 0; p < a.real.length; p++) {
    exponent.real[p] = angle * a.imag[p];
    exponent.imag[p] = -angle * a.real[p];
  }
  return expmDense(exponent);
}

/** exp(-2 pi i H t), block by block. */
function evolution(coupled: CoupledSpins, seconds: number): ComplexMatrix {
  const { dimension } = coupled;
  const out = complexMatrix(dimension, dimension);
  coupled.blocks.forEach(({ states }, block) => {
    const n = states.length;
    const { values, vectors } = eigenSmall(coupled.blockMatrix(block), n);
    for (let k = 0; k < n; k++) {
      const angle = -2 * Math.PI * values[k] * seconds;
      const [c, s] = [Math.cos(angle), Math.sin(angle)];
      for (let i = 0; i < n; i++) {
        for (let j = 0; j < n; j++) {
          const share = vectors[k * n + i] * vectors[k * n + j];
          const place = states[i] * dimension + states[j];
          out.real[place] += c * share;
          out.imag[place] += s * share;
        }
      }
    }
  });
  return out;
}

function fullHamiltonian(coupled: CoupledSpins): ComplexMatrix {
  const { dimension } = coupled;
  const out = complexMatrix(dimension, dimension);
  coupled.blocks.forEach(({ states }, block) => {
    const n = states.length;
    const matrix = coupled.blockMatrix(block);
    for (let i = 0; i < n; i++) {
      for (let j = 0; j <= i; j++) {
        out.real[states[i] * dimension + states[j]] = matrix[i * n + j];
        out.real[states[j] * dimension + states[i]] = matrix[i * n + j];
      }
    }
  });
  return out;
}

/** Total projection of an isotope in each product state. */
function totals(coupled: CoupledSpins, isotope: string): Float64Array {
  return Float64Array.from({ length: coupled.dimension }, (_, s) =>
    coupled.spins.reduce((sum, spin, k) => (spin.isotope === isotope ? sum + coupled.projection(s, k) : sum), 0),
  );
}

/** U rho U+ */
function sandwich(u: ComplexMatrix, rho: ComplexMatrix): ComplexMatrix {
  return multiplyComplex(multiplyComplex(u, rho), adjoint(u));
}

function keepWhere(rho: ComplexMatrix, kept: (row: number, column: number) => boolean): ComplexMatrix {
  const out = complexMatrix(rho.rows, rho.rows, rho.real.slice(), rho.imag.slice());
  for (let p = 0; p < out.real.length; p++) {
    if (!kept(Math.floor(p / rho.rows), p % rho.rows)) out.real[p] = out.imag[p] = 0;
  }
  return out;
}

/** exp(i angle) rho */
function turned(rho: ComplexMatrix, angle: number): ComplexMatrix {
  const [c, s] = [Math.cos(angle), Math.sin(angle)];
  const out = complexMatrix(rho.rows, rho.rows);
  for (let p = 0; p < out.real.length; p++) {
    out.real[p] = c * rho.real[p] - s * rho.imag[p];
    out.imag[p] = s * rho.real[p] + c * rho.imag[p];
  }
  return out;
}
