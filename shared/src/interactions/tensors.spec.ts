import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { innerProduct3, type Matrix3 } from '../algebra/rotation.js';
import { parseSystem } from '../documents/parse.js';
import {
  dipolarConstantHz,
  dipolarCouplingsOf,
  quadrupolarTensorHz,
  shiftTensorHz,
  shiftTensorPpm,
} from './tensors.js';

const frame = { protonMHz: 400, observe: '1H', acquisition: { centre: 0, width: 1000, points: 16 } };
const angle = fc.double({ min: -180, max: 180, noNaN: true });
const euler = fc.tuple(angle, angle, angle);

const expectDiagonal = (tensor: Matrix3 | null, [x, y, z]: number[], digits = 9) =>
  [x, 0, 0, 0, y, 0, 0, 0, z].forEach((value, p) => expect(tensor![p]).toBeCloseTo(value, digits));

function expectSymmetricTraceless(tensor: Matrix3, scale: number): void {
  expect(Math.abs(tensor[0] + tensor[4] + tensor[8])).toBeLessThan(1e-12 * scale);
  for (const [p, q] of [
    [1, 3],
    [2, 6],
    [5, 7],
  ])
    expect(Math.abs(tensor[p] - tensor[q])).toBeLessThan(1e-12 * scale);
}

describe('shift tensor', () => {
  it('has Haeberlen axes: z is the value farthest from the mean', () => {
    expectDiagonal(shiftTensorPpm({ csa: { span: 120, skew: 0.5, euler: [0, 0, 0] } }), [50, 20, -70]);
    expectDiagonal(shiftTensorPpm({ csa: { span: 120, skew: 0, euler: [0, 0, 0] } }), [-60, 0, 60]);
    expectDiagonal(shiftTensorPpm({ csa: { span: 120, skew: 0.5, euler: [0, 90, 0] } }), [-70, 20, 50]);
  });

  it('scales with the Larmor frequency and its sense', () => {
    const csa = { span: 100, skew: -1, euler: [0, 0, 0] as [number, number, number] };
    // 15N: Xi = 10.136767 % (IUPAC 2001), magnetogyric ratio opposite to that of 1H.
    const hz = -40.547068 * (200 / 3);
    expectDiagonal(shiftTensorHz({ isotope: '15N', csa }, frame), [-hz / 2, -hz / 2, hz], 6);
    expect(shiftTensorHz({ isotope: '15N', csa }, { ...frame, observe: '15N' })![8]).toBeCloseTo(-hz, 6);
  });

  it('is null without a csa', () => {
    expect(shiftTensorPpm({})).toBeNull();
    expect(shiftTensorHz({ isotope: '1H' }, frame)).toBeNull();
  });
});

describe('quadrupolar tensor', () => {
  it('gives 3 CQ/(4I(2I-1)) splitting terms along its axis', () => {
    // H_Q = CQ/(4I(2I-1)) [3 Iz^2 - I^2 + eta (Ix^2 - Iy^2)]; as I.Q.I: Qzz - (Qxx + Qyy)/2 = 3 CQ/(4I(2I-1)), Qxx - Qyy = 2 eta CQ/(4I(2I-1)).
    for (const [isotope, spin] of [
      ['2H', 1],
      ['23Na', 1.5],
      ['27Al', 2.5],
      ['45Sc', 3.5],
      ['93Nb', 4.5],
    ] as const) {
      const [cq, eta] = [-2.5e6, 0.3];
      const q = quadrupolarTensorHz({ isotope, quadrupole: { cq, eta, euler: [0, 0, 0] } })!;
      const unit = cq / (4 * spin * (2 * spin - 1));
      expect(q[8] - (q[0] + q[4]) / 2).toBeCloseTo(3 * unit, 6);
      expect(q[0] - q[4]).toBeCloseTo(2 * eta * unit, 6);
    }
    expect(quadrupolarTensorHz({ isotope: '2H' })).toBeNull();
  });

  it('is symmetric, traceless and of one size in every orientation', () => {
    fc.assert(
      fc.property(euler, fc.double({ min: 0, max: 1, noNaN: true }), (angles, eta) => {
        const tensor = quadrupolarTensorHz({ isotope: '2H', quadrupole: { cq: 2e5, eta, euler: angles } })!;
        expectSymmetricTraceless(tensor, 2e5);
        // Sum of the squared principal values CQ/2 (1, -(1-eta)/2, -(1+eta)/2).
        expect(innerProduct3(tensor, tensor) / (1e10 * 1.5 * (1 + eta ** 2 / 3))).toBeCloseTo(1, 12);
      }),
    );
  });
});

describe('dipolar tensor', () => {
  const pair = (dipolar: unknown, position: number[] = [0, 0, 2]) =>
    parseSystem({
      format: 'heddle.spin-system/1',
      name: 'pair',
      nuclei: [
        { id: 'A', isotope: '1H', shift: 0, position: [0, 0, 0] },
        { id: 'B', isotope: '1H', shift: 0, position },
      ],
      couplings: [{ between: ['B', 'A'], dipolar }],
    });

  it('has the constant of two protons at 2 angstrom and of H-N at 1.02 angstrom', () => {
    // (mu0/4pi) gamma^2 hbar/2pi = 120.12 kHz angstrom^3 for two protons (K. Schmidt-Rohr and H. W. Spiess 1994, from memory).
    expect(dipolarConstantHz('1H', '1H', 2) / -15015).toBeCloseTo(1, 4);
    expect(dipolarConstantHz('1H', '15N', 1.02)).toBeGreaterThan(0);
    expect(dipolarConstantHz('1H', '1H', 1) / dipolarConstantHz('1H', '1H', 3)).toBeCloseTo(27, 10);
  });

  it('is d (3 e e - 1), twice the constant along the bond', () => {
    const d = dipolarConstantHz('1H', '1H', 2);
    const [coupling] = dipolarCouplingsOf(pair('positions'));
    expect([coupling.a, coupling.b, coupling.like]).toEqual([0, 1, true]);
    expectDiagonal(coupling.tensor, [-d, -d, 2 * d]);
    expectDiagonal(dipolarCouplingsOf(pair({ constant: -900, polar: [90, 90] }))[0].tensor, [900, -1800, 900]);
  });

  it('is symmetric and traceless, and the same from positions and from constant and polar angles', () => {
    fc.assert(
      fc.property(fc.double({ min: 0, max: 180, noNaN: true }), angle, (theta, phi) => {
        const [t, p] = [(theta * Math.PI) / 180, (phi * Math.PI) / 180];
        const position = [3 * Math.sin(t) * Math.cos(p), 3 * Math.sin(t) * Math.sin(p), 3 * Math.cos(t)];
        const [{ tensor }] = dipolarCouplingsOf(pair('positions', position));
        const [given] = dipolarCouplingsOf(pair({ constant: dipolarConstantHz('1H', '1H', 3), polar: [theta, phi] }));
        expectSymmetricTraceless(tensor, 1e4);
        tensor.forEach((value, q) => expect(value).toBeCloseTo(given.tensor[q], 7));
      }),
    );
  });

  it('is absent where no dipolar coupling is given', () => {
    expect(dipolarCouplingsOf(pair(undefined))).toEqual([]);
  });
});
