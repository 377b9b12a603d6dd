import type { ComplexArray } from '../run/solved.js';

const UNIT = 2 ** -52;

/**
 * Simon's recursion for the overlaps q_k^T q_j of Lanczos vectors that rounding lets grow (H. D. Simon, Math. Comput. 42 (1984)
 * 115), here in the bilinear form of complex symmetric matrices: it follows from the recursion of the vectors themselves, costs j
 * operations a step, and tells when the vectors must be made orthogonal again.
 */
export class OrthogonalityLoss {
  private before: ComplexArray;
  private now: ComplexArray;
  private next: ComplexArray;
  private readonly rounding: number;

  /** For vectors of `n` elements. */
  constructor(n: number) {
    const overlaps = (): ComplexArray => ({ real: new Float64Array(n + 1), imag: new Float64Array(n + 1) });
    [this.before, this.now, this.next] = [overlaps(), overlaps(), overlaps()];
    this.now.real[0] = 1;
    this.rounding = UNIT * Math.sqrt(n);
  }

  /**
   * The largest overlap, estimated, of vector j + 1 with vectors 0..j-1, where T so far has `diagonal` 0..j, `beside` 0..j-1 and
   * then `root`.
   */
  advance(j: number, diagonal: ComplexArray, beside: ComplexArray, [br, bi]: readonly [number, number]): number {
    const { before, now, next, rounding } = this;
    const [er, ei] = [beside.real, beside.imag];
    const square = br * br + bi * bi || Number.MIN_VALUE;
    const size = Math.sqrt(square);
    const norm = Math.hypot(diagonal.real[j], diagonal.imag[j]) + size;
    let largest = 0;
    for (let k = 0; k < j; k++) {
      const [dr, di] = [diagonal.real[k] - diagonal.real[j], diagonal.imag[k] - diagonal.imag[j]];
      let re = er[k] * now.real[k + 1] - ei[k] * now.imag[k + 1] + dr * now.real[k] - di * now.imag[k];
      let im = er[k] * now.imag[k + 1] + ei[k] * now.real[k + 1] + dr * now.imag[k] + di * now.real[k];
      if (k > 0) {
        re += er[k - 1] * now.real[k - 1] - ei[k - 1] * now.imag[k - 1];
        im += er[k - 1] * now.imag[k - 1] + ei[k - 1] * now.real[k - 1];
      }
      re -= er[j - 1] * before.real[k] - ei[j - 1] * before.imag[k];
      im -= er[j - 1] * before.imag[k] + ei[j - 1] * before.real[k];
      next.real[k] = (re * br + im * bi) / square + (rounding * norm) / size;
      next.imag[k] = (im * br - re * bi) / square;
      largest = Math.max(largest, Math.abs(next.real[k]), Math.abs(next.imag[k]));
    }
    next.real[j] = (rounding * norm) / size;
    next.imag[j] = 0;
    next.real[j + 1] = 1;
    next.imag[j + 1] = 0;
    [this.before, this.now, this.next] = [now, next, before];
    return Math.max(largest, next.real[j]);
  }

  /** Vector j, the newest, has been made orthogonal to all before it. */
  restored(j: number): void {
    this.now.real.fill(this.rounding, 0, j);
    this.now.imag.fill(0, 0, j);
  }
}
