import { describe, expect, it } from 'vitest';
import { unitVector } from '../src/algebra/rotation.js';
import { MAGIC_ANGLE, type ExperimentInput } from '../src/documents/experiment.schema.js';
import type { SpinSystemInput } from '../src/documents/system.schema.js';
import { observedClusters } from '../src/dynamics/oriented/oriented-spins.js';
import { rotorCone } from '../src/dynamics/oriented/rotor.js';
import { SidebandSeries } from '../src/dynamics/oriented/sidebands.js';
import { solveOriented } from '../src/dynamics/oriented/solve-oriented.js';
import { surfaceFrequency, surfacesOf, type Surface } from '../src/dynamics/oriented/surfaces.js';
import { deltaEtaFromSpanSkew, spanSkewFromPrincipal } from '../src/interactions/shift-notations.js';
import { dipolarConstantHz } from '../src/interactions/tensors.js';
import { larmorMHz } from '../src/nuclides/nuclides.js';
import { gaussProduct } from '../src/orientations/gauss-product.js';
import { SILENT } from '../src/run/context.js';
import { fidToSpectrum } from '../src/spectrum/transform.js';
import { experimentOf, systemOf } from './documents.js';
import { referenceCases } from './reference/catalogue.js';

type Sample = NonNullable<ExperimentInput['sample']>;
type Three = [number, number, number];

/** A 13C field at which 1 ppm is 1 Hz, so that the catalogue's shifts serve as both. */
const ONE_HZ_PER_PPM = 1 / larmorMHz('13C', 1);

/** One carbon with the principal values given, in Hz, at 0 Hz on a window of `width` Hz. */
function carbon(values: readonly number[]) {
  const { span, skew, iso } = spanSkewFromPrincipal([...values] as Three);
  return systemOf({ nuclei: [{ id: 'C', isotope: '13C', shift: iso, csa: { span, skew, euler: [20, 50, 70] } }] });
}

function carbonExperiment(sample: Sample, width: number, points: number, gaussian = 0) {
  return experimentOf({
    protonMHz: ONE_HZ_PER_PPM,
    observe: '13C',
    sample,
    lineWidth: 0,
    acquisition: { centre: 0, width, points },
    processing: { gaussian },
  });
}

/** Spectrum in order of rising frequency, with the frequency of each point. */
function spectrumOf(system: ReturnType<typeof systemOf>, experiment: ReturnType<typeof experimentOf>) {
  const { fid } = solveOriented(system, experiment, SILENT);
  const real = fidToSpectrum(fid, experiment).real.slice().reverse();
  const { width } = experiment.acquisition;
  const hz = (j: number) => ((j - real.length / 2) * width) / real.length;
  const at = (frequency: number) => {
    const place = (frequency / width + 0.5) * real.length;
    const j = Math.floor(place);
    return real[j] + (place - j) * (real[j + 1] - real[j]);
  };
  const between = (low: number, high: number) =>
    real.reduce((sum, value, j) => (hz(j) >= low && hz(j) < high ? sum + value : sum), 0) * (width / real.length);
  return { real, hz, at, between };
}

/** Mean and variance of the spectrum behind a FID, from its logarithm at the first two samples, which must be close to 0. */
function moments(system: ReturnType<typeof systemOf>, experiment: ReturnType<typeof experimentOf>) {
  const { fid } = solveOriented(system, experiment, SILENT);
  const step = (2 * Math.PI) / experiment.acquisition.width;
  const [size, phase] = [Math.hypot(fid.real[1], fid.imag[1]), Math.atan2(fid.imag[1], fid.real[1])];
  return { mean: phase / step, variance: (-2 * Math.log(size / fid.real[0])) / step ** 2 };
}

const relative = (actual: number, expected: number) => Math.abs(actual / expected - 1);

describe('E01 shift-tensor conventions', () => {
  type Expected = Record<'iso' | 'HB_span' | 'HB_skew' | 'reduced_anisotropy' | 'eta', number>;
  it.each(referenceCases<{ d11_d22_d33_ppm: Three }, Expected>('E01'))('$id', ({ inputs, expected, tolerance }) => {
    const { iso, span, skew } = spanSkewFromPrincipal(inputs.d11_d22_d33_ppm);
    const { delta, eta } = deltaEtaFromSpanSkew({ span, skew });
    const found = { iso, HB_span: span, HB_skew: skew, reduced_anisotropy: delta, eta };
    for (const [name, value] of Object.entries(found)) {
      const wanted = expected[name as keyof Expected];
      // The catalogue gives ten digits.
      expect(Math.abs(value - wanted)).toBeLessThan(tolerance.abs + 1e-9 * Math.abs(wanted));
    }
  });
});

describe('E02 axial powder pattern', () => {
  type Expected = { at: number[]; density: number[]; cumulative_from_horn: number[]; mean: number; variance: number };
  const cases = referenceCases<{ v_perp: number; v_par: number }, Expected>('E02');
  const sample = { kind: 'powder', orientations: 4000 } as const;

  it.each(cases)('$id density and cumulative intensity', ({ inputs: { v_perp, v_par }, expected }) => {
    const { at, between } = spectrumOf(carbon([v_perp, v_perp, v_par]), carbonExperiment(sample, 400, 2048, 1));
    const direction = Math.sign(v_par - v_perp);
    expected.at.forEach((hz, k) => {
      // What remains is the width of 1 Hz: (width^2/16 ln 2) d2I/I is 3e-4 at the point nearest to the horn.
      expect(relative(at(hz), expected.density[k])).toBeLessThan(2e-3);
      const [low, high] = [v_perp - direction * 60, hz].sort((a, b) => a - b);
      expect(Math.abs(between(low, high) - expected.cumulative_from_horn[k])).toBeLessThan(2e-3);
    });
  });

  it.each(cases)('$id moments', ({ inputs: { v_perp, v_par }, expected }) => {
    const { mean, variance } = moments(carbon([v_perp, v_perp, v_par]), carbonExperiment(sample, 1e5, 2));
    expect(Math.abs(mean - expected.mean)).toBeLessThan(2e-3);
    expect(relative(variance, expected.variance)).toBeLessThan(3e-4);
  });
});

describe('E03 non-axial powder pattern', () => {
  type Expected = {
    at: number[];
    density: number[];
    ten_equal_bins_low_to_high: number[];
    mean: number;
    variance: number;
  };
  const cases = referenceCases<{ d11_d22_d33: Three }, Expected>('E03');
  const sample = { kind: 'powder', orientations: 4000 } as const;

  it.each(cases)('$id density and bins', ({ inputs: { d11_d22_d33 }, expected }) => {
    const { at, between } = spectrumOf(carbon(d11_d22_d33), carbonExperiment(sample, 800, 4096, 0.5));
    expected.at.forEach((hz, k) => expect(relative(at(hz), expected.density[k])).toBeLessThan(3e-3));
    const [high, , low] = d11_d22_d33;
    const bin = (high - low) / 10;
    expected.ten_equal_bins_low_to_high.forEach((share, k) => {
      const from = k === 0 ? low - 50 : low + k * bin;
      const to = k === 9 ? high + 50 : low + (k + 1) * bin;
      expect(Math.abs(between(from, to) - share)).toBeLessThan(8e-4);
    });
  });

  it.each(cases)('$id moments', ({ inputs: { d11_d22_d33 }, expected }) => {
    const { mean, variance } = moments(carbon(d11_d22_d33), carbonExperiment(sample, 1e5, 2));
    expect(Math.abs(mean - expected.mean)).toBeLessThan(2e-3);
    expect(relative(variance, expected.variance)).toBeLessThan(3e-4);
  });
});

describe('E04 dipolar constants', () => {
  type Inputs = { pair: [string, string]; r_angstrom: number };
  it.each(referenceCases<Inputs, { b_Hz: number }>('E04'))('$id', ({ inputs, expected, tolerance }) => {
    const found = dipolarConstantHz(...inputs.pair, inputs.r_angstrom);
    expect(relative(found, expected.b_Hz)).toBeLessThan(tolerance.rel);
  });
});

/** Local maxima above `share` of the highest point, by rising frequency. */
function peaksOf({ real, hz }: ReturnType<typeof spectrumOf>, share: number): number[] {
  const top = real.reduce((most, value) => Math.max(most, value), 0);
  return Array.from(real.keys())
    .filter((j) => real[j] > share * top && real[j] > (real[j - 1] ?? 0) && real[j] >= (real[j + 1] ?? 0))
    .map(hz);
}

/** The outermost frequencies at which the spectrum reaches `level` (per Hz). */
function feetOf({ real, hz }: ReturnType<typeof spectrumOf>, level: number): [number, number] {
  const above = Array.from(real.keys()).filter((j) => real[j] > level);
  return [hz(above[0]), hz(above[above.length - 1])];
}

describe('E05 Pake doublet', () => {
  type Inputs = { b_Hz: number; spins: 'like' | 'unlike' };
  type Expected = { horns_Hz: number[]; edges_Hz: number[]; second_moment_Hz2: number };
  const cases = referenceCases<Inputs, Expected>('E05');
  const pair = ({ b_Hz, spins }: Inputs) =>
    systemOf({
      nuclei: [
        { id: 'A', isotope: '1H', shift: 5 },
        { id: 'B', isotope: spins === 'like' ? '1H' : '13C', shift: 5 },
      ],
      couplings: [{ between: ['A', 'B'], dipolar: { constant: b_Hz, polar: [30, 60] } }],
    });
  const setting = (width: number, points: number) => ({
    sample: { kind: 'powder', orientations: 4000 } as const,
    lineWidth: 0,
    acquisition: { centre: 5, width, points },
    processing: { gaussian: points > 2 ? 100 : 0 },
  });

  it.each(cases)('$id horns and edges', ({ inputs, expected }) => {
    const spectrum = spectrumOf(pair(inputs), experimentOf(setting(80_000, 4096)));
    // The broadening moves a horn inwards, towards the pattern, by about a third of its width.
    const horns = peaksOf(spectrum, 0.9);
    expect(horns).toHaveLength(2);
    horns.forEach((horn, k) => expect(Math.abs(horn - expected.horns_Hz[k])).toBeLessThan(60));
    // At the edges the density steps from 0 to its least value inside: half of that is reached at the edge.
    const step = spectrum.at(expected.edges_Hz[1] - 400);
    const feet = feetOf(spectrum, step / 2);
    feet.forEach((foot, k) => expect(Math.abs(foot - expected.edges_Hz[k])).toBeLessThan(25));
  });

  it.each(cases)('$id second moment', ({ inputs, expected }) => {
    const { variance } = moments(pair(inputs), experimentOf(setting(2e7, 2)));
    expect(relative(variance, expected.second_moment_Hz2)).toBeLessThan(3e-4);
  });
});

describe('E06 powder pattern of 2H', () => {
  type Expected = Record<`${'edge' | 'shoulder' | 'horn'}_splitting_Hz` | 'second_moment_Hz2', number>;
  const cases = referenceCases<{ CQ_Hz: number; eta: number }, Expected>('E06');
  const deuteron = ({ CQ_Hz, eta }: { CQ_Hz: number; eta: number }) =>
    systemOf({ nuclei: [{ id: 'D', isotope: '2H', shift: 5, quadrupole: { cq: CQ_Hz, eta, euler: [0, 30, 0] } }] });
  const setting = (width: number, points: number) => ({
    observe: '2H',
    sample: { kind: 'powder', orientations: 4000 } as const,
    quadrupoleOrder: 1 as const,
    lineWidth: 0,
    acquisition: { centre: 5, width, points },
    processing: { gaussian: points > 2 ? 500 : 0 },
  });

  it.each(cases)('$id horns, shoulders and edges', ({ inputs, expected }) => {
    const spectrum = spectrumOf(deuteron(inputs), experimentOf(setting(500_000, 4096)));
    const [low, high] = peaksOf(spectrum, 0.9);
    expect(Math.abs(high - low - expected.horn_splitting_Hz)).toBeLessThan(600);
    const edge = expected.edge_splitting_Hz / 2;
    const [left, right] = feetOf(spectrum, spectrum.at(edge - 3000) / 2);
    expect(Math.abs(right - left - expected.edge_splitting_Hz)).toBeLessThan(600);
    // Just inside the shoulder each branch adds its step to the other's density; just outside it does not.
    const shoulder = expected.shoulder_splitting_Hz / 2;
    if (inputs.eta > 0) expect(spectrum.at(shoulder - 1500) / spectrum.at(shoulder + 1500)).toBeGreaterThan(1.15);
  });

  it.each(cases)('$id second moment', ({ inputs, expected }) => {
    const { variance } = moments(deuteron(inputs), experimentOf(setting(2e8, 2)));
    expect(relative(variance, expected.second_moment_Hz2)).toBeLessThan(3e-4);
  });
});

describe('E07 spinning sidebands', () => {
  type Inputs = { shifts_d11_d22_d33_over_spinning_rate: Three };
  type Expected = { orders_minus8_to_8: number[]; sum_N2_I: number; sum_N3_I: number };
  const cases = referenceCases<Inputs, Expected>('E07');
  const rateHz = 100;
  const orders = 64;

  it.each(cases)('$id intensities and sum rules', ({ inputs, expected, tolerance }) => {
    const values = inputs.shifts_d11_d22_d33_over_spinning_rate.map((value) => rateHz * value);
    // The window holds `orders` sidebands and the FID one rotor period: its transform is the sidebands.
    const sample = { kind: 'spinning', rateHz, orientations: 1600 } as const;
    const experiment = carbonExperiment(sample, rateHz * orders, orders);
    const { fid } = solveOriented(carbon(values), experiment, SILENT);
    const intensity = (order: number) => {
      let sum = 0;
      for (let k = 0; k < orders; k++) {
        const angle = (-2 * Math.PI * order * k) / orders;
        sum += (fid.real[k] * Math.cos(angle) - fid.imag[k] * Math.sin(angle)) / orders;
      }
      return sum;
    };
    expected.orders_minus8_to_8.forEach((share, k) => {
      expect(Math.abs(intensity(k - 8) - share)).toBeLessThan(tolerance.abs);
    });
    const moment = (power: number) =>
      Array.from(
        { length: orders - 1 },
        (_, k) => (k + 1 - orders / 2) ** power * intensity(k + 1 - orders / 2),
      ).reduce((sum, value) => sum + value, 0);
    expect(Math.abs(moment(0) - 1)).toBeLessThan(1e-8);
    expect(Math.abs(moment(1))).toBeLessThan(1e-7);
    expect(Math.abs(moment(2) - expected.sum_N2_I)).toBeLessThan(tolerance.abs);
    expect(Math.abs(moment(3) - expected.sum_N3_I)).toBeLessThan(2 * tolerance.abs);
  });
});

/** An isotope of the spin given, for the cases that name none. */
const ISOTOPE_OF_SPIN: Record<string, string> = { '1.5': '23Na', '2.5': '27Al' };

function quadrupolarNucleus(I: number, cq: number, eta: number): SpinSystemInput['nuclei'][number] {
  return { id: 'Q', isotope: ISOTOPE_OF_SPIN[String(I)], shift: 0, quadrupole: { cq, eta } };
}

describe('E08 first-order satellites of a crystal', () => {
  type Inputs = { I: number; CQ_Hz: number; eta: number; theta_deg: number; phi_deg: number };
  type Expected = { offsets_Hz: number[]; intensity_fraction: number[] };
  it.each(referenceCases<Inputs, Expected>('E08'))('$id', ({ inputs, expected }) => {
    const { I, CQ_Hz, eta, theta_deg, phi_deg } = inputs;
    const system = systemOf({ nuclei: [quadrupolarNucleus(I, CQ_Hz, eta)] });
    const acquisition = { centre: 0, width: 4e6, points: 64 };
    const { fid } = solveOriented(
      system,
      experimentOf({
        observe: system.nuclei[0].isotope,
        // The field's polar angles in the molecule are (b, 180 - g). The catalogue's phi counts from the axis of -(1 - eta)/2.
        sample: { kind: 'crystal', euler: [10, theta_deg, 180 - phi_deg] },
        quadrupoleOrder: 1,
        lineWidth: 0,
        acquisition,
      }),
      SILENT,
    );
    for (let k = 0; k < acquisition.points; k++) {
      const turns = expected.offsets_Hz.map((hz) => (2 * Math.PI * hz * k) / acquisition.width);
      const sum = (f: (angle: number) => number) =>
        turns.reduce((total, angle, line) => total + expected.intensity_fraction[line] * f(angle), 0);
      // The catalogue gives ten digits: 1e-4 Hz at 4 MHz over 64 points is 1e-8.
      expect(Math.abs(fid.real[k] - sum(Math.cos))).toBeLessThan(1e-7);
      expect(Math.abs(fid.imag[k] - sum(Math.sin))).toBeLessThan(1e-7);
    }
  });
});

describe('E09 second-order central transition', () => {
  type Inputs = { I: number; CQ_Hz: number; eta: number; nu0_Hz: number };
  type Name =
    | 'isotropic_shift_Hz'
    | 'shift_Hz_at_theta40_phi20'
    | 'MAS_shift_Hz_at_beta35_alpha15'
    | `${'static' | 'MAS'}_${'min' | 'max'}_Hz`;
  const cases = referenceCases<Inputs, Record<Name, number>>('E09');

  const centralTransition = ({ I, CQ_Hz, eta, nu0_Hz }: Inputs): Surface => {
    const nucleus = quadrupolarNucleus(I, CQ_Hz, eta);
    const protonMHz = nu0_Hz / 1e6 / larmorMHz(nucleus.isotope, 1);
    const acquisition = { centre: 0, width: 1e5, points: 2 };
    const experiment = experimentOf({ protonMHz, observe: nucleus.isotope, acquisition });
    const [cluster] = observedClusters(systemOf({ nuclei: [nucleus] }), experiment, []);
    // The satellites carry the anisotropy of first order, far larger.
    const surfaces = surfacesOf(cluster, nucleus.isotope);
    return surfaces.reduce((best, surface) => (surface.intensity > best.intensity ? surface : best));
  };
  const staticShift = (surface: Surface, theta: number, phi: number) =>
    surfaceFrequency(surface, ...unitVector(theta, phi));
  const spinningShift = (surface: Surface, beta: number, alpha: number) => {
    const cone = rotorCone(MAGIC_ANGLE);
    cone.setAxis(Float64Array.from(unitVector(beta, alpha)));
    const series = new SidebandSeries(1e5, 4);
    series.evaluate(surface, cone);
    return series.mean;
  };
  /** Least and greatest value over the octant, in steps of half a degree. */
  const extremes = (value: (theta: number, phi: number) => number) => {
    let [low, high] = [Infinity, -Infinity];
    for (let theta = 0; theta <= 90; theta += 0.5) {
      for (let phi = 0; phi <= 90; phi += 0.5) {
        low = Math.min(low, value(theta, phi));
        high = Math.max(high, value(theta, phi));
      }
    }
    return { low, high };
  };

  it.each(cases)('$id shifts of single orientations', ({ inputs, expected, tolerance }) => {
    const surface = centralTransition(inputs);
    const at = staticShift(surface, 40, 20);
    expect(relative(at, expected.shift_Hz_at_theta40_phi20)).toBeLessThan(tolerance.rel);
    const spinning = spinningShift(surface, 35, 15);
    expect(relative(spinning, expected.MAS_shift_Hz_at_beta35_alpha15)).toBeLessThan(tolerance.rel);
  });

  it.each(cases)('$id isotropic shift', ({ inputs, expected, tolerance }) => {
    const surface = centralTransition(inputs);
    const { directions, weights } = gaussProduct(100, 'octant');
    const mean = weights.reduce(
      (sum, weight, k) =>
        sum + weight * surfaceFrequency(surface, directions[3 * k], directions[3 * k + 1], directions[3 * k + 2]),
      0,
    );
    expect(relative(mean, expected.isotropic_shift_Hz)).toBeLessThan(tolerance.rel);
  });

  it.each(cases)('$id edges, static and spinning', ({ inputs, expected }) => {
    const surface = centralTransition(inputs);
    const still = extremes((theta, phi) => staticShift(surface, theta, phi));
    const spun = extremes((theta, phi) => spinningShift(surface, theta, phi));
    // Extremes between the steps of half a degree are missed by up to (0.25 degrees)^2 of the range, 2e-5.
    expect(relative(still.low, expected.static_min_Hz)).toBeLessThan(1e-4);
    expect(relative(still.high, expected.static_max_Hz)).toBeLessThan(1e-4);
    expect(relative(spun.low, expected.MAS_min_Hz)).toBeLessThan(1e-4);
    expect(relative(spun.high, expected.MAS_max_Hz)).toBeLessThan(2e-3);
  });
});

describe('E10 magic angles', () => {
  type Angles = { P2_zero_deg: number; P4_at_magic: number };
  type Residual = { P2: number; scaled_anisotropy_Hz: number };
  const P2 = (degrees: number) => 1.5 * Math.cos((degrees * Math.PI) / 180) ** 2 - 0.5;

  it('E10-1', () => {
    const [{ expected, tolerance }] = referenceCases<object, Angles>('E10-1');
    expect(Math.abs(MAGIC_ANGLE - expected.P2_zero_deg)).toBeLessThan(tolerance.abs);
  });

  it('E10-2: fast spinning off the magic angle scales the pattern by P2', () => {
    const [{ inputs, expected, tolerance }] = referenceCases<
      { spinning_angle_deg: number; static_anisotropy_Hz: number },
      Residual
    >('E10-2');
    const { spinning_angle_deg: angle, static_anisotropy_Hz: anisotropy } = inputs;
    expect(Math.abs(P2(angle) - expected.P2)).toBeLessThan(tolerance.abs);
    const values = [(2 / 3) * anisotropy, -anisotropy / 3, -anisotropy / 3];
    const sample = { kind: 'spinning', rateHz: 5e6, orientations: 2000, angle } as const;
    const scaled = values.map((value) => (value / anisotropy) * expected.scaled_anisotropy_Hz);
    const spun = solveOriented(carbon(values), carbonExperiment(sample, 8000, 256), SILENT).fid;
    const still = solveOriented(
      carbon(scaled),
      carbonExperiment({ kind: 'powder', orientations: 2000 }, 8000, 256),
      SILENT,
    ).fid;
    spun.real.forEach((value, k) => expect(Math.abs(value - still.real[k])).toBeLessThan(1e-3));
  });
});

describe('E11 the average of a dephasing curve over the sphere', () => {
  it.each(referenceCases<{ lambda: number }, { S_over_S0: number }>('E11'))(
    '$id',
    ({ inputs, expected, tolerance }) => {
      const { directions, weights } = gaussProduct(900, 'hemisphere');
      const mean = weights.reduce((sum, weight, k) => {
        // sin(beta) cos(beta) sin(alpha)
        const angular = directions[3 * k + 1] * directions[3 * k + 2];
        return sum + weight * Math.cos(4 * Math.SQRT2 * inputs.lambda * angular);
      }, 0);
      expect(Math.abs(mean - expected.S_over_S0)).toBeLessThan(tolerance.abs);
    },
  );
});
