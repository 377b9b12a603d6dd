import { describe, expect, it } from 'vitest';
import { rotateTensor, rotationMatrix } from '../algebra/rotation.js';
import { gaussLegendre, gaussProduct } from './gauss-product.js';
import { BAND_ROWS, forEachPatch, nodeDirection, octahedralGrid, patchWeight } from './octahedral-grid.js';
import { inFrame, symmetryOf, type Domain } from './symmetry.js';

/** Mean of x^a y^b z^c over the sphere: (a-1)!!(b-1)!!(c-1)!!/(a+b+c+1)!! for even powers, else 0 (G. B. Folland, Am. Math. Mon. 108, 446 (2001)). */
function sphereMean(powers: readonly number[]): number {
  const odd = (n: number): number => (n <= 1 ? 1 : n * odd(n - 2));
  if (powers.some((p) => p % 2 === 1)) return 0;
  return powers.reduce((product, p) => product * odd(p - 1), 1) / odd(powers.reduce((sum, p) => sum + p, 0) + 1);
}

const monomial = (d: ArrayLike<number>, [a, b, c]: readonly number[]) => d[0] ** a * d[1] ** b * d[2] ** c;

const evenPowers = (degree: number, step: number) => {
  const all: number[][] = [];
  for (let a = 0; a <= degree; a += step) {
    for (let b = 0; a + b <= degree; b += step) {
      const c = degree - a - b;
      if (c % step === 0) all.push([a, b, c]);
    }
  }
  return all;
};

describe('the Gauss product rule', () => {
  it('has the tabulated nodes and weights of 4 points', () => {
    // M. Abramowitz & I. A. Stegun, Handbook of Mathematical Functions, table 25.4
    const { nodes, weights } = gaussLegendre(4);
    [-0.861136311594053, -0.339981043584856, 0.339981043584856, 0.861136311594053].forEach((x, k) =>
      expect(nodes[k]).toBeCloseTo(x, 13),
    );
    [0.347854845137454, 0.652145154862546, 0.652145154862546, 0.347854845137454].forEach((w, k) =>
      expect(weights[k]).toBeCloseTo(w, 13),
    );
  });

  it.each<[Domain, number]>([
    ['hemisphere', 1],
    ['hemisphere', 2],
    ['octant', 2],
  ])('integrates even polynomials of degree below 2n over the %s exactly (powers in steps of %i)', (domain, step) => {
    const { count, directions, weights, orientations } = gaussProduct(100, domain);
    expect(orientations).toBe(100);
    expect(count).toBe(domain === 'octant' ? 25 : 100);
    for (let degree = 0; degree < 20; degree += 2) {
      for (const powers of evenPowers(degree, step)) {
        let mean = 0;
        for (let k = 0; k < count; k++) mean += weights[k] * monomial(directions.subarray(3 * k, 3 * k + 3), powers);
        expect(mean).toBeCloseTo(sphereMean(powers), 13);
      }
    }
  });
});

describe('the octahedral grid', () => {
  const meanOver = (requested: number, domain: Domain, size: 2 | 4, powers: readonly number[]) => {
    const grid = octahedralGrid(requested, domain);
    const weight = patchWeight(grid, size);
    const direction = new Float64Array(3);
    let mean = 0;
    grid.faces.forEach((_, face) => {
      for (let first = 0; first < grid.n; first += BAND_ROWS) {
        forEachPatch(grid, first, size, (patch) => {
          for (let m = 6; m < 12; m += 2) {
            const solidAngle = nodeDirection(grid, face, patch[m], patch[m + 1], direction);
            mean += (weight * solidAngle * monomial(direction, powers)) / 3;
          }
        });
      }
    });
    return mean;
  };

  it('has at least the directions asked for, all of them of unit length', () => {
    for (const requested of [1, 33, 34, 1000, 1153]) {
      const grid = octahedralGrid(requested, 'hemisphere');
      expect(grid.orientations).toBeGreaterThanOrEqual(requested);
      expect(grid.n % BAND_ROWS).toBe(0);
    }
    const direction = new Float64Array(3);
    nodeDirection(octahedralGrid(33, 'hemisphere'), 2, 1, 2, direction);
    expect(Math.hypot(...direction)).toBeCloseTo(1, 15);
    expect([direction[0] < 0, direction[1] < 0]).toEqual([true, true]);
  });

  it.each<[Domain, 2 | 4]>([
    ['hemisphere', 2],
    ['hemisphere', 4],
    ['octant', 2],
  ])('has weights that sum to 1 and integrates harmonics to fourth order (%s, patches of %i)', (domain, size) => {
    expect(meanOver(1000, domain, size, [0, 0, 0])).toBeCloseTo(1, 13);
    for (const powers of [
      [2, 0, 0],
      [0, 0, 2],
      [2, 2, 0],
      [0, 4, 0],
      [2, 2, 2],
    ]) {
      const error = (requested: number) => Math.abs(meanOver(requested, domain, size, powers) - sphereMean(powers));
      const [coarse, fine] = [error(500), error(2048)];
      expect(coarse).toBeLessThan(2e-4);
      // A factor of two in n: 16 at fourth order; a little is left for the terms beyond. Symmetry makes some exact.
      expect(fine).toBeLessThan(coarse / 11 + 1e-14);
    }
  });
});

describe('symmetry', () => {
  const rhombic = Float64Array.of(-30, 0, 0, 0, 10, 0, 0, 0, 20);

  it('leaves an octant in the principal frame of one tensor', () => {
    const turned = rotateTensor(rotationMatrix([20, 50, 70]), rhombic);
    const { frame, domain } = symmetryOf([turned]);
    expect(domain).toBe('octant');
    const principal = inFrame(frame, turned);
    [-30, 10, 20].forEach((value, axis) => expect(principal[4 * axis]).toBeCloseTo(value, 12));
  });

  it('leaves an octant where tensors share their axes and a hemisphere where not', () => {
    const euler = rotationMatrix([20, 50, 70]);
    const other = Float64Array.of(5, 0, 0, 0, 5, 0, 0, 0, -10);
    const scalar = Float64Array.of(3, 0, 0, 0, 3, 0, 0, 0, 3);
    const first = rotateTensor(euler, rhombic);
    expect(symmetryOf([scalar, first, rotateTensor(euler, other)]).domain).toBe('octant');
    expect(symmetryOf([first, other]).domain).toBe('hemisphere');
    expect(symmetryOf([]).domain).toBe('octant');
  });
});
