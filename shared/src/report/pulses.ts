import { spinorRotation, rotationOfSpinor } from '../algebra/pauli.js';
import type { Experiment, Step } from '../documents/experiment.schema.js';
import type { Approximation } from '../documents/result.js';
import type { SpinSystem } from '../documents/system.schema.js';
import { larmorMHz } from '../nuclides/nuclides.js';
import { extents } from './extents.js';
import { hertz, percent } from './text.js';

/** Nutation of a common 10 microsecond 90 degree pulse, Hz (common practice), for experiments without an instrument. */
export const COMMON_NUTATION = 25_000;
/** Offset over nutation from which on the excitation is no longer even (1 % of the signal of a 90 degree pulse at about 0.3). */
const EVEN = 0.25;

/** What taking pulses as endlessly short leaves out: lines far from the carrier are turned by less, and about a tilted axis. */
export function idealPulses(system: SpinSystem, experiment: Experiment, nutation = COMMON_NUTATION): Approximation {
  const made = hasIdealPulses(experiment);
  const offset = Math.max(
    0,
    ...extents(system, experiment).map(({ low, high }) => Math.max(Math.abs(low), Math.abs(high))),
  );
  const { amplitude, phase } = excitation(offset, nutation);
  return {
    id: 'ideal-pulses',
    title: 'Ideal pulses',
    made,
    hz: made ? offset : 0,
    computed: 'estimate',
    warnAbove: EVEN * nutation,
    detail: `The farthest line stands ${hertz(offset)} from the carrier. A 90 degree pulse with a nutation of ${hertz(nutation)} leaves ${percent(
      amplitude,
    )} of the signal there, with a phase error of ${+phase.toPrecision(2)} degrees; an ideal pulse excites evenly.`,
  };
}

/**
 * Signal and phase (degrees) after a rectangular 90 degree pulse on equilibrium magnetisation at `offset` Hz from the carrier: a turn
 * about the effective field (F. Bloch, Phys. Rev. 70 (1946) 460).
 */
export function excitation(offset: number, nutation: number): { amplitude: number; phase: number } {
  const effective = Math.hypot(offset, nutation);
  const turn = ((Math.PI / 2) * effective) / nutation;
  const rotation = rotationOfSpinor(spinorRotation([nutation / effective, 0, offset / effective], turn));
  const [x, y] = [rotation[2], rotation[5]];
  // On resonance the magnetisation ends along -y.
  return { amplitude: Math.hypot(x, y), phase: (Math.atan2(x, -y) * 180) / Math.PI };
}

/** The counter-rotating half of the linear field of pulses with a length: nutation^2/(4 nu0) (F. Bloch, A. Siegert, Phys. Rev. 57 (1940) 522). */
export function rotatingFrame(experiment: Experiment): Approximation | null {
  const fields = stepsOf(experiment).flatMap((step) => fieldOf(step, experiment));
  if (fields.length === 0) return null;
  const hz = Math.max(...fields.map(({ nutation, larmor }) => nutation ** 2 / (4 * larmor)));
  return {
    id: 'rotating-frame',
    title: 'Rotating-frame pulses',
    made: true,
    hz,
    computed: 'estimate',
    warnAbove: 1,
    detail: `Pulses turn with their nuclei; the counter-rotating half of a real field moves them by up to ${hertz(hz)} while it is on.`,
  };
}

function fieldOf(step: Step, experiment: Experiment): { nutation: number; larmor: number }[] {
  if (!('pulse' in step) || step.pulse.seconds === undefined) return [];
  const nutation = Math.abs(step.pulse.flip) / 360 / step.pulse.seconds;
  return [{ nutation, larmor: larmorMHz(step.pulse.on, experiment.protonMHz) * 1e6 }];
}

function stepsOf({ sequence }: Experiment): readonly Step[] {
  return 'steps' in sequence ? sequence.steps : [];
}

/** Recipes have ideal pulses only. */
function hasIdealPulses(experiment: Experiment): boolean {
  if ('recipe' in experiment.sequence) return experiment.sequence.recipe !== 'cross-polarisation-ideal';
  return stepsOf(experiment).some((step) => 'pulse' in step && step.pulse.seconds === undefined);
}
