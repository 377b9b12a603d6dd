import type { ExperimentInput, Step } from '../src/documents/experiment.schema.js';
import type { SpinSystem } from '../src/documents/system.schema.js';
import { nuclide } from '../src/nuclides/nuclides.js';
import { simulate } from '../src/simulate/simulate.js';
import { experimentOf } from './documents.js';

/** Shifts are given in Hz from the carrier, which lies at this shift, at this 1H frequency. */
export const MHZ = 400;
export const CENTRE = 5;

/** Shift of a nucleus `hz` from the carrier of its isotope, which lies at CENTRE. */
export function ppmAt(hz: number, isotope = '1H'): number {
  return CENTRE + hz / ((MHZ * nuclide(isotope).xi) / 100);
}

/** A step as a person writes it: phases default to zero. */
export const pulse = (
  on: string,
  flip: number,
  phase = 0,
  more: { seconds?: number; offsetHz?: number } = {},
): Step => ({
  pulse: { on, flip, phase, ...more },
});

/** The complex signal of `steps` and an acquisition, first point after the last step; short, as most tests look at that alone. */
export function signalAfter(system: SpinSystem, steps: Step[], experiment: Partial<ExperimentInput> = {}) {
  return simulate(
    system,
    experimentOf({
      protonMHz: MHZ,
      lineWidth: 0,
      acquisition: { centre: CENTRE, width: 1000, points: 2 },
      sequence: { steps: [...steps, { acquire: { phase: 0 } }] },
      ...experiment,
    }),
  ).fid;
}

/**
 * Magnetisation of the observed isotope after `steps`, 1 for each nucleus at equilibrium: s(0) = i(Mx + i My) gives the
 * transverse part; what a 90 degree pulse shows of the diagonal and the zero-quantum part gives Mz.
 */
export function magnetisationAfter(
  system: SpinSystem,
  steps: Step[],
  experiment: Partial<ExperimentInput> = {},
): [number, number, number] {
  const on = experiment.observe ?? '1H';
  const transverse = signalAfter(system, steps, experiment);
  const longitudinal = signalAfter(system, [...steps, { select: { on, order: 0 } }, pulse(on, 90)], experiment);
  return [transverse.imag[0], -transverse.real[0], longitudinal.real[0]];
}
