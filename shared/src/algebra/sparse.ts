import type { ComplexArray } from '../run/solved.js';

/** Square complex matrix by rows: row r holds entries start[r] to start[r + 1]. */
export interface SparseComplex {
  readonly size: number;
  readonly start: Uint32Array;
  readonly columns: Uint32Array;
  readonly real: Float64Array;
  readonly imag: Float64Array;
}

/** Collects entries row by row; entries of one place add up. */
export class SparseComplexBuilder {
  private readonly columns: number[] = [];
  private readonly real: number[] = [];
  private readonly imag: number[] = [];
  private readonly start: number[] = [0];
  private readonly slot: Int32Array;
  private rowBegin = 0;

  constructor(private readonly size: number) {
    this.slot = new Int32Array(size).fill(-1);
  }

  /** Adds to the row that is being built. */
  add(column: number, real: number, imag: number): void {
    let at = this.slot[column];
    if (at < this.rowBegin) {
      at = this.columns.length;
      this.slot[column] = at;
      this.columns.push(column);
      this.real.push(0);
      this.imag.push(0);
    }
    this.real[at] += real;
    this.imag[at] += imag;
  }

  endRow(): void {
    this.rowBegin = this.columns.length;
    this.start.push(this.rowBegin);
  }

  finish(): SparseComplex {
    return {
      size: this.size,
      start: Uint32Array.from(this.start),
      columns: Uint32Array.from(this.columns),
      real: Float64Array.from(this.real),
      imag: Float64Array.from(this.imag),
    };
  }
}

/** out = a v; out and v must not alias. */
export function applySparseInto(out: ComplexArray, a: SparseComplex, v: ComplexArray): void {
  const { size, start, columns, real, imag } = a;
  const [vr, vi] = [v.real, v.imag];
  for (let r = 0; r < size; r++) {
    let re = 0;
    let im = 0;
    for (let p = start[r]; p < start[r + 1]; p++) {
      const c = columns[p];
      re += real[p] * vr[c] - imag[p] * vi[c];
      im += real[p] * vi[c] + imag[p] * vr[c];
    }
    out.real[r] = re;
    out.imag[r] = im;
  }
}

/** Largest row sum of absolute values, an upper bound of the spectral radius. */
export function rowSumNorm({ size, start, real, imag }: SparseComplex): number {
  let most = 0;
  for (let r = 0; r < size; r++) {
    let sum = 0;
    for (let p = start[r]; p < start[r + 1]; p++) sum += Math.hypot(real[p], imag[p]);
    if (sum > most) most = sum;
  }
  return most;
}
