import { expAction, type KrylovCounts } from '../../algebra/krylov.js';
import type { SparseComplex } from '../../algebra/sparse.js';
import { offsetsOf, relativePolarisation, senseOf } from '../../interactions/carriers.js';
import { EngineError, type RunContext } from '../../run/context.js';
import type { ComplexArray } from '../../run/solved.js';
import type { ScanStep } from '../../sequence/steps.js';
import {
  addSticks,
  driveClosed,
  eigenGroup,
  evolveClosed,
  toEigenstates,
  type EigenGroup,
} from './closed-evolution.js';
import { Density } from './density.js';
import { hamiltoniansOf, isClosed, type Ensemble } from './ensemble.js';
import { generatorOf } from './generator.js';
import type { DrivingField, SparseHamiltonian } from './hamiltonian.js';
import { neededOrders, type NeededOrders } from './needed-orders.js';
import {
  type Repeated,
  evolutionSeconds,
  evolveVector,
  evolveWithSource,
  samplingSeconds,
  signalsOf,
  TOLERANCE,
} from './open-evolution.js';
import { applyPulse, isotopeTotals, rotateAboutZ } from './rotations.js';
import { adjointBlocks, coherenceBlocks, everyCoherence, raising, type CoherenceBlock } from './spin-space.js';

const RADIANS = Math.PI / 180;

/** Nuclei that decay alike by line width while the signal is recorded. */
export interface DetectionClass {
  readonly lineWidth: number;
  readonly rows: readonly number[];
}

/** Runs scans on one ensemble; keeps what scans share: blocks, Hamiltonians, eigenstates, generators, propagators. */
export class ScanRunner {
  readonly counts: KrylovCounts = { products: 0 };
  largestMatrix = 0;
  private readonly closed: boolean;
  private readonly blocks: readonly CoherenceBlock[];
  /** For each block the one with kets and bras exchanged, whose elements a Hermitian rho has as well. */
  private readonly adjoints: Uint32Array;
  /** Whether rho is Hermitian at this step; a selection of one order ends that. */
  private hermitian = true;
  private readonly hamiltonians = new Map<string, SparseHamiltonian[]>();
  private readonly generators = new Map<string, SparseComplex>();
  private readonly evolutions = new Map<string, Repeated>();
  private readonly groups = new Map<string, EigenGroup>();
  private readonly totals: ReadonlyMap<string, Float64Array>;

  constructor(
    private readonly ensemble: Ensemble,
    private readonly detection: readonly DetectionClass[],
    private readonly context: RunContext,
  ) {
    const { space, states, flips } = ensemble;
    const bytes = 16 * states.length * space.dimension ** 2 * 3;
    if (context.limits && bytes > context.limits.bytes) throw tooLarge(bytes, undefined);
    this.closed = isClosed(ensemble);
    this.blocks = coherenceBlocks(space, !flips);
    this.adjoints = adjointBlocks(this.blocks, space.dimension);
    const isotopes = [...new Set(space.particles.map(({ isotope }) => isotope))];
    this.totals = new Map(isotopes.map((isotope) => [isotope, isotopeTotals(space, isotope)]));
  }

  /** The signal of one scan, one array a detection class, receiver phase not yet applied to `line-width` decay. */
  run(steps: readonly ScanStep[], onProgress: (fraction: number) => void): ComplexArray[] {
    const { experiment, system } = this.ensemble;
    const isotopeOf = (id: string) => system.nuclei.find((nucleus) => nucleus.id === id)!.isotope;
    const needed = neededOrders(steps, [...this.totals.keys()], experiment.observe, isotopeOf);
    let decoupled: readonly string[] = experiment.decouple;
    let rho = this.equilibrium();
    this.hermitian = true;
    for (const [i, step] of steps.entries()) {
      if ('pulse' in step) this.pulse(rho, step.pulse, decoupled);
      else if ('delay' in step) this.delay(rho, step.delay, decoupled, needed[i]);
      else if ('spoil' in step) rho.keep((ket, bra) => ket === bra);
      else if ('select' in step) this.select(rho, step.select.on, step.select.order);
      else if ('decouple' in step) decoupled = step.decouple;
      else if ('saturate' in step) this.saturate(rho, step.saturate, decoupled);
      else if ('polarise' in step) rho = this.polarised(step.polarise.from);
      else return this.acquire(rho, step.acquire.phase * RADIANS, decoupled, onProgress);
      this.context.tick(0);
    }
    throw new EngineError('UNSUPPORTED', 'a sequence ends by acquiring', 'sequence.steps');
  }

  private equilibrium(): Density {
    const { states, space, populations, equilibrium } = this.ensemble;
    const rho = new Density(states.length, space.dimension);
    populations.forEach((population, s) => {
      for (let k = 0; k < space.dimension; k++) rho.real[rho.at(s, k, k)] = population * equilibrium[k];
    });
    return rho;
  }

  /** -(g_from/g_observed) Fy of the observed isotope. */
  private polarised(from: string): Density {
    const { states, space, populations, experiment } = this.ensemble;
    const rho = new Density(states.length, space.dimension);
    const factor = -relativePolarisation(from, experiment.observe);
    space.particles.forEach(({ isotope, spin }, p) => {
      if (isotope !== experiment.observe) return;
      for (let bra = 0; bra < space.dimension; bra++) {
        const up = raising(spin, space.projections[bra * space.particles.length + p]);
        if (up === 0) continue;
        const ket = bra - space.strides[p];
        populations.forEach((population, s) => {
          // Iy = (I+ - I-)/2i
          rho.imag[rho.at(s, ket, bra)] -= (population * factor * up) / 2;
          rho.imag[rho.at(s, bra, ket)] += (population * factor * up) / 2;
        });
      }
    });
    return rho;
  }

  private select(rho: Density, isotope: string, order: number): void {
    const totals = this.totals.get(isotope);
    this.hermitian &&= order === 0;
    rho.keep((ket, bra) => Math.abs((totals ? totals[ket] - totals[bra] : 0) - order) < 0.25);
  }

  private pulse(
    rho: Density,
    { on, flip, phase, seconds, offsetHz = 0 }: Extract<ScanStep, { pulse: unknown }>['pulse'],
    decoupled: readonly string[],
  ): void {
    const { space, experiment } = this.ensemble;
    if (seconds === undefined) {
      applyPulse(rho, space, on, flip * RADIANS, phase * RADIANS);
      return;
    }
    const field: DrivingField = { nutationHz: flip / 360 / seconds, drives: ({ isotope }) => isotope === on };
    const shiftHz = offsetHz * senseOf(on, experiment.observe);
    // The field along x does the same as along the phase when the spins are turned there and back.
    rotateAboutZ(rho, space, on, -phase * RADIANS);
    this.drive(rho, { isotope: on, shiftHz, field }, seconds, decoupled);
    rotateAboutZ(rho, space, on, phase * RADIANS + 2 * Math.PI * shiftHz * seconds);
  }

  /** A field on one nucleus, turning with it. */
  private saturate(
    rho: Density,
    { nucleus, seconds, nutationHz }: Extract<ScanStep, { saturate: unknown }>['saturate'],
    decoupled: readonly string[],
  ): void {
    const { system, experiment, space } = this.ensemble;
    const row = system.nuclei.findIndex(({ id }) => id === nucleus);
    if (!space.particles.some((particle) => particle.row === row)) {
      this.delay(rho, seconds, decoupled, new Map());
      return;
    }
    const { isotope } = system.nuclei[row];
    const shiftHz = offsetsOf(system, experiment)[row];
    const field: DrivingField = { nutationHz, drives: (particle) => particle.row === row };
    this.drive(rho, { isotope, shiftHz, field }, seconds, decoupled);
    rotateAboutZ(rho, space, isotope, 2 * Math.PI * shiftHz * seconds);
  }

  /** All interactions, relaxation and exchange while a field is on, in the frame that turns with the field. */
  private drive(
    rho: Density,
    driving: { isotope: string; shiftHz: number; field: DrivingField },
    seconds: number,
    decoupled: readonly string[],
  ): void {
    const hamiltonians = hamiltoniansOf(this.ensemble, decoupled, driving);
    if (this.closed) hamiltonians.forEach((h, s) => driveClosed(rho, s, h, seconds));
    else this.driveOpen(rho, hamiltonians, seconds);
  }

  private driveOpen(rho: Density, hamiltonians: readonly SparseHamiltonian[], seconds: number): void {
    const { space, states, populations, equilibrium, rates, relaxation } = this.ensemble;
    const n = space.dimension;
    const all = everyCoherence(n);
    const gamma = relaxation?.(all);
    const source = new Float64Array(states.length * n * n);
    if (gamma) {
      populations.forEach((population, s) => {
        for (let i = 0; i < n * n; i++) {
          for (let p = gamma.start[i]; p < gamma.start[i + 1]; p++) {
            const j = gamma.columns[p];
            if (all.kets[j] === all.bras[j])
              source[s * n * n + i] += population * gamma.values[p] * equilibrium[all.kets[j]];
          }
        }
      });
    }
    const free = generatorOf(n, all, hamiltonians, gamma, rates);
    this.note(free, evolutionSeconds(free, seconds));
    const driven = evolveWithSource(free, rho, source, this.populationsOf(free.size), seconds, this.counts);
    if (driven) {
      rho.real.set(driven.real);
      rho.imag.set(driven.imag);
      return;
    }
    const generator = generatorOf(n, all, hamiltonians, gamma, rates, source);
    const v = { real: new Float64Array(generator.size), imag: new Float64Array(generator.size) };
    v.real.set(rho.real);
    v.imag.set(rho.imag);
    v.real[generator.size - 1] = 1;
    const out = expAction(generator, v, seconds, TOLERANCE, this.counts);
    rho.real.set(out.real.subarray(0, rho.real.length));
    rho.imag.set(out.imag.subarray(0, rho.imag.length));
  }

  private delay(rho: Density, seconds: number, decoupled: readonly string[], needed: NeededOrders): void {
    if (seconds === 0) return;
    this.offEquilibrium(rho, -1);
    this.blocks.forEach((block, b) => {
      if (!this.matters(block, needed)) return;
      const mirrored = this.hermitian && this.adjoints[b] !== b;
      if (mirrored && this.adjoints[b] < b && this.matters(this.blocks[this.adjoints[b]], needed)) return;
      const v = rho.gather(block);
      if (!v) return;
      const out = this.closed ? this.closedDelay(b, v, seconds, decoupled) : this.openDelay(b, v, seconds, decoupled);
      rho.scatter(block, out);
      if (mirrored) rho.scatterAdjoint(block, out);
    });
    this.offEquilibrium(rho, 1);
  }

  /** Relaxation leads to equilibrium, which free evolution leaves as it is: what evolves is the difference from it. */
  private offEquilibrium(rho: Density, sign: 1 | -1): void {
    const { relaxation, populations, equilibrium, space } = this.ensemble;
    if (!relaxation) return;
    populations.forEach((population, s) => {
      for (let k = 0; k < space.dimension; k++) rho.real[rho.at(s, k, k)] += sign * population * equilibrium[k];
    });
  }

  private openDelay(b: number, v: ComplexArray, seconds: number, decoupled: readonly string[]): ComplexArray {
    const generator = this.generator(b, decoupled);
    this.note(generator, evolutionSeconds(generator, seconds));
    const key = `${b}|${seconds}|${decoupled.join()}`;
    const populations = this.populationsOf(generator.size);
    let repeated = this.evolutions.get(key);
    if (!repeated) this.evolutions.set(key, (repeated = { spent: 0 }));
    return evolveVector(generator, v, seconds, populations, repeated, this.counts);
  }

  private closedDelay(b: number, v: ComplexArray, seconds: number, decoupled: readonly string[]): ComplexArray {
    const count = this.blocks[b].kets.length;
    const out = { real: new Float64Array(v.real.length), imag: new Float64Array(v.real.length) };
    this.ensemble.states.forEach((_, s) => {
      const { ket, bra } = this.eigenPair(b, s, decoupled);
      const part = evolveClosed(ket, bra, slice(v, s, count), seconds);
      out.real.set(part.real, s * count);
      out.imag.set(part.imag, s * count);
    });
    return out;
  }

  private acquire(
    rho: Density,
    phase: number,
    decoupled: readonly string[],
    onProgress: (fraction: number) => void,
  ): ComplexArray[] {
    const { experiment } = this.ensemble;
    const { points } = experiment.acquisition;
    const signals = this.detection.map(() => ({ real: new Float64Array(points), imag: new Float64Array(points) }));
    const needed = neededOrders([{ acquire: { phase: 0 } }], [...this.totals.keys()], experiment.observe, () => '')[0];
    const wanted = [...this.blocks.keys()].filter((b) => this.matters(this.blocks[b], needed));
    wanted.forEach((b, done) => {
      const v = rho.gather(this.blocks[b]);
      if (!v) return;
      const probes = this.detection.map(({ rows }) => this.probe(this.blocks[b], rows));
      if (probes.every((probe) => probe.every((x) => x === 0))) return;
      if (this.closed) this.closedSignals(b, v, probes, decoupled, signals);
      else {
        const within = (fraction: number) => onProgress((done + fraction) / wanted.length);
        addTo(signals, this.openSignals(b, v, probes, decoupled, within));
      }
    });
    // s = i exp(-i receiver phase) x sum: turn every sample.
    const [cos, sin] = [Math.sin(phase), Math.cos(phase)];
    for (const { real, imag } of signals) {
      for (let k = 0; k < points; k++) {
        const re = real[k];
        real[k] = cos * re - sin * imag[k];
        imag[k] = cos * imag[k] + sin * re;
      }
    }
    return signals;
  }

  private openSignals(
    b: number,
    v: ComplexArray,
    probes: readonly Float64Array[],
    decoupled: readonly string[],
    onProgress: (fraction: number) => void,
  ): ComplexArray[] {
    const { states, experiment } = this.ensemble;
    const { points, width } = experiment.acquisition;
    const sampling = { dwell: 1 / width, points };
    const generator = this.generator(b, decoupled);
    this.note(generator, samplingSeconds(generator, sampling));
    const everyState = probes.map((probe) => {
      const all = new Float64Array(states.length * probe.length);
      for (let s = 0; s < states.length; s++) all.set(probe, s * probe.length);
      return all;
    });
    return signalsOf(generator, v, everyState, this.populationsOf(generator.size), sampling, this.counts, onProgress);
  }

  /** The population of its exchange state for each of `size` elements. */
  private populationsOf(size: number): Float64Array {
    const { populations } = this.ensemble;
    return Float64Array.from({ length: size }, (_, i) => populations[Math.floor((i * populations.length) / size)]);
  }

  /** Sticks at E_bra - E_ket with amplitude probe times rho, both among eigenstates. */
  private closedSignals(
    b: number,
    v: ComplexArray,
    probes: readonly Float64Array[],
    decoupled: readonly string[],
    signals: readonly ComplexArray[],
  ): void {
    const { points, width } = this.ensemble.experiment.acquisition;
    const count = this.blocks[b].kets.length;
    this.ensemble.states.forEach((_, s) => {
      const { ket, bra } = this.eigenPair(b, s, decoupled);
      const part = slice(v, s, count);
      const real = toEigenstates(ket, bra, part.real);
      const imag = toEigenstates(ket, bra, part.imag);
      const hz = new Float64Array(count);
      ket.energies.forEach((energy, i) =>
        bra.energies.forEach((other, j) => (hz[i * bra.energies.length + j] = other - energy)),
      );
      probes.forEach((probe, c) => {
        const weights = toEigenstates(ket, bra, probe);
        addSticks(
          signals[c],
          hz,
          weights.map((w, i) => w * real[i]),
          weights.map((w, i) => w * imag[i]),
          points,
          width,
        );
      });
    });
  }

  private eigenPair(b: number, s: number, decoupled: readonly string[]): { ket: EigenGroup; bra: EigenGroup } {
    const { kets, bras } = this.blocks[b];
    const group = (members: Uint32Array): EigenGroup => {
      const key = `${members[0]}|${s}|${decoupled.join()}`;
      let found = this.groups.get(key);
      if (!found) this.groups.set(key, (found = eigenGroup(this.hamiltoniansFor(decoupled)[s], members)));
      this.largestMatrix = Math.max(this.largestMatrix, members.length);
      return found;
    };
    return { ket: group(Uint32Array.from(new Set(kets))), bra: group(Uint32Array.from(new Set(bras))) };
  }

  private hamiltoniansFor(decoupled: readonly string[]): SparseHamiltonian[] {
    const key = decoupled.join();
    let found = this.hamiltonians.get(key);
    if (!found) this.hamiltonians.set(key, (found = hamiltoniansOf(this.ensemble, decoupled)));
    return found;
  }

  private generator(b: number, decoupled: readonly string[]): SparseComplex {
    const key = `${b}|${decoupled.join()}`;
    let found = this.generators.get(key);
    if (!found) {
      const { space, rates, relaxation } = this.ensemble;
      const block = this.blocks[b];
      found = generatorOf(space.dimension, block, this.hamiltoniansFor(decoupled), relaxation?.(block), rates);
      this.generators.set(key, found);
    }
    return found;
  }

  private note(generator: SparseComplex, seconds: number): void {
    this.largestMatrix = Math.max(this.largestMatrix, generator.size);
    const { limits } = this.context;
    if (limits && seconds > limits.seconds) throw tooLarge(undefined, seconds);
  }

  /** <bra|sum of I+|ket> for every coherence: what Tr(I+ rho) takes of it. */
  private probe({ kets, bras }: CoherenceBlock, rows: readonly number[]): Float64Array {
    const { particles, projections, strides } = this.ensemble.space;
    const out = new Float64Array(kets.length);
    particles.forEach(({ row, spin }, p) => {
      if (!rows.includes(row)) return;
      for (let i = 0; i < kets.length; i++) {
        if (bras[i] !== kets[i] - strides[p]) continue;
        out[i] += raising(spin, projections[kets[i] * particles.length + p]);
      }
    });
    return out;
  }

  private matters({ orders, kets, bras }: CoherenceBlock, needed: NeededOrders): boolean {
    if (orders.length === 0) return false;
    for (const [isotope, order] of needed) {
      const totals = this.totals.get(isotope);
      if (totals && Math.abs(totals[kets[0]] - totals[bras[0]] - order) > 0.25) return false;
    }
    return true;
  }
}

function tooLarge(bytes: number | undefined, seconds: number | undefined): EngineError {
  const need = bytes === undefined ? `about ${Math.round(seconds!)} s` : `about ${Math.round(bytes / 2 ** 20)} MiB`;
  return new EngineError(
    'TOO_LARGE',
    `this sequence on these coupled nuclei needs ${need}, more than a run may take`,
    'nuclei',
  );
}

function slice({ real, imag }: ComplexArray, s: number, count: number): ComplexArray {
  return { real: real.subarray(s * count, (s + 1) * count), imag: imag.subarray(s * count, (s + 1) * count) };
}

function addTo(sums: readonly ComplexArray[], parts: readonly ComplexArray[]): void {
  sums.forEach((sum, c) => {
    for (let k = 0; k < sum.real.length; k++) {
      sum.real[k] += parts[c].real[k];
      sum.imag[k] += parts[c].imag[k];
    }
  });
}
