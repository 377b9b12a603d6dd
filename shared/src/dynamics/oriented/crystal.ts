import type { Job } from './job.js';
import type { DirectionalSpectrum } from './directional-spectrum.js';

/** The lines of one orientation; there is no smaller set to compare with, so both sums get them. */
export function crystalJob(spectrum: DirectionalSpectrum, direction: Float64Array): Job {
  const { transitions, channels } = spectrum;
  return {
    units: 1,
    orientations: 1,
    transitions,
    costOf: () => 1,
    run(_, sum) {
      const frequency = new Float64Array(transitions);
      const amplitude = new Float64Array(channels * transitions);
      spectrum.evaluate(direction, frequency, amplitude);
      sum.fine.forEach((pattern, c) => {
        for (let t = 0; t < transitions; t++) pattern.addStick(frequency[t], amplitude[c * transitions + t]);
      });
    },
  };
}
