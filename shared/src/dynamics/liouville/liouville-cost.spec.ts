import { describe, expect, it } from 'vitest';
import { experimentOf, systemOf } from '../../../test/documents.js';
import type { ExperimentInput } from '../../documents/experiment.schema.js';
import { liouvilleCost } from './liouville-cost.js';

/** A chain of n coupled protons. */
function chain(n: number, rates: { t1?: number; t2?: number } = {}) {
  const nuclei = Array.from({ length: n }, (_, k) => ({ id: `H${k}`, isotope: '1H', shift: 5 + k / 5, ...rates }));
  const couplings = nuclei.slice(1).map(({ id }, k) => ({ between: [`H${k}`, id] as [string, string], j: 7 }));
  return systemOf({ nuclei, couplings });
}

const cost = (n: number, rates: { t1?: number; t2?: number } = {}, experiment: Partial<ExperimentInput> = {}) =>
  liouvilleCost(chain(n, rates), experimentOf(experiment));

const echo = { sequence: { recipe: 'spin-echo', tau: 0.02 } } as const;
const relaxing = { relaxation: 't1-t2' } as const;

describe('liouvilleCost', () => {
  it('counts coherences of order -1: C(2n, n - 1) of n spins 1/2', () => {
    expect([1, 2, 3, 6].map((n) => cost(n).detected)).toEqual([1, 4, 15, 792]);
    expect(cost(6).basis).toBe(64);
  });

  it('counts them over states, and with the orders of other isotopes', () => {
    const system = systemOf({
      nuclei: [
        { id: 'H', isotope: '1H', shift: 5 },
        { id: 'N', isotope: '14N', shift: 0 },
      ],
      couplings: [{ between: ['H', 'N'], j: 50 }],
      states: [
        { id: 'p', population: 0.5 },
        { id: 'q', population: 0.5 },
      ],
      exchange: [{ from: 'p', to: 'q', rate: 10 }],
    });
    // 1 of the proton times 3 of nitrogen times 2 states.
    expect(liouvilleCost(system, experimentOf())).toMatchObject({ basis: 6, detected: 6 });
  });

  it('writes groups out only where relaxation tells their nuclei apart', () => {
    const system = systemOf({ nuclei: [{ id: 'M', isotope: '1H', shift: 1, count: 3 }] });
    expect(liouvilleCost(system, experimentOf()).basis).toBe(4);
    expect(liouvilleCost(system, experimentOf(relaxing)).basis).toBe(8);
  });

  it('lets ten closed protons through the limits of a run, and stops nine that relax by flips', () => {
    expect(cost(10, {}, echo).seconds).toBeLessThan(60);
    expect(cost(10, {}, echo).bytes).toBeLessThan(2 ** 30);
    expect(cost(9, { t1: 1, t2: 0.5 }, { ...relaxing, ...echo }).seconds).toBeGreaterThan(600);
  });

  it('is dearer with flips than without, and for every step more', () => {
    const t2Only = cost(6, { t2: 0.5 }, relaxing).seconds;
    const both = cost(6, { t1: 1, t2: 0.5 }, relaxing).seconds;
    expect(both).toBeGreaterThan(t2Only);
    expect(cost(6, { t1: 1, t2: 0.5 }, { ...relaxing, ...echo }).seconds).toBeGreaterThan(both);
  });
});
