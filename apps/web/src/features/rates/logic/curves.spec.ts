import { describe, expect, it } from 'vitest';
import { larmorMHz, parseSystem } from '@heddle/shared';
import { decades, missing, rateCurve, timeWords } from './curves';

const pair = parseSystem({
  format: 'heddle.spin-system/1',
  name: 'Two protons',
  nuclei: [
    { id: 'A', isotope: '1H', shift: 4, position: [0, 0, 0] },
    { id: 'B', isotope: '1H', shift: 4.5, position: [0, 0, 1.8] },
  ],
  couplings: [{ between: ['A', 'B'], dipolar: 'positions' }],
  tumbling: { tauC: 1e-10 },
});
const frame = { protonMHz: 400, observe: '1H', acquisition: { centre: 4, width: 1000, points: 64 } };

describe('rateCurve', () => {
  it('has the T1 minimum of a like pair where omega tauC is 0.616 (Bloembergen, Purcell & Pound, Phys. Rev. 73 (1948) 679)', () => {
    const curve = rateCurve(pair, frame, 'A', 'tauC');
    const { x } = curve.reduce((least, point) => (point.t1! < least.t1! ? point : least));
    const omegaTau = 2 * Math.PI * larmorMHz('1H', 400) * 1e6 * x;
    // Ten points a decade: the next ones lie 26 % away.
    expect(omegaTau).toBeGreaterThan(0.616 / 1.26);
    expect(omegaTau).toBeLessThan(0.616 * 1.26);
  });

  it('has T2 longer than T1 by 3/2 in extreme narrowing, since unlike shifts part transverse cross-relaxation (the 3/2 effect, textbook)', () => {
    const [first] = rateCurve(pair, frame, 'A', 'tauC');
    expect(first.t1! / first.t2!).toBeCloseTo(2 / 3, 4);
  });
});

it('says what is missing', () => {
  expect(missing(pair)).toBeNull();
  expect(missing({ ...pair, tumbling: undefined })).toMatch(/correlation time/);
  expect(missing({ ...pair, couplings: [] })).toMatch(/positions/);
});

it('finds the decades of values and words for times', () => {
  expect(decades([0.02, 3, null])).toEqual({ low: -2, high: 1 });
  expect(decades([null])).toBeNull();
  expect([timeWords(2.345), timeWords(0.0123), timeWords(null)]).toEqual(['2.35 s', '12.3 ms', '\u2013']);
});
