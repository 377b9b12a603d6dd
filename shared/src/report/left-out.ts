import type { Experiment } from '../documents/experiment.schema.js';
import type { Approximation } from '../documents/result.js';
import type { SpinSystem } from '../documents/system.schema.js';
import { idealDecoupling } from './decoupling.js';
import { fidCutOff } from './fid-cut-off.js';
import { firstOrderReading } from './first-order.js';
import { folding } from './folding.js';
import { highFieldTruncation } from './high-field.js';
import { neglectedCouplings } from './neglected-couplings.js';
import { idealPulses, rotatingFrame } from './pulses.js';
import { relaxationLeftOut } from './relaxation-left-out.js';

/** What is known of the spectrometer; common values stand in for what is not. */
export interface SpectrometerFields {
  /** Nutation of the observed isotope under a hard pulse, Hz: 1/(4 x 90 degree length). */
  readonly nutation?: number;
  /** Nutation of the decoupled isotopes, Hz. */
  readonly decoupling?: number;
}

/**
 * What a run leaves out, or what a reader of its spectrum might: each with its size in Hz, how that was found and from where on it
 * matters. Knows the two documents only; a solver adds what only it knows, such as the convergence of a powder sum.
 */
export function whatIsLeftOut(
  system: SpinSystem,
  experiment: Experiment,
  fields: SpectrometerFields = {},
): Approximation[] {
  const solution = experiment.sample.kind === 'solution';
  return [
    ...(solution ? [firstOrderReading(system, experiment)] : []),
    highFieldTruncation(system, experiment),
    idealPulses(system, experiment, fields.nutation),
    rotatingFrame(experiment),
    ...idealDecoupling(system, experiment, fields.decoupling),
    fidCutOff(system, experiment),
    folding(system, experiment),
    neglectedCouplings(system, experiment),
    relaxationLeftOut(system, experiment),
  ].filter((entry) => entry !== null);
}
