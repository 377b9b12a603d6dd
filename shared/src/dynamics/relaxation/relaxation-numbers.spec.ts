import { describe, expect, it } from 'vitest';
import { systemOf } from '../../../test/documents.js';
import { signedLarmorHz } from '../../interactions/carriers.js';
import { dipolarConstantHz } from '../../interactions/tensors.js';
import { nuclide } from '../../nuclides/nuclides.js';
import { relaxationNumbers, relaxationTable } from './relaxation-numbers.js';
import { scalarRelaxation } from './scalar-relaxation.js';

const frame = { protonMHz: 400, observe: '1H', acquisition: { centre: 0, width: 1000, points: 16 } };
const density = (tauC: number) => (w: number) => tauC / (1 + (w * tauC) ** 2);
const omega = (isotope: string, protonMHz = 400) => 2 * Math.PI * signedLarmorHz(isotope, { ...frame, protonMHz });

const expectRatio = (actual: number | null, expected: number, digits = 10) =>
  expect(actual! / expected).toBeCloseTo(1, digits);

describe('relaxationNumbers', () => {
  const bonded = (isotope: string, distance: number, tauC: number) =>
    systemOf({
      nuclei: [
        { id: 'X', isotope, shift: 0, position: [0, 0, 0] },
        { id: 'H', isotope: '1H', shift: 0, position: [0, 0, distance] },
      ],
      couplings: [{ between: ['X', 'H'], dipolar: 'positions' }],
      tumbling: { tauC },
    });

  it('gives T1, T2 and NOE of a nucleus bonded to H: K. F. Kuhlmann, D. M. Grant, R. K. Harris, J. Chem. Phys. 52 (1970) 3439', () => {
    for (const tauC of [2e-11, 3e-9, 4e-8]) {
      const [x] = relaxationNumbers(bonded('13C', 1.09, tauC), frame);
      const b2 = (2 * Math.PI * dipolarConstantHz('13C', '1H', 1.09)) ** 2;
      const [j, wX, wH] = [density(tauC), omega('13C'), omega('1H')];
      const total = j(wH - wX) + 3 * j(wX) + 6 * j(wH + wX);
      expectRatio(x.t1, 10 / (b2 * total));
      expectRatio(x.t1Selective, 10 / (b2 * total));
      const r2 = (b2 / 20) * (4 * tauC + total + 6 * j(wH));
      expectRatio(x.t2, 1 / r2);
      expectRatio(x.lineWidth, r2 / Math.PI);
      const enhancement = ((nuclide('1H').gamma / nuclide('13C').gamma) * (6 * j(wH + wX) - j(wH - wX))) / total;
      expectRatio(x.noe.H, enhancement, 8);
      expectRatio(x.noeByIsotope['1H'], enhancement, 8);
      expect(x.noe.X).toBe(-1);
    }
  });

  it('reaches the NOE limits of extreme narrowing, gamma_H/(2 gamma_X)', () => {
    // 1.988 for 13C, -4.931 for 15N (D. Doddrell, V. Glushko, A. Allerhand, J. Chem. Phys. 56 (1972) 3683).
    expect(relaxationNumbers(bonded('13C', 1.09, 1e-14), frame)[0].noe.H).toBeCloseTo(1.988, 3);
    expect(relaxationNumbers(bonded('15N', 1.02, 1e-14), frame)[0].noe.H).toBeCloseTo(-4.931, 3);
  });

  it('gives the homonuclear NOE: +1/2, zero at w tauC = sqrt 5/2, -1 (J. H. Noggle and R. E. Schirmer 1971)', () => {
    const noe = (tauC: number) => relaxationNumbers(bonded('1H', 2.5, tauC), frame)[0].noe.H;
    expect(noe(1e-14)).toBeCloseTo(0.5, 6);
    expect(noe(Math.sqrt(5) / 2 / omega('1H'))).toBeCloseTo(0, 10);
    expect(noe(1e-5)).toBeCloseTo(-1, 6);
  });

  it('tells recovery after inverting all like nuclei from recovery of one', () => {
    // Bloembergen, Purcell and Pound, Phys. Rev. 73 (1948) 679, against W0 + 2 W1 + W2 of Solomon.
    const tauC = 2e-10;
    const [a] = relaxationNumbers(bonded('1H', 1.78, tauC), frame);
    const b2 = (2 * Math.PI * dipolarConstantHz('1H', '1H', 1.78)) ** 2;
    const [j, w] = [density(tauC), omega('1H')];
    expectRatio(a.t1, 10 / (3 * b2 * (j(w) + 4 * j(2 * w))));
    expectRatio(a.t1Selective, 10 / (b2 * (tauC + 3 * j(w) + 6 * j(2 * w))));
  });

  it('adds shift anisotropy and gives the width difference of a doublet: M. Goldman, J. Magn. Reson. 60 (1984) 437', () => {
    const system = systemOf({
      nuclei: [
        { id: 'N', isotope: '15N', shift: 0, position: [0, 0, 0], csa: { span: 172, skew: 1, euler: [0, 17, 0] } },
        { id: 'H', isotope: '1H', shift: 0, position: [0, 0, 1.02] },
      ],
      couplings: [{ between: ['N', 'H'], dipolar: 'positions' }],
      tumbling: { tauC: 1e-8 },
    });
    const at600 = { ...frame, protonMHz: 600 };
    const [n, h] = relaxationNumbers(system, at600);
    const b = 2 * Math.PI * dipolarConstantHz('15N', '1H', 1.02);
    const [j, wN, wH] = [density(1e-8), omega('15N', 600), omega('1H', 600)];
    const c = (wN * 172e-6) / Math.sqrt(3);
    const r1 = (b ** 2 / 10) * (j(wH - wN) + 3 * j(wN) + 6 * j(wH + wN)) + (2 / 5) * c ** 2 * j(wN);
    expectRatio(n.t1, 1 / r1);
    const legendre = (3 * Math.cos((17 * Math.PI) / 180) ** 2 - 1) / 2;
    const eta = (1 / 15) * Math.abs(b * wN * 172e-6 * legendre) * (4e-8 + 3 * j(wN));
    expectRatio(n.widthDifference.H, (2 * eta) / Math.PI);
    expect(h.widthDifference).toEqual({});
  });

  it('says null for a nucleus that nothing relaxes, and leaves its polarisation alone', () => {
    const pair = bonded('13C', 1.09, 1e-10);
    const [methyl] = relaxationNumbers(
      systemOf({ ...pair, nuclei: [{ id: 'M', isotope: '1H', shift: 1, count: 3 }, ...pair.nuclei] }),
      frame,
    );
    expect(methyl).toMatchObject({ t1: null, t1Selective: null, t2: null, lineWidth: null });
    expect(methyl.noe.X).toBe(0);
  });

  it('takes many nuclei: rates add up over the pairs', () => {
    const nuclei = Array.from({ length: 12 }, (_, k) => ({
      id: `H${k}`,
      isotope: '1H',
      shift: k,
      position: [1.5 * k, (k % 3) * 1.7, 0] as [number, number, number],
    }));
    const couplings = nuclei.flatMap(({ id }, k) =>
      nuclei
        .slice(0, k)
        .map((other) => ({ between: [other.id, id] as [string, string], dipolar: 'positions' as const })),
    );
    const numbers = relaxationNumbers(systemOf({ nuclei, couplings, tumbling: { tauC: 1e-10 } }), frame);
    const [j, w] = [density(1e-10), omega('1H')];
    const sum = nuclei.slice(1).reduce((total, { position }) => {
      const distance = Math.hypot(...position.map((x, axis) => x - nuclei[0].position[axis]));
      return (
        total + ((2 * Math.PI * dipolarConstantHz('1H', '1H', distance)) ** 2 / 10) * (1e-10 + 3 * j(w) + 6 * j(2 * w))
      );
    }, 0);
    expectRatio(numbers[0].t1Selective, 1 / sum);
  });
});

describe('scalar relaxation of the second kind', () => {
  it('has the value of the formula where the flip term counts, and only the T1 term far from resonance', () => {
    // A. Abragam, Principles of Nuclear Magnetism, 1961, ch. VIII, evaluated by hand for J = 100 Hz, S = 3/2, T1 = T2 = 2 us:
    // 4 pi^2 J^2 S(S+1)/3 = 493480.22; w T2 = 2 pi 1e5 2e-6 = 1.256637, 2e-6/(1 + w^2 T2^2) = 7.754526e-7.
    const { r1, r2 } = scalarRelaxation({ spin: 1.5, j: 100, t1: 2e-6, t2: 2e-6, frequencyDifference: 1e5 });
    expect(r1).toBeCloseTo(0.765342, 5);
    expect(r2).toBeCloseTo(1.369631, 5);
  });

  it('broadens a proton on 14N by (8 pi/3) J^2 T1', () => {
    const system = systemOf({
      nuclei: [
        { id: 'N', isotope: '14N', shift: 0, quadrupole: { cq: 3e6 } },
        { id: 'H', isotope: '1H', shift: 7 },
      ],
      couplings: [{ between: ['N', 'H'], j: 52 }],
      tumbling: { tauC: 1e-11 },
    });
    const [n, h] = relaxationNumbers(system, frame);
    expectRatio(h.scalarWidth.N, ((8 * Math.PI) / 3) * 52 ** 2 * n.t1!, 4);
    // The proton itself is not relaxed by tumbling: it does not broaden nitrogen.
    expect(n.scalarWidth).toEqual({});
    expect(h.lineWidth).toBeNull();
  });
});

describe('relaxationTable', () => {
  it('has the T1 minimum of a like pair at w tauC = 0.6158 (Bloembergen, Purcell and Pound 1948)', () => {
    const pair = systemOf({
      nuclei: [
        { id: 'A', isotope: '1H', shift: 0 },
        { id: 'B', isotope: '1H', shift: 1 },
      ],
      couplings: [{ between: ['A', 'B'], dipolar: { constant: -20e3 } }],
      tumbling: { tauC: 1 },
    });
    const tauCs = [0.6, 0.61, 0.6158, 0.62, 0.63].map((x) => x / omega('1H', 500));
    const table = relaxationTable(pair, frame, tauCs, [500]);
    expect(table.map(({ protonMHz }) => protonMHz)).toEqual([500, 500, 500, 500, 500]);
    const times = table.map(({ nuclei }) => nuclei[0].t1!);
    expect(times.indexOf(Math.min(...times))).toBe(2);
  });
});
