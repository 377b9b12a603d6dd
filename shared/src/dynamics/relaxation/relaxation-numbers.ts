import { complexMatrix } from '../../algebra/dense.js';
import { solveComplexInPlace } from '../../algebra/dense-solve.js';
import type { SpinSystem } from '../../documents/system.schema.js';
import { relativePolarisation, signedLarmorHz, type Frame } from '../../interactions/carriers.js';
import { couplingsOf } from '../../interactions/scalar.js';
import { nuclide } from '../../nuclides/nuclides.js';
import { crossCorrelatedRate, oneSpinRates } from './one-spin-rates.js';
import { scalarRelaxation } from './scalar-relaxation.js';

/** What tumbling does to one nucleus, from Redfield's Gamma. Times in s, widths in Hz; null where nothing relaxes it. */
export interface NucleusRelaxation {
  readonly id: string;
  /** Initial recovery of Iz after all nuclei of this isotope were inverted. */
  readonly t1: number | null;
  /** Initial recovery of Iz after this nucleus alone was inverted. */
  readonly t1Selective: number | null;
  /** Initial decay of the in-phase single-quantum coherence, at a shift of its own. */
  readonly t2: number | null;
  /** 1/(pi T2), full width at half height. */
  readonly lineWidth: number | null;
  /** By nucleus that is kept saturated: the steady change of Iz, as a fraction of its equilibrium (-1 for itself). */
  readonly noe: Readonly<Record<string, number>>;
  /** The same with all nuclei of another isotope saturated. */
  readonly noeByIsotope: Readonly<Record<string, number>>;
  /** By dipolar partner of spin 1/2: difference of the widths of the multiplet's two halves, from dipole-shift cross-correlation. */
  readonly widthDifference: Readonly<Record<string, number>>;
  /** By J-coupled partner that relaxes too fast to split this nucleus's lines: the width it gives them, not part of `lineWidth`. */
  readonly scalarWidth: Readonly<Record<string, number>>;
}

/**
 * T1, T2, NOE and widths of every nucleus. Equations of Iz alone (I. Solomon, Phys. Rev. 99 (1955) 559): the multi-spin orders
 * that cross-correlation mixes in are left out here; spectra have them.
 * Needs `tumbling`. Cheap at any number of nuclei: one-spin rates are sums over mechanisms of at most two spins.
 */
export function relaxationNumbers(system: SpinSystem, frame: Frame): NucleusRelaxation[] {
  const { nuclei } = system;
  const { longitudinal: rates, transverse: transverseRates } = oneSpinRates(system, frame);
  const isotopes = [...new Set(nuclei.map(({ isotope }) => isotope))];
  const saturatedOne = nuclei.map((_, row) => steadyState(system, rates, [row]));
  const saturatedAll = isotopes.map((isotope) => steadyState(system, rates, rowsOf(system, isotope)));
  return nuclei.map((nucleus, row) => {
    const transverse = transverseRates[row];
    const together = rowsOf(system, nucleus.isotope).reduce(
      (sum, other) => sum + rates[row * nuclei.length + other],
      0,
    );
    return {
      id: nucleus.id,
      t1: timeOf(together),
      t1Selective: timeOf(rates[row * nuclei.length + row]),
      t2: timeOf(transverse),
      lineWidth: transverse > 0 ? transverse / Math.PI : null,
      noe: Object.fromEntries(nuclei.map(({ id }, other) => [id, saturatedOne[other][row]])),
      noeByIsotope: Object.fromEntries(
        isotopes.flatMap((isotope, k) => (isotope === nucleus.isotope ? [] : [[isotope, saturatedAll[k][row]]])),
      ),
      widthDifference: widthDifferences(system, frame, row),
      scalarWidth: scalarWidths(system, frame, row, (other) => ({
        t1: 1 / rates[other * (nuclei.length + 1)],
        t2: 1 / transverseRates[other],
      })),
    };
  });
}

/** Relaxation of every nucleus at one correlation time and field. */
export interface RelaxationPoint {
  readonly tauC: number;
  readonly protonMHz: number;
  readonly nuclei: NucleusRelaxation[];
}

/** `relaxationNumbers` for each correlation time (s) at each field (1H frequency in MHz), fields outermost. */
export function relaxationTable(
  system: SpinSystem,
  frame: Frame,
  tauCs: readonly number[],
  fields: readonly number[],
): RelaxationPoint[] {
  return fields.flatMap((protonMHz) =>
    tauCs.map((tauC) => ({
      tauC,
      protonMHz,
      nuclei: relaxationNumbers({ ...system, tumbling: { tauC } }, { ...frame, protonMHz }),
    })),
  );
}

function rowsOf(system: SpinSystem, isotope: string): number[] {
  return system.nuclei.flatMap((nucleus, row) => (nucleus.isotope === isotope ? [row] : []));
}

function timeOf(rate: number): number | null {
  return rate > 0 ? 1 / rate : null;
}

/**
 * Change of every Iz over its equilibrium while the rows `saturated` are held at zero: R dM = 0 for the others, dM = -M_eq
 * for the saturated ones. Nuclei that do not relax keep their equilibrium.
 */
function steadyState(system: SpinSystem, rates: Float64Array, saturated: readonly number[]): Float64Array {
  const { nuclei } = system;
  const n = nuclei.length;
  const equilibrium = nuclei.map(({ isotope }) => relativePolarisation(isotope, nuclei[0].isotope));
  const matrix = complexMatrix(n, n);
  const change = complexMatrix(n, 1);
  for (let row = 0; row < n; row++) {
    const held = saturated.includes(row);
    if (held) change.real[row] = -equilibrium[row];
    if (held || rates[row * n + row] === 0) matrix.real[row * n + row] = 1;
    else for (let other = 0; other < n; other++) matrix.real[row * n + other] = rates[row * n + other];
  }
  solveComplexInPlace(matrix, change);
  return Float64Array.from(change.real, (value, row) => value / equilibrium[row]);
}

function widthDifferences(system: SpinSystem, frame: Frame, row: number): Record<string, number> {
  const { nuclei, couplings } = system;
  const differences: Record<string, number> = {};
  for (const { between, dipolar } of couplings) {
    if (dipolar === undefined || !nuclei[row].csa || !between.includes(nuclei[row].id)) continue;
    const partner = nuclei.findIndex(({ id }) => id !== nuclei[row].id && between.includes(id));
    if (nuclide(nuclei[partner].isotope).spin !== 0.5) continue;
    differences[nuclei[partner].id] = (2 * Math.abs(crossCorrelatedRate(system, frame, row, partner))) / Math.PI;
  }
  return differences;
}

function scalarWidths(
  system: SpinSystem,
  frame: Frame,
  row: number,
  timesOf: (row: number) => { t1: number; t2: number },
): Record<string, number> {
  const { nuclei } = system;
  const widths: Record<string, number> = {};
  for (const { a, b, j, like } of couplingsOf(system, [])) {
    if (like || (a !== row && b !== row)) continue;
    const partner = nuclei[a + b - row];
    const times = timesOf(a + b - row);
    if (2 * Math.PI * Math.abs(j) * times.t1 >= 1) continue;
    const frequencyDifference = signedLarmorHz(nuclei[row].isotope, frame) - signedLarmorHz(partner.isotope, frame);
    const { r2 } = scalarRelaxation({ spin: nuclide(partner.isotope).spin, j, ...times, frequencyDifference });
    widths[partner.id] = r2 / Math.PI;
  }
  return widths;
}
