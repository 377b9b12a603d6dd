import type { Experiment } from '../documents/experiment.schema.js';
import { requirePair } from '../documents/parse.js';
import type { Result } from '../documents/result.js';
import type { SpinSystem } from '../documents/system.schema.js';
import { solveBlocks } from '../dynamics/blocks/solve-blocks.js';
import { solveLiouville } from '../dynamics/liouville/solve-liouville.js';
import { solveOriented } from '../dynamics/oriented/solve-oriented.js';
import { whatIsLeftOut } from '../report/left-out.js';
import { fidToSpectrum } from '../spectrum/transform.js';
import { SILENT, type RunContext } from '../run/context.js';
import { methodFor, type Method } from './method.js';
import type { Solved } from '../run/solved.js';
import { ENGINE_VERSION } from './version.js';

type Solver = (system: SpinSystem, experiment: Experiment, context: RunContext) => Solved;

const SOLVERS: Record<Method, Solver> = { blocks: solveBlocks, liouville: solveLiouville, orientations: solveOriented };

/**
 * Simulates one experiment on one spin system: the signal by the cheapest exact method, its spectrum and the report.
 * Throws DocumentRefused when the two documents do not fit together, EngineError when they can't be computed.
 */
export function simulate(system: SpinSystem, experiment: Experiment, context: RunContext = SILENT): Result {
  requirePair(system, experiment);
  const started = Date.now();
  const solve = SOLVERS[methodFor(system, experiment)];
  const solved = solve(system, experiment, context);
  return toResult(system, experiment, solved, (Date.now() - started) / 1000);
}

/** The result document of a solved signal. */
export function toResult(system: SpinSystem, experiment: Experiment, solved: Solved, seconds: number): Result {
  const { fid, lines, method, dimensions, approximations, warnings } = solved;
  return {
    format: 'heddle.result/1',
    system,
    experiment,
    spectrum: fidToSpectrum(fid, experiment),
    fid: { dwell: 1 / experiment.acquisition.width, real: fid.real, imag: fid.imag },
    ...(lines && { lines }),
    report: {
      method,
      seconds,
      dimensions,
      approximations: [...whatIsLeftOut(system, experiment), ...approximations],
      warnings,
      engine: ENGINE_VERSION,
    },
  };
}
