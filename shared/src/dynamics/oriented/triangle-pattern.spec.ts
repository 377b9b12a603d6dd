import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { TrianglePattern } from './triangle-pattern.js';

const [points, width] = [64, 1000];

/**
 * FID of a tent: the mean of exp(i w f) over a triangle on which f is linear is 2 (-1/w^2) times the second divided difference of
 * exp(i w f) at the corners; here by the product rule of Gauss-Legendre points, independent of that formula.
 */
function triangleFid(corners: readonly number[], k: number): [number, number] {
  const [a, b, c] = corners;
  const steps = 400;
  let [re, im] = [0, 0];
  for (let i = 0; i < steps; i++) {
    // The inner integral along a line of constant u is a sinc; the outer one by midpoints.
    const u = (i + 0.5) / steps;
    const from = a + u * (b - a);
    const to = a + u * (c - a);
    const w = (2 * Math.PI * k) / width;
    const half = (w * (to - from)) / 2;
    const sinc = Math.abs(half) < 1e-9 ? 1 : Math.sin(half) / half;
    re += (2 * u * sinc * Math.cos((w * (from + to)) / 2)) / steps;
    im += (2 * u * sinc * Math.sin((w * (from + to)) / 2)) / steps;
  }
  return [re, im];
}

function patternFid(add: (pattern: TrianglePattern) => void) {
  const pattern = new TrianglePattern(points, width);
  add(pattern);
  const fid = { real: new Float64Array(points), imag: new Float64Array(points) };
  pattern.addTo(fid, () => 1);
  return fid;
}

describe('TrianglePattern', () => {
  it('sums tents of any width anywhere, within the window and beyond', () => {
    const frequency = fc.double({ min: -3000, max: 3000, noNaN: true });
    const spread = fc.double({ min: 0, max: 400, noNaN: true });
    fc.assert(
      fc.property(frequency, spread, spread, (a, db, dc) => {
        // A wide tent and many others make a pattern much wider than the inverse of the FID's length, as real ones are.
        const triangles = [0, 1, 2, 3].map((n) => [a + 100 * n, a + db + 100 * n, a - dc + 100 * n]);
        const fid = patternFid((pattern) => triangles.forEach(([x, y, z]) => pattern.add(x, y, z, 0.25)));
        for (const k of [0, 1, 7, 20, 50]) {
          const exact = triangles.map((corners) => triangleFid(corners, k));
          const mean = (part: 0 | 1) => exact.reduce((sum, value) => sum + value[part] / 4, 0);
          expect(Math.abs(fid.real[k] - mean(0))).toBeLessThan(4e-3);
          expect(Math.abs(fid.imag[k] - mean(1))).toBeLessThan(4e-3);
        }
      }),
      { numRuns: 60 },
    );
  });

  it('takes triangles without width as lines, exactly', () => {
    const fid = patternFid((pattern) => pattern.add(123.4, 123.4, 123.4, 0.7));
    for (let k = 0; k < points; k++) {
      expect(fid.real[k]).toBeCloseTo(0.7 * Math.cos((2 * Math.PI * 123.4 * k) / width), 9);
      expect(fid.imag[k]).toBeCloseTo(0.7 * Math.sin((2 * Math.PI * 123.4 * k) / width), 9);
    }
  });

  it('is continuous where two corners coincide', () => {
    const apart = patternFid((pattern) => pattern.add(-100, -100 + 1e-7, 80, 1));
    const together = patternFid((pattern) => pattern.add(-100, -100, 80, 1));
    apart.real.forEach((value, k) => expect(value).toBeCloseTo(together.real[k], 8));
  });

  it('counts what lies outside the window', () => {
    const pattern = new TrianglePattern(points, width);
    pattern.add(510, 520, 530, 0.25);
    pattern.add(10, 20, 30, 0.5);
    pattern.addStick(-501, 0.125);
    expect(pattern.folded).toBeCloseTo(0.375, 12);
  });
});
