import type { Experiment } from '../documents/experiment.schema.js';
import type { SpinSystem } from '../documents/system.schema.js';

/** Share of the signal from which on folding is worth a word. */
const WORTH_A_WORD = 1e-6;

/** The warning about intensity, in nuclei, that lies outside the spectral width: there is no filter. None where it is negligible. */
export function foldingWarning(folded: number, system: SpinSystem, { observe }: Pick<Experiment, 'observe'>): string[] {
  const nuclei = system.nuclei.reduce((total, { isotope, count }) => total + (isotope === observe ? count : 0), 0);
  const share = folded / nuclei;
  if (share < WORTH_A_WORD) return [];
  return [`${(100 * share).toPrecision(3)} % of the intensity lies outside the spectral width and folds into it`];
}
