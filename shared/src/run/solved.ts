import type { Approximation, Line } from '../documents/result.js';

/** Real and imaginary parts, apart, of one length. */
export interface ComplexArray {
  readonly real: Float64Array;
  readonly imag: Float64Array;
}

/** What every solver yields: the raw FID, k = 0..points-1 at k/width, and an account of how it was reached. */
export interface Solved {
  fid: ComplexArray;
  lines?: Line[];
  method: string;
  dimensions: Record<string, number>;
  approximations: Approximation[];
  warnings: string[];
}
