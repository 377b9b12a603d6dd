/**
 * Repeated pulses with the transverse part gone before the next one (E = exp(-repetition / T1)).
 * R. R. Ernst, W. A. Anderson, Rev. Sci. Instrum. 37, 93 (1966).
 */

/** The flip angle in degrees of the largest steady-state signal, acos E. Times in s, both > 0. */
export function ernstAngle(repetition: number, t1: number): number {
  return (Math.acos(Math.exp(-repetition / t1)) * 180) / Math.PI;
}

/** Steady-state signal after a flip of `flip` degrees, as a share of the full magnetisation: (1 - E) sin f / (1 - E cos f). */
export function steadyStateSignal(flip: number, repetition: number, t1: number): number {
  const decay = Math.exp(-repetition / t1);
  const angle = (flip * Math.PI) / 180;
  return ((1 - decay) * Math.sin(angle)) / (1 - decay * Math.cos(angle));
}
