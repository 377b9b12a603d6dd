import { describe, expect, it } from 'vitest';
import { eigenSymmetric } from '../src/algebra/eigen/symmetric.js';
import type { SpinSystemInput } from '../src/documents/system.schema.js';
import { blockHamiltonian } from '../src/dynamics/blocks/block-hamiltonian.js';
import { buildSector } from '../src/dynamics/blocks/sector.js';
import { larmorMHz } from '../src/nuclides/nuclides.js';
import { simulate } from '../src/simulate/simulate.js';
import { experimentOf, systemOf } from './documents.js';
import { referenceCases } from './reference/catalogue.js';

type Sticks = [hz: number, intensity: number][];
type Nuclei = SpinSystemInput['nuclei'];
type Couplings = [a: string, b: string, j: number][];

/** 1H frequency of all cases, MHz: one at which the carriers of all isotopes are far apart and the numbers handy. */
const MHZ = 100;

/** Lines of `observe` in Hz; the shifts of `nuclei` are Hz from delta = 0 of their own isotope, as the catalogue gives them. */
function linesOf(observe: string, nuclei: Nuclei, couplings: Couplings): Sticks {
  const system = systemOf({
    nuclei: nuclei.map((nucleus) => ({ ...nucleus, shift: nucleus.shift / larmorMHz(nucleus.isotope, MHZ) })),
    couplings: couplings.map(([a, b, j]) => ({ between: [a, b], j })),
  });
  const experiment = experimentOf({ protonMHz: MHZ, observe, acquisition: { centre: 0, width: 20000, points: 64 } });
  const { lines } = simulate(system, experiment);
  return lines!.map(({ hz, intensity }): [number, number] => [hz, intensity]).sort((a, b) => a[0] - b[0]);
}

const proton = (id: string, shift: number, count = 1) => ({ id, isotope: '1H', shift, count });

/** Lines that coincide within 1e-6 Hz are one in the catalogue; so are they here, within the engine's 1e-4 Hz. */
function expectSticks(found: Sticks, expected: Sticks, tolerance: Record<string, number>, least = 0): void {
  const seen = found.filter(([, intensity]) => intensity > least);
  expect(seen.map(([hz]) => hz)).toHaveLength(expected.length);
  expected.forEach(([hz, intensity], i) => {
    // The catalogue prints nine digits.
    expect(Math.abs(seen[i][0] - hz)).toBeLessThanOrEqual(tolerance.freq_abs_Hz + 5e-9 * Math.abs(hz));
    expect(Math.abs(seen[i][1] - intensity)).toBeLessThanOrEqual(tolerance.intensity_abs + 5e-9);
  });
}

/** The density of Lorentzian lines of `width` Hz at `hz`, in nuclei per Hz. */
function density(sticks: Sticks, width: number, hz: number): number {
  return sticks.reduce(
    (sum, [at, intensity]) => sum + (intensity * width) / (2 * Math.PI) / ((hz - at) ** 2 + width ** 2 / 4),
    0,
  );
}

const total = (sticks: Sticks) => sticks.reduce((sum, [, intensity]) => sum + intensity, 0);
const moment = (sticks: Sticks, power: number) =>
  sticks.reduce((sum, [hz, intensity]) => sum + intensity * hz ** power, 0) / total(sticks);

interface Pair {
  nuA_Hz: number;
  nuB_Hz: number;
  J_Hz: number;
}

describe.each(['A01', 'A02'])('%s, two coupled protons', (topic) => {
  it.each(referenceCases<Pair, { lines_Hz_intensity: Sticks }>(topic))(
    '$id $title',
    ({ inputs, expected, tolerance }) => {
      const found = linesOf('1H', [proton('A', inputs.nuA_Hz), proton('B', inputs.nuB_Hz)], [['A', 'B', inputs.J_Hz]]);
      expectSticks(found, expected.lines_Hz_intensity, tolerance);
    },
  );
});

interface Equivalent {
  nu_Hz?: number[];
  J_AA_Hz?: number;
  J12?: number;
  J13?: number;
  J23?: number;
  group?: string;
  nuA_Hz: number;
  nuX_Hz: number;
  J_AX_Hz: number;
}

it.each(referenceCases<Equivalent, { lines_Hz_intensity: Sticks }>('A03'))(
  '$id couplings inside an equivalent group are invisible',
  ({ inputs, expected, tolerance }) => {
    if (inputs.group === 'A3X') {
      // Three protons written out, their coupling included, and a fluorine; each isotope is observed by itself.
      const nuclei = [1, 2, 3].map((i) => proton(`A${i}`, inputs.nuA_Hz));
      const inside: Couplings = [
        ['A1', 'A2', inputs.J_AA_Hz!],
        ['A1', 'A3', inputs.J_AA_Hz!],
        ['A2', 'A3', inputs.J_AA_Hz!],
      ];
      const outside: Couplings = nuclei.map(({ id }) => [id, 'X', inputs.J_AX_Hz]);
      const all = [...nuclei, { id: 'X', isotope: '19F', shift: inputs.nuX_Hz }];
      const found = [...linesOf('1H', all, [...inside, ...outside]), ...linesOf('19F', all, [...inside, ...outside])];
      expectSticks(found, expected.lines_Hz_intensity, tolerance);
      // The same as a group.
      const grouped = [proton('A', inputs.nuA_Hz, 3), all[3]];
      const asGroup: Couplings = [['A', 'X', inputs.J_AX_Hz]];
      expectSticks(
        [...linesOf('1H', grouped, asGroup), ...linesOf('19F', grouped, asGroup)],
        expected.lines_Hz_intensity,
        tolerance,
      );
      return;
    }
    const nuclei = inputs.nu_Hz!.map((shift, i) => proton(`A${i + 1}`, shift));
    const { J12 = inputs.J_AA_Hz!, J13 = 0, J23 = 0 } = inputs;
    const couplings: Couplings = [
      ['A1', 'A2', J12],
      ...(nuclei.length > 2
        ? ([
            ['A1', 'A3', J13],
            ['A2', 'A3', J23],
          ] as Couplings)
        : []),
    ];
    expectSticks(linesOf('1H', nuclei, couplings), expected.lines_Hz_intensity, tolerance);
  },
);

describe('A04, one proton and two equivalent ones', () => {
  type Expected = { lines_Hz_intensity: Sticks; total: number };
  it.each(referenceCases<{ nuA_Hz: number; nuB_Hz: number; J_AB_Hz: number }, Expected>('A04'))(
    '$id',
    ({ inputs, expected, tolerance }) => {
      const found = linesOf(
        '1H',
        [proton('A', inputs.nuA_Hz), proton('B', inputs.nuB_Hz, 2)],
        [['A', 'B', inputs.J_AB_Hz]],
      );
      expectSticks(found, expected.lines_Hz_intensity, tolerance);
      expect(total(found)).toBeCloseTo(expected.total, 9);
    },
  );
});

describe('A05, two protons beside a distant nucleus', () => {
  type Inputs = { nuA_Hz: number; nuB_Hz: number; nuX_Hz: number; J_AB_Hz: number; J_AX_Hz: number; J_BX_Hz: number };
  type Expected = { AB_lines_Hz_intensity: Sticks; X_lines_Hz_intensity: Sticks };
  it.each(referenceCases<Inputs, Expected>('A05'))('$id', ({ inputs, expected, tolerance }) => {
    const nuclei = [
      proton('A', inputs.nuA_Hz),
      proton('B', inputs.nuB_Hz),
      { id: 'X', isotope: '19F', shift: inputs.nuX_Hz },
    ];
    const couplings: Couplings = [
      ['A', 'B', inputs.J_AB_Hz],
      ['A', 'X', inputs.J_AX_Hz],
      ['B', 'X', inputs.J_BX_Hz],
    ];
    expectSticks(linesOf('1H', nuclei, couplings), expected.AB_lines_Hz_intensity, tolerance);
    expectSticks(linesOf('19F', nuclei, couplings), expected.X_lines_Hz_intensity, tolerance);
  });
});

it.each(
  referenceCases<
    { nuA_Hz: number; nuX_Hz: number; J_AAp: number; J_XXp: number; J_AX: number; J_AXp: number },
    { A_half_lines_Hz_intensity: Sticks }
  >('A06'),
)("$id AA'XX'", ({ inputs, expected, tolerance }) => {
  const fluorine = (id: string) => ({ id, isotope: '19F', shift: inputs.nuX_Hz });
  const nuclei = [proton('A', inputs.nuA_Hz), proton('A2', inputs.nuA_Hz), fluorine('X'), fluorine('X2')];
  const couplings: Couplings = [
    ['A', 'A2', inputs.J_AAp],
    ['X', 'X2', inputs.J_XXp],
    ...(
      [
        ['A', 'X'],
        ['A2', 'X2'],
      ] as const
    ).map(([a, x]): [string, string, number] => [a, x, inputs.J_AX]),
    ...(
      [
        ['A', 'X2'],
        ['A2', 'X'],
      ] as const
    ).map(([a, x]): [string, string, number] => [a, x, inputs.J_AXp]),
  ];
  expectSticks(linesOf('1H', nuclei, couplings), expected.A_half_lines_Hz_intensity, tolerance, 1e-9);
});

interface Sampled {
  total: number;
  spectrum_points_Hz: number[];
}

function expectSampled(found: Sticks, expected: Sampled, values: number[], width: number): void {
  expect(total(found)).toBeCloseTo(expected.total, 4);
  expected.spectrum_points_Hz.forEach((hz, i) => expect(density(found, width, hz) / values[i]).toBeCloseTo(1, 6));
}

it.each(
  referenceCases<
    { nuA_Hz: number; nuB_Hz: number; J_AAp: number; J_BBp: number; J_AB: number; J_ABp: number },
    Sampled & { high_frequency_half_lines_over_0p005: Sticks; spectrum_values_fwhm_0p5Hz: number[] }
  >('A07'),
)("$id AA'BB'", ({ inputs, expected, tolerance }) => {
  const nuclei = [
    proton('A', inputs.nuA_Hz),
    proton('A2', inputs.nuA_Hz),
    proton('B', inputs.nuB_Hz),
    proton('B2', inputs.nuB_Hz),
  ];
  const couplings: Couplings = [
    ['A', 'A2', inputs.J_AAp],
    ['B', 'B2', inputs.J_BBp],
    ['A', 'B', inputs.J_AB],
    ['A2', 'B2', inputs.J_AB],
    ['A', 'B2', inputs.J_ABp],
    ['A2', 'B', inputs.J_ABp],
  ];
  const found = linesOf('1H', nuclei, couplings);
  const half = found.filter(([hz]) => hz > (inputs.nuA_Hz + inputs.nuB_Hz) / 2);
  expectSticks(half, expected.high_frequency_half_lines_over_0p005, tolerance, 0.005);
  expectSampled(found, expected, expected.spectrum_values_fwhm_0p5Hz, 0.5);
});

it.each(
  referenceCases<
    { nu_CH3_Hz: number; nu_CH2_Hz: number; J_Hz: number },
    Sampled & { lines_over_0p02: Sticks; first_moment_Hz: number; spectrum_values_fwhm_0p5Hz: number[] }
  >('A08'),
)('$id ethyl group', ({ inputs, expected, tolerance }) => {
  const nuclei = [proton('Me', inputs.nu_CH3_Hz, 3), proton('CH2', inputs.nu_CH2_Hz, 2)];
  const found = linesOf('1H', nuclei, [['Me', 'CH2', inputs.J_Hz]]);
  expectSticks(found, expected.lines_over_0p02, tolerance, 0.02);
  expect(moment(found, 1)).toBeCloseTo(expected.first_moment_Hz, 4);
  expectSampled(found, expected, expected.spectrum_values_fwhm_0p5Hz, 0.5);
});

it.each(
  referenceCases<
    {
      spectrometer_MHz: number;
      ppm_alpha_transpartner_cispartner: number[];
      J_trans: number;
      J_cis: number;
      J_gem: number;
    },
    { nu_Hz: number[]; lines_Hz_intensity: Sticks; first_moment_Hz: number }
  >('A09'),
)('$id vinyl group', ({ inputs, expected, tolerance }) => {
  const [alpha, trans, cis] = expected.nu_Hz;
  const nuclei = [proton('Ha', alpha), proton('Ht', trans), proton('Hc', cis)];
  const found = linesOf('1H', nuclei, [
    ['Ha', 'Ht', inputs.J_trans],
    ['Ha', 'Hc', inputs.J_cis],
    ['Ht', 'Hc', inputs.J_gem],
  ]);
  // The result drops lines under 1e-6 of the strongest (contract); the catalogue keeps them.
  const kept = expected.lines_Hz_intensity.filter(([, intensity]) => intensity > 1e-6);
  expectSticks(found, kept, tolerance, 1e-6);
  expect(moment(found, 1)).toBeCloseTo(expected.first_moment_Hz, 4);
});

it.each(
  referenceCases<
    { nu_CH_Hz: number; nu_CH3_Hz: number; J_Hz: number; coupling: string },
    Sampled & { lines_over_0p01: Sticks; spectrum_values_fwhm_0p4Hz: number[] }
  >('A10'),
)('$id isopropyl group', ({ inputs, expected, tolerance }) => {
  const weak = inputs.coupling === 'weak';
  const methine = { ...proton('CH', inputs.nu_CH_Hz), isotope: weak ? '19F' : '1H' };
  const nuclei = [methine, proton('Me', inputs.nu_CH3_Hz, 6)];
  const couplings: Couplings = [['CH', 'Me', inputs.J_Hz]];
  const found = [...linesOf('1H', nuclei, couplings), ...(weak ? linesOf('19F', nuclei, couplings) : [])];
  expectSticks(found, expected.lines_over_0p01, tolerance, 0.01);
  expectSampled(found, expected, expected.spectrum_values_fwhm_0p4Hz, 0.4);
});

it.each(
  referenceCases<
    { nuA_nuB_nuX_Hz: number[]; J_AB: number; J_AX: number; J_BX: number },
    { X_lines_Hz_intensity: Sticks }
  >('A11'),
)('$id virtual coupling', ({ inputs, expected, tolerance }) => {
  const [a, b, x] = inputs.nuA_nuB_nuX_Hz;
  const nuclei = [proton('A', a), proton('B', b), { id: 'X', isotope: '19F', shift: x }];
  const found = linesOf('19F', nuclei, [
    ['A', 'B', inputs.J_AB],
    ['A', 'X', inputs.J_AX],
    ['B', 'X', inputs.J_BX],
  ]);
  expectSticks(found, expected.X_lines_Hz_intensity, tolerance, 1e-9);
});

/** An isotope of each spin, to split a proton with. */
const PARTNER: Record<string, string> = { 0.5: '19F', 1: '2H', 1.5: '11B', 3: '10B' };

it.each(referenceCases<{ n: number; I: number; J_Hz: number }, { lines_Hz_intensity: Sticks }>('A12'))(
  '$id $inputs.n equivalent spins $inputs.I',
  ({ inputs, expected, tolerance }) => {
    const nuclei = [proton('H', 0), { id: 'X', isotope: PARTNER[inputs.I], shift: 0, count: inputs.n }];
    expectSticks(linesOf('1H', nuclei, [['H', 'X', inputs.J_Hz]]), expected.lines_Hz_intensity, tolerance);
  },
);

it.each(
  referenceCases<
    { nu_Hz: number[]; J_Hz: Record<string, number> },
    Record<'total' | 'mean_Hz' | 'mean_square_Hz2' | 'mean_cube_Hz3', number>
  >('A13'),
)('$id moments', ({ inputs, expected }) => {
  const nuclei = inputs.nu_Hz.map((shift, i) => proton(`H${i + 1}`, shift));
  const couplings = Object.entries(inputs.J_Hz).map(([pair, j]): [string, string, number] => [
    `H${pair[0]}`,
    `H${pair[1]}`,
    j,
  ]);
  const found = linesOf('1H', nuclei, couplings);
  // Lines below 1e-6 of the strongest are dropped, so sums hold to about as much.
  expect(total(found) / expected.total).toBeCloseTo(1, 5);
  expect(moment(found, 1) / expected.mean_Hz).toBeCloseTo(1, 5);
  expect(moment(found, 2) / expected.mean_square_Hz2).toBeCloseTo(1, 4);
  expect(moment(found, 3) / expected.mean_cube_Hz3).toBeCloseTo(1, 4);
});

it.each(referenceCases<Pair, { eigenvalues_Hz: number[] }>('A14'))('$id energy levels', ({ inputs, expected }) => {
  const sector = buildSector([0.5, 0.5], [0, 0]);
  const offsets = Float64Array.of(inputs.nuA_Hz, inputs.nuB_Hz);
  const levels = sector.ladders.flatMap((ladder) =>
    ladder.flatMap((codes) => [
      ...eigenSymmetric(
        blockHamiltonian(sector, codes, offsets, [{ p: 0, q: 1, j: inputs.J_Hz, like: true }]),
        codes.length,
      ).values,
    ]),
  );
  levels.sort((a, b) => a - b).forEach((level, i) => expect(level).toBeCloseTo(expected.eigenvalues_Hz[i], 6));
});
