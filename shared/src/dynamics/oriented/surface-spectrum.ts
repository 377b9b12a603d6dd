import type { DecayClasses } from './decay-classes.js';
import type { DirectionalSpectrum } from './directional-spectrum.js';
import { surfaceFrequency, type Surface } from './surfaces.js';

/** Surfaces that share their axes as the spectrum of a static sample: one channel for each class of line widths. */
export function surfaceSpectrum(surfaces: readonly Surface[], classes: DecayClasses): DirectionalSpectrum {
  const transitions = surfaces.length;
  const place = surfaces.map(({ row }, t) => classes.classOf(row) * transitions + t);
  return {
    transitions,
    channels: classes.lineWidths.length,
    evaluate(direction, frequency, amplitude) {
      for (let t = 0; t < transitions; t++) {
        frequency[t] = surfaceFrequency(surfaces[t], direction[0], direction[1], direction[2]);
        amplitude[place[t]] = surfaces[t].intensity;
      }
    },
  };
}
