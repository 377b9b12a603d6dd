import type { ExperimentInput } from '../src/documents/experiment.schema.js';
import { parseExperiment, parseSystem } from '../src/documents/parse.js';
import type { SpinSystemInput } from '../src/documents/system.schema.js';

/** A system for tests, short to write. */
export function systemOf(parts: Omit<SpinSystemInput, 'format' | 'name'>) {
  return parseSystem({ format: 'heddle.spin-system/1', name: 'test', ...parts });
}

/** A pulse and an acquisition of 1H at 400 MHz, window 5 ppm +- 2 kHz, with `parts` in place of that. */
export function experimentOf(parts: Partial<ExperimentInput> = {}) {
  const acquisition = { centre: 5, width: 4000, points: 16384 };
  return parseExperiment({ format: 'heddle.experiment/1', protonMHz: 400, observe: '1H', acquisition, ...parts });
}

/** Two protons `difference` Hz apart at 400 MHz, the first at the carrier of `experimentOf`, coupled by `j` Hz. */
export function protonPair(difference: number, j: number) {
  return systemOf({
    nuclei: [
      { id: 'A', isotope: '1H', shift: 5 },
      { id: 'B', isotope: '1H', shift: 5 + difference / 400 },
    ],
    couplings: [{ between: ['A', 'B'], j }],
  });
}
