import type { Experiment } from '../documents/experiment.schema.js';
import type { Approximation } from '../documents/result.js';
import type { SpinSystem } from '../documents/system.schema.js';
import { extents } from './extents.js';
import { hertz } from './text.js';

/** How far lines stand outside the window and fold into it: there is no filter. */
export function folding(system: SpinSystem, experiment: Experiment): Approximation {
  const half = experiment.acquisition.width / 2;
  const outside = extents(system, experiment)
    .map(({ id, low, high }) => ({ id, hz: Math.max(-half - low, high - half, 0) }))
    .filter(({ hz }) => hz > 0)
    .sort((p, q) => q.hz - p.hz);
  const hz = outside[0]?.hz ?? 0;
  const named = outside.slice(0, 6).map(({ id }) => id);
  return {
    id: 'folding',
    title: 'Folding into the window',
    made: true,
    hz,
    computed: 'estimate',
    warnAbove: 0,
    detail:
      hz > 0
        ? `Lines of ${named.join(', ')} reach up to ${hertz(hz)} beyond the window and fold into it.`
        : 'All lines stand inside the window, by first-order widths of the multiplets and patterns.',
  };
}
