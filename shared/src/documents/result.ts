import type { Experiment } from './experiment.schema.js';
import type { SpinSystem } from './system.schema.js';

/** Evenly spaced complex spectrum, highest ppm first; `real` is absorption in nuclei per Hz. */
export interface Spectrum {
  firstPpm: number;
  lastPpm: number;
  real: Float64Array;
  imag: Float64Array;
}

/** The raw signal before processing; `dwell` in s. */
export interface Fid {
  dwell: number;
  real: Float64Array;
  imag: Float64Array;
}

/** One line of a closed pulse-acquire solution; `hz` counts from delta = 0, `intensity` in nuclei. */
export interface Line {
  ppm: number;
  hz: number;
  intensity: number;
  nuclei: string[];
}

/**
 * One approximation that a run made or could have made. `hz` is the size of what is left out, in Hz;
 * `warnAbove` the size from which on the picture is not to be trusted; `computed` says how the size was found.
 */
export interface Approximation {
  id: string;
  title: string;
  made: boolean;
  hz: number;
  computed: 'exact-difference' | 'estimate';
  warnAbove: number;
  detail: string;
}

export interface Report {
  method: string;
  seconds: number;
  /** Counts: matrix dimensions, blocks, transitions, matrix-vector products, orientations ... */
  dimensions: Record<string, number>;
  approximations: Approximation[];
  warnings: string[];
  engine: string;
}

/** heddle.result/1 with its arrays as typed arrays. `toResultDocument` makes the plain JSON. */
export interface Result {
  format: 'heddle.result/1';
  system: SpinSystem;
  experiment: Experiment;
  spectrum: Spectrum;
  fid: Fid;
  lines?: Line[];
  report: Report;
}

/** The result as plain JSON. */
export function toResultDocument(result: Result): object {
  return {
    ...result,
    spectrum: { ...result.spectrum, real: Array.from(result.spectrum.real), imag: Array.from(result.spectrum.imag) },
    fid: { ...result.fid, real: Array.from(result.fid.real), imag: Array.from(result.fid.imag) },
  };
}
