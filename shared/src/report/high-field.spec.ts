import { describe, expect, it } from 'vitest';
import { experimentOf, protonPair, systemOf } from '../../test/documents.js';
import { estimateHighFieldTruncation, highFieldTruncation } from './high-field.js';

describe('high-field truncation', () => {
  const crystal = (euler: [number, number, number]) => experimentOf({ sample: { kind: 'crystal', euler } });

  it('is J^2/(4 difference) for an unlike pair in solution', () => {
    const system = systemOf({
      nuclei: [
        { id: 'H', isotope: '1H', shift: 5 },
        { id: 'F', isotope: '19F', shift: -100 },
      ],
      couplings: [{ between: ['H', 'F'], j: 1e4 }],
    });
    const entry = highFieldTruncation(system, experimentOf());
    // Xi(19F) = 94.094011 % (IUPAC 2001). Two spins 1/2: levels ab, ba move by (sqrt(D^2 + J^2) - D)/2.
    const difference = 400e6 * (1 + 5e-6 - 0.94094011 * (1 - 100e-6));
    expect(entry.computed).toBe('exact-difference');
    expect(entry.hz / ((Math.hypot(difference, 1e4) - difference) / 2)).toBeCloseTo(1, 3);
    expect(estimateHighFieldTruncation(system, experimentOf()) / entry.hz).toBeCloseTo(1, 2);
  });

  it('is nothing for like nuclei in solution', () => {
    expect(highFieldTruncation(protonPair(20, 12), experimentOf()).hz).toBe(0);
  });

  it('of a shift tensor is the tilt of the field: sqrt((nu0 + Tzz)^2 + Txz^2) - nu0 - Tzz', () => {
    const system = systemOf({ nuclei: [{ id: 'P', isotope: '31P', shift: 0, csa: { span: 400, skew: 1 } }] });
    const at = experimentOf({ observe: '31P', sample: { kind: 'crystal', euler: [0, 45, 0] } });
    const entry = highFieldTruncation(system, at);
    const nu0 = 400e6 * 0.40480742; // Xi(31P), IUPAC 2001
    const [zz, xz] = [((-400 * 2) / 3 + 400 / 3) / 2, 400 / 2].map((ppm) => ppm * 1e-6 * nu0);
    expect(entry.hz).toBeCloseTo(Math.hypot(nu0 + zz, xz) - nu0 - zz, 3);
    const estimate = estimateHighFieldTruncation(system, at);
    expect(estimate / entry.hz).toBeGreaterThan(0.9);
    expect(estimate / entry.hz).toBeLessThan(1.1);
  });

  it('estimates bound the exact difference and stay within a factor of five of the worst orientation', () => {
    const cases = {
      'two protons': { observe: '1H', nuclei: ['1H', '1H'] },
      'carbon and proton': { observe: '13C', nuclei: ['13C', '1H'] },
      'proton and fluorine': { observe: '1H', nuclei: ['1H', '19F'] },
    };
    for (const { observe, nuclei } of Object.values(cases)) {
      const system = systemOf({
        nuclei: nuclei.map((isotope, k) => ({ id: `N${k}`, isotope, shift: 3 * k })),
        couplings: [{ between: ['N0', 'N1'], dipolar: { constant: -60e3 } }],
      });
      const tilts = [15, 30, 45, 60, 75, 90].map((tilt) =>
        experimentOf({ observe, sample: { kind: 'crystal', euler: [0, tilt, 0] } }),
      );
      const exact = Math.max(...tilts.map((experiment) => highFieldTruncation(system, experiment).hz));
      const estimate = estimateHighFieldTruncation(system, tilts[0]);
      expect(exact).toBeGreaterThan(1);
      expect(estimate).toBeGreaterThan(exact);
      expect(estimate).toBeLessThan(5 * exact);
    }
  });

  it('of a quadrupolar nucleus is the second-order shift when only the first order is kept', () => {
    const system = systemOf({ nuclei: [{ id: 'Na', isotope: '23Na', shift: 0, quadrupole: { cq: 1e6, eta: 0 } }] });
    const sample = { kind: 'crystal' as const, euler: [0, 90, 0] as [number, number, number] };
    const first = experimentOf({ observe: '23Na', quadrupoleOrder: 1, sample });
    const second = experimentOf({ observe: '23Na', quadrupoleOrder: 2, sample });
    const [left1, left2] = [first, second].map((experiment) => highFieldTruncation(system, experiment));
    // Field across the axis: V = CQ/16 (I+^2 + I-^2) apart from its diagonal, CQ sqrt 3/8 between levels 2 nu0 apart. The levels of
    // the central transition move by |V|^2/(2 nu0) away from each other, those of the satellites together.
    const nu0 = 400e6 * 0.264519; // Xi(23Na), IUPAC 2001
    expect(left1.hz / (((1e6 * Math.sqrt(3)) / 8) ** 2 / nu0)).toBeCloseTo(1, 2);
    expect(left2.hz).toBeLessThan(left1.hz / 20);
    for (const [experiment, entry] of [
      [first, left1],
      [second, left2],
    ] as const) {
      const estimate = estimateHighFieldTruncation(system, experiment);
      expect(estimate).toBeGreaterThan(entry.hz);
    }
    expect(estimateHighFieldTruncation(system, first)).toBeLessThan(20 * left1.hz);
  });

  it('takes powders over a set of orientations', () => {
    const system = systemOf({ nuclei: [{ id: 'P', isotope: '31P', shift: 0, csa: { span: 400, skew: 1 } }] });
    const powder = experimentOf({ observe: '31P', sample: { kind: 'powder', orientations: 100 } });
    expect(highFieldTruncation(system, powder).hz).toBeGreaterThan(
      highFieldTruncation(system, { ...crystal([0, 5, 0]), observe: '31P' }).hz,
    );
  });
});
