import type { Spectrum } from '../documents/result.js';

/**
 * How well one experiment tells two candidates apart.
 *
 * Two predicted FIDs a and b in white noise are two hypotheses of a matched-filter detector; their distance in units
 * of the noise is d = |a - c b| / noise, with the scale c (the unknown amount) chosen in the candidates' favour.
 * The likelier candidate is then the wrong one with probability Phi(-d/2), and d grows with the square root of the
 * number of scans. W. W. Peterson, T. G. Birdsall, W. C. Fox, Trans. IRE PGIT 4, 171 (1954).
 */
export interface Discrimination {
  /** Distance after one scan, in units of the noise. */
  perScan: number;
  /** Distance after one hour of scans. */
  perHour: number;
  /** Hours until d = 6, where the wrong choice has a probability of Phi(-3) = 0.13 %. Infinite for equal spectra. */
  hours: number;
  /** The narrowest stretch of the spectrum that holds half of the squared distance, ppm. */
  region: { high: number; low: number };
}

export const DECISIVE_DISTANCE = 6;

export interface ComparedSignal {
  fid: { real: Float64Array; imag: Float64Array };
  spectrum: Spectrum;
}

export interface NoiseBudget {
  /** rms of each part of an FID point after one scan, in nuclei. */
  noise: number;
  /** Seconds from one scan to the next. */
  repetition: number;
}

/** Compares two candidates under one experiment; both signals were computed with the same acquisition and processing. */
export function discriminate(a: ComparedSignal, b: ComparedSignal, budget: NoiseBudget): Discrimination {
  const scale = bestScale(a.fid, b.fid);
  const perScan = Math.sqrt(squaredDistance(a.fid, b.fid, scale)) / budget.noise;
  const perHour = perScan * Math.sqrt(3600 / budget.repetition);
  return {
    perScan,
    perHour,
    hours: perScan > 0 ? (DECISIVE_DISTANCE / perHour) ** 2 : Infinity,
    region: decidingRegion(a.spectrum, b.spectrum, scale),
  };
}

/** The real c that makes |a - c b| smallest. */
function bestScale(a: ComparedSignal['fid'], b: ComparedSignal['fid']): number {
  let [dot, norm] = [0, 0];
  for (let k = 0; k < a.real.length; k++) {
    dot += a.real[k] * b.real[k] + a.imag[k] * b.imag[k];
    norm += b.real[k] ** 2 + b.imag[k] ** 2;
  }
  return norm > 0 ? dot / norm : 0;
}

function squaredDistance(a: ComparedSignal['fid'], b: ComparedSignal['fid'], scale: number): number {
  let sum = 0;
  for (let k = 0; k < a.real.length; k++) {
    sum += (a.real[k] - scale * b.real[k]) ** 2 + (a.imag[k] - scale * b.imag[k]) ** 2;
  }
  return sum;
}

/** Two pointers over the running sum of squared absorption differences. */
function decidingRegion(a: Spectrum, b: Spectrum, scale: number): { high: number; low: number } {
  const points = a.real.length;
  const weight = Float64Array.from(a.real, (value, j) => (value - scale * b.real[j]) ** 2);
  const half = weight.reduce((sum, value) => sum + value, 0) / 2;
  let best = { start: 0, end: points - 1 };
  let [start, inside] = [0, 0];
  for (let end = 0; end < points; end++) {
    inside += weight[end];
    while (start < end && inside - weight[start] >= half) inside -= weight[start++];
    if (inside >= half && end - start < best.end - best.start) best = { start, end };
  }
  const ppm = (j: number) => a.firstPpm + ((a.lastPpm - a.firstPpm) * j) / (points - 1);
  return { high: ppm(best.start), low: ppm(best.end) };
}
