import type { Experiment, Step } from '../documents/experiment.schema.js';
import type { Approximation } from '../documents/result.js';
import type { SpinSystem } from '../documents/system.schema.js';
import { offsetsOf } from '../interactions/carriers.js';
import { couplingsOf } from '../interactions/scalar.js';
import { larmorMHz, nuclide } from '../nuclides/nuclides.js';
import { mainState } from './spin-hamiltonian.js';
import { hertz } from './text.js';
import { finestDetail } from './widths.js';

/** Nutation of the decoupled nuclei under a common decoupling field, Hz (common practice). */
export const COMMON_DECOUPLING = 3_000;

/** What ideal decoupling leaves out: the shift by the decoupling field, and splittings that a field of finite strength leaves. */
export function idealDecoupling(
  system: SpinSystem,
  experiment: Experiment,
  nutation = COMMON_DECOUPLING,
): Approximation[] {
  const isotopes = decoupledIsotopes(experiment).filter((isotope) => system.nuclei.some((n) => n.isotope === isotope));
  if (isotopes.length === 0) return [];
  const shift = Math.max(...isotopes.map((isotope) => Math.abs(blochSiegertShift(isotope, experiment, nutation))));
  const splitting = residualSplitting(system, experiment, isotopes, nutation);
  const warnAbove = finestDetail(system, experiment);
  const field = `a field that turns ${isotopes.join(', ')} with ${hertz(nutation)}`;
  return [
    {
      id: 'bloch-siegert',
      title: 'Bloch-Siegert shift of the decoupling field',
      made: true,
      hz: shift,
      computed: 'estimate',
      warnAbove,
      detail: `Decoupling is ideal; ${field} would move the ${experiment.observe} lines by ${hertz(shift)}.`,
    },
    {
      id: 'residual-splitting',
      title: 'Splitting left by decoupling',
      made: true,
      hz: splitting,
      computed: 'estimate',
      warnAbove,
      detail: `Decoupling is ideal; continuous irradiation by ${field} would leave splittings of up to ${hertz(splitting)}. Composite decoupling leaves less.`,
    },
  ];
}

/**
 * Shift in Hz of the observed isotope by a linear field near the frequency of another isotope, both rotating halves:
 * nu2^2 nu0/(nu0^2 - nud^2), nu2 the nutation of the observed isotope in that field (F. Bloch, A. Siegert, Phys. Rev. 57 (1940)
 * 522; N. F. Ramsey, Phys. Rev. 100 (1955) 1191). `nutation` is that of the decoupled isotope.
 */
export function blochSiegertShift(
  decoupled: string,
  experiment: Pick<Experiment, 'observe' | 'protonMHz'>,
  nutation: number,
): number {
  const observed = Math.abs((nutation * nuclide(experiment.observe).gamma) / nuclide(decoupled).gamma);
  const [own, field] = [experiment.observe, decoupled].map((isotope) => larmorMHz(isotope, experiment.protonMHz) * 1e6);
  return (observed ** 2 * own) / (own ** 2 - field ** 2);
}

/** J offset/sqrt(offset^2 + nutation^2) (R. R. Ernst, J. Chem. Phys. 45 (1966) 3845), the largest over the couplings taken away. */
function residualSplitting(
  system: SpinSystem,
  experiment: Experiment,
  isotopes: readonly string[],
  nutation: number,
): number {
  const state = mainState(system);
  const offsets = offsetsOf(system, experiment, state);
  const { nuclei } = system;
  let largest = 0;
  for (const { a, b, j } of couplingsOf(system, [], state)) {
    for (const [own, other] of [
      [a, b],
      [b, a],
    ]) {
      if (nuclei[own].isotope !== experiment.observe || !isotopes.includes(nuclei[other].isotope)) continue;
      largest = Math.max(largest, Math.abs((j * offsets[other]) / Math.hypot(offsets[other], nutation)));
    }
  }
  return largest;
}

/** Decoupled while the signal is acquired: the last word of the steps, else of the experiment. */
function decoupledIsotopes({ sequence, decouple }: Experiment): readonly string[] {
  const steps: readonly Step[] = 'steps' in sequence ? sequence.steps : [];
  return steps.reduce<readonly string[]>((isotopes, step) => ('decouple' in step ? step.decouple : isotopes), decouple);
}
