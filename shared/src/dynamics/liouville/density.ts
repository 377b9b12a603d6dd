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
}
