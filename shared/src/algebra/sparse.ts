import type { ComplexArray } from '../run/solved.js';

/**
 * Square complex matrix by rows: row r holds entries start[r] to start[r + 1], from imaginary[r] on those without a real part,
 * which are most in a generator of spin dynamics.
 */
export interface SparseComplex {
  readonly size: number;
  readonly start: Uint32Array;
  readonly imaginary: Uint32Array;
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
    const count = this.columns.length;
    const start = Uint32Array.from(this.start);
    const imaginary = new Uint32Array(this.size);
    const columns = new Uint32Array(count);
    const [real, imag] = [new Float64Array(count), new Float64Array(count)];
    let at = 0;
    const copy = (p: number) => {
      columns[at] = this.columns[p];
      real[at] = this.real[p];
      imag[at++] = this.imag[p];
    };
    for (let r = 0; r < this.size; r++) {
      for (let p = start[r]; p < start[r + 1]; p++) if (this.real[p] !== 0) copy(p);
      imaginary[r] = at;
      for (let p = start[r]; p < start[r + 1]; p++) if (this.real[p] === 0) copy(p);
    }
    return { size: this.size, start, imaginary, columns, real, imag };
  }
}

/** out = a v; out and v must not alias. */
export function applySparseInto(out: ComplexArray, a: SparseComplex, v: ComplexArray): void {
  const { size, start, imaginary, columns, real, imag } = a;
  const { real: vr, imag: vi } = v;
  const { real: outReal, imag: outImag } = out;
  for (let r = 0, p = 0; r < size; r++) {
    let re = 0;
    let im = 0;
    for (const end = imaginary[r]; p < end; p++) {
      const c = columns[p];
      re += real[p] * vr[c] - imag[p] * vi[c];
      im += real[p] * vi[c] + imag[p] * vr[c];
    }
    for (const end = start[r + 1]; p < end; p++) {
      const c = columns[p];
      re -= imag[p] * vi[c];
      im += imag[p] * vr[c];
    }
    outReal[r] = re;
    outImag[r] = im;
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
