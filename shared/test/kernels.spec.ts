import { readFile } from 'node:fs/promises';
import { expect, it } from 'vitest';
import { compileKernels, TARGET } from '../assembly/compile.js';

it('carries the kernels as they compile from their source now', async () => {
  expect(await compileKernels()).toBe(await readFile(TARGET, 'utf8'));
});
