import { describe, expect, it } from 'vitest';
import { simulate } from '../src/simulate/simulate.js';
import { absorptionAt } from './continuous-spectrum.js';
import { experimentOf, systemOf } from './documents.js';
import { CENTRE, MHZ } from './magnetisation.js';
import { referenceCases } from './reference/catalogue.js';

describe('D10 proton coupled to a relaxing spin 1', () => {
  type Inputs = { J_Hz: number; T1_spin1_s: number };
  type Expected = { points_Hz: number[]; S_per_Hz: number[] };

  it.each(referenceCases<Inputs, Expected>('D10'))('$id', ({ inputs, expected, tolerance }) => {
    const { J_Hz: j, T1_spin1_s: t1 } = inputs;
    // 1/T1 = (3/2) pi^2 CQ^2 tauC for I = 1 without asymmetry, in the extreme narrowing that the case assumes.
    const tauC = 1e-13;
    const cq = Math.sqrt(1 / (1.5 * Math.PI ** 2 * tauC * t1));
    const system = systemOf({
      nuclei: [
        { id: 'H', isotope: '1H', shift: CENTRE },
        { id: 'N', isotope: '14N', shift: CENTRE, quadrupole: { cq, eta: 0 } },
      ],
      couplings: [{ between: ['H', 'N'], j }],
      tumbling: { tauC },
    });
    // Slowest: 2/(5 T1) of the middle line, or the mean square of 2 pi J times the time 5 T1/3 that a site lasts, when narrowed.
    const slowest = Math.min(2 / (5 * t1), ((2 * Math.PI * j) ** 2 * (2 / 3) * (5 * t1)) / 3);
    const width = 12 * Math.max(2 * Math.PI * j, 3 / (5 * t1));
    const points = 2 * Math.ceil((width * 40) / slowest / 2);
    const acquisition = { centre: CENTRE, width, points };
    const result = simulate(system, experimentOf({ protonMHz: MHZ, relaxation: 'redfield', acquisition }));
    expected.points_Hz.forEach((hz, k) => {
      expect(Math.abs(absorptionAt(result, hz) / expected.S_per_Hz[k] - 1), `${hz} Hz`).toBeLessThan(tolerance.rel);
    });
  });
});
