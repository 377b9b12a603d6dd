import type { Approximation } from '../../documents/result.js';
import type { ComplexArray } from '../../run/solved.js';
import { fourier } from '../../spectrum/fourier.js';

/**
 * How far, in Hz and on average, intensity lies in one spectrum from where it lies in the other: the integral of the absolute
 * difference of their cumulative distributions, for FIDs of equal first point. On the circle that folding makes of the
 * spectral width distributions start anywhere, and their median difference is the one to leave out
 * (J. Rabin, J. Delon & Y. Gousseau, J. Math. Imaging Vis. 41, 147 (2011)).
 */
export function spectralDistanceHz(a: ComplexArray, b: ComplexArray, width: number): number {
  const n = a.real.length;
  const difference = { real: new Float64Array(n), imag: new Float64Array(n) };
  const [re, im] = [a.real[0], a.imag[0]];
  const size = re * re + im * im;
  if (size === 0) return 0;
  for (let k = 1; k < n; k++) {
    // Without a window that ends at zero, ripples of a cut FID would add up over the whole width.
    const weight = Math.cos((Math.PI * k) / (2 * n)) ** 2;
    const x = weight * (a.real[k] - b.real[k]);
    const y = weight * (a.imag[k] - b.imag[k]);
    difference.real[k] = (x * re + y * im) / size;
    difference.imag[k] = (y * re - x * im) / size;
  }
  // The spectrum is 2/width times the real part, its bins width/n apart.
  const cumulative = fourier(difference, -1).real;
  cumulative[0] *= 2 / n;
  for (let j = 1; j < n; j++) cumulative[j] = cumulative[j - 1] + (2 / n) * cumulative[j];
  const median = cumulative.slice().sort()[n >> 1];
  return cumulative.reduce((sum, value) => sum + Math.abs(value - median), 0) * (width / n);
}

/** The account of a sum over orientations, by the difference between two sets of them. */
export function orientationApproximation(hz: number, orientations: number, resolution: number): Approximation {
  return {
    id: 'orientations',
    title: 'Sum over orientations',
    made: true,
    hz,
    computed: 'exact-difference',
    warnAbove: resolution / 10,
    detail: `mean displacement of intensity between a set of ${orientations} orientations and one of about a quarter as many`,
  };
}

/** The account of the average over rotor phases, which is taken exactly whatever number of them was asked for. */
export function rotorPhaseApproximation(gammas: number): Approximation {
  return {
    id: 'rotor-phases',
    title: 'Sum over rotor phases',
    made: false,
    hz: 0,
    computed: 'exact-difference',
    warnAbove: 0,
    detail: `the average over rotor phases was taken exactly, the limit that a sum over ${gammas} of them approaches`,
  };
}
