import { describe, expect, it } from 'vitest';
import type { ExperimentInput } from '../src/documents/experiment.schema.js';
import type { SpinSystem } from '../src/documents/system.schema.js';
import { relaxationNumbers } from '../src/dynamics/relaxation/relaxation-numbers.js';
import { simulate } from '../src/simulate/simulate.js';
import { absorptionAt } from './continuous-spectrum.js';
import { experimentOf, systemOf } from './documents.js';

/** Redfield relaxation in whole experiments, against numbers that come from Gamma alone or from closed formulas. */

const carbon = (tauC = 2e-9, j = 140) =>
  systemOf({
    nuclei: [
      { id: 'C', isotope: '13C', shift: 60, position: [0, 0, 0] },
      { id: 'H', isotope: '1H', shift: 4, position: [0, 0, 1.09] },
    ],
    couplings: [{ between: ['C', 'H'], j, dipolar: 'positions' }],
    tumbling: { tauC },
  });

const onCarbon = (parts: Partial<ExperimentInput> = {}) =>
  experimentOf({
    observe: '13C',
    relaxation: 'redfield',
    acquisition: { centre: 60, width: 4000, points: 16 },
    ...parts,
  });

const firstPoint = (system: SpinSystem, parts: Partial<ExperimentInput>) =>
  simulate(system, onCarbon(parts)).fid.real[0];

describe('Redfield relaxation', () => {
  it('leaves equilibrium alone', () => {
    const steps = [{ pulse: { on: '13C', flip: 90 } }, { acquire: {} }];
    const [at, after] = [steps, [{ delay: 3 }, ...steps]].map((sequence) =>
      firstPoint(carbon(), { sequence: { steps: sequence } }),
    );
    expect(at).toBeCloseTo(1, 12);
    expect(after).toBeCloseTo(1, 9);
  });

  it('brings saturated nuclei back to it', () => {
    const recovered = firstPoint(carbon(), { sequence: { recipe: 'saturation-recovery', delay: 60 } });
    expect(recovered).toBeCloseTo(1, 8);
  });

  it('has the steady-state NOE of the Solomon equations while a proton is saturated', () => {
    // Only the pair relaxes, so that no cross-correlation mixes in; the field of 50 Hz saturates to some 1e-4.
    const system = carbon(1e-10, 0);
    const [{ noe }] = relaxationNumbers(system, onCarbon());
    const enhancement = firstPoint(system, { sequence: { recipe: 'noe-difference', saturate: 'H', time: 40 } });
    expect(enhancement / noe.H).toBeCloseTo(1, 2);
  });

  it('recovers with T1 from inversion, decoupled or not', () => {
    const system = systemOf({
      nuclei: [{ id: 'C', isotope: '13C', shift: 60, csa: { span: 180, skew: 0.4 } }],
      tumbling: { tauC: 2e-9 },
    });
    const [{ t1 }] = relaxationNumbers(system, onCarbon());
    for (const delay of [0.3, 1.5, 6]) {
      const signal = firstPoint(system, { sequence: { recipe: 'inversion-recovery', delay } });
      expect(signal).toBeCloseTo(1 - 2 * Math.exp(-delay / t1!), 9);
    }
    const short = (decouple: string[]) =>
      firstPoint(carbon(), { decouple, sequence: { recipe: 'inversion-recovery', delay: 0.05 } });
    expect(short(['1H'])).toBeCloseTo(short([]), 9);
  });

  it('gives the halves of a doublet the widths R2 +- eta over pi (M. Goldman, J. Magn. Reson. 60 (1984) 437)', () => {
    const system = systemOf({
      nuclei: [
        { id: 'N', isotope: '15N', shift: 120, position: [0, 0, 0], csa: { span: 172, skew: 1, euler: [0, 17, 0] } },
        { id: 'H', isotope: '1H', shift: 8, position: [0, 0, 1.02] },
      ],
      couplings: [{ between: ['N', 'H'], j: -92, dipolar: 'positions' }],
      tumbling: { tauC: 8e-9 },
    });
    const experiment = experimentOf({
      protonMHz: 600,
      observe: '15N',
      relaxation: 'redfield',
      acquisition: { centre: 120, width: 4000, points: 32768 },
    });
    const result = simulate(system, experiment);
    const [n] = relaxationNumbers(system, experiment);
    const width = (offset: number) => {
      const height = absorptionAt(result, offset);
      let [low, high] = [0, 20];
      for (let k = 0; k < 30; k++) {
        const middle = (low + high) / 2;
        if (absorptionAt(result, offset + middle) > height / 2) low = middle;
        else high = middle;
      }
      return 2 * low;
    };
    const [left, right] = [width(-46), width(46)];
    expect(Math.abs(left - right) / n.widthDifference.H).toBeCloseTo(1, 2);
    // Their mean is that of the in-phase and the antiphase coherence, here within a few per cent of the former.
    expect((left + right) / 2 / n.lineWidth!).toBeGreaterThan(0.95);
    expect((left + right) / 2 / n.lineWidth!).toBeLessThan(1.1);
  });

  it('collapses the triplet of a proton on 14N as nitrogen relaxes faster', () => {
    const at = (tauC: number) =>
      simulate(
        systemOf({
          nuclei: [
            { id: 'H', isotope: '1H', shift: 5 },
            { id: 'N', isotope: '14N', shift: 0, quadrupole: { cq: 1e6 } },
          ],
          couplings: [{ between: ['H', 'N'], j: 50 }],
          tumbling: { tauC },
        }),
        // A low field, for extreme narrowing.
        experimentOf({ protonMHz: 40, relaxation: 'redfield', acquisition: { centre: 5, width: 2000, points: 16384 } }),
      );
    const ratio = (tauC: number) => {
      const result = at(tauC);
      return absorptionAt(result, 50) / absorptionAt(result, 0);
    };
    // J. A. Pople, Mol. Phys. 1 (1958) 168: [45 + y^2 (5 x^2 + 1)]/[225 x^2 + y^2 (34 x^4 - 2 x^2 + 4) + y^4 (x^6 - 2 x^4 + x^2)].
    for (const tauC of [1e-12, 1e-11, 5e-11]) {
      const t1 = 1 / (((3 * Math.PI ** 2) / 2) * 1e12 * tauC);
      const y = 10 * Math.PI * t1 * 50;
      const shape = (x: number) =>
        (45 + y ** 2 * (5 * x ** 2 + 1)) /
        (225 * x ** 2 + y ** 2 * (34 * x ** 4 - 2 * x ** 2 + 4) + y ** 4 * (x ** 6 - 2 * x ** 4 + x ** 2));
      expect(ratio(tauC) / (shape(1) / shape(0))).toBeCloseTo(1, 3);
    }
  });

  it('is the same in every state of an exchange', () => {
    const states = [
      { id: 's0', population: 0.5 },
      { id: 's1', population: 0.5 },
    ];
    const exchanging = {
      ...carbon(),
      states: states.map((state) => ({ ...state, shifts: {}, j: {} })),
      exchange: [{ from: 's0', to: 's1', rate: 100 }],
    };
    const [alone, both] = [carbon(), exchanging].map((system) => simulate(system, onCarbon()).fid);
    both.real.forEach((value, k) => expect(value).toBeCloseTo(alone.real[k], 8));
  });
});
