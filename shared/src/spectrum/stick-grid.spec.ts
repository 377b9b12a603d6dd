import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { StickGrid } from './stick-grid.js';

/** The sum that the grid stands for, term by term. */
function direct(hz: readonly number[], amplitude: readonly number[], points: number, width: number) {
  const fid = { real: new Float64Array(points), imag: new Float64Array(points) };
  hz.forEach((nu, s) => {
    for (let k = 0; k < points; k++) {
      const angle = 2 * Math.PI * (((nu / width) % 1) * k);
      fid.real[k] += amplitude[s] * Math.cos(angle);
      fid.imag[k] += amplitude[s] * Math.sin(angle);
    }
  });
  return fid;
}

describe('StickGrid', () => {
  it.each([1, 2, 7, 64, 1000, 4096])('equals the direct sum over sticks to 1e-10, %d points', (points) => {
    fc.assert(
      fc.property(
        fc.array(fc.tuple(fc.double({ min: -9000, max: 9000, noNaN: true }), fc.integer({ min: -1000, max: 1000 })), {
          minLength: 1,
          maxLength: 8,
        }),
        (sticks) => {
          const hz = sticks.map(([nu]) => nu);
          const amplitude = sticks.map(([, a]) => a);
          const expected = direct(hz, amplitude, points, 5000);
          const grid = new StickGrid(points, 5000);
          grid.add(Float64Array.from(hz), Float64Array.from(amplitude));
          const fid = { real: new Float64Array(points), imag: new Float64Array(points) };
          grid.addTo(fid);
          const total = amplitude.reduce((sum, a) => sum + Math.abs(a), 0);
          for (let k = 0; k < points; k++) {
            expect(Math.abs(fid.real[k] - expected.real[k])).toBeLessThanOrEqual(1e-10 * total);
            expect(Math.abs(fid.imag[k] - expected.imag[k])).toBeLessThanOrEqual(1e-10 * total);
          }
        },
      ),
      { numRuns: 30 },
    );
  });

  it('applies the decay of its class to every point', () => {
    const grid = new StickGrid(16, 100);
    grid.add(Float64Array.of(0), Float64Array.of(2));
    const fid = { real: new Float64Array(16), imag: new Float64Array(16) };
    grid.addTo(fid, (k) => Math.exp(-k));
    for (let k = 0; k < 16; k++) expect(fid.real[k]).toBeCloseTo(2 * Math.exp(-k), 10);
  });
});
