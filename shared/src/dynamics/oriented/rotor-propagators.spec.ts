import { describe, expect, it } from 'vitest';
import { experimentOf, systemOf } from '../../../test/documents.js';
import { complexIdentity, complexMatrix, multiplyComplex } from '../../algebra/dense.js';
import { expmDense } from '../../algebra/expm-dense.js';
import { rotateTensor, rotationMatrix, multiply3 } from '../../algebra/rotation.js';
import { MAGIC_ANGLE } from '../../documents/experiment.schema.js';
import { CoupledSpins } from './coupled-spins.js';
import { observedClusters } from './oriented-spins.js';
import { rotorCone } from './rotor.js';
import { RotorPropagators } from './rotor-propagators.js';

describe('RotorPropagators', () => {
  const system = systemOf({
    nuclei: [
      { id: 'A', isotope: '1H', shift: 8, csa: { span: 20, skew: 0.3, euler: [10, 40, 70] } },
      { id: 'B', isotope: '1H', shift: 2 },
    ],
    couplings: [{ between: ['A', 'B'], j: 10, dipolar: { constant: -6000, polar: [40, 70] } }],
  });
  const [cluster] = observedClusters(system, experimentOf(), []);
  const [rate, steps] = [5000, 64];

  /** Hz of the block of one spin up at rotor phase theta, from the contract's Ry(angle) Rz(theta) R T R^T ... and its operators. */
  const block = (theta: number) => {
    const lab = multiply3(
      rotationMatrix([0, MAGIC_ANGLE, 0]),
      multiply3(rotationMatrix([(theta * 180) / Math.PI, 0, 0]), rotationMatrix([0, 35, 110])),
    );
    const zz = (tensor: Float64Array) => rotateTensor(lab, tensor)[8];
    const [a, b] = cluster.spins;
    const [pair] = cluster.pairs;
    const [offsetA, offsetB, d] = [a.offset + zz(a.shift!), b.offset, zz(pair.dipolar!)];
    const diagonal = -(pair.j + d) / 4;
    const flip = pair.j / 2 - d / 4;
    // prettier-ignore
    return Float64Array.of(
      (offsetA - offsetB) / 2 + diagonal, flip,
      flip, (offsetB - offsetA) / 2 + diagonal,
    );
  };

  it('has Floquet states whose evolution is that of many short steps', () => {
    const coupled = new CoupledSpins(cluster);
    const index = coupled.blocks.findIndex(({ states }) => states.length === 2);
    const cone = rotorCone(MAGIC_ANGLE);
    // The rotor axis seen from the molecule is the third row of R; where on the cone theta = 0 lies is the cone's choice of e1.
    const axis = rotationMatrix([0, 35, 110]).slice(6);
    cone.setAxis(axis);
    const [states] = new RotorPropagators(coupled, [index], steps, rate).statesAbout(cone);

    const many = 4096;
    // e1 of the cone against the x axis of the rotor frame, R^T x.
    const x = rotationMatrix([0, 35, 110]).slice(0, 3);
    const y = rotationMatrix([0, 35, 110]).slice(3, 6);
    const dot = (u: Float64Array, v: Float64Array) => u[0] * v[0] + u[1] * v[1] + u[2] * v[2];
    // The field is -cos(theta) e1 + sin(theta) e2 across the axis: at theta = 0 along `cosine`, which is -cos(start) x + sin(start) y.
    const start = Math.atan2(dot(cone.cosine, y), -dot(cone.cosine, x));
    let u = complexIdentity(2);
    for (let k = 0; k < many / 2; k++) {
      const h = block(start + (2 * Math.PI * (k + 0.5)) / many);
      const exponent = complexMatrix(
        2,
        2,
        undefined,
        h.map((value) => (-2 * Math.PI * value) / (rate * many)),
      );
      u = multiplyComplex(expmDense(exponent), u);
    }
    const half = steps / 2;
    for (let i = 0; i < 2; i++) {
      for (let j = 0; j < 2; j++) {
        let [re, im] = [0, 0];
        for (let a = 0; a < 2; a++) {
          const angle = (-Math.PI * states.energies[a]) / rate;
          const [p, q] = [(half * 2 + a) * 2 + i, a * 2 + j];
          const [sr, si] = [states.real[p], states.imag[p]];
          const [tr, ti] = [states.real[q], -states.imag[q]];
          const [xr, xi] = [sr * tr - si * ti, sr * ti + si * tr];
          re += xr * Math.cos(angle) - xi * Math.sin(angle);
          im += xr * Math.sin(angle) + xi * Math.cos(angle);
        }
        expect(Math.abs(re - u.real[2 * i + j])).toBeLessThan(1e-5);
        expect(Math.abs(im - u.imag[2 * i + j])).toBeLessThan(1e-5);
      }
    }
  });

  it('has quasi-energies that converge with the fourth power of the step', () => {
    const coupled = new CoupledSpins(cluster);
    const index = coupled.blocks.findIndex(({ states }) => states.length === 2);
    const cone = rotorCone(MAGIC_ANGLE);
    cone.setAxis(Float64Array.of(0.36, 0.48, 0.8));
    const difference = (count: number) => {
      const [{ energies }] = new RotorPropagators(coupled, [index], count, rate).statesAbout(cone);
      return Math.cos((2 * Math.PI * (energies[0] - energies[1])) / rate);
    };
    const exact = difference(1024);
    const [coarse, fine] = [Math.abs(difference(32) - exact), Math.abs(difference(64) - exact)];
    expect(fine).toBeLessThan(1e-5);
    expect(coarse / fine).toBeGreaterThan(12);
    expect(coarse / fine).toBeLessThan(22);
  });
});
