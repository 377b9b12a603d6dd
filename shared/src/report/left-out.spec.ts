import { describe, expect, it } from 'vitest';
import { parseExperiment, parseSystem } from '../documents/parse.js';
import type { ExperimentInput } from '../documents/experiment.schema.js';
import type { SpinSystemInput } from '../documents/system.schema.js';
import { dipolarConstantHz } from '../interactions/tensors.js';
import { blochSiegertShift, idealDecoupling } from './decoupling.js';
import { fidCutOff, lineWidth } from './fid-cut-off.js';
import { estimateFirstOrderDisplacement, firstOrderReading } from './first-order.js';
import { folding } from './folding.js';
import { estimateHighFieldTruncation, highFieldTruncation } from './high-field.js';
import { whatIsLeftOut } from './left-out.js';
import { neglectedCouplings } from './neglected-couplings.js';
import { excitation, idealPulses, rotatingFrame } from './pulses.js';
import { relaxationLeftOut } from './relaxation-left-out.js';

function systemOf(parts: Omit<SpinSystemInput, 'format' | 'name'>) {
  return parseSystem({ format: 'heddle.spin-system/1', name: 'test', ...parts });
}

function experimentOf(parts: Partial<ExperimentInput> = {}) {
  const acquisition = { centre: 5, width: 4000, points: 16384 };
  return parseExperiment({ format: 'heddle.experiment/1', protonMHz: 400, observe: '1H', acquisition, ...parts });
}

const pair = (difference: number, j: number) =>
  systemOf({
    nuclei: [
      { id: 'A', isotope: '1H', shift: 5 },
      { id: 'B', isotope: '1H', shift: 5 + difference / 400 },
    ],
    couplings: [{ between: ['A', 'B'], j }],
  });

describe('first-order reading', () => {
  it('is exact for an AB quartet: lines at (sqrt(D^2 + J^2) +- J)/2, intensities 1 -+ J/sqrt(D^2 + J^2)', () => {
    // J. A. Pople, W. G. Schneider, H. J. Bernstein, High-Resolution NMR, 1959, ch. 6.
    for (const [difference, j] of [
      [100, 10],
      [30, 12],
      [20, -7],
    ]) {
      const entry = firstOrderReading(pair(difference, j), experimentOf());
      const root = Math.hypot(difference, j);
      expect(entry.computed).toBe('exact-difference');
      expect(entry.hz).toBeCloseTo((root - difference) / 2, 8);
      expect(estimateFirstOrderDisplacement(pair(difference, j), experimentOf())).toBeCloseTo(entry.hz, 8);
      const intensity = +/intensities by ([\d.]+) %/.exec(entry.detail)![1] / 100;
      expect(Math.abs(intensity - Math.abs(j) / root)).toBeLessThan(0.005);
    }
  });

  it('estimates within a factor of two of the exact difference for ABX-like chains', () => {
    for (const gap of [20, 40, 80, 200]) {
      const system = systemOf({
        nuclei: [0, 1, 2.7].map((k, row) => ({ id: `H${row}`, isotope: '1H', shift: 4 + (k * gap) / 400 })),
        couplings: [
          { between: ['H0', 'H1'], j: 9 },
          { between: ['H1', 'H2'], j: 6 },
        ],
      });
      const ratio =
        estimateFirstOrderDisplacement(system, experimentOf()) / firstOrderReading(system, experimentOf()).hz;
      expect(ratio).toBeGreaterThan(0.5);
      expect(ratio).toBeLessThan(2);
    }
  });

  it('is nothing for equivalent nuclei and for an isolated methyl group', () => {
    expect(firstOrderReading(pair(0, 12), experimentOf()).hz).toBeCloseTo(0, 8);
    const methyl = systemOf({ nuclei: [{ id: 'M', isotope: '1H', shift: 1, count: 3 }] });
    expect(firstOrderReading(methyl, experimentOf()).hz).toBe(0);
  });

  it('warns where lines move by more than their width', () => {
    const strong = firstOrderReading(pair(20, 12), experimentOf({ lineWidth: 0.5 }));
    expect(strong.hz).toBeGreaterThan(strong.warnAbove);
    const weak = firstOrderReading(pair(600, 7), experimentOf({ lineWidth: 0.5 }));
    expect(weak.hz).toBeLessThan(weak.warnAbove);
  });

  it('falls back to the estimate for large fragments', () => {
    const nuclei = Array.from({ length: 8 }, (_, k) => ({ id: `H${k}`, isotope: '1H', shift: 1 + k }));
    const couplings = nuclei.slice(1).map(({ id }, k) => ({ between: [`H${k}`, id] as [string, string], j: 7 }));
    const entry = firstOrderReading(systemOf({ nuclei, couplings }), experimentOf());
    expect(entry.computed).toBe('estimate');
    expect(entry.hz).toBeCloseTo(2 * ((Math.hypot(400, 7) - 400) / 2), 8);
  });
});

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
    expect(highFieldTruncation(pair(20, 12), experimentOf()).hz).toBe(0);
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

describe('pulses', () => {
  it('excites as a turn about the effective field: nothing lost on resonance, numbers by integrating the Bloch equations', () => {
    expect(excitation(0, 25e3)).toEqual({ amplitude: 1, phase: 0 });
    for (const offset of [2e3, 10e3, 40e3]) {
      const { amplitude, phase } = excitation(offset, 25e3);
      // dM/dt = w x M by small exact steps of Heun's method.
      let m = [0, 0, 1];
      const steps = 20_000;
      const dt = 1 / (4 * 25e3) / steps;
      const cross = ([x, y, z]: number[]) => {
        const [wx, wz] = [2 * Math.PI * 25e3, 2 * Math.PI * offset];
        return [-wz * y, wz * x - wx * z, wx * y];
      };
      for (let k = 0; k < steps; k++) {
        const slope = cross(m);
        const next = cross(m.map((value, i) => value + dt * slope[i]));
        m = m.map((value, i) => value + (dt / 2) * (slope[i] + next[i]));
      }
      expect(amplitude).toBeCloseTo(Math.hypot(m[0], m[1]), 5);
      expect(phase).toBeCloseTo((Math.atan2(m[0], -m[1]) * 180) / Math.PI, 2);
    }
  });

  it('warns for lines far from the carrier and says nothing of sequences without ideal pulses', () => {
    const far = systemOf({ nuclei: [{ id: 'F', isotope: '19F', shift: -100 }] });
    const experiment = experimentOf({ observe: '19F' });
    const entry = idealPulses(far, experiment);
    expect(entry.made).toBe(true);
    expect(entry.hz).toBeCloseTo(105 * 400 * 0.94094011, 2);
    expect(entry.hz).toBeGreaterThan(entry.warnAbove);
    const finite = experimentOf({
      observe: '19F',
      sequence: { steps: [{ pulse: { on: '19F', flip: 90, seconds: 1e-5 } }, { acquire: {} }] },
    });
    expect(idealPulses(far, finite)).toMatchObject({ made: false, hz: 0 });
    // 25 kHz at 376 MHz: nu1^2/(4 nu0) = 0.415 Hz.
    expect(rotatingFrame(finite)!.hz).toBeCloseTo(25e3 ** 2 / (4 * 400e6 * 0.94094011), 9);
    expect(rotatingFrame(experiment)).toBeNull();
  });
});

describe('decoupling', () => {
  const system = systemOf({
    nuclei: [
      { id: 'C', isotope: '13C', shift: 30 },
      { id: 'Ha', isotope: '1H', shift: 1 },
      { id: 'Hb', isotope: '1H', shift: 9 },
    ],
    couplings: [
      { between: ['C', 'Ha'], j: 130 },
      { between: ['C', 'Hb'], j: 8 },
    ],
  });

  it('shifts as the exact precession in an oscillating field', () => {
    // Scaled down so that the laboratory frame can be integrated: nu0 = 1, field at 0.6, strong enough to see.
    const [nu0, nud, nutation] = [1, 0.6, 0.05];
    const expected = (nutation ** 2 * nu0) / (nu0 ** 2 - nud ** 2);
    const periods = 400;
    const perPeriod = 400;
    const dt = 1 / perPeriod;
    let m = [1, 0, 0];
    let [turns, last] = [0, 0];
    const slope = ([x, y, z]: number[], t: number) => {
      const [wx, wz] = [2 * Math.PI * 2 * nutation * Math.cos(2 * Math.PI * nud * t), 2 * Math.PI * nu0];
      return [-wz * y, wz * x - wx * z, wx * y];
    };
    for (let k = 0; k < periods * perPeriod; k++) {
      const t = k * dt;
      // Fourth-order Runge-Kutta.
      const a = slope(m, t);
      const b = slope(
        m.map((v, i) => v + (dt / 2) * a[i]),
        t + dt / 2,
      );
      const c = slope(
        m.map((v, i) => v + (dt / 2) * b[i]),
        t + dt / 2,
      );
      const d = slope(
        m.map((v, i) => v + dt * c[i]),
        t + dt,
      );
      m = m.map((v, i) => v + (dt / 6) * (a[i] + 2 * b[i] + 2 * c[i] + d[i]));
      const angle = Math.atan2(m[1], m[0]) / (2 * Math.PI);
      turns += angle - last - Math.round(angle - last);
      last = angle;
    }
    const shift = turns / periods - nu0;
    expect(shift / expected).toBeGreaterThan(0.85);
    expect(shift / expected).toBeLessThan(1.15);
  });

  it('scales with the square of the field and the magnetogyric ratios', () => {
    const experiment = { observe: '13C', protonMHz: 400 };
    const shift = blochSiegertShift('1H', experiment, 3000);
    // 3 kHz on 1H turns 13C with 754.5 Hz; nu0 = 100.58, field at 400 MHz.
    expect(shift).toBeCloseTo((754.5 ** 2 * 100.58e6) / (100.58e6 ** 2 - 400e6 ** 2), 5);
    expect(blochSiegertShift('1H', experiment, 6000) / shift).toBeCloseTo(4, 12);
  });

  it('names the splitting that continuous irradiation leaves: J offset/sqrt(offset^2 + nutation^2)', () => {
    const [bloch, splitting] = idealDecoupling(system, experimentOf({ observe: '13C', decouple: ['1H'] }), 3000);
    expect(bloch.id).toBe('bloch-siegert');
    // Protons at 1 and 9 ppm stand 1600 Hz from their mean.
    expect(splitting.hz).toBeCloseTo((130 * 1600) / Math.hypot(1600, 3000), 6);
    expect(idealDecoupling(system, experimentOf({ observe: '13C' }))).toEqual([]);
    const switchedOff = experimentOf({
      observe: '13C',
      decouple: ['1H'],
      sequence: { steps: [{ pulse: { on: '13C', flip: 90 } }, { decouple: [] }, { acquire: {} }] },
    });
    expect(idealDecoupling(system, switchedOff)).toEqual([]);
  });
});

describe('end of the FID', () => {
  const line = systemOf({ nuclei: [{ id: 'H', isotope: '1H', shift: 5, lineWidth: 2 }] });

  it('has the width of the decay if that ends within the time, and of the sinc function if there is none', () => {
    expect(lineWidth({ lorentzian: 2, gaussian: 0 }, 6)).toBeCloseTo(2, 3);
    expect(lineWidth({ lorentzian: 0, gaussian: 3 }, 4)).toBeCloseTo(3, 3);
    // sin(x)/x = 1/2 at x = 1.895494.
    expect(lineWidth({ lorentzian: 0, gaussian: 0 }, 0.5)).toBeCloseTo(1.895494 / Math.PI / 0.5, 4);
  });

  it('is negligible for a long FID and warns for a short one', () => {
    const long = fidCutOff(line, experimentOf());
    expect(long.hz).toBeLessThan(0.01);
    const short = fidCutOff(line, experimentOf({ acquisition: { centre: 5, width: 4000, points: 1024 } }));
    expect(short.hz).toBeGreaterThan(short.warnAbove);
    expect(short.detail).toContain('20 %'); // exp(-pi 2 0.256) = 0.2
  });
});

describe('folding', () => {
  it('counts from the edge of the window to the outermost line', () => {
    const outside = folding(pair(2000, 10), experimentOf({ acquisition: { centre: 5, width: 3900, points: 1024 } }));
    expect(outside.hz).toBeCloseTo(2000 + 5 - 1950, 6);
    expect(outside.detail).toContain('B');
    expect(folding(pair(100, 10), experimentOf()).hz).toBe(0);
  });
});

describe('neglected couplings', () => {
  const system = systemOf({
    nuclei: [
      { id: 'A', isotope: '1H', shift: 1, position: [0, 0, 0] },
      { id: 'B', isotope: '1H', shift: 2, position: [0, 0, 2] },
      { id: 'C', isotope: '1H', shift: 3, position: [0, 3, 2] },
    ],
    couplings: [{ between: ['A', 'B'], dipolar: 'positions' }],
    tumbling: { tauC: 1e-9 },
  });

  it('finds the strongest pair without a coupling in a solid', () => {
    const entry = neglectedCouplings(system, experimentOf({ sample: { kind: 'powder', orientations: 10 } }))!;
    expect(entry.hz).toBeCloseTo(3 * Math.abs(dipolarConstantHz('1H', '1H', 3)), 6);
    expect(entry.detail).toContain('2 pairs');
    expect(neglectedCouplings(system, experimentOf())).toBeNull();
  });

  it('gives the width that they would add to Redfield relaxation', () => {
    const entry = neglectedCouplings(system, experimentOf({ relaxation: 'redfield' }))!;
    expect(entry.computed).toBe('exact-difference');
    // The rate of C alone: (b^2/20)(5 tauC + 9 j(w) + 6 j(2w)) from B and from A (A. Abragam 1961, ch. VIII).
    const [tauC, w] = [1e-9, 2 * Math.PI * 400e6];
    const j = (x: number) => tauC / (1 + (x * tauC) ** 2);
    const rate = (distance: number) =>
      ((2 * Math.PI * dipolarConstantHz('1H', '1H', distance)) ** 2 / 20) * (5 * tauC + 9 * j(w) + 6 * j(2 * w));
    expect(entry.hz / ((rate(3) + rate(Math.hypot(3, 2))) / Math.PI)).toBeCloseTo(1, 9);
  });
});

describe('relaxation that was not asked for', () => {
  it('compares the widths of tumbling with those given', () => {
    const system = systemOf({
      nuclei: [{ id: 'D', isotope: '2H', shift: 1, lineWidth: 1, quadrupole: { cq: 170e3 } }],
      tumbling: { tauC: 5e-12 },
    });
    const experiment = experimentOf({ observe: '2H' });
    // 3/8 (2 pi CQ)^2 tauC over pi in extreme narrowing (A. Abragam 1961, ch. VIII).
    const width = ((3 / 8) * (2 * Math.PI * 170e3) ** 2 * 5e-12) / Math.PI;
    expect(relaxationLeftOut(system, experiment)!.hz).toBeCloseTo(Math.abs(width - 1), 4);
    expect(relaxationLeftOut(system, { ...experiment, relaxation: 'redfield' })).toBeNull();
  });
});

describe('whatIsLeftOut', () => {
  it('gives every entry a number, a threshold and a sentence', () => {
    const entries = whatIsLeftOut(pair(100, 10), experimentOf());
    expect(entries.map(({ id }) => id)).toEqual([
      'first-order-reading',
      'high-field-truncation',
      'ideal-pulses',
      'fid-cut-off',
      'folding',
    ]);
    for (const { hz, warnAbove, detail, title } of entries) {
      expect(Number.isFinite(hz) && hz >= 0 && warnAbove >= 0).toBe(true);
      expect(detail.length > 20 && title.length > 3).toBe(true);
    }
  });
});
