import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { ernstAngle, steadyStateSignal } from './ernst-angle.js';

describe('Ernst angle', () => {
  // Ernst & Anderson 1966; numbers recomputed independently (reference checks B10-1 and B10-2).
  it.each([
    { repetition: 1, t1: 1, angle: 68.4151, optimum: 0.679792, at90: 0.6321206, at30: 0.4638348 },
    { repetition: 0.5, t1: 2.5, angle: 35.04206, optimum: 0.3157024, at90: 0.1812692, at30: 0.3115038 },
  ])(
    'follows the published formula at TR = $repetition s, T1 = $t1 s',
    ({ repetition, t1, angle, optimum, at90, at30 }) => {
      expect(ernstAngle(repetition, t1)).toBeCloseTo(angle, 4);
      expect(steadyStateSignal(ernstAngle(repetition, t1), repetition, t1)).toBeCloseTo(optimum, 6);
      expect(steadyStateSignal(90, repetition, t1)).toBeCloseTo(at90, 6);
      expect(steadyStateSignal(30, repetition, t1)).toBeCloseTo(at30, 6);
    },
  );

  it('is better than any other flip angle', () => {
    const seconds = fc.double({ min: 0.01, max: 20, noNaN: true });
    fc.assert(
      fc.property(seconds, seconds, fc.double({ min: 1, max: 179, noNaN: true }), (repetition, t1, flip) => {
        const best = steadyStateSignal(ernstAngle(repetition, t1), repetition, t1);
        expect(steadyStateSignal(flip, repetition, t1)).toBeLessThanOrEqual(best + 1e-12);
      }),
    );
  });
});
