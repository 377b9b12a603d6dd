import { nuclide } from '../nuclides/nuclides.js';

/**
 * A reference measurement that calibrates a spectrometer's sensitivity: one line of a stated sample, after exponential
 * broadening. Signal-to-noise as laboratories quote it: height over half the peak-to-peak noise times 2.5, which is
 * height over twice the rms noise (common practice).
 */
export interface ReferenceSensitivity {
  isotope: string;
  signalToNoise: number;
  scans: number;
  /** Molecules that carry the observed isotope, mol/L. */
  concentration: number;
  /** Equivalent nuclei in the reference line. */
  nuclei: number;
  /** Full width at half height as displayed, broadening included, Hz. */
  lineWidth: number;
  /** Exponential broadening of the display, Hz, > 0. */
  broadening: number;
}

/**
 * Noise of one scan: rms of each of the real and imaginary parts in the FID, at a spectral width of 1 Hz, in the units
 * of the signal (nuclei times mol/L). At width W the rms is this times sqrt(W).
 *
 * From the spectrum S = (2/W) sum s_k exp(..) of white noise follows an rms of 2 noise sqrt(T), T = 1/(2 pi broadening)
 * the integral of the squared exponential window; a Lorentzian of width w has the height 2 nuclei/(pi w).
 */
export function noiseOfOneScan(reference: ReferenceSensitivity, isotope: string): number {
  const height = ((2 * reference.nuclei) / (Math.PI * reference.lineWidth)) * reference.concentration;
  const rms = (height * Math.sqrt(reference.scans)) / (2 * reference.signalToNoise);
  const window = 1 / (2 * Math.PI * reference.broadening);
  return (rms / (2 * Math.sqrt(window))) * (nuclearSensitivity(reference.isotope) / nuclearSensitivity(isotope));
}

/**
 * Signal per noise of one nucleus in one field, |gamma|^(5/2) I (I + 1): the induced voltage goes with gamma^3 I(I + 1),
 * the noise of the coil with the square root of the frequency. A. Abragam, Principles of Nuclear Magnetism (1961), ch. III.
 */
export function nuclearSensitivity(isotope: string): number {
  const { gamma, spin } = nuclide(isotope);
  return Math.abs(gamma) ** 2.5 * spin * (spin + 1);
}

export interface LineForecast {
  /** Height of the line in the processed spectrum, nuclei per Hz, for one full-strength scan. */
  height: number;
  /** Integral of the squared apodisation over the acquisition, s. */
  window: number;
  /** Molecules that carry the observed isotope, mol/L. */
  concentration: number;
  /** Share of the full signal that a scan yields, 0..1 (`steadyStateSignal`). */
  signalShare: number;
}

/** Signal-to-noise of one scan, in the same sense as the reference's. */
export function signalToNoise(noise: number, line: LineForecast): number {
  const rms = 2 * noise * Math.sqrt(line.window);
  return (line.height * line.concentration * line.signalShare) / (2 * rms);
}

/** Scans that reach `wanted` when one scan yields `single`: noise averages with the square root of the number. */
export function scansFor(wanted: number, single: number): number {
  return Math.max(1, Math.ceil((wanted / single) ** 2));
}

/** Integral over the acquisition time of exp(-2 pi LB t) exp(-2 (pi GB t)^2 / (4 ln 2)), s: what noise survives processing. */
export function noiseWindow(acquisitionTime: number, exponential: number, gaussian: number): number {
  const intervals = 2000;
  const step = acquisitionTime / intervals;
  const weight = (t: number) =>
    Math.exp(-2 * Math.PI * exponential * t - (Math.PI * gaussian * t) ** 2 / (2 * Math.LN2));
  let sum = (weight(0) + weight(acquisitionTime)) / 2;
  for (let i = 1; i < intervals; i++) sum += weight(i * step);
  return sum * step;
}
