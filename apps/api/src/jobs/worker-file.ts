import { existsSync } from 'node:fs';
import { join } from 'node:path';
import { pathToFileURL } from 'node:url';

/** The worker's file and how to run it: compiled beside the server, or from source where tests run. */
export function workerFile(): { filename: string; execArgv?: string[] } {
  const compiled = join(folder(), 'simulate.worker.js');
  if (existsSync(compiled)) return { filename: pathToFileURL(compiled).href };
  return {
    filename: pathToFileURL(join(folder(), 'simulate.worker.ts')).href,
    execArgv: ['--import', 'tsx', '--conditions=heddle-src'],
  };
}

/** The folder of this file: `import.meta` does not exist where jest turns modules into CommonJS, so the stack is asked. */
function folder(): string {
  const line = new Error().stack?.split('\n').find((entry) => entry.includes('worker-file.'));
  const path = line?.match(/((?:file:\/\/)?\/[^():]+)\/worker-file\./)?.[1];
  if (!path) throw new Error('The folder of the workers was not found');
  return path.replace('file://', '');
}
