import type { Experiment } from '../documents/experiment.schema.js';
import { sortedPair } from '../documents/system.rules.js';
import type { SpinSystem } from '../documents/system.schema.js';

/** The quantities along which a series of runs may go. */
export const VARIED = ['field', 'temperature', 'spinning', 'delay', 'rate', 'coupling', 'tauC'] as const;
export type Varied = (typeof VARIED)[number];

/** One quantity and its values; `target` is 'from,to' of an exchange step or 'a,b' of a coupling. */
export interface Variation {
  quantity: Varied;
  target?: string;
  values: readonly number[];
}

/** Unit of each quantity, for labels. */
export const VARIED_UNITS: Record<Varied, string> = {
  field: 'MHz',
  temperature: 'K',
  spinning: 'Hz',
  delay: 's',
  rate: 's\u207b\u00b9',
  coupling: 'Hz',
  tauC: 's',
};

/** The experiment's one delay: the time that its recipe asks for. */
const DELAYS = ['tau', 'delay', 'time'] as const;

/** The pair of documents with one value put in its place; null where the documents have no such quantity. */
export function varied(
  system: SpinSystem,
  experiment: Experiment,
  { quantity, target }: Pick<Variation, 'quantity' | 'target'>,
  value: number,
): { system: SpinSystem; experiment: Experiment } | null {
  switch (quantity) {
    case 'field':
      return { system, experiment: { ...experiment, protonMHz: value } };
    case 'temperature':
      return { system, experiment: { ...experiment, temperature: value } };
    case 'spinning': {
      const { sample } = experiment;
      return sample.kind === 'spinning'
        ? { system, experiment: { ...experiment, sample: { ...sample, rateHz: value } } }
        : null;
    }
    case 'delay':
      return withDelay(system, experiment, value);
    case 'rate':
      return withRate(system, experiment, target, value);
    case 'coupling':
      return withCoupling(system, experiment, target, value);
    case 'tauC':
      return { system: { ...system, tumbling: { tauC: value } }, experiment };
  }
}

function withDelay(system: SpinSystem, experiment: Experiment, value: number) {
  const { sequence } = experiment;
  const name = DELAYS.find((key) => key in sequence);
  return name ? { system, experiment: { ...experiment, sequence: { ...sequence, [name]: value } } } : null;
}

function withRate(system: SpinSystem, experiment: Experiment, target: string | undefined, rate: number) {
  const steps = system.exchange ?? [];
  const index = target ? steps.findIndex(({ from, to }) => sortedPair(from, to) === sortedPair(...pairOf(target))) : 0;
  if (!steps[index]) return null;
  const exchange = steps.map((step, i) => (i === index ? { from: step.from, to: step.to, rate } : step));
  return { system: { ...system, exchange }, experiment };
}

function withCoupling(system: SpinSystem, experiment: Experiment, target: string | undefined, j: number) {
  const index = system.couplings.findIndex(
    ({ between: [a, b] }) => target === undefined || sortedPair(a, b) === sortedPair(...pairOf(target)),
  );
  if (index < 0) return null;
  const couplings = system.couplings.map((coupling, i) => (i === index ? { ...coupling, j } : coupling));
  return { system: { ...system, couplings }, experiment };
}

function pairOf(target: string): [string, string] {
  const [a = '', b = ''] = target.split(',');
  return [a.trim(), b.trim()];
}

/** `count` values from `first` to `last`, evenly apart or, both being positive, by equal ratios. */
export function spread(first: number, last: number, count: number, ratios = false): number[] {
  return Array.from({ length: count }, (_, i) => {
    const share = count === 1 ? 0 : i / (count - 1);
    const value = ratios ? first * (last / first) ** share : first + share * (last - first);
    return +value.toPrecision(6);
  });
}
