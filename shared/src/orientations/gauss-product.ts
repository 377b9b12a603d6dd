import { tridiagonalQl } from '../algebra/eigen/tridiagonal-ql.js';
import type { Domain } from './symmetry.js';

/** Directions (x, y, z of each in turn) and their weights, which sum to 1. */
export interface OrientationSet {
  readonly count: number;
  readonly directions: Float64Array;
  readonly weights: Float64Array;
  /** Directions of the whole set modulo inversion; `count` may be fewer where reflections make them alike. */
  readonly orientations: number;
}

/**
 * The product rule on the sphere: Gauss-Legendre in cos(theta), equal steps in phi (A. H. Stroud, Approximate Calculation of
 * Multiple Integrals, 1971, sec. 2.6). With n latitudes and 2n meridians it is exact for all spherical harmonics of degree
 * below 2n, so smooth functions converge faster than any power. Of the 2n^2 directions one of each pair of opposite ones is
 * kept, or those of one octant; the smallest n with at least `requested` pairs is taken.
 */
export function gaussProduct(requested: number, domain: Domain): OrientationSet {
  const n = 2 * Math.max(1, Math.ceil(Math.sqrt(requested) / 2 - 1e-9));
  const { nodes, weights: latitudeWeights } = gaussLegendre(n);
  const meridians = domain === 'octant' ? n / 2 : 2 * n;
  const count = (n / 2) * meridians;
  const directions = new Float64Array(3 * count);
  const weights = new Float64Array(count);
  for (let i = n / 2, k = 0; i < n; i++) {
    const sine = Math.sqrt(1 - nodes[i] * nodes[i]);
    for (let j = 0; j < meridians; j++, k++) {
      const phi = (Math.PI * (j + 0.5)) / n;
      directions[3 * k] = sine * Math.cos(phi);
      directions[3 * k + 1] = sine * Math.sin(phi);
      directions[3 * k + 2] = nodes[i];
      weights[k] = latitudeWeights[i] / meridians;
    }
  }
  return { count, directions, weights, orientations: n * n };
}

/**
 * Nodes, ascending, and weights of the n point Gauss-Legendre rule on -1..1, as eigenvalues and first components of the
 * eigenvectors of the Jacobi matrix (G. H. Golub & J. H. Welsch, Math. Comput. 23, 221 (1969)).
 */
export function gaussLegendre(n: number): { nodes: Float64Array; weights: Float64Array } {
  const nodes = new Float64Array(n);
  const offDiagonal = Float64Array.from({ length: n }, (_, k) => (k + 1) / Math.sqrt(4 * (k + 1) ** 2 - 1));
  const first = new Float64Array(n);
  first[0] = 1;
  tridiagonalQl(nodes, offDiagonal, n, first, 0, 1, 1);
  return { nodes, weights: first.map((component) => 2 * component * component) };
}
