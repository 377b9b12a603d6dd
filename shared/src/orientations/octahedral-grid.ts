import type { Domain } from './symmetry.js';

/**
 * Directions on the faces of an octahedron, each face split into n^2 triangles (D. W. Alderman, M. S. Solum & D. M. Grant,
 * J. Chem. Phys. 84, 3717 (1986)): node (i, j) of a face points along (+-i, +-j, n - i - j). The grid takes `patches` of
 * six nodes, the corners of a triangle and the middles of its sides, so that frequencies can be interpolated to second
 * order. Patches of half the density are made of every other node, for a second, smaller set at no cost.
 */
export interface OctahedralGrid {
  /** Intervals along an edge, a multiple of 4. */
  readonly n: number;
  /** Signs of x and y of each face that is needed. */
  readonly faces: readonly (readonly [number, number])[];
  /** Directions of the whole set modulo inversion, 2n^2 + 1. */
  readonly orientations: number;
  /** Bands of four rows of nodes on each face; neighbouring bands share a row. */
  readonly bands: number;
}

/** Rows of nodes from one band of a face to the next: the larger patches are four rows high. */
export const BAND_ROWS = 4;

/** The coarsest grid with at least `requested` directions. */
export function octahedralGrid(requested: number, domain: Domain): OctahedralGrid {
  const n = BAND_ROWS * Math.max(1, Math.ceil(Math.sqrt((requested - 1) / 2) / BAND_ROWS - 1e-9));
  // prettier-ignore
  const faces = domain === 'octant' ? [[1, 1]] as const : [[1, 1], [-1, 1], [-1, -1], [1, -1]] as const;
  return { n, faces, orientations: 2 * n * n + 1, bands: n / BAND_ROWS };
}

/** Number of nodes in row i of a face. */
export function rowLength(grid: OctahedralGrid, i: number): number {
  return grid.n + 1 - i;
}

/** Writes the direction of node (i, j) to `out`; returns the solid angle there per unit of the flat face's area. */
export function nodeDirection(grid: OctahedralGrid, face: number, i: number, j: number, out: Float64Array): number {
  const signs = grid.faces[face];
  const k = grid.n - i - j;
  const inverse = 1 / Math.sqrt(i * i + j * j + k * k);
  out[0] = signs[0] * i * inverse;
  out[1] = signs[1] * j * inverse;
  out[2] = k * inverse;
  return (grid.n * inverse) ** 3;
}

/** Row and column of a patch's corners 0, 1, 2 and of the middles of the sides opposite them, twelve numbers. */
export type Patch = Int32Array;

/** Calls `visit` for each patch of `size` (2, or 4 for the smaller set) between rows `first` and `first + BAND_ROWS`. */
export function forEachPatch(grid: OctahedralGrid, first: number, size: 2 | 4, visit: (patch: Patch) => void): void {
  const patch = new Int32Array(12);
  for (let i = first; i < first + BAND_ROWS; i += size) {
    for (let j = 0; i + j < grid.n; j += size) {
      place(patch, i, j, size);
      visit(patch);
      if (i + j + size >= grid.n) continue;
      place(patch, i + size, j + size, -size);
      visit(patch);
    }
  }
}

/** A triangle with its right angle at (i, j); a negative size turns it by half a turn. */
function place(patch: Patch, i: number, j: number, size: number): void {
  const half = size / 2;
  patch[0] = patch[4] = patch[8] = i;
  patch[1] = patch[3] = patch[11] = j;
  patch[2] = i + size;
  patch[5] = j + size;
  patch[6] = patch[10] = i + half;
  patch[7] = patch[9] = j + half;
}

/**
 * Factor that turns (solid angle per area) x value, summed over patches as the mean of their three middles (exact for
 * quadratic functions), into a mean over the sphere.
 */
export function patchWeight(grid: OctahedralGrid, size: 2 | 4): number {
  const direction = new Float64Array(3);
  let sum = 0;
  for (let first = 0; first < grid.n; first += BAND_ROWS) {
    forEachPatch(grid, first, size, (patch) => {
      for (let m = 6; m < 12; m += 2) sum += nodeDirection(grid, 0, patch[m], patch[m + 1], direction) / 3;
    });
  }
  return 1 / (sum * grid.faces.length);
}
