import type { Experiment } from '../documents/experiment.schema.js';
import type { SpinSystem } from '../documents/system.schema.js';
import { blocksCost } from '../dynamics/blocks/blocks-cost.js';
import { EngineError } from '../run/context.js';
import { methodFor, type Method } from './method.js';

/** What a run will take, told before it starts: seconds of one core of a machine of 2020, bytes at once, and the counts. */
export interface CostEstimate {
  method: Method;
  seconds: number;
  bytes: number;
  dimensions: Record<string, number>;
}

/** Estimates the cost of `simulate` without doing its work. */
export function estimateCost(system: SpinSystem, experiment: Experiment): CostEstimate {
  const method = methodFor(system, experiment);
  if (method !== 'blocks')
    throw new EngineError('UNSUPPORTED', 'this kind of experiment is not computed yet', 'sequence');
  const { seconds, bytes, ...dimensions } = blocksCost(system, experiment);
  return { method, seconds, bytes, dimensions };
}
