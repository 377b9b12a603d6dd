import type { Line } from '../../documents/result.js';

/** Sticks closer than this are one line, Hz; lines below this share of the strongest are dropped (contract of the result). */
const MERGE_HZ = 1e-4;
const DROP = 1e-6;
/** Sticks this small beside the strongest so far can't lift a line over DROP unless a thousand coincide. */
const FORGET = 1e-9;
/** A nucleus is named when it takes at least this share of the change of projection in a transition. */
const NAMED_SHARE = 0.1;

/** Collects transitions as columns, and the eigenstates' projections that say which nuclei flip in them. */
export class StickTable {
  private length = 0;
  private hz = new Float64Array(1024);
  private intensity = new Float64Array(1024);
  private upper = new Uint32Array(1024);
  private lower = new Uint32Array(1024);
  private strongest = 0;
  private states = 0;
  /** Row of projections for each state, one column for each nucleus of `names`. */
  private projections = new Float32Array(1024);

  /** `names` are the ids of the observed nuclei, one a column of the projections. */
  constructor(private readonly names: readonly string[]) {}

  get transitions(): number {
    return this.length;
  }

  /** Adds `count` states with the projections of the nuclei in `columns`; returns the number of the first. */
  addStates(projections: Float32Array, count: number, columns: readonly number[]): number {
    const width = this.names.length;
    const first = this.states;
    this.states += count;
    if (this.states * width > this.projections.length) {
      this.projections = grown(this.projections, new Float32Array(2 * this.states * width));
    }
    for (let k = 0, p = 0; k < count; k++) {
      for (const column of columns) this.projections[(first + k) * width + column] = projections[p++];
    }
    return first;
  }

  /** Hz from the carrier; intensity in nuclei. */
  add(hz: number, intensity: number, upper: number, lower: number): void {
    const size = Math.abs(intensity);
    if (size < FORGET * this.strongest) return;
    if (size > this.strongest) this.strongest = size;
    if (this.length === this.hz.length) this.grow();
    const at = this.length++;
    this.hz[at] = hz;
    this.intensity[at] = intensity;
    this.upper[at] = upper;
    this.lower[at] = lower;
  }

  /** Merged lines, highest frequency first. `carrierHz` and `hzPerPpm` belong to the observed isotope. */
  lines(carrierHz: number, hzPerPpm: number): Line[] {
    const order = Uint32Array.from({ length: this.length }, (_, i) => i).sort((a, b) => this.hz[b] - this.hz[a]);
    const lines: Line[] = [];
    for (let start = 0; start < order.length;) {
      let end = start + 1;
      while (end < order.length && this.hz[order[end - 1]] - this.hz[order[end]] < MERGE_HZ) end++;
      lines.push(this.merge(order.subarray(start, end), carrierHz, hzPerPpm));
      start = end;
    }
    const strongest = lines.reduce((most, { intensity }) => Math.max(most, Math.abs(intensity)), 0);
    return lines.filter(({ intensity }) => Math.abs(intensity) > DROP * strongest);
  }

  private merge(rows: Uint32Array, carrierHz: number, hzPerPpm: number): Line {
    const width = this.names.length;
    const shares = new Float64Array(width);
    let [moment, intensity] = [0, 0];
    for (const row of rows) {
      const weight = this.intensity[row];
      intensity += weight;
      moment += weight * this.hz[row];
      const [up, low] = [this.upper[row] * width, this.lower[row] * width];
      for (let n = 0; n < width; n++) shares[n] += weight * (this.projections[up + n] - this.projections[low + n]);
    }
    const hz = carrierHz + moment / intensity;
    const nuclei = this.names.filter((_, n) => shares[n] / intensity >= NAMED_SHARE);
    return { ppm: hz / hzPerPpm, hz, intensity, nuclei };
  }

  private grow(): void {
    const size = 2 * this.hz.length;
    this.hz = grown(this.hz, new Float64Array(size));
    this.intensity = grown(this.intensity, new Float64Array(size));
    this.upper = grown(this.upper, new Uint32Array(size));
    this.lower = grown(this.lower, new Uint32Array(size));
  }
}

function grown<T extends Float64Array | Float32Array | Uint32Array>(old: T, larger: T): T {
  larger.set(old);
  return larger;
}
