import type { Experiment } from '../documents/experiment.schema.js';
import type { SpinSystem } from '../documents/system.schema.js';
import { blocksCost } from '../dynamics/blocks/blocks-cost.js';
import { liouvilleCost } from '../dynamics/liouville/liouville-cost.js';
import { orientedCost } from '../dynamics/oriented/oriented-cost.js';
import { methodFor, type Method } from './method.js';

type Cost = { seconds: number; bytes: number } & Record<string, number>;

const COSTS: Record<Method, (system: SpinSystem, experiment: Experiment) => Cost> = {
  blocks: (system, experiment) => ({ ...blocksCost(system, experiment) }),
  liouville: (system, experiment) => ({ ...liouvilleCost(system, experiment) }),
  orientations: (system, experiment) => ({ ...orientedCost(system, experiment) }),
};

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
  const { seconds, bytes, ...dimensions } = COSTS[method](system, experiment);
  return { method, seconds, bytes, dimensions: { ...dimensions } };
}
