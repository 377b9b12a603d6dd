import { readFileSync } from 'node:fs';
import { totalmem } from 'node:os';
import { DocumentRefused, readExperiment, readSystem, requirePair, simulate, type Result } from '@heddle/shared';
import { PairRefused } from './failures.js';

/** Share of the machine's memory that a run may plan to use; the rest is for the result, the runtime and others. */
const MEMORY_SHARE = 0.75;

/** Reads and checks both documents, then simulates. `workers` runs share the memory. */
export function runPair(
  systemFile: string,
  experimentFile: string,
  tick: (fraction: number) => void,
  workers = 1,
): Result {
  const system = readSystem(readJson(systemFile, 'system'));
  const experiment = readExperiment(readJson(experimentFile, 'experiment'));
  if (!system.ok || !experiment.ok) {
    const refused: DocumentRefused[] = [];
    if (!system.ok) refused.push(new DocumentRefused('system', system.errors));
    if (!experiment.ok) refused.push(new DocumentRefused('experiment', experiment.errors));
    throw new PairRefused(refused);
  }
  requirePair(system.value, experiment.value);
  const limits = { bytes: (MEMORY_SHARE * totalmem()) / workers, seconds: Infinity };
  return simulate(system.value, experiment.value, { tick, limits });
}

function readJson(file: string, document: 'system' | 'experiment'): unknown {
  const text = readFileSync(file, 'utf8').replace(/^\uFEFF/, '');
  try {
    return JSON.parse(text) as unknown;
  } catch (error) {
    throw new DocumentRefused(document, [{ path: '', message: `${file} is not JSON: ${(error as Error).message}` }]);
  }
}
