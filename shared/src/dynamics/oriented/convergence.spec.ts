import { describe, expect, it } from 'vitest';
import { spectralDistanceHz } from './convergence.js';

function line(hz: number, lineWidth: number, width: number, points: number) {
  const decay = (k: number) => Math.exp((-Math.PI * lineWidth * k) / width);
  const angle = (k: number) => (2 * Math.PI * hz * k) / width;
  return {
    real: Float64Array.from({ length: points }, (_, k) => decay(k) * Math.cos(angle(k))),
    imag: Float64Array.from({ length: points }, (_, k) => decay(k) * Math.sin(angle(k))),
  };
}

describe('spectralDistanceHz', () => {
  // The distance between a distribution and the same distribution moved by d is d.
  it('is how far a line was moved, also across the edge of the window', () => {
    const at = (hz: number) => line(hz, 20, 4000, 4096);
    // Some of the Lorentzian wings lies beyond the window.
    expect(Math.abs(spectralDistanceHz(at(100), at(107), 4000) - 7)).toBeLessThan(0.1);
    expect(Math.abs(spectralDistanceHz(at(1998), at(2003), 4000) - 5)).toBeLessThan(0.1);
    expect(spectralDistanceHz(at(100), at(100), 4000)).toBe(0);
  });

  it('does not depend on the phase of the signal', () => {
    const [a, b] = [line(50, 20, 4000, 1024), line(56, 20, 4000, 1024)];
    const turned = (x: typeof a) => ({ real: x.imag.map((value) => -value), imag: x.real });
    expect(spectralDistanceHz(turned(a), turned(b), 4000)).toBeCloseTo(spectralDistanceHz(a, b, 4000), 9);
  });
});
