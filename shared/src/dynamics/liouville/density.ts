import type { ComplexArray } from '../../run/solved.js';
import type { CoherenceBlock } from './spin-space.js';

/** Elements below this beside the largest possible one count as empty. */
const EMPTY = 1e-15;

/** Density operators of all exchange states, dim x dim each, row-major, one after the other. */
export class Density {
  readonly real: Float64Array;
  readonly imag: Float64Array;

  constructor(
    readonly states: number,
    readonly dimension: number,
  ) {
    this.real = new Float64Array(states * dimension * dimension);
    this.imag = new Float64Array(states * dimension * dimension);
  }

  /** Place of |ket><bra| in state s. */
  at(s: number, ket: number, bra: number): number {
    return (s * this.dimension + ket) * this.dimension + bra;
  }

  /** Zeros all elements but those that `kept` names. */
  keep(kept: (ket: number, bra: number) => boolean): void {
    for (let ket = 0; ket < this.dimension; ket++) {
      for (let bra = 0; bra < this.dimension; bra++) {
        if (kept(ket, bra)) continue;
        for (let s = 0; s < this.states; s++) {
          const at = this.at(s, ket, bra);
          this.real[at] = this.imag[at] = 0;
        }
      }
    }
  }

  /** The elements of a block, state after state; null where there is nothing. */
  gather({ kets, bras }: CoherenceBlock): ComplexArray | null {
    const count = kets.length;
    const v = { real: new Float64Array(this.states * count), imag: new Float64Array(this.states * count) };
    let largest = 0;
    for (let s = 0; s < this.states; s++) {
      for (let i = 0; i < count; i++) {
        const at = this.at(s, kets[i], bras[i]);
        const [re, im] = [this.real[at], this.imag[at]];
        v.real[s * count + i] = re;
        v.imag[s * count + i] = im;
        largest = Math.max(largest, Math.abs(re), Math.abs(im));
      }
    }
    return largest > EMPTY ? v : null;
  }

  /** Puts back what `gather` gave. */
  scatter({ kets, bras }: CoherenceBlock, v: ComplexArray): void {
    const count = kets.length;
    for (let s = 0; s < this.states; s++) {
      for (let i = 0; i < count; i++) {
        const at = this.at(s, kets[i], bras[i]);
        this.real[at] = v.real[s * count + i];
        this.imag[at] = v.imag[s * count + i];
      }
    }
  }

  /** Puts the adjoint of what `scatter` puts into a block into the block with kets and bras exchanged. */
  scatterAdjoint({ kets, bras }: CoherenceBlock, v: ComplexArray): void {
    const count = kets.length;
    for (let s = 0; s < this.states; s++) {
      for (let i = 0; i < count; i++) {
        const at = this.at(s, bras[i], kets[i]);
        this.real[at] = v.real[s * count + i];
        this.imag[at] = -v.imag[s * count + i];
      }
    }
  }
}
