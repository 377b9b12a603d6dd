import { describe, expect, it } from 'vitest';
import { parseExperiment, parseSystem } from '../documents/parse.js';
import { spread, varied } from './series.js';

const system = parseSystem({
  format: 'heddle.spin-system/1',
  name: 'Pair',
  nuclei: [
    { id: 'A', isotope: '1H', shift: 1 },
    { id: 'B', isotope: '1H', shift: 2 },
  ],
  couplings: [{ between: ['A', 'B'], j: 7 }],
  states: [
    { id: 's', population: 0.5 },
    { id: 't', population: 0.5, shifts: { A: 2, B: 1 } },
  ],
  exchange: [{ from: 's', to: 't', eyring: { enthalpy: 60, entropy: 0 } }],
});
const experiment = parseExperiment({
  format: 'heddle.experiment/1',
  protonMHz: 400,
  observe: '1H',
  sequence: { recipe: 'spin-echo', tau: 0.01 },
  acquisition: { centre: 1.5, width: 1000, points: 256 },
});

describe('varied', () => {
  it('puts a value in its one place and leaves the rest', () => {
    expect(varied(system, experiment, { quantity: 'field' }, 600)!.experiment.protonMHz).toBe(600);
    expect(varied(system, experiment, { quantity: 'delay' }, 0.5)!.experiment.sequence).toEqual({
      recipe: 'spin-echo',
      tau: 0.5,
    });
    expect(varied(system, experiment, { quantity: 'rate', target: 't,s' }, 80)!.system.exchange).toEqual([
      { from: 's', to: 't', rate: 80 },
    ]);
    expect(varied(system, experiment, { quantity: 'coupling', target: 'B,A' }, 3)!.system.couplings[0].j).toBe(3);
    expect(system.couplings[0].j).toBe(7);
  });

  it('says so where the documents have no such quantity', () => {
    expect(varied(system, experiment, { quantity: 'spinning' }, 1000)).toBeNull();
    expect(varied(system, experiment, { quantity: 'coupling', target: 'A,C' }, 3)).toBeNull();
  });
});

describe('spread', () => {
  it('goes from the first to the last', () => expect(spread(1, 3, 5)).toEqual([1, 1.5, 2, 2.5, 3]));
  it('goes by equal ratios', () => expect(spread(1, 1000, 4, true)).toEqual([1, 10, 100, 1000]));
});
