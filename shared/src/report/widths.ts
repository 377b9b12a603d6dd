import type { Experiment } from '../documents/experiment.schema.js';
import type { Nucleus, SpinSystem } from '../documents/system.schema.js';
import { relaxationNumbers } from '../dynamics/relaxation/relaxation-numbers.js';

/** Full width at half height that a nucleus's relaxation gives its lines, Hz; 0 where nothing broadens them. */
export function naturalWidths(system: SpinSystem, experiment: Experiment): number[] {
  const { relaxation } = experiment;
  if (relaxation === 'redfield') return relaxationNumbers(system, experiment).map(({ lineWidth }) => lineWidth ?? 0);
  return system.nuclei.map((nucleus) => givenWidth(nucleus, experiment));
}

/**
 * The finest detail that the spectrum shows, Hz: the narrowest observed line with the weighting of the FID, but no less than
 * the distance of points. What is left out matters where it exceeds this.
 */
export function finestDetail(system: SpinSystem, experiment: Experiment): number {
  const { acquisition, processing } = experiment;
  const points = Math.max(acquisition.points, processing.zeroFill);
  const width = narrowestNaturalWidth(system, experiment) + processing.exponential;
  return Math.max(Math.hypot(Math.max(width, 0), processing.gaussian), acquisition.width / points);
}

export function narrowestNaturalWidth(system: SpinSystem, experiment: Experiment): number {
  const widths = naturalWidths(system, experiment);
  return Math.min(...widths.filter((_, row) => system.nuclei[row].isotope === experiment.observe));
}

function givenWidth({ lineWidth, t2 }: Nucleus, experiment: Experiment): number {
  if (experiment.relaxation === 't1-t2' && t2 !== undefined) return 1 / (Math.PI * t2);
  return lineWidth ?? experiment.lineWidth;
}
