import { describe, expect, it } from 'vitest';
import { experimentOf, systemOf } from '../../test/documents.js';
import { blochSiegertShift, idealDecoupling } from './decoupling.js';

describe('decoupling', () => {
  const system = systemOf({
    nuclei: [
      { id: 'C', isotope: '13C', shift: 30 },
      { id: 'Ha', isotope: '1H', shift: 1 },
      { id: 'Hb', isotope: '1H', shift: 9 },
    ],
    couplings: [
      { between: ['C', 'Ha'], j: 130 },
      { between: ['C', 'Hb'], j: 8 },
    ],
  });

  it('shifts as the exact precession in an oscillating field', () => {
    // Scaled down so that the laboratory frame can be integrated: nu0 = 1, field at 0.6, strong enough to see.
    const [nu0, nud, nutation] = [1, 0.6, 0.05];
    const expected = (nutation ** 2 * nu0) / (nu0 ** 2 - nud ** 2);
    const periods = 400;
    const perPeriod = 400;
    const dt = 1 / perPeriod;
    let m = [1, 0, 0];
    let [turns, last] = [0, 0];
    const slope = ([x, y, z]: number[], t: number) => {
      const [wx, wz] = [2 * Math.PI * 2 * nutation * Math.cos(2 * Math.PI * nud * t), 2 * Math.PI * nu0];
      return [-wz * y, wz * x - wx * z, wx * y];
    };
    for (let k = 0; k < periods * perPeriod; k++) {
      const t = k * dt;
      // Fourth-order Runge-Kutta.
      const a = slope(m, t);
      const b = slope(
        m.map((v, i) => v + (dt / 2) * a[i]),
        t + dt / 2,
      );
      const c = slope(
        m.map((v, i) => v + (dt / 2) * b[i]),
        t + dt / 2,
      );
      const d = slope(
        m.map((v, i) => v + dt * c[i]),
        t + dt,
      );
      m = m.map((v, i) => v + (dt / 6) * (a[i] + 2 * b[i] + 2 * c[i] + d[i]));
      const angle = Math.atan2(m[1], m[0]) / (2 * Math.PI);
      turns += angle - last - Math.round(angle - last);
      last = angle;
    }
    const shift = turns / periods - nu0;
    expect(shift / expected).toBeGreaterThan(0.85);
    expect(shift / expected).toBeLessThan(1.15);
  });

  it('scales with the square of the field and the magnetogyric ratios', () => {
    const experiment = { observe: '13C', protonMHz: 400 };
    const shift = blochSiegertShift('1H', experiment, 3000);
    // 3 kHz on 1H turns 13C with 754.5 Hz; nu0 = 100.58, field at 400 MHz.
    expect(shift).toBeCloseTo((754.5 ** 2 * 100.58e6) / (100.58e6 ** 2 - 400e6 ** 2), 5);
    expect(blochSiegertShift('1H', experiment, 6000) / shift).toBeCloseTo(4, 12);
  });

  it('names the splitting that continuous irradiation leaves: J offset/sqrt(offset^2 + nutation^2)', () => {
    const [bloch, splitting] = idealDecoupling(system, experimentOf({ observe: '13C', decouple: ['1H'] }), 3000);
    expect(bloch.id).toBe('bloch-siegert');
    // Protons at 1 and 9 ppm stand 1600 Hz from their mean.
    expect(splitting.hz).toBeCloseTo((130 * 1600) / Math.hypot(1600, 3000), 6);
    expect(idealDecoupling(system, experimentOf({ observe: '13C' }))).toEqual([]);
    const switchedOff = experimentOf({
      observe: '13C',
      decouple: ['1H'],
      sequence: { steps: [{ pulse: { on: '13C', flip: 90 } }, { decouple: [] }, { acquire: {} }] },
    });
    expect(idealDecoupling(system, switchedOff)).toEqual([]);
  });
});
