import { describe, expect, it } from 'vitest';
import type { SpinSystemInput } from '../src/documents/system.schema.js';
import { redfieldMatrix } from '../src/dynamics/relaxation/redfield-matrix.js';
import { redfieldTerms } from '../src/dynamics/relaxation/redfield.js';
import { relaxationNumbers, type NucleusRelaxation } from '../src/dynamics/relaxation/relaxation-numbers.js';
import { scalarRelaxation } from '../src/dynamics/relaxation/scalar-relaxation.js';
import { nuclide } from '../src/nuclides/nuclides.js';
import { systemOf } from './documents.js';
import { referenceCases } from './reference/catalogue.js';

/**
 * The catalogue takes every frequency from gamma B0; here they come from the unified scale, which differs between isotopes by the
 * shielding, up to some 2e-4. A case of one isotope is compared at the field where its frequency agrees; a case of two isotopes agrees
 * only as closely as their frequencies do. (At equal frequencies the closed formulas are met to 1e-10, see the specs of `relaxation`.)
 */
const TWO_ISOTOPES = 5e-4;

/** The 1H frequency, MHz, at which the isotope precesses with gamma B0/2 pi. */
function fieldOf(isotope: string, tesla: number): number {
  const { gamma, xi } = nuclide(isotope);
  return (Math.abs(gamma) * tesla) / (2 * Math.PI * 1e6) / (xi / 100);
}

function numbers(parts: Partial<SpinSystemInput>, tauC: number, protonMHz: number): NucleusRelaxation[] {
  const system = systemOf({ nuclei: [], ...parts, tumbling: { tauC } });
  const acquisition = { centre: 0, width: 1000, points: 2 };
  return relaxationNumbers(system, { protonMHz, observe: system.nuclei[0].isotope, acquisition });
}

const pairAt = (a: string, b: string, metres: number): Partial<SpinSystemInput> => ({
  nuclei: [
    { id: 'A', isotope: a, shift: 0, position: [0, 0, 0] },
    { id: 'B', isotope: b, shift: 0, position: [0, 0, metres * 1e10] },
  ],
  couplings: [{ between: ['A', 'B'], dipolar: 'positions' }],
});

function expectRatio(actual: number | null, expected: number, relative: number): void {
  expect(Math.abs(actual! / expected - 1)).toBeLessThan(relative);
}

describe('D01 two like spins', () => {
  type Inputs = { r_m: number; nu_MHz: number; tau_c_s: number };
  const cases = referenceCases<Inputs, { R1_per_s: number; R2_per_s: number }>('D01').filter(
    ({ inputs }) => 'r_m' in inputs,
  );

  it.each(cases)('$id', ({ inputs, expected, tolerance }) => {
    const { r_m, nu_MHz, tau_c_s } = inputs;
    const [a] = numbers(pairAt('1H', '1H', r_m), tau_c_s, nu_MHz);
    expectRatio(1 / a.t1!, expected.R1_per_s, tolerance.rel);
    // R2 of two spins of one shift belongs to the total I-, whose elements are all 1.
    const system = systemOf({ nuclei: [], ...pairAt('1H', '1H', r_m), tumbling: { tauC: tau_c_s } });
    const frame = { protonMHz: nu_MHz, observe: '1H', acquisition: { centre: 0, width: 1000, points: 2 } };
    const { values } = redfieldMatrix(redfieldTerms(system, frame), 4, { kets: [1, 2, 3, 3], bras: [0, 0, 1, 2] });
    expectRatio(values.reduce((sum, value) => sum + value, 0) / 4, expected.R2_per_s, tolerance.rel);
  });
});

describe('D02 Solomon equations', () => {
  type Inputs = { I: string; S: string; r_m: number; B0_T: number; tau_c_s: number };

  it.each(referenceCases<Inputs, { rho_I: number; sigma: number }>('D02'))('$id', ({ inputs, expected, tolerance }) => {
    const { I, S, r_m, B0_T, tau_c_s } = inputs;
    const [a] = numbers(pairAt(I, S, r_m), tau_c_s, fieldOf(I, B0_T));
    const relative = I === S ? tolerance.rel : TWO_ISOTOPES;
    expectRatio(1 / a.t1Selective!, expected.rho_I, relative);
    const polarisation = nuclide(S).gamma / nuclide(I).gamma;
    expectRatio(a.noe.B / polarisation / a.t1Selective!, expected.sigma, relative);
  });
});

describe('D03 homonuclear NOE', () => {
  const steady = referenceCases<{ omega_tau: number }, { eta: number }>('D03').filter(
    ({ expected }) => 'eta' in expected,
  );

  it.each(steady)('$id', ({ inputs, expected, tolerance }) => {
    const [a] = numbers(pairAt('1H', '1H', 2.5e-10), inputs.omega_tau / (2 * Math.PI * 400e6), 400);
    expect(Math.abs(a.noe.B - expected.eta)).toBeLessThan(tolerance.abs);
  });

  it('D03-7 after inversion', () => {
    type Inputs = { omega_tau: number; W0_per_s: number; t_s: number };
    type Expected = { rho: number; sigma: number; I_enhancement: number };
    const [{ inputs, expected, tolerance }] = referenceCases<Inputs, Expected>('D03-7');
    const tauC = inputs.omega_tau / (2 * Math.PI * 400e6);
    // W0 = b^2 tauC/10 of two like spins.
    const constant = Math.sqrt((10 * inputs.W0_per_s) / tauC) / (2 * Math.PI);
    const { nuclei } = pairAt('1H', '1H', 2e-10);
    const [a] = numbers({ nuclei, couplings: [{ between: ['A', 'B'], dipolar: { constant } }] }, tauC, 400);
    const [rho, sigma] = [1 / a.t1Selective!, a.noe.B / a.t1Selective!];
    expectRatio(rho, expected.rho, tolerance.rel);
    expectRatio(sigma, expected.sigma, tolerance.rel);
    const enhancement = Math.exp(-(rho - sigma) * inputs.t_s) - Math.exp(-(rho + sigma) * inputs.t_s);
    expectRatio(enhancement, expected.I_enhancement, tolerance.rel);
  });
});

describe('D04 heteronuclear NOE and R1', () => {
  type Inputs = { X: string; r_m?: number; B0_T?: number; tau_c_s?: number };
  type Expected = { eta_max?: number; eta?: number; R1_per_s?: number };

  it.each(referenceCases<Inputs, Expected>('D04'))('$id', ({ inputs, expected, tolerance }) => {
    const { X, r_m = 1e-10, B0_T = 1, tau_c_s = 1e-15 } = inputs;
    const [x] = numbers(pairAt(X, '1H', r_m), tau_c_s, fieldOf(X, B0_T));
    if (expected.eta_max !== undefined) expectRatio(x.noe.B, expected.eta_max, tolerance.rel);
    if (expected.eta !== undefined) expectRatio(x.noe.B, expected.eta, TWO_ISOTOPES);
    if (expected.R1_per_s !== undefined) expectRatio(1 / x.t1!, expected.R1_per_s, TWO_ISOTOPES);
  });
});

/** An axial shift tensor of this anisotropy (parallel less perpendicular, ppm), tilted from the z axis. */
const axial = (anisotropy: number, tilt = 0) => ({
  span: Math.abs(anisotropy),
  skew: anisotropy > 0 ? -1 : 1,
  euler: [0, tilt, 0] as [number, number, number],
});

describe('D05 15N of an amide', () => {
  type Inputs = { nu_H_MHz: number; tau_m_s: number; S2: number; r_m: number; csa_ppm: number };
  type Expected = { R1_per_s: number; R2_per_s: number; NOE: number };
  // Internal motion (S2 < 1) is no part of the model here.
  const rigid = referenceCases<Inputs, Expected>('D05').filter(({ inputs }) => inputs.S2 === 1);

  it.each(rigid)('$id', ({ inputs, expected }) => {
    const parts = pairAt('15N', '1H', inputs.r_m);
    const nuclei = parts.nuclei!.map((nucleus, k) => (k === 0 ? { ...nucleus, csa: axial(inputs.csa_ppm) } : nucleus));
    const [n] = numbers({ ...parts, nuclei }, inputs.tau_m_s, inputs.nu_H_MHz);
    expectRatio(1 / n.t1!, expected.R1_per_s, TWO_ISOTOPES);
    expectRatio(1 / n.t2!, expected.R2_per_s, TWO_ISOTOPES);
    expectRatio(1 + n.noe.B, expected.NOE, TWO_ISOTOPES);
  });
});

describe('D06 shift anisotropy', () => {
  type Inputs = { X: string; B0_T: number; anisotropy_ppm: number; tau_c_s: number };

  it.each(referenceCases<Inputs, { R1_per_s: number; R2_per_s: number }>('D06'))(
    '$id',
    ({ inputs, expected, tolerance }) => {
      const { X, B0_T, anisotropy_ppm, tau_c_s } = inputs;
      const nuclei = [{ id: 'X', isotope: X, shift: 0, csa: axial(anisotropy_ppm) }];
      const [x] = numbers({ nuclei }, tau_c_s, fieldOf(X, B0_T));
      expectRatio(1 / x.t1!, expected.R1_per_s, tolerance.rel);
      expectRatio(1 / x.t2!, expected.R2_per_s, tolerance.rel);
    },
  );
});

describe('D07 widths of a doublet by cross-correlation', () => {
  type Inputs = { X: string; r_m: number; B0_T: number; csa_ppm: number; angle_deg: number; tau_c_s: number };

  it.each(referenceCases<Inputs, { width_difference_Hz: number }>('D07'))('$id', ({ inputs, expected, tolerance }) => {
    const { X, r_m, B0_T, csa_ppm, angle_deg, tau_c_s } = inputs;
    const parts = pairAt(X, '1H', r_m);
    const nuclei = parts.nuclei!.map((nucleus, k) =>
      k === 0 ? { ...nucleus, csa: axial(csa_ppm, angle_deg) } : nucleus,
    );
    const [x] = numbers({ ...parts, nuclei }, tau_c_s, fieldOf(X, B0_T));
    expectRatio(x.widthDifference.B, expected.width_difference_Hz, tolerance.rel);
  });
});

describe('D08 quadrupolar relaxation', () => {
  type Inputs = { nuclide: string; CQ_Hz: number; eta: number; tau_c_s: number; B0_T?: number };
  type Expected = { R1_per_s: number; R2_per_s?: number; linewidth_Hz?: number };

  it.each(referenceCases<Inputs, Expected>('D08'))('$id', ({ inputs, expected, tolerance }) => {
    const { nuclide: isotope, CQ_Hz, eta, tau_c_s, B0_T = 1e-6 } = inputs;
    const nuclei = [{ id: 'Q', isotope, shift: 0, quadrupole: { cq: CQ_Hz, eta } }];
    const [q] = numbers({ nuclei }, tau_c_s, fieldOf(isotope, B0_T));
    expectRatio(1 / q.t1!, expected.R1_per_s, tolerance.rel);
    if (expected.R2_per_s !== undefined) expectRatio(1 / q.t2!, expected.R2_per_s, tolerance.rel);
    if (expected.linewidth_Hz !== undefined) expectRatio(q.lineWidth, expected.linewidth_Hz, tolerance.rel);
  });
});

describe('D09 scalar relaxation of the second kind', () => {
  type Inputs = { S: number; J_Hz: number; T1S_s: number; T2S_s: number; frequency_difference_Hz: number };

  it.each(referenceCases<Inputs, { R1_per_s: number; R2_per_s: number }>('D09'))(
    '$id',
    ({ inputs, expected, tolerance }) => {
      const { S, J_Hz, T1S_s, T2S_s, frequency_difference_Hz } = inputs;
      const partner = { spin: S, j: J_Hz, t1: T1S_s, t2: T2S_s, frequencyDifference: frequency_difference_Hz };
      const { r1, r2 } = scalarRelaxation(partner);
      expectRatio(r1, expected.R1_per_s, tolerance.rel);
      expectRatio(r2, expected.R2_per_s, tolerance.rel);
    },
  );
});
