/* eslint-disable @typescript-eslint/no-unnecessary-type-assertion -- mathjs types what it returns as unions of all its kinds */
import { all, create, type Complex, type Matrix } from 'mathjs';
import { describe, expect, it } from 'vitest';
import type { SpinSystemInput } from '../src/documents/system.schema.js';
import { offsetsOf } from '../src/interactions/carriers.js';
import { couplingsOf } from '../src/interactions/scalar.js';
import { nuclide } from '../src/nuclides/nuclides.js';
import { simulate } from '../src/simulate/simulate.js';
import { experimentOf, systemOf } from './documents.js';

const math = create(all);

/**
 * The FID of one perfect pulse by whole matrices and mathjs' exponential: s_k = 3/(dim I(I+1)) Tr(I+ U^k Fx (U^k)+) with
 * U = exp(-2 pi i H/width). Nothing of the engine's blocks, sticks or grids is used.
 */
function slowFid(nuclei: SpinSystemInput['nuclei'], couplings: SpinSystemInput['couplings'], observe: string) {
  const system = systemOf({ nuclei, couplings });
  const experiment = experimentOf({
    observe,
    lineWidth: 0,
    acquisition: { centre: nuclei.find(({ isotope }) => isotope === observe)!.shift + 0.4, width: 900, points: 12 },
  });
  const spins = system.nuclei.map(({ isotope }) => nuclide(isotope).spin);
  const embed = (row: number, one: Matrix): Matrix =>
    spins.reduce<Matrix>(
      (product, spin, p) => math.kron(product, p === row ? one : (math.identity(2 * spin + 1) as Matrix)),
      math.matrix([[1]]),
    );
  const z = spins.map((spin, row) => embed(row, math.matrix(square(spin, (i, k, m) => (i === k ? m : 0)))));
  const plus = spins.map((spin, row) =>
    embed(row, math.matrix(square(spin, (i, k, m) => (k === i + 1 ? Math.sqrt(spin * (spin + 1) - m * (m - 1)) : 0)))),
  );
  const minus = plus.map((matrix) => math.transpose(matrix));
  const offsets = offsetsOf(system, experiment);
  let h = math.multiply(z[0], 0) as Matrix;
  z.forEach((iz, row) => (h = math.add(h, math.multiply(iz, offsets[row])) as Matrix));
  for (const { a, b, j, like } of couplingsOf(system, [])) {
    h = math.add(h, math.multiply(math.multiply(z[a], z[b]), j)) as Matrix;
    if (like) {
      const flips = math.add(math.multiply(plus[a], minus[b]), math.multiply(minus[a], plus[b]));
      h = math.add(h, math.multiply(flips, j / 2)) as Matrix;
    }
  }
  const rows = system.nuclei.flatMap(({ isotope }, row) => (isotope === observe ? [row] : []));
  const detect = rows.map((row) => plus[row]).reduce((sum, one) => math.add(sum, one) as Matrix);
  let rho = rows
    .map((row) => math.divide(math.add(plus[row], minus[row]), 2) as Matrix)
    .reduce((sum, one) => math.add(sum, one) as Matrix);
  const u = math.expm(math.multiply(h, math.complex(0, (-2 * Math.PI) / 900)) as Matrix);
  const back = math.ctranspose(u);
  const { spin } = nuclide(observe);
  const scale = 3 / (h.size()[0] * spin * (spin + 1));
  const samples = Array.from({ length: 12 }, () => {
    const signal = math.multiply(math.trace(math.multiply(detect, rho)) as unknown as Complex, scale) as unknown as
      Complex | number;
    rho = math.multiply(math.multiply(u, rho), back) as Matrix;
    return typeof signal === 'number' ? math.complex(signal, 0) : signal;
  });
  return { samples, fid: simulate(system, experiment).fid };
}

/** Entries of a one-spin matrix, rows from m = spin down. */
function square(spin: number, entry: (i: number, k: number, m: number) => number): number[][] {
  const n = 2 * spin + 1;
  return Array.from({ length: n }, (_, i) => Array.from({ length: n }, (_, k) => entry(i, k, spin - i)));
}

describe('simulate agrees with whole matrices', () => {
  const coupling = (a: string, b: string, j: number) => ({ between: [a, b] as [string, string], j });
  it.each([
    ['three strongly coupled protons', '1H', ['1H', '1H', '1H'], [5, 5.05, 5.2], 9],
    ['protons beside 15N, whose ratio is negative', '1H', ['1H', '1H', '15N'], [5, 5.03, 120], -90],
    ['15N beside two strongly coupled protons', '15N', ['15N', '1H', '1H'], [120, 5, 5.03], -90],
    ['29Si beside 1H and 31P', '29Si', ['29Si', '1H', '31P'], [-20, 4, 11], 14],
    ['a proton and 2H', '1H', ['1H', '2H', '1H'], [5, 2, 5.1], 2.2],
    ['11B with a strongly coupled partner of its kind', '11B', ['11B', '11B'], [1.4, 1.6], 25],
  ])('for %s', (_name, observe, isotopes, shifts, j) => {
    const nuclei = isotopes.map((isotope, i) => ({ id: `N${i}`, isotope, shift: shifts[i] }));
    const couplings = [
      coupling('N0', 'N1', j),
      ...(nuclei.length > 2 ? [coupling('N1', 'N2', 7.3), coupling('N0', 'N2', -3.1)] : []),
    ];
    const { samples, fid } = slowFid(nuclei, couplings, observe);
    samples.forEach(({ re, im }, k) => {
      expect(fid.real[k]).toBeCloseTo(re, 9);
      expect(fid.imag[k]).toBeCloseTo(im, 9);
    });
  });
});
