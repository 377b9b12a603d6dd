import type { Experiment } from '../documents/experiment.schema.js';
import type { SpinSystem } from '../documents/system.schema.js';
import { EngineError } from '../run/context.js';

export type Method = 'blocks' | 'liouville' | 'orientations';

/** The cheapest method that is exact for the documents, or the one asked for. Throws UNSUPPORTED where that one does not apply. */
export function methodFor(system: SpinSystem, experiment: Experiment): Method {
  const { method, sample } = experiment;
  const oriented = sample.kind !== 'solution';
  const best = oriented ? 'orientations' : isClosedPulseAcquire(system, experiment) ? 'blocks' : 'liouville';
  if (method === 'auto' || method === best) return best;
  if (method === 'liouville' && best === 'blocks') return 'liouville';
  throw new EngineError(
    'UNSUPPORTED',
    `'${method}' is not exact for these documents; 'auto' takes '${best}'`,
    'method',
  );
}

/** Whether nothing happens but one ideal pulse and an acquisition in which each nucleus decays by its line width. */
function isClosedPulseAcquire(system: SpinSystem, experiment: Experiment): boolean {
  const exchanging = (system.exchange ?? []).some(({ rate }) => rate !== 0);
  return !exchanging && experiment.relaxation === 'line-width' && isSinglePulse(experiment);
}

function isSinglePulse({ sequence, observe }: Experiment): boolean {
  if ('recipe' in sequence) return sequence.recipe === 'pulse-acquire';
  if (sequence.phaseCycle || sequence.steps.length !== 2) return false;
  const [first, second] = sequence.steps;
  if (!('pulse' in first) || !('acquire' in second)) return false;
  const { on, phase, seconds } = first.pulse;
  return on === observe && phase === second.acquire.phase && seconds === undefined;
}
