import { simulate, type Result, type Spectrum } from '@heddle/shared';
import type { Pair } from './cases.js';

export interface Timing {
  seconds: number;
  result: Result;
}

export function timeEngine({ system, experiment }: Pair): Timing {
  const started = performance.now();
  const result = simulate(system, experiment);
  return { seconds: (performance.now() - started) / 1000, result };
}

/** Largest difference of two complex spectra over the largest modulus of the second. */
export function compare(ours: Spectrum, theirs: { real: number[]; imag: number[] }): number {
  if (ours.real.length !== theirs.real.length) return NaN;
  let difference = 0;
  let largest = 0;
  theirs.real.forEach((real, i) => {
    largest = Math.max(largest, Math.hypot(real, theirs.imag[i]));
    difference = Math.max(difference, Math.hypot(ours.real[i] - real, ours.imag[i] - theirs.imag[i]));
  });
  return difference / largest;
}
