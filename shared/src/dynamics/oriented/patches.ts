import {
  BAND_ROWS,
  forEachPatch,
  nodeDirection,
  patchWeight,
  rowLength,
  type OctahedralGrid,
  type Patch,
} from '../../orientations/octahedral-grid.js';
import type { DirectionalSpectrum } from './directional-spectrum.js';
import type { TrianglePattern } from './triangle-pattern.js';

/** The nodes of one row of a face, with all transitions. */
interface NodeRow {
  readonly frequency: Float64Array[];
  readonly amplitude: Float64Array[];
  readonly solidAngle: Float64Array;
}

/**
 * Adds a band of a face to the patterns: over each patch of six nodes, frequencies and amplitudes are the quadratic functions
 * through the nodes, and the patch is cut into as many flat triangles as keep the frequency within `tolerance` Hz of them.
 */
export class PatchIntegrator {
  private readonly rows: NodeRow[];
  private filled = { face: -1, band: -1 };
  private readonly fine: PatchSize;
  private readonly coarse: PatchSize;
  private readonly direction = new Float64Array(3);

  constructor(
    private readonly grid: OctahedralGrid,
    private readonly spectrum: DirectionalSpectrum,
    private readonly tolerance: number,
  ) {
    const { transitions, channels } = spectrum;
    const longest = rowLength(grid, 0);
    this.rows = Array.from({ length: BAND_ROWS + 1 }, () => ({
      frequency: Array.from({ length: longest }, () => new Float64Array(transitions)),
      amplitude: Array.from({ length: longest }, () => new Float64Array(channels * transitions)),
      solidAngle: new Float64Array(longest),
    }));
    this.fine = patchSize(grid, 2);
    this.coarse = patchSize(grid, 4);
  }

  /** Adds the mean over the band to `fine`, and that of the smaller set to `coarse`: a pattern for each channel. */
  addBand(face: number, band: number, fine: readonly TrianglePattern[], coarse: readonly TrianglePattern[]): void {
    const first = BAND_ROWS * band;
    const follows = this.filled.face === face && this.filled.band === band - 1;
    this.filled = { face, band };
    if (follows) this.rows.unshift(this.rows.pop()!);
    for (let i = follows ? 1 : 0; i <= BAND_ROWS; i++) this.fillRow(face, first + i, this.rows[i]);
    forEachPatch(this.grid, first, 2, (patch) => this.addPatch(patch, first, this.fine, fine));
    forEachPatch(this.grid, first, 4, (patch) => this.addPatch(patch, first, this.coarse, coarse));
  }

  private fillRow(face: number, i: number, row: NodeRow): void {
    const length = rowLength(this.grid, i);
    for (let j = 0; j < length; j++) {
      row.solidAngle[j] = nodeDirection(this.grid, face, i, j, this.direction);
      this.spectrum.evaluate(this.direction, row.frequency[j], row.amplitude[j]);
    }
  }

  private addPatch(patch: Patch, first: number, size: PatchSize, patterns: readonly TrianglePattern[]): void {
    const { transitions, channels } = this.spectrum;
    const { weight } = size;
    for (let t = 0; t < transitions; t++) {
      let cut = 0;
      for (let c = 0; c < channels; c++) {
        let strongest = 0;
        for (let p = 0; p < 6; p++) {
          const row = this.rows[patch[2 * p] - first];
          const column = patch[2 * p + 1];
          const value = weight * row.solidAngle[column] * row.amplitude[column][c * transitions + t];
          amplitudes[p] = value;
          strongest = Math.max(strongest, Math.abs(value));
        }
        if (strongest < NEGLIGIBLE * weight) continue;
        if (cut === 0) {
          for (let p = 0; p < 6; p++) {
            frequencies[p] = this.rows[patch[2 * p] - first].frequency[patch[2 * p + 1]][t];
          }
          cut = this.cutsOf(frequencies, size.mostCuts);
        }
        addTriangles(cut, patterns[c]);
      }
    }
  }

  /** Triangles along a side: a chord of a parabola of second difference d leaves it by d/(2 cuts^2). */
  private cutsOf(f: Float64Array, most: number): number {
    const bend = Math.max(
      Math.abs(f[1] + f[2] - 2 * f[3]),
      Math.abs(f[0] + f[2] - 2 * f[4]),
      Math.abs(f[0] + f[1] - 2 * f[5]),
    );
    return Math.min(most, Math.max(2, Math.ceil(Math.sqrt(bend / (2 * this.tolerance)))));
  }
}

/** What patches of one size have in common. */
interface PatchSize {
  readonly weight: number;
  readonly mostCuts: number;
}

/**
 * Over a side of size/n quarter turns, bent by d, the cubic term of a rank-2 harmonic, which the quadratic function leaves out, is
 * some 0.1 d size/n. Cuts beyond those that bring the chords' d/(2 cuts^2) near that are of no use; the factor was found by trial.
 */
function patchSize(grid: OctahedralGrid, size: 2 | 4): PatchSize {
  const useful = Math.ceil(Math.sqrt((2 * grid.n) / size));
  return { weight: patchWeight(grid, size), mostCuts: Math.min(MOST_CUTS, useful) };
}

const MOST_CUTS = 16;
/** Amplitudes below this share of a nucleus are left out. */
const NEGLIGIBLE = 1e-12;

const frequencies = new Float64Array(6);
const amplitudes = new Float64Array(6);
const rowAbove = { f: new Float64Array(MOST_CUTS + 1), a: new Float64Array(MOST_CUTS + 1) };
const rowBelow = { f: new Float64Array(MOST_CUTS + 1), a: new Float64Array(MOST_CUTS + 1) };

/** Cuts the patch in `frequencies` and `amplitudes` into cuts^2 triangles. */
function addTriangles(cuts: number, pattern: TrianglePattern): void {
  const area = 1 / (cuts * cuts);
  // Mean of the corners less the mean over the triangle, the same for every triangle of a quadratic function.
  const excess = area * cornersLessMiddles(amplitudes);
  const lift = -area * cornersLessMiddles(frequencies);
  let [above, below] = [rowAbove, rowBelow];
  interpolateRow(0, cuts, above);
  for (let i = 1; i <= cuts; i++) {
    interpolateRow(i, cuts, below);
    const last = cuts - i;
    for (let j = 0; j <= last; j++) {
      const mean = (above.a[j] + above.a[j + 1] + below.a[j]) / 3 - excess;
      pattern.add(above.f[j] + lift, above.f[j + 1] + lift, below.f[j] + lift, area * mean);
      if (j === last) break;
      const inverted = (below.a[j] + below.a[j + 1] + above.a[j + 1]) / 3 - excess;
      pattern.add(below.f[j] + lift, below.f[j + 1] + lift, above.f[j + 1] + lift, area * inverted);
    }
    [above, below] = [below, above];
  }
}

/** For a quadratic function the middles have the mean of the triangle. */
function cornersLessMiddles(x: Float64Array): number {
  return (x[0] + x[1] + x[2] - x[3] - x[4] - x[5]) / 3;
}

/** Values on the row at i/cuts of the way from the side 0-2 to corner 1. */
function interpolateRow(i: number, cuts: number, row: { f: Float64Array; a: Float64Array }): void {
  const u = i / cuts;
  for (let j = 0; j <= cuts - i; j++) {
    const v = j / cuts;
    const w = 1 - u - v;
    const n0 = w * (2 * w - 1);
    const n1 = u * (2 * u - 1);
    const n2 = v * (2 * v - 1);
    const n3 = 4 * u * v;
    const n4 = 4 * v * w;
    const n5 = 4 * u * w;
    row.f[j] = blend(frequencies, n0, n1, n2, n3, n4, n5);
    row.a[j] = blend(amplitudes, n0, n1, n2, n3, n4, n5);
  }
}

function blend(x: Float64Array, n0: number, n1: number, n2: number, n3: number, n4: number, n5: number): number {
  return n0 * x[0] + n1 * x[1] + n2 * x[2] + n3 * x[3] + n4 * x[4] + n5 * x[5];
}
