import { describe, expect, it } from 'vitest';
import type { ExperimentInput } from '../src/documents/experiment.schema.js';
import type { SpinSystemInput } from '../src/documents/system.schema.js';
import { complexMatrix } from '../src/algebra/dense.js';
import { solveComplexInPlace } from '../src/algebra/dense-solve.js';
import { forwardRate } from '../src/dynamics/exchange/rate-matrix.js';
import { generatorOf } from '../src/dynamics/liouville/generator.js';
import { sparseHamiltonian } from '../src/dynamics/liouville/hamiltonian.js';
import { spinSpace } from '../src/dynamics/liouville/spin-space.js';
import { simulate } from '../src/simulate/simulate.js';
import { absorptionAt } from './continuous-spectrum.js';
import { experimentOf, systemOf } from './documents.js';
import { referenceCases } from './reference/catalogue.js';

/** Shifts are given in Hz from the carrier at this field. */
const MHZ = 400;
const CENTRE = 5;
const ppm = (hz: number) => CENTRE + hz / MHZ;

/** A FID that is fine enough for `fastest` (s^-1) and long enough for `slowest`. */
function signal(
  parts: Partial<SpinSystemInput>,
  fastest: number,
  slowest: number,
  experiment: Partial<ExperimentInput> = {},
) {
  const width = 12 * fastest;
  const points = 2 * Math.ceil((width * 26) / slowest / 2);
  return simulate(
    systemOf(parts as Omit<SpinSystemInput, 'format' | 'name'>),
    experimentOf({ protonMHz: MHZ, acquisition: { centre: CENTRE, width, points }, ...experiment }),
  );
}

/** One proton that changes between shifts (Hz), decaying with R2. */
function sites(
  shifts: number[],
  populations: number[],
  exchange: [number, number, number][],
  r2: number,
): Partial<SpinSystemInput> {
  return {
    nuclei: [{ id: 'H', isotope: '1H', shift: CENTRE, lineWidth: r2 / Math.PI }],
    states: shifts.map((hz, k) => ({ id: `s${k}`, population: populations[k], shifts: { H: ppm(hz) } })),
    exchange: exchange.map(([from, to, rate]) => ({ from: `s${from}`, to: `s${to}`, rate })),
  };
}

function expectRatios(actual: number[], expected: readonly number[], relative: number): void {
  actual.forEach((value, k) => expect(Math.abs(value / expected[k] - 1), `number ${k}`).toBeLessThan(relative));
}

/** Where f changes sign between low and high. */
function bisect(f: (x: number) => number, low: number, high: number, steps: number): number {
  const sign = Math.sign(f(low));
  let [a, b] = [low, high];
  for (let k = 0; k < steps; k++) {
    const middle = (a + b) / 2;
    if (Math.sign(f(middle)) === sign) a = middle;
    else b = middle;
  }
  return (a + b) / 2;
}

/** Positive: the absorption at `offset` is a minimum. */
function curvature(result: ReturnType<typeof signal>, offset: number, step = 0.5): number {
  return absorptionAt(result, offset + step) + absorptionAt(result, offset - step) - 2 * absorptionAt(result, offset);
}

interface Points {
  points_Hz: number[];
  S_per_Hz: number[];
}

describe('C01 two sites of equal population', () => {
  type Inputs = { nuA_Hz: number; nuB_Hz: number; pA: number; k_per_s: number; R2_per_s: number };
  type Expected = Points & { peak_separation_Hz_without_R2?: number };

  it.each(referenceCases<Inputs, Expected>('C01'))('$id', ({ inputs, expected, tolerance }) => {
    const { nuA_Hz, nuB_Hz, pA, k_per_s: k, R2_per_s } = inputs;
    const of = (r2: number, slowest: number) =>
      signal(sites([nuA_Hz, nuB_Hz], [pA, 1 - pA], [[0, 1, k]], r2), 2 * k + 700, slowest);
    const result = of(R2_per_s, R2_per_s || k);
    expectRatios(
      expected.points_Hz.map((hz) => absorptionAt(result, hz)),
      expected.S_per_Hz,
      tolerance.rel,
    );
    if (expected.peak_separation_Hz_without_R2 === undefined) return;
    const bare = of(0, k);
    const slope = (hz: number) => absorptionAt(bare, hz + 0.01) - absorptionAt(bare, hz - 0.01);
    const peak = bisect(slope, nuA_Hz - 6, nuA_Hz + 1, 40);
    expect(2 * peak).toBeCloseTo(expected.peak_separation_Hz_without_R2, 4);
  });
});

describe('C02 two sites of unequal population', () => {
  type Inputs = { nuA_Hz: number; nuB_Hz: number; pA: number; k_ex_per_s: number; R2_per_s: number };
  type Expected = Points & { kAB: number };
  const spectra = referenceCases<Inputs, Expected>('C02').filter(({ inputs }) => 'pA' in inputs);

  it.each(spectra)('$id', ({ inputs, expected, tolerance }) => {
    const { nuA_Hz, nuB_Hz, pA, k_ex_per_s, R2_per_s } = inputs;
    const parts = sites([nuA_Hz, nuB_Hz], [pA, 1 - pA], [[0, 1, expected.kAB]], R2_per_s);
    const result = signal(parts, k_ex_per_s + 700, R2_per_s);
    expectRatios(
      expected.points_Hz.map((hz) => absorptionAt(result, hz)),
      expected.S_per_Hz,
      tolerance.rel,
    );
  });

  it('C02-6 coalesces: two maxima below the rate, one above', () => {
    type Coalescence = { kAB_major_to_minor: number; k_ex_at_coalescence: number };
    const [{ inputs, expected }] = referenceCases<{ d_Hz: number; population_difference: number }, Coalescence>(
      'C02-6',
    );
    const { d_Hz, population_difference } = inputs;
    const maxima = (factor: number) => {
      const k = factor * expected.kAB_major_to_minor;
      const populations = [(1 + population_difference) / 2, (1 - population_difference) / 2];
      const result = signal(sites([d_Hz / 2, -d_Hz / 2], populations, [[0, 1, k]], 0), 1200, 30);
      const heights = Array.from({ length: 241 }, (_, n) => absorptionAt(result, n / 2 - 60));
      return heights.filter((height, n) => height > heights[n - 1] && height > heights[n + 1]).length;
    };
    expect(maxima(0.99)).toBe(2);
    expect(maxima(1.01)).toBe(1);
  });
});

describe('C03 mutual exchange of a coupled pair', () => {
  type Inputs = { nuA_Hz: number; nuB_Hz: number; J_Hz: number; k_per_s: number; R2_per_s: number };
  const swapping = (a: number, b: number, j: number, rate: number, r2: number): Partial<SpinSystemInput> => ({
    nuclei: [
      { id: 'A', isotope: '1H', shift: ppm(a), lineWidth: r2 / Math.PI },
      { id: 'B', isotope: '1H', shift: ppm(b), lineWidth: r2 / Math.PI },
    ],
    couplings: [{ between: ['A', 'B'], j }],
    states: [
      { id: 's0', population: 0.5 },
      { id: 's1', population: 0.5, shifts: { A: ppm(b), B: ppm(a) } },
    ],
    exchange: [{ from: 's0', to: 's1', rate }],
  });
  const spectra = referenceCases<Inputs, Points>('C03').filter(({ inputs }) => 'nuA_Hz' in inputs);

  it.each(spectra)('$id', ({ inputs, expected, tolerance }) => {
    const { nuA_Hz, nuB_Hz, J_Hz, k_per_s, R2_per_s } = inputs;
    const result = signal(swapping(nuA_Hz, nuB_Hz, J_Hz, k_per_s, R2_per_s), 2 * k_per_s + 400, R2_per_s);
    expectRatios(
      expected.points_Hz.map((hz) => absorptionAt(result, hz)),
      expected.S_per_Hz,
      tolerance.rel,
    );
  });

  it('C03-6 coalesces where the curvature at the centre changes sign', () => {
    type Coalescence = { k_exact: number };
    const [{ inputs, expected, tolerance }] = referenceCases<{ d_Hz: number; J_Hz: number }, Coalescence>('C03-6');
    const at = (k: number) => {
      const result = signal(swapping(inputs.d_Hz / 2, -inputs.d_Hz / 2, inputs.J_Hz, k, 0), 2 * k + 400, 20);
      // The fourth-order term of a flat top counts at half a hertz: a smaller step.
      return curvature(result, 0, 0.05);
    };
    const k = bisect(at, 80, 92, 16);
    expect(Math.abs(k / expected.k_exact - 1)).toBeLessThan(tolerance.k_exact_rel);
  });
});

describe('C04 three sites', () => {
  type Inputs = { nu_Hz: number[]; rate_pairs: string[]; k_per_s: number; R2_per_s: number };
  // Exchange obeys detailed balance in the documents, so that only hops to both neighbours can be written.
  const balanced = referenceCases<Inputs, Points>('C04').filter(({ inputs }) => inputs.rate_pairs.length === 6);

  it.each(balanced)('$id', ({ inputs, expected, tolerance }) => {
    const { nu_Hz, k_per_s: k, R2_per_s } = inputs;
    const third = [1 / 3, 1 / 3, 1 / 3];
    const result = signal(
      sites(
        nu_Hz,
        third,
        [
          [0, 1, k],
          [1, 2, k],
          [2, 0, k],
        ],
        R2_per_s,
      ),
      3 * k + 1000,
      R2_per_s,
    );
    expectRatios(
      expected.points_Hz.map((hz) => absorptionAt(result, hz)),
      expected.S_per_Hz,
      tolerance.rel,
    );
  });

  // One-way cycles can't be written in a document: the generator is given their rates, and its resolvent is the spectrum.
  const cyclic = referenceCases<Inputs, Points>('C04').filter(({ inputs }) => inputs.rate_pairs.length === 3);

  it.each(cyclic)('$id one way round', ({ inputs, expected, tolerance }) => {
    const { nu_Hz, k_per_s: k, R2_per_s } = inputs;
    const space = spinSpace([{ row: 0, isotope: '1H', spin: 0.5 }], [0]);
    const hamiltonians = nu_Hz.map((hz) => sparseHamiltonian(space, Float64Array.of(hz), []));
    const decay = { start: Uint32Array.of(0, 1), columns: Uint32Array.of(0), values: Float64Array.of(R2_per_s) };
    const rates = Float64Array.of(-k, 0, k, k, -k, 0, 0, k, -k);
    const lowering = { kets: Uint32Array.of(1), bras: Uint32Array.of(0) };
    const generator = generatorOf(2, lowering, hamiltonians, decay, rates);
    const absorption = (hz: number) => {
      const resolvent = complexMatrix(3, 3);
      for (let r = 0; r < 3; r++) {
        resolvent.imag[r * 4] = 2 * Math.PI * hz;
        for (let p = generator.start[r]; p < generator.start[r + 1]; p++) {
          resolvent.real[r * 3 + generator.columns[p]] -= generator.real[p];
          resolvent.imag[r * 3 + generator.columns[p]] -= generator.imag[p];
        }
      }
      const equal = complexMatrix(3, 1, Float64Array.of(1 / 3, 1 / 3, 1 / 3));
      return 2 * solveComplexInPlace(resolvent, equal).real.reduce((sum, value) => sum + value, 0);
    };
    expectRatios(expected.points_Hz.map(absorption), expected.S_per_Hz, tolerance.rel);
  });
});

describe('C05 Eyring rates', () => {
  type Inputs = { T_K: number; dG_J_per_mol?: number; dH?: number; dS?: number };
  const rates = referenceCases<Inputs, { k_per_s: number }>('C05').filter(({ expected }) => 'k_per_s' in expected);

  it.each(rates)('$id', ({ inputs, expected, tolerance }) => {
    const { T_K, dG_J_per_mol, dH = dG_J_per_mol!, dS = 0 } = inputs;
    const withRate = (exchange: SpinSystemInput['exchange']) =>
      signal({ ...sites([25, -25], [0.5, 0.5], [], 3), exchange }, 1000, 3, { temperature: T_K });
    const eyring = { enthalpy: dH / 1000, entropy: dS };
    const result = withRate([{ from: 's0', to: 's1', eyring }]);
    const given = withRate([{ from: 's0', to: 's1', rate: expected.k_per_s }]);
    // The spectrum follows the rate with about its own size here, so that equal spectra mean equal rates.
    for (const hz of [0, 25, 40]) {
      expect(Math.abs(absorptionAt(result, hz) / absorptionAt(given, hz) - 1)).toBeLessThan(tolerance.rel);
    }
  });
});

describe('C05-4 barrier from coalescence', () => {
  it('has the coalescence rate pi d/sqrt 2 at the temperature of coalescence', () => {
    type Expected = { k_c: number; dG_J_per_mol: number };
    const [{ inputs, expected, tolerance }] = referenceCases<{ Tc_K: number; d_Hz: number }, Expected>('C05-4');
    const eyring = { enthalpy: expected.dG_J_per_mol / 1000, entropy: 0 };
    const forward = forwardRate({ from: 's0', to: 's1', eyring }, inputs.Tc_K);
    expectRatios([forward, forward], [expected.k_c, (Math.PI * inputs.d_Hz) / Math.SQRT2], tolerance.rel);
  });
});

describe('C06 magnetisation transfer and dispersion', () => {
  const firstPoint = (parts: Partial<SpinSystemInput>, experiment: Partial<ExperimentInput>) => {
    const { fid } = simulate(
      systemOf(parts as Omit<SpinSystemInput, 'format' | 'name'>),
      experimentOf({
        protonMHz: MHZ,
        acquisition: { centre: CENTRE, width: 1000, points: 2 },
        relaxation: 't1-t2',
        ...experiment,
      }),
    );
    return Math.hypot(fid.real[0], fid.imag[0]);
  };
  const twoSites = (pA: number, difference: number, kex: number, t1: number, t2: number): Partial<SpinSystemInput> => ({
    nuclei: [{ id: 'H', isotope: '1H', shift: CENTRE, t1, t2 }],
    states: [
      { id: 's0', population: pA, shifts: { H: ppm((1 - pA) * difference) } },
      { id: 's1', population: 1 - pA, shifts: { H: ppm(-pA * difference) } },
    ],
    exchange: [{ from: 's0', to: 's1', rate: (1 - pA) * kex }],
  });

  type Echoes = { pA: number; dnu_Hz: number; kex: number; nu_cp_Hz: number; R20: number };
  const trains = referenceCases<Echoes, { R2eff_exact_numerical: number }>('C06').filter(
    ({ inputs }) => 'nu_cp_Hz' in inputs,
  );

  it.each(trains)('$id echo train', ({ inputs, expected, tolerance }) => {
    const { pA, dnu_Hz, kex, nu_cp_Hz, R20 } = inputs;
    const tau = 1 / (4 * nu_cp_Hz);
    const after = (loops: number) =>
      firstPoint(twoSites(pA, dnu_Hz, kex, 1 / R20, 1 / R20), { sequence: { recipe: 'cpmg', tau, loops } });
    const [few, many] = [20, 120];
    const rate = Math.log(after(few) / after(many)) / ((many - few) * 2 * tau);
    expect(Math.abs(rate / expected.R2eff_exact_numerical - 1)).toBeLessThan(tolerance.exact_rel);
  });

  it('C06-6 spin lock', () => {
    type Lock = { pA: number; dnu_Hz: number; kex: number; nu1_Hz: number; R1: number; R2: number };
    const [{ inputs, expected, tolerance }] = referenceCases<Lock, { R1rho_exact_numerical: number }>('C06-6');
    const { pA, dnu_Hz, kex, nu1_Hz, R1, R2 } = inputs;
    // Both signs of the locked magnetisation, so that what recovers meanwhile drops out.
    const locked = (seconds: number) =>
      firstPoint(twoSites(pA, dnu_Hz, kex, 1 / R1, 1 / R2), {
        sequence: {
          steps: [
            { pulse: { on: '1H', flip: 90 } },
            { pulse: { on: '1H', flip: 360 * nu1_Hz * seconds, seconds } },
            { acquire: {} },
          ],
          phaseCycle: [
            [90, 0, 90],
            [270, 0, 270],
          ],
        },
      });
    // What turns about the field changes sign within half a period.
    const half = 1 / nu1_Hz / 2;
    const after = (seconds: number) => locked(seconds - half) + 2 * locked(seconds) + locked(seconds + half);
    const rate = Math.log(after(0.05) / after(0.1)) / 0.05;
    expect(Math.abs(rate / expected.R1rho_exact_numerical - 1)).toBeLessThan(tolerance.exact_rel);
  });

  it('C06-1 saturation of one site', () => {
    const [{ inputs, expected }] = referenceCases<
      { T1_s: number; kA_per_s: number },
      { MA_inf: number; rate_per_s: number }
    >('C06-1');
    const { T1_s, kA_per_s } = inputs;
    // A field on the second site, strong enough to saturate it and far from the first: both fail by less than 1e-4.
    const [far, field] = [1e6, 500];
    const parts = twoSites(0.5, far, 2 * kA_per_s, T1_s, 0.01);
    const after = (seconds: number) =>
      firstPoint(parts, {
        sequence: {
          steps: [
            { pulse: { on: '1H', flip: 360 * field * seconds, seconds, offsetHz: -far / 2 } },
            { spoil: true },
            { pulse: { on: '1H', flip: 90 } },
            { acquire: {} },
          ],
        },
      });
    // Half of the nuclei are in the first site.
    const [early, late] = [after(1), after(40)];
    expect(late).toBeCloseTo(0.5 * expected.MA_inf, 4);
    const decay = 0.5 * (1 - expected.MA_inf) * Math.exp(-expected.rate_per_s);
    expect(early - late).toBeCloseTo(decay, 4);
  });
});

describe('C07 loss of a splitting by exchange of the partner', () => {
  type Inputs = { J_Hz: number; exchange_rate: number; R2_per_s: number };

  it.each(referenceCases<Inputs, Points>('C07'))('$id', ({ inputs, expected, tolerance }) => {
    const { J_Hz, exchange_rate, R2_per_s } = inputs;
    // A partner whose Iz decays with R1 = exchange rate flips with half of it.
    const parts: Partial<SpinSystemInput> = {
      nuclei: [
        { id: 'H', isotope: '1H', shift: CENTRE, t2: 1 / R2_per_s },
        { id: 'X', isotope: '13C', shift: 50, t1: 1 / exchange_rate, t2: 1 / exchange_rate },
      ],
      couplings: [{ between: ['H', 'X'], j: J_Hz }],
    };
    const result = signal(parts, 200, R2_per_s, { relaxation: 't1-t2' });
    expectRatios(
      expected.points_Hz.map((hz) => absorptionAt(result, hz)),
      expected.S_per_Hz,
      tolerance.rel,
    );
  });
});
