/** What is known of a sample along any field direction: transitions that vary continuously with it. */
export interface DirectionalSpectrum {
  readonly transitions: number;
  /** Amplitudes of a transition: one for each class of line widths, or two (real and imaginary part) for each. */
  readonly channels: number;
  /**
   * Writes what is seen along the unit vector `direction`: frequencies of transition t in Hz to frequency[t], amplitudes of
   * channel c to amplitude[c * transitions + t].
   */
  evaluate(direction: Float64Array, frequency: Float64Array, amplitude: Float64Array): void;
}

/** The spectrum with its amplitudes times `weight`. */
export function weighted(spectrum: DirectionalSpectrum, weight: number): DirectionalSpectrum {
  if (weight === 1) return spectrum;
  return {
    ...spectrum,
    evaluate(direction, frequency, amplitude) {
      spectrum.evaluate(direction, frequency, amplitude);
      for (let p = 0; p < amplitude.length; p++) amplitude[p] *= weight;
    },
  };
}
