import type { Experiment } from '../../documents/experiment.schema.js';
import type { SpinSystem } from '../../documents/system.schema.js';

/** Line widths of the observed nuclei, each once; every nucleus belongs to the class of its own. */
export interface DecayClasses {
  /** Hz */
  readonly lineWidths: readonly number[];
  /** Class of a row of `system.nuclei`. */
  readonly classOf: (row: number) => number;
}

export function decayClasses(system: SpinSystem, experiment: Experiment): DecayClasses {
  const widthOf = (row: number) => system.nuclei[row].lineWidth ?? experiment.lineWidth;
  const observed = system.nuclei.flatMap(({ isotope }, row) => (isotope === experiment.observe ? [row] : []));
  const lineWidths = [...new Set(observed.map(widthOf))];
  return { lineWidths, classOf: (row) => lineWidths.indexOf(widthOf(row)) };
}
