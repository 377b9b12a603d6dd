import type { Experiment } from '../../documents/experiment.schema.js';
import type { ComplexArray } from '../../run/solved.js';
import type { DecayClasses } from './decay-classes.js';
import { TrianglePattern } from './triangle-pattern.js';

/**
 * Collects a signal and that of a smaller set of orientations, by channels: one for each class of line widths, or a real and
 * an imaginary one for each.
 */
export class SignalSum {
  readonly fine: readonly TrianglePattern[];
  readonly coarse: readonly TrianglePattern[];
  private readonly acquisition: Experiment['acquisition'];

  constructor(
    experiment: Experiment,
    private readonly classes: DecayClasses,
    private readonly complex: boolean,
  ) {
    this.acquisition = experiment.acquisition;
    const { points, width } = this.acquisition;
    const patterns = () => Array.from({ length: this.channels }, () => new TrianglePattern(points, width));
    this.fine = patterns();
    this.coarse = patterns();
  }

  get channels(): number {
    return this.classes.lineWidths.length * (this.complex ? 2 : 1);
  }

  /** The FID of `patterns` with the decay of each class. */
  fidOf(patterns: readonly TrianglePattern[]): ComplexArray {
    const { points, width } = this.acquisition;
    const parts = [0, 1].map(() => ({ real: new Float64Array(points), imag: new Float64Array(points) }));
    patterns.forEach((pattern, channel) => {
      const lineWidth = this.classes.lineWidths[this.complex ? channel >> 1 : channel];
      const part = parts[this.complex ? channel & 1 : 0];
      pattern.addTo(part, (k) => Math.exp((-Math.PI * lineWidth * k) / width));
    });
    const [fid, quarterTurned] = parts;
    if (!this.complex) return fid;
    for (let k = 0; k < points; k++) {
      fid.real[k] -= quarterTurned.imag[k];
      fid.imag[k] += quarterTurned.real[k];
    }
    return fid;
  }

  /** Intensity whose frequency lies outside the spectral width. */
  get folded(): number {
    return this.fine.reduce((sum, pattern) => sum + pattern.folded, 0);
  }
}
