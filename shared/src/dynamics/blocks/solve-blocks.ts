import { eigenSymmetric } from '../../algebra/eigen/symmetric.js';
import type { Experiment } from '../../documents/experiment.schema.js';
import type { ExchangeState, SpinSystem } from '../../documents/system.schema.js';
import { offsetsOf } from '../../interactions/carriers.js';
import { couplingsOf, type ScalarCoupling } from '../../interactions/scalar.js';
import { larmorMHz, nuclide } from '../../nuclides/nuclides.js';
import { EngineError, type RunContext } from '../../run/context.js';
import { refuseBeyond } from '../../run/limits.js';
import type { Solved } from '../../run/solved.js';
import { foldingWarning } from '../../spectrum/folding-warning.js';
import { StickGrid } from '../../spectrum/stick-grid.js';
import { blocksCost } from './blocks-cost.js';
import { blockHamiltonian, type SectorCoupling } from './block-hamiltonian.js';
import { observedParts, type ObservedPart } from './clusters.js';
import { sectorSpins } from './sector-spins.js';
import { buildSector, type Sector } from './sector.js';
import { spectatorFields } from './spectator-fields.js';
import { StickTable } from './sticks.js';
import { loweringMatrix, projectionsOf, type SolvedBlock } from './transitions.js';

/** Nuclei that decay alike while the signal is recorded, and the grid that collects their share of the sticks. */
interface DecayClass {
  readonly lineWidth: number;
  readonly grid: StickGrid;
}

/** What all parts of one run write to. */
interface Collector {
  readonly classes: readonly DecayClass[];
  readonly classOf: (row: number) => number;
  readonly sticks: StickTable;
  readonly columnOf: (row: number) => number;
  readonly width: number;
  folded: number;
  tick: (blocks: number) => void;
}

/**
 * One pulse of any flip angle on a closed solution, exactly, from the eigenstates of the blocks of H:
 *   s(t) = sin(flip) sum_n exp(-pi L_n t) 3/(dim I(I+1)) sum_ab <b|F-|a><a|In+|b>/2 exp(2 pi i (E_a - E_b) t),
 * a sum over sticks, gridded and transformed. States without exchange between them are a static mixture.
 * Throws an EngineError TOO_LARGE with the estimate when it would break the context's limits.
 */
export function solveBlocks(system: SpinSystem, experiment: Experiment, context: RunContext): Solved {
  const cost = blocksCost(system, experiment);
  refuseBeyond(cost, context, `largest block ${cost.largestBlock}`);
  const { acquisition, observe } = experiment;
  const states: (ExchangeState | undefined)[] = system.states ?? [undefined];
  let solved = 0;
  const collector = collectorFor(system, experiment, () => context.tick(Math.min(1, ++solved / cost.blocks)));
  for (const state of states) {
    const couplings = couplingsOf(system, experiment.decouple, state);
    const offsets = offsetsOf(system, experiment, state);
    const isotopes = system.nuclei.map(({ isotope }) => isotope);
    for (const part of observedParts(isotopes, couplings, observe)) {
      const weight = (state?.population ?? 1) * Math.sin(flipAngle(experiment));
      solvePart(system, part, offsets, couplings, weight, collector);
    }
  }
  const fid = { real: new Float64Array(acquisition.points), imag: new Float64Array(acquisition.points) };
  for (const { lineWidth, grid } of collector.classes) {
    grid.addTo(fid, (k) => Math.exp((-Math.PI * lineWidth * k) / acquisition.width));
  }
  const hzPerPpm = larmorMHz(observe, experiment.protonMHz);
  return {
    fid,
    lines: system.states ? undefined : collector.sticks.lines(acquisition.centre * hzPerPpm, hzPerPpm),
    method: 'eigenstates of the blocks of equal total projection, transitions gridded onto the FID',
    dimensions: {
      blocks: cost.blocks,
      largestBlock: cost.largestBlock,
      transitions: cost.transitions,
      sticks: collector.sticks.transitions,
    },
    approximations: [],
    warnings: foldingWarning(collector.folded, system, experiment),
  };
}

function flipAngle({ sequence }: Experiment): number {
  if ('recipe' in sequence) {
    if (sequence.recipe === 'pulse-acquire') return (sequence.flip * Math.PI) / 180;
  } else {
    const [first] = sequence.steps;
    if ('pulse' in first) return (first.pulse.flip * Math.PI) / 180;
  }
  throw new EngineError('UNSUPPORTED', 'blocks need a single pulse before the signal', 'sequence');
}

function collectorFor(system: SpinSystem, experiment: Experiment, tick: () => void): Collector {
  const { points, width } = experiment.acquisition;
  const widthOf = (row: number) => system.nuclei[row].lineWidth ?? experiment.lineWidth;
  const rows = system.nuclei.flatMap(({ isotope }, row) => (isotope === experiment.observe ? [row] : []));
  const widths = [...new Set(rows.map(widthOf))];
  return {
    classes: widths.map((lineWidth) => ({ lineWidth, grid: new StickGrid(points, width) })),
    classOf: (row) => widths.indexOf(widthOf(row)),
    sticks: new StickTable(rows.map((row) => system.nuclei[row].id)),
    columnOf: (row) => rows.indexOf(row),
    width,
    folded: 0,
    tick,
  };
}

function solvePart(
  system: SpinSystem,
  part: ObservedPart,
  offsets: Float64Array,
  couplings: readonly ScalarCoupling[],
  weight: number,
  collector: Collector,
): void {
  const { spin } = nuclide(system.nuclei[part.nuclei[0]].isotope);
  const dimension = part.nuclei.reduce((product, row) => {
    const { isotope, count } = system.nuclei[row];
    return product * (2 * nuclide(isotope).spin + 1) ** count;
  }, 1);
  const scale = (weight * 3) / (2 * dimension * spin * (spin + 1));
  const inside: SectorCoupling[] = couplings
    .map(({ a, b, j, like }) => ({ p: part.nuclei.indexOf(a), q: part.nuclei.indexOf(b), j, like }))
    .filter(({ p, q }) => p >= 0 && q >= 0);
  const fields = spectatorFields(system, part, couplings);
  for (const { spins, multiplicity } of sectorSpins(system, part)) {
    const sector = buildSector(spins, part.cluster);
    for (const field of fields) {
      const shifted = part.nuclei.map((row, p) => offsets[row] + field.shifts[p]);
      solveSector(sector, Float64Array.from(shifted), inside, scale * multiplicity * field.weight, part, collector);
    }
  }
}

function solveSector(
  sector: Sector,
  offsets: Float64Array,
  couplings: readonly SectorCoupling[],
  scale: number,
  part: ObservedPart,
  collector: Collector,
): void {
  const observed = part.cluster.flatMap((cluster, p) => (cluster === 0 ? [p] : []));
  const columns = observed.map((p) => collector.columnOf(part.nuclei[p]));
  const classes = [...new Set(observed.map((p) => collector.classOf(part.nuclei[p])))].map((index) => ({
    grid: collector.classes[index].grid,
    spins: observed.filter((p) => collector.classOf(part.nuclei[p]) === index),
  }));
  for (const ladder of sector.ladders) {
    let upper: (SolvedBlock & { first: number }) | undefined;
    for (const codes of ladder) {
      const h = blockHamiltonian(sector, codes, offsets, couplings);
      const block: SolvedBlock = { ...eigenSymmetric(h, codes.length), codes };
      const first = collector.sticks.addStates(projectionsOf(sector, block, observed.length), codes.length, columns);
      const lower = { ...block, first };
      if (upper) collectTransitions(sector, upper, lower, classes, scale, collector);
      upper = lower;
      collector.tick(1);
    }
  }
}

/** Sticks of every class: scale <b|F-|a> <b|F-(class)|a> at E_a - E_b. */
function collectTransitions(
  sector: Sector,
  upper: SolvedBlock & { first: number },
  lower: SolvedBlock & { first: number },
  classes: readonly { grid: StickGrid; spins: readonly number[] }[],
  scale: number,
  collector: Collector,
): void {
  const [n, m] = [upper.codes.length, lower.codes.length];
  const shares = classes.map(({ spins }) => loweringMatrix(sector, upper, lower, spins));
  const total = shares.length === 1 ? shares[0] : sum(shares);
  const hz = new Float64Array(m);
  const amplitude = new Float64Array(m);
  const half = collector.width / 2;
  for (let a = 0; a < n; a++) {
    const row = a * m;
    for (let b = 0; b < m; b++) {
      hz[b] = upper.values[a] - lower.values[b];
      const intensity = scale * total[row + b] * total[row + b];
      collector.sticks.add(hz[b], intensity, upper.first + a, lower.first + b);
      if (Math.abs(hz[b]) > half) collector.folded += Math.abs(intensity);
    }
    classes.forEach(({ grid }, c) => {
      const share = shares[c];
      for (let b = 0; b < m; b++) {
        const value = scale * total[row + b] * share[row + b];
        amplitude[b] = Math.abs(value) < NEGLIGIBLE ? 0 : value;
      }
      grid.add(hz, amplitude);
    });
  }
}

/** Sticks below this many nuclei are left out of the FID: ten million of them add up to 1e-9 of a nucleus. */
const NEGLIGIBLE = 1e-16;

function sum(matrices: readonly Float64Array[]): Float64Array {
  const out = matrices[0].slice();
  for (const matrix of matrices.slice(1)) for (let i = 0; i < out.length; i++) out[i] += matrix[i];
  return out;
}
