import type { Experiment, Report, Line, RunLimits, SpinSystem } from '@heddle/shared';
import type { MessagePort } from 'node:worker_threads';

/** What a worker thread gets: plain data, and a port to tell its progress through. */
export interface SimulateTask {
  system: SpinSystem;
  experiment: Experiment;
  limits: RunLimits;
  port: MessagePort;
}

/** What it gives back: a result, or the engine's refusal with its code. */
export type SimulateReply = { kind: 'done'; result: PlainResult } | { kind: 'refused'; code: string; message: string };

/** A Result as structured clone carries it. */
export interface PlainResult {
  spectrum: { firstPpm: number; lastPpm: number; real: Float64Array; imag: Float64Array };
  fid: { dwell: number; real: Float64Array; imag: Float64Array };
  lines?: Line[];
  report: Report;
}
