import type { Experiment } from '../../documents/experiment.schema.js';
import type { ExchangeState, SpinSystem } from '../../documents/system.schema.js';
import { offsetsOf, relativePolarisation } from '../../interactions/carriers.js';
import { couplingsOf } from '../../interactions/scalar.js';
import { nuclide } from '../../nuclides/nuclides.js';
import { totalSpinComponents } from '../blocks/total-spin.js';
import { rateMatrix } from '../exchange/rate-matrix.js';
import { redfieldMatrix } from '../relaxation/redfield-matrix.js';
import { redfieldTerms } from '../relaxation/redfield.js';
import type { SparseRows } from '../relaxation/sparse-rows.js';
import { connected } from './fragments.js';
import { sparseHamiltonian, type DrivingField, type SparseHamiltonian } from './hamiltonian.js';
import { nucleusRates, randomFieldMatrix } from './random-field.js';
import { expandedParticles, spinSpace, type CoherenceBlock, type Particle, type SpinSpace } from './spin-space.js';

/** One fragment of the system in one sector of total spins: everything that its dynamics needs. */
export interface Ensemble {
  readonly system: SpinSystem;
  readonly experiment: Experiment;
  readonly space: SpinSpace;
  /** Multiplicity of the sector over the dimension of the whole fragment: Tr over the fragment is this times Tr over the sector. */
  readonly weight: number;
  readonly states: readonly (ExchangeState | undefined)[];
  readonly populations: readonly number[];
  /** Exchange rates between states, columns summing to zero. */
  readonly rates: Float64Array;
  /** rho_eq, diagonal. */
  readonly equilibrium: Float64Array;
  /** Gamma on a block of coherences; undefined where nothing relaxes while spins evolve. */
  readonly relaxation?: (block: Pick<CoherenceBlock, 'kets' | 'bras'>) => SparseRows;
  /** Whether relaxation flips spins, so that only orders are kept. */
  readonly flips: boolean;
}

/** Whether neither relaxation nor exchange acts, so that every state evolves by its own Hamiltonian. */
export function isClosed({ relaxation, rates }: Ensemble): boolean {
  return !relaxation && rates.every((rate) => rate === 0);
}

/** The ensembles of one fragment: one, or one for each choice of total spins of its groups. */
export function ensemblesOf(system: SpinSystem, experiment: Experiment, rows: readonly number[]): Ensemble[] {
  const states = system.states ?? [undefined];
  const dimension = rows.reduce((product, row) => {
    const { isotope, count } = system.nuclei[row];
    return product * (2 * nuclide(isotope).spin + 1) ** count;
  }, 1);
  const common = {
    system,
    experiment,
    states,
    populations: states.map((state) => state?.population ?? 1),
    rates: rateMatrix(system, experiment.temperature),
  };
  return sectorsOf(system, experiment, rows).map(({ particles, multiplicity }) => {
    const space = spinSpace(particles, classesOf(system, experiment, particles));
    return {
      ...common,
      space,
      weight: multiplicity / dimension,
      equilibrium: equilibriumOf(space, experiment.observe),
      ...relaxationOf(system, experiment, rows, space),
    };
  });
}

/** H of every exchange state, Hz; `shiftHz` moves the offsets of an isotope, `field` drives some spins. */
export function hamiltoniansOf(
  ensemble: Ensemble,
  decoupled: readonly string[],
  driving?: { isotope: string; shiftHz: number; field: DrivingField },
): SparseHamiltonian[] {
  const { system, experiment, space, states } = ensemble;
  return states.map((state) => {
    const offsets = offsetsOf(system, experiment, state);
    if (driving) {
      system.nuclei.forEach(({ isotope }, row) => {
        if (isotope === driving.isotope) offsets[row] -= driving.shiftHz;
      });
    }
    return sparseHamiltonian(space, offsets, couplingsOf(system, decoupled, state), driving?.field);
  });
}

interface SectorParticles {
  particles: Particle[];
  multiplicity: number;
}

/** Groups enter by their total spins, except where relaxation tells their nuclei apart. */
function sectorsOf(system: SpinSystem, experiment: Experiment, rows: readonly number[]): SectorParticles[] {
  if (experiment.relaxation === 'redfield') return [{ particles: expandedParticles(system, rows), multiplicity: 1 }];
  let sectors: SectorParticles[] = [{ particles: [], multiplicity: 1 }];
  for (const row of rows) {
    const { isotope, count } = system.nuclei[row];
    const { r1, r2 } = nucleusRates(system, experiment, row);
    const alone = count === 1 || (experiment.relaxation === 't1-t2' && (r1 > 0 || r2 > 0));
    sectors = sectors.flatMap(({ particles, multiplicity }) =>
      alone
        ? [{ particles: [...particles, ...expandedParticles(system, [row])], multiplicity }]
        : totalSpinComponents(nuclide(isotope).spin, count).map((component) => ({
            particles: [...particles, { row, isotope, spin: component.spin }],
            multiplicity: multiplicity * component.multiplicity,
          })),
    );
  }
  const { observe } = experiment;
  return sectors.filter(({ particles }) => particles.some(({ isotope, spin }) => isotope === observe && spin > 0));
}

/** Redfield keeps the order of each isotope; otherwise each set of nuclei joined by flip-flops keeps its own. */
function classesOf(system: SpinSystem, experiment: Experiment, particles: readonly Particle[]): number[] {
  if (experiment.relaxation === 'redfield') {
    const isotopes = [...new Set(particles.map(({ isotope }) => isotope))];
    return particles.map(({ isotope }) => isotopes.indexOf(isotope));
  }
  const likes = (system.states ?? [undefined])
    .flatMap((state) => couplingsOf(system, [], state))
    .filter(({ like }) => like);
  const links = likes.flatMap(({ a, b }) =>
    particles.flatMap((first, p) =>
      particles.flatMap((second, q) => (first.row === a && second.row === b ? [{ a: p, b: q }] : [])),
    ),
  );
  const groups = connected(particles.length, links);
  return particles.map((_, p) => groups.findIndex((group) => group.includes(p)));
}

function equilibriumOf({ particles, projections, dimension }: SpinSpace, observe: string): Float64Array {
  const polarisations = particles.map(({ isotope }) => relativePolarisation(isotope, observe));
  return Float64Array.from({ length: dimension }, (_, state) =>
    polarisations.reduce((sum, polarisation, p) => sum + polarisation * projections[state * particles.length + p], 0),
  );
}

function relaxationOf(
  system: SpinSystem,
  experiment: Experiment,
  rows: readonly number[],
  space: SpinSpace,
): Pick<Ensemble, 'relaxation' | 'flips'> {
  if (experiment.relaxation === 't1-t2') {
    const rates = space.particles.map(({ row }) => nucleusRates(system, experiment, row));
    if (rates.every(({ r1, r2 }) => r1 === 0 && r2 === 0)) return { flips: false };
    return {
      relaxation: (block) => randomFieldMatrix(space, rates, block),
      flips: rates.some(({ r1 }) => r1 > 0),
    };
  }
  if (experiment.relaxation === 'redfield') {
    const ids = rows.map((row) => system.nuclei[row].id);
    const fragment = {
      ...system,
      nuclei: rows.map((row) => system.nuclei[row]),
      couplings: system.couplings.filter(({ between: [a, b] }) => ids.includes(a) && ids.includes(b)),
    };
    const terms = redfieldTerms(fragment, experiment);
    if (terms.length === 0) return { flips: false };
    return { relaxation: (block) => redfieldMatrix(terms, space.dimension, block), flips: true };
  }
  return { flips: false };
}
