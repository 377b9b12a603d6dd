/**
 * Compiles the WebAssembly kernels of the eigen-solver into the TypeScript module that carries them.
 * Only needed after a change of shared/assembly/kernels.ts; a test fails while the module is out of date.
 *   node --import tsx scripts/build-kernels.ts
 */
import { writeFile } from 'node:fs/promises';
import { compileKernels, TARGET } from '../shared/assembly/compile.js';

await writeFile(TARGET, await compileKernels());
console.log(`Wrote ${TARGET.pathname}`);
