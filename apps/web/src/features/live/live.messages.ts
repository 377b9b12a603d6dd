import type { Experiment, Fid, Line, Report, Spectrum, SpinSystem } from '@heddle/shared';

/** What the page asks of the worker. */
export type LiveRequest =
  | { kind: 'simulate'; system: SpinSystem; experiment: Experiment }
  | { kind: 'process'; fid: Fid; experiment: Experiment };

/** What the worker answers. */
export type LiveReply =
  | { kind: 'simulated'; spectrum: Spectrum; fid: Fid; lines: Line[]; report: Report; milliseconds: number }
  | { kind: 'processed'; spectrum: Spectrum; milliseconds: number }
  | { kind: 'refused'; code: string; message: string };
