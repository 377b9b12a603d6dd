import type { z } from 'zod';
import { checkExperiment } from './experiment.rules.js';
import { experimentSchema, type Experiment } from './experiment.schema.js';
import { DocumentRefused, formatPath, type DocumentError } from './errors.js';
import { checkPair } from './pair.rules.js';
import { checkSystem } from './system.rules.js';
import { spinSystemSchema, type SpinSystem } from './system.schema.js';

export type ParseResult<T> = { ok: true; value: T } | { ok: false; errors: DocumentError[] };

type Issue = z.core.$ZodIssue;

/** Checks shape, ranges and the rules within the document, and fills in the defaults. */
export function readSystem(document: unknown): ParseResult<SpinSystem> {
  return read(document, spinSystemSchema, checkSystem);
}

export function readExperiment(document: unknown): ParseResult<Experiment> {
  return read(document, experimentSchema, checkExperiment);
}

/** `readSystem` that throws DocumentRefused. */
export function parseSystem(document: unknown): SpinSystem {
  const result = readSystem(document);
  if (!result.ok) throw new DocumentRefused('system', result.errors);
  return result.value;
}

/** `readExperiment` that throws DocumentRefused. */
export function parseExperiment(document: unknown): Experiment {
  const result = readExperiment(document);
  if (!result.ok) throw new DocumentRefused('experiment', result.errors);
  return result.value;
}

/** Throws DocumentRefused when the two documents, each sound, do not fit together. */
export function requirePair(system: SpinSystem, experiment: Experiment): void {
  const { system: inSystem, experiment: inExperiment } = checkPair(system, experiment);
  if (inSystem.length > 0) throw new DocumentRefused('system', inSystem);
  if (inExperiment.length > 0) throw new DocumentRefused('experiment', inExperiment);
}

function read<T>(document: unknown, schema: z.ZodType<T>, rules: (value: T) => DocumentError[]): ParseResult<T> {
  const parsed = schema.safeParse(document);
  if (!parsed.success) return { ok: false, errors: parsed.error.issues.flatMap((issue) => describe(issue, [])) };
  const errors = rules(parsed.data);
  return errors.length > 0 ? { ok: false, errors } : { ok: true, value: parsed.data };
}

function describe(issue: Issue, prefix: readonly PropertyKey[]): DocumentError[] {
  const path = [...prefix, ...issue.path];
  if (issue.code === 'unrecognized_keys') {
    return issue.keys.map((key) => ({ path: formatPath([...path, key]), message: 'unknown field' }));
  }
  if (issue.code === 'invalid_union' && issue.errors.length > 0) {
    return closestBranch(issue.errors).flatMap((inner) => describe(inner, path));
  }
  return [{ path: formatPath(path), message: issue.message }];
}

/** Of the alternatives of a union, the one the writer most likely meant: its errors lie deepest, then are fewest. */
function closestBranch(branches: readonly (readonly Issue[])[]): readonly Issue[] {
  const depth = (issues: readonly Issue[]) => Math.min(...issues.map((issue) => issue.path.length));
  const foreign = (issues: readonly Issue[]) => issues.filter((issue) => issue.code === 'unrecognized_keys').length;
  return [...branches].sort((a, b) => foreign(a) - foreign(b) || depth(b) - depth(a) || a.length - b.length)[0];
}
