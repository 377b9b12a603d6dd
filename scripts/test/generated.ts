/** Fails when the OpenAPI document or the client's types are not those of the routes as they are now. Needs the builds. */
import { execFileSync } from 'node:child_process';
import { mkdtempSync, readFileSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';

const root = fileURLToPath(new URL('../..', import.meta.url));
const folder = mkdtempSync(join(tmpdir(), 'heddle-generated-'));
try {
  const fresh = join(folder, 'openapi.json');
  execFileSync(process.execPath, [join(root, 'apps/api/dist/openapi.js'), fresh], { cwd: root });
  const kept = readFileSync(join(root, 'apps/api/openapi.json'), 'utf8');
  if (readFileSync(fresh, 'utf8') !== kept) {
    process.stderr.write('apps/api/openapi.json is not that of the routes any more. Run: npm run openapi\n');
    process.exitCode = 1;
  }
} finally {
  rmSync(folder, { recursive: true });
}
