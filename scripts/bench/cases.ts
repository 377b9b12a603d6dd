import { readdirSync, readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { parseExperiment, parseSystem, type Experiment, type SpinSystem } from '@heddle/shared';

const folder = fileURLToPath(new URL('../peers/cases/', import.meta.url));

export interface Pair {
  system: SpinSystem;
  experiment: Experiment;
}

export function casePath(name: string, document: 'system' | 'experiment'): string {
  return `${folder}${name}.${document}.json`;
}

export function listCases(): string[] {
  const files = readdirSync(folder).filter((file) => file.endsWith('.system.json'));
  return files.map((file) => file.slice(0, -'.system.json'.length)).sort();
}

export function loadCase(name: string): Pair {
  const read = (document: 'system' | 'experiment') =>
    JSON.parse(readFileSync(casePath(name, document), 'utf8')) as unknown;
  return { system: parseSystem(read('system')), experiment: parseExperiment(read('experiment')) };
}
