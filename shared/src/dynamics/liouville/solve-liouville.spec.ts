import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { experimentOf, systemOf } from '../../../test/documents.js';
import { magnetisationAfter, ppmAt, pulse, signalAfter } from '../../../test/magnetisation.js';
import type { ExperimentInput, Step } from '../../documents/experiment.schema.js';
import type { SpinSystem, SpinSystemInput } from '../../documents/system.schema.js';
import { nuclide } from '../../nuclides/nuclides.js';
import { EngineError, SILENT } from '../../run/context.js';
import type { ComplexArray } from '../../run/solved.js';
import { solveLiouville } from './solve-liouville.js';

const acquisition = { centre: 5, width: 1500, points: 64 };

function solve(system: SpinSystem, experiment: Partial<ExperimentInput> = {}) {
  return solveLiouville(system, experimentOf({ acquisition, lineWidth: 0, ...experiment }), SILENT);
}

function expectClose(a: ComplexArray, b: ComplexArray, bound: number): void {
  a.real.forEach((x, k) => expect(Math.hypot(x - b.real[k], a.imag[k] - b.imag[k]), `${k}`).toBeLessThan(bound));
}

/** Three protons, A and B strongly coupled, in two states of which the second moves all shifts and couplings. */
function exchanging(rate: number, population = 0.3, more: Partial<SpinSystemInput> = {}): SpinSystem {
  return systemOf({
    nuclei: ['A', 'B', 'C'].map((id, n) => ({ id, isotope: '1H', shift: ppmAt(-200 + 150 * n) })),
    couplings: [
      { between: ['A', 'B'], j: 60 },
      { between: ['B', 'C'], j: -9 },
    ],
    states: [
      { id: 'p', population },
      { id: 'q', population: 1 - population, shifts: { A: ppmAt(90), C: ppmAt(333) }, j: { 'A,B': 20, 'C,A': 7 } },
    ],
    exchange: [{ from: 'p', to: 'q', rate }],
    ...more,
  });
}

/** `exchanging` as one system, with the second state's share `q` of every shift and coupling. */
function mixed(q: number): SpinSystem {
  const between = (p: number, other: number) => (1 - q) * p + q * other;
  return systemOf({
    nuclei: [
      { id: 'A', isotope: '1H', shift: ppmAt(between(-200, 90)) },
      { id: 'B', isotope: '1H', shift: ppmAt(-50) },
      { id: 'C', isotope: '1H', shift: ppmAt(between(100, 333)) },
    ],
    couplings: [
      { between: ['A', 'B'], j: between(60, 20) },
      { between: ['B', 'C'], j: -9 },
      { between: ['A', 'C'], j: between(0, 7) },
    ],
  });
}

describe('exchange', () => {
  it('at rate 0 is the sum of the separate systems by population', () => {
    const [p, q] = [solve(mixed(0)).fid, solve(mixed(1)).fid];
    const expected = {
      real: p.real.map((x, k) => 0.3 * x + 0.7 * q.real[k]),
      imag: p.imag.map((x, k) => 0.3 * x + 0.7 * q.imag[k]),
    };
    expectClose(solve(exchanging(0)).fid, expected, 1e-9);
    // The same through composite space, with a rate that does nothing within the signal.
    expectClose(solve(exchanging(1e-9)).fid, expected, 1e-8);
  });

  it('at 1e9 per second is the averaged system', () => {
    // What is left of exchange broadens by p q (2 pi 290 Hz)^2/k_ex = 5e-4 s^-1: 2e-5 of three protons in 43 ms.
    expectClose(solve(exchanging(1e9)).fid, solve(mixed(0.7)).fid, 3e-5);
  });

  it('does not show between states alike, whatever the rate and the populations', () => {
    const rates = fc.double({ min: 0.1, max: 1e5, noNaN: true });
    const populations = fc.double({ min: 0.05, max: 0.95, noNaN: true });
    fc.assert(
      fc.property(rates, populations, (rate, population) => {
        const states = [
          { id: 'p', population },
          { id: 'q', population: 1 - population },
        ];
        expectClose(solve(exchanging(rate, population, { states })).fid, solve(mixed(0)).fid, 1e-8);
      }),
      { numRuns: 15 },
    );
  });

  it('takes no part of the signal at its start, and never lets it grow beyond', () => {
    fc.assert(
      fc.property(fc.double({ min: 1, max: 1e6, noNaN: true }), (rate) => {
        const { fid } = solve(exchanging(rate));
        expect(fid.real[0]).toBeCloseTo(3, 9);
        fid.real.forEach((x, k) => expect(Math.hypot(x, fid.imag[k])).toBeLessThan(3 + 1e-9));
      }),
      { numRuns: 10 },
    );
  });

  it('works on the total spins of groups as on their nuclei written out', () => {
    const exchange = [{ from: 'p', to: 'q', rate: 150 }];
    const states = [
      { id: 'p', population: 0.4 },
      { id: 'q', population: 0.6, shifts: { A: ppmAt(120) } },
    ];
    const group = systemOf({
      nuclei: [
        { id: 'A', isotope: '1H', shift: ppmAt(0) },
        { id: 'M', isotope: '1H', shift: ppmAt(55), count: 3 },
      ],
      couplings: [{ between: ['A', 'M'], j: 18 }],
      ...{ states, exchange },
    });
    const written = systemOf({
      nuclei: [
        { id: 'A', isotope: '1H', shift: ppmAt(0) },
        ...['M1', 'M2', 'M3'].map((id) => ({ id, isotope: '1H', shift: ppmAt(55) })),
      ],
      couplings: ['M1', 'M2', 'M3'].map((id) => ({ between: ['A', id] as [string, string], j: 18 })),
      ...{ states, exchange },
    });
    const solved = solve(group);
    const apart = solve(written);
    expectClose(solved.fid, apart.fid, 1e-9);
    expect(solved.dimensions.largestMatrix).toBeLessThan(apart.dimensions.largestMatrix);
  });
});

describe('equilibrium', () => {
  it.each(['line-width', 't1-t2'] as const)('is stationary with exchange and %s', (relaxation) => {
    const system = exchanging(77, 0.3, {
      nuclei: ['A', 'B', 'C'].map((id, n) => ({ id, isotope: '1H', shift: ppmAt(99 * n), t1: 0.2 + n, t2: 0.1 + n })),
    });
    expectClose(
      signalAfter(system, [{ delay: 0.37 }, pulse('1H', 90)], { relaxation, acquisition }),
      signalAfter(system, [pulse('1H', 90)], { relaxation, acquisition }),
      1e-8,
    );
  });
});

describe('t1-t2', () => {
  it('decays a product operator of spins 1/2 by the sum of its rates: a doublet line by R2 + R1/2 of the partner, exchanging at R1/2', () => {
    // Two lines at +-J/2 that exchange at R1/2 each way and decay with R2, in closed form for J/2 >> R1.
    const [t2, t1, j] = [0.3, 0.8, 40];
    const system = systemOf({
      nuclei: [
        { id: 'H', isotope: '1H', shift: 5, t1: 10, t2 },
        { id: 'C', isotope: '13C', shift: 5, t1, t2: t1 },
      ],
      couplings: [{ between: ['H', 'C'], j }],
    });
    const { fid } = solve(system, { relaxation: 't1-t2' });
    const k = 1 / (2 * t1);
    const beat = Math.sqrt((Math.PI * j) ** 2 - k * k);
    fid.real.forEach((x, n) => {
      const t = n / acquisition.width;
      const exact = Math.exp(-t / t2 - k * t) * (Math.cos(beat * t) + (k / beat) * Math.sin(beat * t));
      expect(x).toBeCloseTo(exact, 9);
    });
  });

  it('decays the single-quantum lines of a spin I by R2 and the interior ones by R1 as well', () => {
    // Tr(I+ Gamma I-) / Tr(I+ I-) = R2: the total signal of any spin decays with R2.
    const system = systemOf({ nuclei: [{ id: 'B', isotope: '11B', shift: 5, t1: 0.01, t2: 0.004 }] });
    const { fid } = solve(system, { observe: '11B', relaxation: 't1-t2' });
    fid.real.forEach((x, n) => expect(x).toBeCloseTo(Math.exp(-n / acquisition.width / 0.004), 9));
  });
});

describe('steps', () => {
  const single = (hz: number) => systemOf({ nuclei: [{ id: 'H', isotope: '1H', shift: ppmAt(hz), lineWidth: 0 }] });
  const carbonHydrogen = (j: number) =>
    systemOf({
      nuclei: [
        { id: 'C', isotope: '13C', shift: 5 },
        { id: 'H', isotope: '1H', shift: 5 },
      ],
      couplings: [{ between: ['C', 'H'], j }],
    });

  it('turn rho_eq by pulses of any phase, and the signal by the receiver', () => {
    fc.assert(
      fc.property(
        fc.double({ min: -360, max: 360, noNaN: true }),
        fc.double({ min: -360, max: 360, noNaN: true }),
        (flip, phase) => {
          const [b, f] = [flip, phase].map((x) => (x * Math.PI) / 180);
          const [x, y, z] = magnetisationAfter(single(0), [pulse('1H', flip, phase)]);
          expect(x).toBeCloseTo(Math.sin(b) * Math.sin(f), 9);
          expect(y).toBeCloseTo(-Math.sin(b) * Math.cos(f), 9);
          expect(z).toBeCloseTo(Math.cos(b), 9);
          const steps: Step[] = [pulse('1H', flip, phase), { acquire: { phase } }];
          const received = signalAfter(single(0), [], { sequence: { steps } });
          expect(received.real[0]).toBeCloseTo(Math.sin(b), 9);
          expect(received.imag[0]).toBeCloseTo(0, 9);
        },
      ),
      { numRuns: 20 },
    );
  });

  it('spoil everything but the diagonal, select one order of one isotope', () => {
    // 90 - 1/(2J) - 90 on both isotopes makes double- and zero-quantum coherence, which a pulse brings back.
    const j = 100;
    const before: Step[] = [pulse('1H', 90), { delay: 1 / (2 * j) }, pulse('13C', 90)];
    const after: Step[] = [pulse('13C', 90), { delay: 1 / (2 * j) }];
    const size = (between: Step[]) => {
      const { real, imag } = signalAfter(carbonHydrogen(j), [...before, ...between, ...after]);
      return Math.hypot(real[0], imag[0]);
    };
    expect(size([])).toBeCloseTo(1, 9);
    expect(size([{ spoil: true }])).toBeCloseTo(0, 9);
    // Half of the coherence has order -1 of 13C, half +1; the later pulse keeps the order of 1H, of which -1 is seen.
    expect(size([{ select: { on: '13C', order: 1 } }])).toBeCloseTo(0.5, 9);
    expect(size([{ select: { on: '13C', order: 0 } }])).toBeCloseTo(0, 9);
    expect(size([{ select: { on: '1H', order: -1 } }])).toBeCloseTo(1, 9);
    expect(size([{ select: { on: '1H', order: 1 } }])).toBeCloseTo(0, 9);
  });

  it('decouple from one step to the next', () => {
    const [j, t] = [130, 1.3e-3];
    const seen = (steps: Step[]) => signalAfter(carbonHydrogen(j), [pulse('1H', 90), ...steps]).real[0];
    expect(seen([{ delay: t }])).toBeCloseTo(Math.cos(Math.PI * j * t), 9);
    expect(seen([{ decouple: ['13C'] }, { delay: t }])).toBeCloseTo(1, 9);
    expect(seen([{ decouple: ['13C'] }, { delay: t }, { decouple: [] }, { delay: t }])).toBeCloseTo(
      Math.cos(Math.PI * j * t),
      9,
    );
  });

  it('nutate by a rectangular pulse about its tilted axis, phase counted from its start', () => {
    // On resonance with a carrier moved to the spin it is the ideal pulse, then the spin has precessed for the pulse's time.
    const [hz, seconds, phase] = [830, 2.5e-4, 35];
    const [x, y, z] = magnetisationAfter(single(hz), [pulse('1H', 70, phase, { seconds, offsetHz: hz })]);
    const [b, f] = [(70 * Math.PI) / 180, (phase * Math.PI) / 180 + 2 * Math.PI * hz * seconds];
    expect(x).toBeCloseTo(Math.sin(b) * Math.sin(f), 9);
    expect(y).toBeCloseTo(-Math.sin(b) * Math.cos(f), 9);
    expect(z).toBeCloseTo(Math.cos(b), 9);
  });

  it('saturate one nucleus and leave another of its isotope alone', () => {
    // Without relaxation the field nutates A on resonance: Mz = cos(2 pi nutation t); B keeps its equilibrium.
    const system = systemOf({
      nuclei: [
        { id: 'A', isotope: '1H', shift: ppmAt(300) },
        { id: 'B', isotope: '1H', shift: ppmAt(-300) },
      ],
    });
    const saturate = (nutationHz: number): Step => ({ saturate: { nucleus: 'A', seconds: 0.01, nutationHz } });
    expect(magnetisationAfter(system, [saturate(50)])[2]).toBeCloseTo(Math.cos(Math.PI) + 1, 9);
    expect(magnetisationAfter(system, [saturate(12.5)])[2]).toBeCloseTo(Math.cos(Math.PI / 4) + 1, 9);
  });

  it('enhance nothing by an NOE difference without cross relaxation: minus the saturated line alone', () => {
    const nucleus = (id: string, hz: number) => ({ id, isotope: '1H', shift: ppmAt(hz), t1: 2, t2: 1 });
    const system = systemOf({ nuclei: [nucleus('A', 200), nucleus('B', -200)] });
    const sequence = { recipe: 'noe-difference', saturate: 'A', time: 20 } as const;
    // Bloch's steady state on resonance, Mz = 1/(1 + W^2 T1 T2), and no transverse part that the 90 would keep along y.
    const w = 2 * Math.PI * 50;
    const { real } = signalAfter(system, [], { sequence, relaxation: 't1-t2' });
    expect(real[0]).toBeCloseTo(1 / (1 + w * w * 2) - 1, 6);
  });

  it('polarise along -y by ideal cross-polarisation, in the ratio of the magnetogyric ratios', () => {
    const sequence = { recipe: 'cross-polarisation-ideal', from: '1H' } as const;
    const { real, imag } = signalAfter(carbonHydrogen(0.1), [], { observe: '13C', sequence });
    expect(real[0]).toBeCloseTo(nuclide('1H').gamma / nuclide('13C').gamma, 9);
    expect(imag[0]).toBeCloseTo(0, 9);
  });

  it('cancel by a phase cycle what does not follow it', () => {
    const steps: Step[] = [pulse('1H', 90), { acquire: { phase: 0 } }];
    const cycled = (phaseCycle: number[][]) => signalAfter(single(0), [], { sequence: { steps, phaseCycle } }).real[0];
    expect(
      cycled([
        [0, 0],
        [180, 0],
      ]),
    ).toBeCloseTo(0, 9);
    expect(
      cycled([
        [0, 0],
        [90, 90],
        [180, 180],
        [270, 270],
      ]),
    ).toBeCloseTo(1, 9);
  });
});

describe('dimensions', () => {
  it('grow with fragments, not with the system', () => {
    const pair = (n: number) =>
      ['a', 'b'].map((letter, k) => ({ id: `H${n}${letter}`, isotope: '1H', shift: 4 + n + k / 20, t1: 1, t2: 1 }));
    const nuclei = [0, 1, 2, 3].flatMap(pair);
    const couplings = [0, 1, 2, 3].map((n) => ({ between: [`H${n}a`, `H${n}b`] as [string, string], j: 9 }));
    const { dimensions, fid } = solve(systemOf({ nuclei, couplings }), { relaxation: 't1-t2' });
    // Four pairs, each with C(4, 1) coherences of order -1.
    expect(dimensions).toMatchObject({ ensembles: 4, largestMatrix: 4 });
    expect(fid.real[0]).toBeCloseTo(8, 9);
  });

  it('refuse what breaks the limits, before it is built', () => {
    const nuclei = Array.from({ length: 13 }, (_, n) => ({ id: `H${n}`, isotope: '1H', shift: n / 2, t1: 1, t2: 1 }));
    const couplings = nuclei.slice(1).map(({ id }, n) => ({ between: [`H${n}`, id] as [string, string], j: 7 }));
    const run = () => solve(systemOf({ nuclei, couplings }), { relaxation: 't1-t2' });
    expect(run).toThrow(EngineError);
    expect(run).toThrow('8192 basis states');
  });

  it('tell how far they are, and stop when told', () => {
    const experiment = experimentOf({ acquisition, lineWidth: 0 });
    const heard: number[] = [];
    solveLiouville(exchanging(100), experiment, { tick: (fraction) => heard.push(fraction) });
    expect(heard.at(-1)).toBe(1);
    const stop = () => {
      throw new EngineError('CANCELLED', 'stopped');
    };
    expect(() => solveLiouville(exchanging(100), experiment, { tick: stop })).toThrow('stopped');
  });
});
