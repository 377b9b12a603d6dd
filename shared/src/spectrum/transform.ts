import type { Experiment, Processing } from '../documents/experiment.schema.js';
import type { Spectrum } from '../documents/result.js';
import { larmorMHz } from '../nuclides/nuclides.js';
import type { ComplexArray } from '../run/solved.js';
import { fourier } from './fourier.js';

/**
 * Processes a sampled FID to a spectrum in nuclei per Hz, highest frequency first:
 * S(nu) = (2/width) sum_k s_k exp(-2 pi i nu k/width) exp(i(phase0 + phase1 nu/width)), nu counted from the centre,
 * with s_k apodised by exp(-pi LB t) exp(-(pi GB t)^2/(4 ln 2)), the first point halved, and zeros up to `zeroFill`.
 */
export function fidToSpectrum(fid: ComplexArray, experiment: Experiment): Spectrum {
  const { acquisition, processing } = experiment;
  const { width } = acquisition;
  const n = Math.max(fid.real.length, processing.zeroFill);
  const transformed = fourier(apodise(fid, width, processing, n), -1);
  const real = new Float64Array(n);
  const imag = new Float64Array(n);
  const [phase0, phase1] = [radians(processing.phase0), radians(processing.phase1)];
  const phased = phase0 !== 0 || phase1 !== 0;
  for (let j = 0; j < n; j++) {
    const bin = n / 2 - 1 - j;
    const source = bin < 0 ? bin + n : bin;
    const re = (2 / width) * transformed.real[source];
    const im = (2 / width) * transformed.imag[source];
    if (phased) {
      const angle = phase0 + (phase1 * bin) / n;
      real[j] = re * Math.cos(angle) - im * Math.sin(angle);
      imag[j] = re * Math.sin(angle) + im * Math.cos(angle);
    } else {
      real[j] = re;
      imag[j] = im;
    }
  }
  return { firstPpm: ppmOfPoint(0, n, experiment), lastPpm: ppmOfPoint(n - 1, n, experiment), real, imag };
}

/** ppm of point `j` of an `n` point spectrum: the offset is (n/2 - 1 - j) width/n. */
export function ppmOfPoint(j: number, n: number, experiment: Experiment): number {
  const { centre, width } = experiment.acquisition;
  return centre + ((n / 2 - 1 - j) * width) / n / larmorMHz(experiment.observe, experiment.protonMHz);
}

function apodise(fid: ComplexArray, width: number, processing: Processing, n: number): ComplexArray {
  const { exponential, gaussian } = processing;
  const real = new Float64Array(n);
  const imag = new Float64Array(n);
  for (let k = 0; k < fid.real.length; k++) {
    const t = k / width;
    const weight =
      (k === 0 ? 0.5 : 1) * Math.exp(-Math.PI * exponential * t - (Math.PI * gaussian * t) ** 2 / (4 * Math.LN2));
    real[k] = weight * fid.real[k];
    imag[k] = weight * fid.imag[k];
  }
  return { real, imag };
}

function radians(degrees: number): number {
  return (degrees * Math.PI) / 180;
}
