import { describe, expect, it } from 'vitest';
import { multiplyComplex, trace, type ComplexMatrix } from '../src/algebra/dense.js';
import type { Step } from '../src/documents/experiment.schema.js';
import { eigenGroup, evolveClosed } from '../src/dynamics/liouville/closed-evolution.js';
import { sparseHamiltonian } from '../src/dynamics/liouville/hamiltonian.js';
import { pulseMatrix } from '../src/dynamics/liouville/rotations.js';
import { spinSpace } from '../src/dynamics/liouville/spin-space.js';
import { nuclide } from '../src/nuclides/nuclides.js';
import { simulate } from '../src/simulate/simulate.js';
import { experimentOf, systemOf } from './documents.js';
import { CENTRE, magnetisationAfter, MHZ, ppmAt, pulse, signalAfter } from './magnetisation.js';
import { referenceCases } from './reference/catalogue.js';

/** B13-1, B13-2 (counter-rotating fields) and B17-3 (diffusion) are outside the model and not in the catalogue's copy. */

const RADIANS = Math.PI / 180;

/** T2 = T1 unless given. */
function oneProton(hz: number, { t1, t2 = t1 }: { t1?: number; t2?: number } = {}) {
  return systemOf({ nuclei: [{ id: 'H', isotope: '1H', shift: ppmAt(hz), t1, t2 }] });
}

function protons(nuA: number, nuB: number, j: number) {
  return systemOf({
    nuclei: [
      { id: 'A', isotope: '1H', shift: ppmAt(nuA) },
      { id: 'B', isotope: '1H', shift: ppmAt(nuB) },
    ],
    couplings: [{ between: ['A', 'B'], j }],
  });
}

/** One carbon on the carrier with n protons, both isotopes on their carriers. */
function methyne(n: number, j: number) {
  const carbon = { id: 'C', isotope: '13C', shift: CENTRE };
  if (n === 0) return systemOf({ nuclei: [carbon] });
  return systemOf({
    nuclei: [carbon, { id: 'H', isotope: '1H', shift: 5, count: n }],
    couplings: [{ between: ['C', 'H'], j }],
  });
}

const CARBON = { observe: '13C' };
const GAMMA_RATIO = nuclide('1H').gamma / nuclide('13C').gamma;

function expectAll(actual: readonly number[], expected: readonly number[], bound: number): void {
  expect(actual.length).toBe(expected.length);
  actual.forEach((value, k) => expect(Math.abs(value - expected[k]), `number ${k}`).toBeLessThan(bound));
}

describe('B01 flip-angle dependence', () => {
  type Expected = { Mx: number; My: number; Mz: number; every_line_scale: number };

  it.each(referenceCases<{ beta_deg: number }, Expected>('B01'))('$id', ({ inputs, expected, tolerance }) => {
    const pair = protons(10, -10, 10);
    const m = magnetisationAfter(pair, [pulse('1H', inputs.beta_deg)]);
    expectAll(
      m.map((x) => x / 2),
      [expected.Mx, expected.My, expected.Mz],
      tolerance.abs,
    );
    const acquisition = { centre: CENTRE, width: 100, points: 256 };
    const whole = signalAfter(pair, [pulse('1H', 90)], { acquisition });
    const scaled = signalAfter(pair, [pulse('1H', inputs.beta_deg)], { acquisition });
    expectAll(
      [...scaled.real],
      [...whole.real].map((x) => x * expected.every_line_scale),
      1e-9,
    );
  });
});

describe('B02 J modulation of a spin echo', () => {
  type Inputs = { J_Hz: number; tau_s: number; pi_pulse_x_on: string };
  type Expected = { in_phase_I1x: number; antiphase_2I1yI2z: number };

  it.each(referenceCases<Inputs, Expected>('B02'))('$id', ({ inputs, expected, tolerance }) => {
    const { J_Hz: j, tau_s: tau, pi_pulse_x_on } = inputs;
    const turn = pi_pulse_x_on === 'both spins' ? [pulse('1H', 180), pulse('13C', 180)] : [pulse('1H', 180)];
    const echo: Step[] = [pulse('1H', 90, 90), { delay: tau }, ...turn, { delay: tau }];
    const [inPhase] = magnetisationAfter(methyne(1, j), echo);
    // 2 IySz becomes -Ix within 1/(2J), and Ix becomes 2 IySz.
    const [converted] = magnetisationAfter(methyne(1, j), [...echo, { delay: 1 / (2 * j) }]);
    expectAll([inPhase, -converted], [expected.in_phase_I1x, expected.antiphase_2I1yI2z], tolerance.abs);
  });
});

describe('B03 spin echo of a strongly coupled pair', () => {
  type Inputs = { nuA_Hz: number; nuB_Hz: number; J_Hz: number; tau_s: number };

  it.each(referenceCases<Inputs, { Fx_over_Fx0: number; Fy: number }>('B03'))(
    '$id',
    ({ inputs, expected, tolerance }) => {
      const { nuA_Hz, nuB_Hz, J_Hz, tau_s: tau } = inputs;
      const echo: Step[] = [pulse('1H', 90, 90), { delay: tau }, pulse('1H', 180), { delay: tau }];
      const [x, y] = magnetisationAfter(protons(nuA_Hz, nuB_Hz, J_Hz), echo);
      expectAll([x / 2, y / 2], [expected.Fx_over_Fx0, expected.Fy], tolerance.abs);
    },
  );
});

describe('B04 polarisation transfer by INEPT', () => {
  type Inputs = { n: 1 | 2 | 3; J_Hz: number; D1_s: number; D2_s: number };
  type Expected = { line_amplitudes_without_gamma_low_to_high: number[]; refocused_without_gamma: number };

  it.each(referenceCases<Inputs, Expected>('B04'))('$id', ({ inputs, expected, tolerance }) => {
    const { n, J_Hz: j, D1_s, D2_s } = inputs;
    const system = methyne(n, j);
    // Samples at which the n + 1 lines are orthogonal.
    const points = 2 * (n + 1);
    const acquisition = { centre: CENTRE, width: (n + 1) * j, points };
    const recipe = { recipe: 'inept', from: '1H', j: 1 / (2 * D1_s) } as const;
    const { fid } = simulate(system, experimentOf({ ...CARBON, lineWidth: 0, sequence: recipe, acquisition }));
    const amplitudes = Array.from({ length: n + 1 }, (_, line) => {
      let sum = 0;
      for (let k = 0; k < points; k++) {
        const angle = (-2 * Math.PI * (line - n / 2) * k) / (n + 1);
        sum += fid.real[k] * Math.cos(angle) - fid.imag[k] * Math.sin(angle);
      }
      return sum / points / GAMMA_RATIO;
    });
    const sign = Math.sign(amplitudes[n]);
    expectAll(
      amplitudes.map((a) => sign * a),
      expected.line_amplitudes_without_gamma_low_to_high,
      tolerance.abs,
    );
    const both = [pulse('1H', 180), pulse('13C', 180)];
    const refocused: Step[] = [
      ...[
        pulse('1H', 90),
        { delay: D1_s / 2 },
        ...both,
        { delay: D1_s / 2 },
        pulse('1H', 90, 90),
        pulse('13C', 90, 90),
      ],
      ...[{ delay: D2_s / 2 }, ...both, { delay: D2_s / 2 }],
    ];
    const phases = [0, 0, 0, 90, 90, 0, 0];
    const phaseCycle = [
      [...phases, 0],
      [180, ...phases.slice(1), 180],
    ];
    const sequence = { steps: [...refocused, { acquire: { phase: 0 } }], phaseCycle };
    const whole = signalAfter(system, [], { ...CARBON, sequence }).real[0];
    expect(Math.abs(whole / GAMMA_RATIO - expected.refocused_without_gamma)).toBeLessThan(tolerance.abs);
  });
});

describe('B05 DEPT', () => {
  type Expected = { CH: number; CH2: number; CH3: number };

  it.each(referenceCases<{ theta_deg: number; J_Hz: number }, Expected>('B05'))(
    '$id',
    ({ inputs, expected, tolerance }) => {
      const { theta_deg: theta, J_Hz: j } = inputs;
      const sequence = { recipe: 'dept', from: '1H', j, theta } as const;
      const first = (n: number) => signalAfter(methyne(n, j), [], { ...CARBON, sequence }).real[0] / GAMMA_RATIO;
      expectAll([first(1), first(2), first(3)], [expected.CH, expected.CH2, expected.CH3], tolerance.abs);
    },
  );
});

describe('B06 J-modulated carbon echo', () => {
  type Expected = { C: number; CH: number; CH2: number; CH3: number };

  it.each(referenceCases<{ J_Hz: number; T_s: number }, Expected>('B06'))(
    '$id',
    ({ inputs: { J_Hz: j, T_s }, expected, tolerance }) => {
      const steps: Step[] = [
        ...[pulse('13C', 90), { delay: T_s }, pulse('13C', 180, 90)],
        ...[{ decouple: ['1H'] }, { delay: T_s }],
      ];
      const first = (n: number) => signalAfter(methyne(n, j), steps, CARBON).real[0];
      const { C, CH, CH2, CH3 } = expected;
      expectAll([0, 1, 2, 3].map(first), [C, CH, CH2, CH3], tolerance.abs);
    },
  );
});

describe('B07 train of echoes without diffusion', () => {
  type Inputs = { T2_s: number; tau_s: number; n_echo: number };

  it.each(referenceCases<Inputs, { without_diffusion: number }>('B07'))('$id', ({ inputs, expected, tolerance }) => {
    const { T2_s, tau_s: tau, n_echo: loops } = inputs;
    const sequence = { recipe: 'cpmg', tau, loops } as const;
    const fid = signalAfter(oneProton(137, { t2: T2_s }), [], { sequence, relaxation: 't1-t2' });
    expect(Math.abs(fid.real[0] / expected.without_diffusion - 1)).toBeLessThan(tolerance.rel);
  });
});

describe('B08 inversion recovery', () => {
  type Inputs = { T1_s: number; TR_s: number | null; inversion_deg: number };
  type Expected = { Mz_after_pulse: number; null_s: number; Mz_at_T1: number };

  it.each(referenceCases<Inputs, Expected>('B08'))('$id', ({ inputs, expected, tolerance }) => {
    const { T1_s, TR_s, inversion_deg } = inputs;
    const system = oneProton(20, { t1: T1_s });
    const before: Step[] = TR_s === null ? [] : [pulse('1H', 90), { spoil: true }, { delay: TR_s }];
    const at = (delay: number) => {
      const steps: Step[] = [...before, pulse('1H', inversion_deg), { spoil: true }, { delay }];
      return magnetisationAfter(system, steps, { relaxation: 't1-t2' })[2];
    };
    expectAll(
      [at(0), at(expected.null_s), at(T1_s)],
      [expected.Mz_after_pulse, 0, expected.Mz_at_T1],
      2 * tolerance.rel,
    );
  });

  it('is what the recipe does', () => {
    const [{ inputs, expected }] = referenceCases<Inputs, Expected>('B08-1');
    const sequence = { recipe: 'inversion-recovery', delay: inputs.T1_s } as const;
    const fid = signalAfter(oneProton(20, { t1: inputs.T1_s }), [], { sequence, relaxation: 't1-t2' });
    expect(fid.real[0]).toBeCloseTo(expected.Mz_at_T1, 9);
  });
});

describe('B09 steady state under a weak field', () => {
  type Inputs = { T1_s: number; T2_s: number; nu1_Hz: number; offset_Hz: number };

  it.each(referenceCases<Inputs, { Mz: number; absorption: number; dispersion: number }>('B09'))(
    '$id',
    ({ inputs, expected, tolerance }) => {
      const { T1_s, T2_s, nu1_Hz, offset_Hz } = inputs;
      const system = oneProton(0, { t1: T1_s, t2: T2_s });
      // Whole turns of the field, so that its frame and the carrier's agree at the end.
      const seconds = 60;
      const field = pulse('1H', 360 * nu1_Hz * seconds, 0, { seconds, offsetHz: -offset_Hz });
      const [x, y, z] = magnetisationAfter(system, [field], { relaxation: 't1-t2' });
      const { Mz, absorption, dispersion } = expected;
      expectAll([z, Math.abs(y), Math.abs(x)], [Mz, absorption, dispersion], tolerance.rel);
    },
  );
});

describe('B10 Ernst angle', () => {
  type Inputs = { T1_s: number; TR_s: number };
  type Expected = { angle_deg: number; signal_at_optimum: number; signal_at_90: number; signal_at_30: number };

  it.each(referenceCases<Inputs, Expected>('B10'))('$id', ({ inputs: { T1_s, TR_s }, expected, tolerance }) => {
    const system = oneProton(0, { t1: T1_s });
    const steady = (angle: number) => {
      const round: Step[] = [pulse('1H', angle), { spoil: true }, { delay: TR_s }];
      const steps = Array.from({ length: 70 }, () => round).flat();
      return signalAfter(system, [...steps, pulse('1H', angle)], { relaxation: 't1-t2' }).real[0];
    };
    const { angle_deg, signal_at_optimum, signal_at_90, signal_at_30 } = expected;
    expectAll(
      [steady(angle_deg), steady(90), steady(30)],
      [signal_at_optimum, signal_at_90, signal_at_30],
      tolerance.rel,
    );
  });
});

describe('B11 composite inversion', () => {
  type Inputs = { offset_over_nominal_nu1: number; nu1_scale: number };

  it.each(referenceCases<Inputs, { M_composite: number[]; Mz_single_180x: number }>('B11'))(
    '$id',
    ({ inputs, expected, tolerance }) => {
      const nominal = 1000;
      const system = oneProton(inputs.offset_over_nominal_nu1 * nominal);
      const rectangular = (flip: number, phase: number) =>
        pulse('1H', flip * inputs.nu1_scale, phase, { seconds: flip / 360 / nominal });
      const composite = [rectangular(90, 0), rectangular(180, 90), rectangular(90, 0)];
      expectAll(magnetisationAfter(system, composite), expected.M_composite, tolerance.abs);
      const [, , z] = magnetisationAfter(system, [rectangular(180, 0)]);
      expectAll([z], [expected.Mz_single_180x], tolerance.abs);
    },
  );
});

describe('B12 rectangular pulse off resonance', () => {
  it.each(referenceCases<{ nominal_flip_deg: number; offset_over_nu1: number }, { M: number[] }>('B12'))(
    '$id',
    ({ inputs, expected, tolerance }) => {
      const nu1 = 500;
      const rectangular = pulse('1H', inputs.nominal_flip_deg, 0, { seconds: inputs.nominal_flip_deg / 360 / nu1 });
      const system = oneProton(inputs.offset_over_nu1 * nu1);
      expectAll(magnetisationAfter(system, [rectangular]), expected.M, tolerance.abs);
    },
  );
});

describe('B13 line displaced by a field off resonance', () => {
  type Inputs = { offset_of_irradiation_Hz: number; nu1_Hz: number };

  it.each(referenceCases<Inputs, { exact_Hz: number }>('B13-4'))('$id', ({ inputs, expected, tolerance }) => {
    const { offset_of_irradiation_Hz: offset, nu1_Hz: nutationHz } = inputs;
    const space = spinSpace([{ row: 0, isotope: '1H', spin: 1 / 2 }], [0]);
    const h = sparseHamiltonian(space, Float64Array.of(offset), [], { nutationHz, drives: () => true });
    const [low, high] = eigenGroup(h, Uint32Array.of(0, 1)).energies;
    expect(Math.abs((high - low - offset) / expected.exact_Hz - 1)).toBeLessThan(tolerance.rel);
  });
});

describe('B14 spinors and the composition of rotations', () => {
  type Turn = { I: number; angle_deg: number };

  it.each(
    referenceCases<Turn, { factor: number; trace_of_U_at_180: number }>('B14').filter(({ inputs }) => 'I' in inputs),
  )('$id', ({ inputs, expected, tolerance }) => {
    const full = pulseMatrix(inputs.I, inputs.angle_deg * RADIANS, 0.7);
    const n = full.rows;
    expectAll(
      [...full.real],
      Array.from({ length: n * n }, (_, k) => (k % (n + 1) === 0 ? expected.factor : 0)),
      tolerance.abs,
    );
    expectAll(trace(pulseMatrix(inputs.I, Math.PI, 0.7)), [expected.trace_of_U_at_180, 0], tolerance.abs);
  });

  /** Angle in degrees and axis of u = cos(c/2) - 2 i sin(c/2) n.I of spin 1/2. */
  function rotationOf(u: ComplexMatrix): { angle: number; axis: number[] } {
    const half = Math.acos(Math.min(1, Math.max(-1, (u.real[0] + u.real[3]) / 2)));
    const parts = [-(u.imag[1] + u.imag[2]) / 2, (u.real[2] - u.real[1]) / 2, (u.imag[3] - u.imag[0]) / 2];
    return { angle: (2 * half) / RADIANS, axis: parts.map((part) => part / Math.sin(half)) };
  }

  type Net = { angle_deg: number; axis: number[] };
  const pairs = referenceCases<{ pulses_in_order: string[] }, Net>('B14').filter(
    ({ inputs }) => 'pulses_in_order' in inputs && inputs.pulses_in_order.every((name) => !name.endsWith('z')),
  );

  it.each(pairs)('$id', ({ inputs, expected, tolerance }) => {
    const [first, second] = inputs.pulses_in_order.map((name) =>
      pulseMatrix(1 / 2, parseFloat(name) * RADIANS, name.endsWith('x') ? 0 : Math.PI / 2),
    );
    const { angle, axis } = rotationOf(multiplyComplex(second, first));
    expectAll([angle], [expected.angle_deg], tolerance.abs);
    // The axis of half a turn has either sign.
    const sign = expected.angle_deg === 180 ? Math.sign(axis.reduce((s, x, k) => s + x * expected.axis[k], 0)) : 1;
    expectAll(
      axis.map((x) => sign * x),
      expected.axis,
      tolerance.abs,
    );
  });
});

describe('B15 isotropic mixing', () => {
  it.each(referenceCases<{ J_Hz: number; t_s: number }, { I1z: number; I2z: number }>('B15'))(
    '$id',
    ({ inputs: { J_Hz: j, t_s }, expected, tolerance }) => {
      const proton = (row: number) => ({ row, isotope: '1H', spin: 1 / 2 });
      const space = spinSpace([proton(0), proton(1)], [0, 0]);
      const group = eigenGroup(
        sparseHamiltonian(space, new Float64Array(2), [{ a: 0, b: 1, j, like: true }]),
        Uint32Array.of(0, 1, 2, 3),
      );
      const start = new Float64Array(16);
      [0.5, 0.5, -0.5, -0.5].forEach((m, k) => (start[5 * k] = m));
      const { real } = evolveClosed(group, group, { real: start, imag: new Float64Array(16) }, t_s);
      // Tr(Iz rho) over Tr(Iz Iz) = 1
      const diagonal = [real[0], real[5], real[10], real[15]];
      const part = (m: number[]) => diagonal.reduce((sum, p, k) => sum + p * m[k], 0);
      expectAll(
        [part([0.5, 0.5, -0.5, -0.5]), part([0.5, -0.5, 0.5, -0.5])],
        [expected.I1z, expected.I2z],
        tolerance.abs,
      );
    },
  );
});

describe('B16 decoupling off resonance', () => {
  type Inputs = { J_Hz: number; offset_Hz: number; nu2_Hz: number };

  it.each(referenceCases<Inputs, { lines_Hz_intensity: [number, number][] }>('B16'))(
    '$id',
    ({ inputs: { J_Hz: j, offset_Hz, nu2_Hz: nutationHz }, expected, tolerance }) => {
      const space = spinSpace(
        [
          { row: 0, isotope: '1H', spin: 1 / 2 },
          { row: 1, isotope: '13C', spin: 1 / 2 },
        ],
        [0, 1],
      );
      const h = sparseHamiltonian(space, Float64Array.of(0, offset_Hz), [{ a: 0, b: 1, j, like: false }], {
        nutationHz,
        drives: ({ isotope }) => isotope === '13C',
      });
      const up = eigenGroup(h, Uint32Array.of(0, 1));
      const down = eigenGroup(h, Uint32Array.of(2, 3));
      const lines = [...up.energies].flatMap((high, a) =>
        [...down.energies].map((low, b): [number, number] => {
          const overlap = up.vectors[2 * a] * down.vectors[2 * b] + up.vectors[2 * a + 1] * down.vectors[2 * b + 1];
          return [high - low, overlap ** 2 / 2];
        }),
      );
      lines.sort(([p], [q]) => p - q);
      lines.forEach(([hz, intensity], k) => {
        const [expectedHz, expectedIntensity] = expected.lines_Hz_intensity[k];
        // The catalogue has the outer lines with nine digits.
        expect(Math.abs(hz - expectedHz)).toBeLessThan(Math.max(tolerance.freq_abs_Hz, 2e-9 * Math.abs(hz)));
        expect(Math.abs(intensity - expectedIntensity)).toBeLessThan(tolerance.intensity_abs);
      });
    },
  );
});

describe('B17 jump and return', () => {
  it.each(referenceCases<{ offset_Hz: number; t_s: number }, { Mxy: number; Mz: number }>('B17-1'))(
    '$id',
    ({ inputs, expected, tolerance }) => {
      const steps = [pulse('1H', 90), { delay: inputs.t_s }, pulse('1H', 90, 180)];
      const [x, y, z] = magnetisationAfter(oneProton(inputs.offset_Hz), steps, { protonMHz: MHZ });
      expectAll([Math.hypot(x, y), z], [expected.Mxy, expected.Mz], tolerance.abs);
    },
  );
});
