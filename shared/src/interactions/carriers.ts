import type { Experiment } from '../documents/experiment.schema.js';
import type { ExchangeState, SpinSystem } from '../documents/system.schema.js';
import { larmorMHz, nuclide } from '../nuclides/nuclides.js';

/** The part of an experiment that decides frequencies. */
export type Frame = Pick<Experiment, 'protonMHz' | 'observe' | 'acquisition'>;

/**
 * Sense of precession of an isotope beside the observed one: -1 where the magnetogyric ratios have opposite signs, so that
 * offsets and shift tensors of that isotope enter negated and multiplets of strongly coupled spins are not mirrored.
 */
export function senseOf(isotope: string, observed: string): 1 | -1 {
  return nuclide(isotope).gamma * nuclide(observed).gamma < 0 ? -1 : 1;
}

/** Larmor frequency at delta = 0 in Hz, with the sense of precession as its sign. */
export function signedLarmorHz(isotope: string, frame: Frame): number {
  return senseOf(isotope, frame.observe) * larmorMHz(isotope, frame.protonMHz) * 1e6;
}

/** Polarisation of an isotope relative to the observed one, gamma/gamma_observed, signed. */
export function relativePolarisation(isotope: string, observed: string): number {
  return nuclide(isotope).gamma / nuclide(observed).gamma;
}

/** Shift of a nucleus in ppm, as it stands in `state`. */
export function shiftIn(nucleus: { id: string; shift: number }, state?: ExchangeState): number {
  return state?.shifts[nucleus.id] ?? nucleus.shift;
}

/** The ppm at which an isotope's rotating frame turns: `centre` for the observed one, else the mean shift of its nuclei. */
export function carrierPpm(system: SpinSystem, frame: Frame, isotope: string): number {
  if (isotope === frame.observe) return frame.acquisition.centre;
  let [sum, weights] = [0, 0];
  for (const nucleus of system.nuclei) {
    if (nucleus.isotope !== isotope) continue;
    for (const state of system.states ?? [undefined]) {
      const weight = nucleus.count * (state?.population ?? 1);
      sum += weight * shiftIn(nucleus, state);
      weights += weight;
    }
  }
  return sum / weights;
}

/** Offset of each nucleus from its isotope's carrier in `state`, Hz, in the order of `system.nuclei`. */
export function offsetsOf(system: SpinSystem, frame: Frame, state?: ExchangeState): Float64Array {
  const carriers = new Map<string, number>();
  return Float64Array.from(system.nuclei, (nucleus) => {
    const { isotope } = nucleus;
    if (!carriers.has(isotope)) carriers.set(isotope, carrierPpm(system, frame, isotope));
    return (shiftIn(nucleus, state) - carriers.get(isotope)!) * 1e-6 * signedLarmorHz(isotope, frame);
  });
}
