import type { Experiment } from '../documents/experiment.schema.js';
import type { Approximation } from '../documents/result.js';
import type { SpinSystem } from '../documents/system.schema.js';
import { relaxationNumbers } from '../dynamics/relaxation/relaxation-numbers.js';
import { hertz } from './text.js';
import { finestDetail, naturalWidths } from './widths.js';

/**
 * Widths that the system's tensors and correlation time imply but that were not asked for, because the experiment relaxes by
 * given widths or times. null where nothing can be said: no correlation time, a solid, or Redfield relaxation itself.
 */
export function relaxationLeftOut(system: SpinSystem, experiment: Experiment): Approximation | null {
  if (!system.tumbling || experiment.relaxation === 'redfield' || experiment.sample.kind !== 'solution') return null;
  const given = naturalWidths(system, experiment);
  const differences = relaxationNumbers(system, experiment).flatMap(({ id, lineWidth }, row) =>
    system.nuclei[row].isotope === experiment.observe && lineWidth !== null
      ? [{ id, lineWidth, given: given[row], hz: Math.abs(lineWidth - given[row]) }]
      : [],
  );
  if (differences.length === 0) return null;
  const worst = differences.reduce((most, one) => (one.hz > most.hz ? one : most));
  return {
    id: 'relaxation-left-out',
    title: 'Relaxation by tumbling',
    made: true,
    hz: worst.hz,
    computed: 'exact-difference',
    warnAbove: finestDetail(system, experiment),
    detail: `The widths are as given. Tumbling with ${system.tumbling.tauC} s makes ${worst.id} ${hertz(worst.lineWidth)} wide instead of ${hertz(worst.given)}.`,
  };
}
