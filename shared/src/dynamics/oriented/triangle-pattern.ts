import type { ComplexArray } from '../../run/solved.js';
import { fourierOfReal } from '../../spectrum/fourier.js';
import { StickGrid } from '../../spectrum/stick-grid.js';

/**
 * Sums the FIDs of triangles of the sphere over which a frequency varies linearly. Seen along the frequency axis such a
 * triangle is a tent: it rises from the lowest of the corner frequencies to the middle one and falls to the highest
 * (D. W. Alderman, M. S. Solum & D. M. Grant, J. Chem. Phys. 84, 3717 (1986)). The second derivative of a tent is three
 * sticks, so each triangle costs three sticks however wide it is, and
 *   FID(t) = -sum over corners c exp(2 pi i nu t) / (2 pi t)^2.
 * The sticks are spread over a fine periodic grid with quintic B-splines (M. Unser, IEEE Signal Process. Mag. 16(6), 22
 * (1999)) and transformed once; what lies outside the spectral width folds, as sampling does. Triangles narrower than a
 * fraction of a cell are added as sticks.
 */
export class TrianglePattern {
  private readonly size: number;
  private readonly grid: Float64Array;
  private readonly cellsPerHz: number;
  private readonly sticks: StickGrid;
  private readonly waitingHz = new Float64Array(WAITING);
  private readonly waitingWeight = new Float64Array(WAITING);
  private waiting = 0;
  private weight = 0;
  private outside = 0;
  private used = false;

  /** `points` samples, 1/width seconds apart. */
  constructor(
    private readonly points: number,
    private readonly width: number,
  ) {
    this.size = 16;
    while (this.size < OVERSAMPLING * points) this.size *= 2;
    this.grid = new Float64Array(this.size);
    this.cellsPerHz = this.size / width;
    this.sticks = new StickGrid(points, width);
  }

  /** Intensity so far whose frequency lies outside the spectral width and folds into it. */
  get folded(): number {
    return this.outside;
  }

  /** Adds a triangle of total intensity `weight` with the frequencies a, b, c (Hz) at its corners. */
  add(a: number, b: number, c: number, weight: number): void {
    const low = Math.min(a, b, c);
    const high = Math.max(a, b, c);
    const cells = (high - low) * this.cellsPerHz;
    if (Math.abs(a + b + c) > 1.5 * this.width) this.outside += Math.abs(weight);
    if (cells < NARROW) this.addNarrow(a, b, c, weight, cells);
    else
      this.addTent(low * this.cellsPerHz, (a + b + c - low - high) * this.cellsPerHz, high * this.cellsPerHz, weight);
  }

  /** Adds one line. */
  addStick(hz: number, weight: number): void {
    if (Math.abs(hz) > this.width / 2) this.outside += Math.abs(weight);
    this.wait(hz, weight);
  }

  private wait(hz: number, weight: number): void {
    this.waitingHz[this.waiting] = hz;
    this.waitingWeight[this.waiting++] = weight;
    if (this.waiting === WAITING) this.flush();
  }

  /** Adds the FID of all that was added so far, each point times `decay(k)`, to `fid`. */
  addTo(fid: ComplexArray, decay: (k: number) => number): void {
    this.flush();
    this.sticks.addTo(fid, decay);
    if (!this.used) return;
    fid.real[0] += decay(0) * this.weight;
    const { real, imag } = fourierOfReal(this.grid, this.points);
    for (let k = 1; k < this.points; k++) {
      const half = (Math.PI * k) / this.size;
      const factor = -decay(k) / (4 * half * half * (Math.sin(half) / half) ** 6);
      fid.real[k] += factor * real[k];
      fid.imag[k] += factor * imag[k];
    }
  }

  /** Three points of equal weight, exact up to second moments (A. H. Stroud, Approximate Calculation of Multiple Integrals, 1971, T2:2-1). */
  private addNarrow(a: number, b: number, c: number, weight: number, cells: number): void {
    const sixth = (a + b + c) / 6;
    if (cells < POINT_LIKE) {
      this.wait(2 * sixth, weight);
      return;
    }
    this.wait(sixth + a / 2, weight / 3);
    this.wait(sixth + b / 2, weight / 3);
    this.wait(sixth + c / 2, weight / 3);
  }

  /** Corner frequencies in cells, ascending. */
  private addTent(low: number, middle: number, high: number, weight: number): void {
    // A middle corner that almost coincides with another is moved a little, and all three back, so that the mean stays.
    const inside = Math.min(Math.max(middle, low + GAP), high - GAP);
    const back = (inside - middle) / 3;
    const rise = inside - low;
    const fall = high - inside;
    const span = high - low;
    this.spread(low - back, (2 * weight) / (rise * span));
    this.spread(inside - back, (-2 * weight) / (rise * fall));
    this.spread(high - back, (2 * weight) / (fall * span));
    this.weight += weight;
    this.used = true;
  }

  private spread(position: number, amount: number): void {
    const { grid } = this;
    const mask = this.size - 1;
    const cell = Math.floor(position);
    const t = position - cell;
    const t2 = t * t;
    const t3 = t2 * t;
    const t4 = t2 * t2;
    const t5 = t2 * t3;
    const scale = amount / 120;
    // `cell` may be far outside the grid: reduce before the integer mask.
    const first = ((cell - 2) % this.size) + this.size;
    grid[first & mask] += scale * (1 - 5 * t + 10 * t2 - 10 * t3 + 5 * t4 - t5);
    grid[(first + 1) & mask] += scale * (26 - 50 * t + 20 * t2 + 20 * t3 - 20 * t4 + 5 * t5);
    grid[(first + 2) & mask] += scale * (66 - 60 * t2 + 30 * t4 - 10 * t5);
    grid[(first + 3) & mask] += scale * (26 + 50 * t + 20 * t2 - 20 * t3 - 20 * t4 + 10 * t5);
    grid[(first + 4) & mask] += scale * (1 + 5 * t + 10 * t2 + 10 * t3 + 5 * t4 - 5 * t5);
    grid[(first + 5) & mask] += scale * t5;
  }

  private flush(): void {
    if (this.waiting > 0) this.sticks.add(this.waitingHz, this.waitingWeight, this.waiting);
    this.waiting = 0;
  }
}

/** Grid cells for each FID point. At 4 the images of what lies beyond the FID are damped by (1/3)^4 at its end, more before. */
const OVERSAMPLING = 4;
/** Triangles narrower than this many cells are sticks; a cell turns by a quarter of a cycle over the whole FID. */
const NARROW = 0.5;
/** Triangles narrower than this many cells are one stick: their second moment turns by less than 1e-8. */
const POINT_LIKE = 1e-4;
/** Least distance, in cells, of the middle corner from the others, so that no slope is too steep for double precision. */
const GAP = 5e-3;
const WAITING = 1024;
