import { readFile } from 'node:fs/promises';
import asc from 'assemblyscript/asc';

/** The kernels' source, and the TypeScript module that carries them compiled. */
export const SOURCE = new URL('kernels.ts', import.meta.url);
export const TARGET = new URL('../src/algebra/kernels/kernels.wasm.ts', import.meta.url);

/** Compiles kernels.ts and returns the text of the module to be written to TARGET. Throws on a compiler's complaint. */
export async function compileKernels(): Promise<string> {
  const source = await readFile(SOURCE, 'utf8');
  const files = new Map<string, Uint8Array | string>();
  const options = ['-O3', '--noAssert', '--enable', 'simd', '--runtime', 'stub', '--initialMemory', '1'];
  const { error, stderr } = await asc.main(['kernels.ts', '--outFile', 'kernels.wasm', ...options], {
    readFile: (name) => (name === 'kernels.ts' ? source : null),
    writeFile: (name, contents) => void files.set(name, contents),
    listFiles: () => [],
  });
  const wasm = files.get('kernels.wasm');
  if (error || !(wasm instanceof Uint8Array)) throw new Error(`The kernels do not compile.\n${stderr.toString()}`);
  const lines =
    Buffer.from(wasm)
      .toString('base64')
      .match(/.{1,112}/g) ?? [];
  return [
    '// Compiled from shared/assembly/kernels.ts by scripts/build-kernels.ts; do not edit.',
    'export const KERNELS_BASE64 =',
    ...lines.map((line, i) => `  '${line}'${i === lines.length - 1 ? ';' : ' +'}`),
    '',
  ].join('\n');
}
