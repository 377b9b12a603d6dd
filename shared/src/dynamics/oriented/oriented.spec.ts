import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { experimentOf, systemOf } from '../../../test/documents.js';
import { complexMatrix } from '../../algebra/dense.js';
import { eigenHermitian } from '../../algebra/eigen/hermitian.js';
import { eulerAngles, multiply3, rotationMatrix, unitVector } from '../../algebra/rotation.js';
import type { ExperimentInput } from '../../documents/experiment.schema.js';
import type { Euler, SpinSystem, SpinSystemInput } from '../../documents/system.schema.js';
import { quadrupolarTensorHz } from '../../interactions/tensors.js';
import { larmorMHz } from '../../nuclides/nuclides.js';
import { EngineError, SILENT } from '../../run/context.js';
import type { ComplexArray } from '../../run/solved.js';
import { solveBlocks } from '../blocks/solve-blocks.js';
import { solveLiouville } from '../liouville/solve-liouville.js';
import { mergeParts, planParts, simulatePart, solveOriented } from './solve-oriented.js';

const fidOf = (system: SpinSystem, experiment: ReturnType<typeof experimentOf>) =>
  solveOriented(system, experiment, SILENT).fid;

/** Largest distance of two FIDs, in units of the first point of the second. */
function distance(a: ComplexArray, b: ComplexArray): number {
  const size = Math.hypot(b.real[0], b.imag[0]);
  return (
    a.real.reduce((most, value, k) => Math.max(most, Math.hypot(value - b.real[k], a.imag[k] - b.imag[k])), 0) / size
  );
}

const powder = (orientations: number) => ({ kind: 'powder', orientations }) as const;
const crystal = (...euler: Euler) => ({ kind: 'crystal', euler }) as const;
const spinning = (rateHz: number, orientations: number) => ({ kind: 'spinning', rateHz, orientations }) as const;

/** 13C at 100 MHz around 100 ppm. */
const carbonExperiment = (parts: Partial<ExperimentInput>) =>
  experimentOf({
    observe: '13C',
    lineWidth: 100,
    acquisition: { centre: 100, width: 40_000, points: 256 },
    ...parts,
  });

const carbonPair: Omit<SpinSystemInput, 'format' | 'name'> = {
  nuclei: [
    { id: 'C1', isotope: '13C', shift: 150, csa: { span: 100, skew: 0.3, euler: [10, 40, 70] } },
    { id: 'C2', isotope: '13C', shift: 60, csa: { span: 30, skew: -0.4, euler: [80, 20, 0] } },
  ],
  couplings: [{ between: ['C1', 'C2'], j: 50, dipolar: { constant: -2000, polar: [40, 70] } }],
};

/** The molecule turned by `euler`: the same system for a powder, another orientation of a crystal. */
function turned(system: SpinSystem, euler: Euler): SpinSystem {
  const rotation = rotationMatrix(euler);
  const turnEuler = (own: Euler) => eulerAngles(multiply3(rotation, rotationMatrix(own)));
  const turnPolar = (polar: readonly [number, number]): [number, number] => {
    const [x, y, z] = unitVector(...polar);
    const [u, v, w] = [0, 3, 6].map((row) => rotation[row] * x + rotation[row + 1] * y + rotation[row + 2] * z);
    return [(Math.acos(w) * 180) / Math.PI, (Math.atan2(v, u) * 180) / Math.PI];
  };
  return {
    ...system,
    nuclei: system.nuclei.map((nucleus) => ({
      ...nucleus,
      csa: nucleus.csa && { ...nucleus.csa, euler: turnEuler(nucleus.csa.euler) },
      quadrupole: nucleus.quadrupole && { ...nucleus.quadrupole, euler: turnEuler(nucleus.quadrupole.euler) },
    })),
    couplings: system.couplings.map((coupling) => {
      const { dipolar } = coupling;
      if (dipolar === undefined || dipolar === 'positions') return coupling;
      return { ...coupling, dipolar: { ...dipolar, polar: turnPolar(dipolar.polar) } };
    }),
  };
}

const anyEuler = fc.tuple(
  fc.double({ min: 0, max: 360, noNaN: true }),
  fc.double({ min: 0, max: 180, noNaN: true }),
  fc.double({ min: 0, max: 360, noNaN: true }),
);

describe('a powder', () => {
  it('does not change when the molecule is turned: one nucleus', () => {
    const aluminium = systemOf({
      nuclei: [
        {
          id: 'Al',
          isotope: '27Al',
          shift: 10,
          csa: { span: 60, skew: 0.2, euler: [40, 60, 10] },
          quadrupole: { cq: 2e6, eta: 0.3, euler: [10, 20, 30] },
        },
      ],
    });
    const acquisition = { centre: 10, width: 1.5e6, points: 256 };
    const experiment = experimentOf({ observe: '27Al', sample: powder(1200), lineWidth: 5000, acquisition });
    const straight = fidOf(aluminium, experiment);
    fc.assert(
      fc.property(anyEuler, (euler) => {
        expect(distance(fidOf(turned(aluminium, euler), experiment), straight)).toBeLessThan(1e-3);
      }),
      { numRuns: 8 },
    );
  });

  it('does not change when the molecule is turned: coupled nuclei', () => {
    const pair = systemOf(carbonPair);
    const experiment = carbonExperiment({ sample: powder(1200) });
    const straight = fidOf(pair, experiment);
    fc.assert(
      fc.property(anyEuler, (euler) => {
        expect(distance(fidOf(turned(pair, euler), experiment), straight)).toBeLessThan(2e-3);
      }),
      { numRuns: 8 },
    );
  });

  it('of nuclei without anisotropy is the solution', () => {
    const system = systemOf({
      nuclei: [
        { id: 'A', isotope: '1H', shift: 5.2, csa: { span: 0, skew: 0.4 }, lineWidth: 3 },
        { id: 'B', isotope: '1H', shift: 5.0, count: 2 },
        { id: 'X', isotope: '13C', shift: 30 },
      ],
      couplings: [
        { between: ['A', 'B'], j: 9 },
        { between: ['B', 'X'], j: 130 },
      ],
    });
    const solution = solveBlocks(system, experimentOf(), SILENT).fid;
    for (const sample of [powder(1), spinning(1000, 1), crystal(10, 20, 30)]) {
      expect(distance(fidOf(system, experimentOf({ sample })), solution)).toBeLessThan(1e-8);
    }
  });

  it('comes out the same in parts, in any order, and its parts survive a structured clone', () => {
    const [system, experiment] = [systemOf(carbonPair), carbonExperiment({ sample: powder(300) })];
    const whole = solveOriented(system, experiment, SILENT);
    expect(planParts(system, experiment)).toBe(1);
    expect(planParts(system, carbonExperiment({ sample: powder(1_000_000) }))).toBeGreaterThan(3);
    const parts = [2, 0, 1].map((part) => structuredClone(simulatePart(system, experiment, part, 3, SILENT)));
    const merged = mergeParts(system, experiment, parts);
    expect(distance(merged.fid, whole.fid)).toBeLessThan(1e-12);
    expect(merged.approximations[0].hz).toBeCloseTo(whole.approximations[0].hz, 9);
    expect(merged.dimensions).toEqual(whole.dimensions);
  });

  it('reports a smaller displacement for more orientations', () => {
    const hz = (orientations: number) =>
      solveOriented(systemOf(carbonPair), carbonExperiment({ sample: powder(orientations) }), SILENT).approximations[0]
        .hz;
    const [few, many] = [hz(100), hz(3000)];
    expect(few).toBeGreaterThan(100 * many);
    expect(many).toBeLessThan(5);
  });

  it('tells how far it is and stops when told to', () => {
    const heard: number[] = [];
    const context = {
      tick(fraction: number) {
        heard.push(fraction);
        if (fraction > 0.5) throw new EngineError('CANCELLED', 'stopped');
      },
    };
    expect(() => solveOriented(systemOf(carbonPair), carbonExperiment({ sample: powder(2000) }), context)).toThrow(
      'stopped',
    );
    expect(heard.length).toBeGreaterThan(5);
    expect(heard).toEqual([...heard].sort((a, b) => a - b));
  });
});

describe('spinning', () => {
  it('fast becomes the solution, for coupled nuclei too', () => {
    const [system, sample] = [systemOf(carbonPair), spinning(2e7, 100)];
    const solution = solveBlocks(system, carbonExperiment({}), SILENT).fid;
    // What is left of the anisotropy is of the order of its square over the rate: (1e4)^2/2e7 = 5 Hz.
    const spun = fidOf(system, carbonExperiment({ sample }));
    expect(distance(spun, solution)).toBeLessThan(5e-3);
    const uncoupled = systemOf({ nuclei: carbonPair.nuclei });
    const lone = solveBlocks(uncoupled, carbonExperiment({}), SILENT).fid;
    expect(distance(fidOf(uncoupled, carbonExperiment({ sample })), lone)).toBeLessThan(1e-3);
  });

  it('slowly has the envelope of the static pattern', () => {
    const carbon = systemOf({ nuclei: [{ id: 'C', isotope: '13C', shift: 100, csa: { span: 60, skew: 0.3 } }] });
    const parts = { lineWidth: 400 };
    const still = fidOf(carbon, carbonExperiment({ ...parts, sample: powder(3000) }));
    const slow = fidOf(carbon, carbonExperiment({ ...parts, sample: spinning(5, 10_000) }));
    // While the signal lasts, 1 ms, the rotor turns by 2 degrees.
    expect(distance(slow, still)).toBeLessThan(0.02);
    const faster = fidOf(carbon, carbonExperiment({ ...parts, sample: spinning(20, 10_000) }));
    expect(distance(faster, still)).toBeGreaterThan(2 * distance(slow, still));
  });

  it('of two nuclei with next to no coupling is that of two single nuclei', () => {
    // The first goes through Floquet states of the product basis, the second through closed forms.
    const sample = spinning(3000, 200);
    const [first, second] = carbonPair.nuclei;
    const coupled = systemOf({ nuclei: [first, second], couplings: [{ between: ['C1', 'C2'], j: 1e-7 }] });
    const apart = systemOf({ nuclei: [first, second] });
    const experiment = carbonExperiment({ sample });
    expect(distance(fidOf(coupled, experiment), fidOf(apart, experiment))).toBeLessThan(1e-6);
  });

  it('at zero angle to the field is the static powder', () => {
    const carbon = systemOf({ nuclei: [carbonPair.nuclei[0]] });
    const spun = fidOf(carbon, carbonExperiment({ sample: { ...spinning(3000, 2000), angle: 0 } }));
    expect(distance(spun, fidOf(carbon, carbonExperiment({ sample: powder(2000) })))).toBeLessThan(1e-6);
  });

  it('keeps the line widths of its nuclei apart', () => {
    const widths = [50, 400];
    const apart = carbonPair.nuclei.map((nucleus, k) => ({ ...nucleus, lineWidth: widths[k] }));
    const experiment = carbonExperiment({ sample: spinning(3000, 200) });
    const both = fidOf(systemOf({ ...carbonPair, nuclei: apart }), experiment);
    const early = fidOf(systemOf(carbonPair), carbonExperiment({ sample: spinning(3000, 200), lineWidth: 0 }));
    // Each nucleus by itself: the other is observed too, but has decayed before the second point.
    const only = (k: number) =>
      fidOf(
        systemOf({
          ...carbonPair,
          nuclei: apart.map((n, l) => (l === k ? { ...n, lineWidth: 0 } : { ...n, lineWidth: 1e7 })),
        }),
        experiment,
      );
    const sum = [only(0), only(1)];
    for (const k of [1, 10, 60]) {
      const decay = widths.map((w) => Math.exp((-Math.PI * w * k) / 40_000));
      expect(both.real[k]).toBeCloseTo(decay[0] * sum[0].real[k] + decay[1] * sum[1].real[k], 9);
      expect(early.real[k]).toBeCloseTo(sum[0].real[k] + sum[1].real[k], 9);
    }
  });
});

describe('a crystal', () => {
  it('has second-order quadrupolar shifts that exact energy levels confirm', () => {
    const [isotope, spin, cq] = ['23Na', 1.5, 6e5] as const;
    const sodium = systemOf({
      nuclei: [{ id: 'Na', isotope, shift: 0, quadrupole: { cq, eta: 0.4, euler: [30, 40, 50] } }],
    });
    const larmor = larmorMHz(isotope, 400) * 1e6;
    const acquisition = { centre: 0, width: 1e6, points: 512 };
    const sample = crystal(100, 70, 20);
    const fid = fidOf(sodium, experimentOf({ observe: isotope, sample, lineWidth: 0, acquisition }));
    // I.Q.I in the laboratory, with the Zeeman energy, from its matrix elements.
    const rotation = rotationMatrix(sample.euler);
    const Q = quadrupolarTensorHz(sodium.nuclei[0])!;
    const lab = multiply3(
      multiply3(rotation, Q),
      Float64Array.from({ length: 9 }, (_, p) => rotation[3 * (p % 3) + Math.floor(p / 3)]),
    );
    const h = complexMatrix(4, 4);
    const plus = (m: number) => Math.sqrt(spin * (spin + 1) - m * (m + 1));
    for (let l = 0; l < 4; l++) {
      const m = spin - l;
      h.real[5 * l] = larmor * m + (lab[8] / 2) * (3 * m * m - spin * (spin + 1));
      // <m+1| (Ix Iz + Iz Ix) Qxz + (Iy Iz + Iz Iy) Qyz |m>
      if (l > 0) {
        const element = (plus(m) * (2 * m + 1)) / 2;
        h.real[4 * (l - 1) + l] = h.real[4 * l + l - 1] = element * lab[2];
        h.imag[4 * (l - 1) + l] = -element * lab[5];
        h.imag[4 * l + l - 1] = element * lab[5];
      }
      if (l > 1) {
        const element = (plus(m) * plus(m + 1)) / 4;
        h.real[4 * (l - 2) + l] = h.real[4 * l + l - 2] = element * (lab[0] - lab[4]);
        h.imag[4 * (l - 2) + l] = -2 * element * lab[1];
        h.imag[4 * l + l - 2] = 2 * element * lab[1];
      }
    }
    const { values } = eigenHermitian(h);
    const lines = [3, 2, 1].map((k) => values[k] - values[k - 1] - larmor);
    const shares = [0.3, 0.4, 0.3];
    for (let k = 0; k < 512; k += 37) {
      const exact = lines.reduce(
        (sum, hz, line) => sum + shares[line] * Math.cos((2 * Math.PI * hz * k) / acquisition.width),
        0,
      );
      // Third order is 3e5^3/(106e6)^2 = 2.4 Hz at most: 0.008 of a radian after 0.5 ms.
      expect(Math.abs(fid.real[k] - exact)).toBeLessThan(0.01);
    }
    // Without second order the central line would be at 0, out of step by the end.
    expect(Math.abs(lines[1])).toBeGreaterThan(50);
  });

  it('is the mean of nothing: no account of orientations', () => {
    const sample = crystal(0, 0, 0);
    const solved = solveOriented(systemOf(carbonPair), carbonExperiment({ sample }), SILENT);
    expect(solved.approximations).toEqual([]);
    expect(solved.dimensions.orientations).toBe(1);
  });
});

describe('preparation', () => {
  const deuteron = systemOf({
    nuclei: [{ id: 'D', isotope: '2H', shift: 5, quadrupole: { cq: 1.6e5, eta: 0.1, euler: [0, 30, 0] } }],
  });
  const setting: Partial<ExperimentInput> = {
    observe: '2H',
    sample: powder(1000),
    lineWidth: 2000,
    acquisition: { centre: 5, width: 500_000, points: 256 },
    quadrupoleOrder: 1,
  };

  it('refocuses a spin 1 completely by a quadrupole echo', () => {
    // J. H. Davis et al., Chem. Phys. Lett. 42, 390 (1976): on resonance the echo repeats the FID.
    const pulsed = fidOf(deuteron, experimentOf(setting));
    const echo = fidOf(deuteron, experimentOf({ ...setting, sequence: { recipe: 'quadrupole-echo', tau: 3e-5 } }));
    expect(distance(echo, pulsed)).toBeLessThan(1e-3);
  });

  it('gives the same through the density operator as by turning the magnetisation', () => {
    const steps = (delay: boolean): ExperimentInput['sequence'] => ({
      steps: [
        { pulse: { on: '2H', flip: 40, phase: 20 } },
        ...(delay ? [{ delay: 0 }] : []),
        { pulse: { on: '2H', flip: 70, phase: 110 } },
        { acquire: { phase: 0 } },
      ],
      phaseCycle: [
        [0, 90, 10],
        [20, 80, 0],
      ],
    });
    const sample = crystal(10, 50, 80);
    const through = fidOf(deuteron, experimentOf({ ...setting, sample, sequence: steps(true) }));
    const by = fidOf(deuteron, experimentOf({ ...setting, sample, sequence: steps(false) }));
    expect(Math.hypot(by.real[0], by.imag[0])).toBeGreaterThan(0.1);
    expect(distance(through, by)).toBeLessThan(1e-9);
  });

  it('polarises by the ratio of the magnetogyric ratios', () => {
    const system = systemOf({ nuclei: [...carbonPair.nuclei.slice(0, 1), { id: 'H', isotope: '1H', shift: 5 }] });
    const parts: Partial<ExperimentInput> = { sample: spinning(4000, 100), decouple: ['1H'] };
    const pulsed = fidOf(system, carbonExperiment(parts));
    const crossed = fidOf(
      system,
      carbonExperiment({ ...parts, sequence: { recipe: 'cross-polarisation-ideal', from: '1H' } }),
    );
    // IUPAC 2001: gamma(1H)/gamma(13C) = 26.7522128/6.728284
    pulsed.real.forEach((value, k) => expect(crossed.real[k]).toBeCloseTo((26.7522128 / 6.728284) * value, 9));
  });

  it('turns by a short strong pulse as by an ideal one', () => {
    const sample = crystal(10, 50, 80);
    const sequence = (seconds?: number): ExperimentInput['sequence'] => ({
      steps: [{ pulse: { on: '2H', flip: 60, phase: 30, seconds } }, { acquire: { phase: 0 } }],
    });
    const ideal = fidOf(deuteron, experimentOf({ ...setting, sample, sequence: sequence() }));
    const short = fidOf(deuteron, experimentOf({ ...setting, sample, sequence: sequence(1e-10) }));
    const long = fidOf(deuteron, experimentOf({ ...setting, sample, sequence: sequence(1e-5) }));
    expect(distance(short, ideal)).toBeLessThan(1e-4);
    expect(distance(long, ideal)).toBeGreaterThan(0.1);
  });

  it.each<[string, ExperimentInput['sequence']]>([
    ['a refocused INEPT', { recipe: 'inept', from: '1H', j: 140, refocused: true, multiplicity: 2 }],
    ['a spin echo', { recipe: 'spin-echo', tau: 0.0013 }],
    [
      'pulses of all kinds',
      {
        steps: [
          { pulse: { on: '13C', flip: 80, phase: 15, seconds: 2e-4, offsetHz: 700 } },
          { saturate: { nucleus: 'H1', seconds: 0.01, nutationHz: 40 } },
          { decouple: ['1H'] },
          { delay: 0.002 },
          { decouple: [] },
          { pulse: { on: '1H', flip: 50, phase: 0 } },
          { select: { on: '1H', order: 0 } },
          { pulse: { on: '13C', flip: 30, phase: 90 } },
          { acquire: { phase: 25 } },
        ],
      },
    ],
  ])('propagates through %s as in a solution, in another way', (_, sequence) => {
    // Without tensors a crystal is a solution, which the Liouville solver steps through in its own way.
    const system = systemOf({
      nuclei: [
        { id: 'C', isotope: '13C', shift: 101, lineWidth: 20 },
        { id: 'H1', isotope: '1H', shift: 4 },
        { id: 'H2', isotope: '1H', shift: 4.7 },
      ],
      couplings: [
        { between: ['C', 'H1'], j: 140 },
        { between: ['C', 'H2'], j: 8 },
        { between: ['H1', 'H2'], j: -12 },
      ],
    });
    const crystalline = fidOf(system, carbonExperiment({ sample: crystal(10, 20, 30), sequence }));
    const dissolved = solveLiouville(system, carbonExperiment({ sequence }), SILENT).fid;
    expect(Math.hypot(dissolved.real[0], dissolved.imag[0])).toBeGreaterThan(0.01);
    expect(distance(crystalline, dissolved)).toBeLessThan(1e-8);
  });

  it('says what it does not compute', () => {
    const exchanging = systemOf({
      nuclei: [{ id: 'C', isotope: '13C', shift: 100 }],
      states: [
        { id: 's1', population: 0.5 },
        { id: 's2', population: 0.5, shifts: { C: 90 } },
      ],
      exchange: [{ from: 's1', to: 's2', rate: 10 }],
    });
    const unsupported = (system: SpinSystem, parts: Partial<ExperimentInput>) => () =>
      solveOriented(system, carbonExperiment({ sample: powder(100), ...parts }), SILENT);
    expect(unsupported(exchanging, {})).toThrow(EngineError);
    expect(unsupported(systemOf(carbonPair), { relaxation: 't1-t2' })).toThrow('line widths');
  });
});
