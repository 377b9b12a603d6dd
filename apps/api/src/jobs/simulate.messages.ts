import type { Experiment, Line, PartialSignal, Report, RunLimits, SpinSystem } from '@heddle/shared';
import type { MessagePort } from 'node:worker_threads';

/** What a worker thread gets: plain data, and a port to tell its progress through. */
export interface SimulateTask {
  system: SpinSystem;
  experiment: Experiment;
  limits: RunLimits;
  port: MessagePort;
  /** One part of an oriented run in place of the whole. */
  part?: { index: number; of: number };
}

/** What it gives back: a result, the signal of a part, or the engine's refusal with its code. */
export type SimulateReply =
  | { kind: 'done'; result: PlainResult }
  | { kind: 'part'; signal: PartialSignal }
  | { kind: 'refused'; code: string; message: string };

/** A Result as structured clone carries it. */
export interface PlainResult {
  spectrum: { firstPpm: number; lastPpm: number; real: Float64Array; imag: Float64Array };
  fid: { dwell: number; real: Float64Array; imag: Float64Array };
  lines?: Line[];
  report: Report;
}
