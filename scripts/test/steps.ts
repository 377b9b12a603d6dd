/** What `npm test` runs, in this order. */
export interface Step {
  name: string;
  /** What is checked, for the list and the summary. */
  title: string;
  /** Program and arguments; the program is a file run by this Node, or a name of the path. */
  command: readonly string[];
  folder?: string;
  env?: Record<string, string | undefined>;
  /** The step writes its counts of test cases here, in the form that jest and vitest share; else it counts as one. */
  counts?: string;
}

const bin = (path: string) => `node_modules/${path}`;
const tsc = (project: string) => [bin('typescript/bin/tsc'), '-p', project];

function vitest(name: string, title: string, folder: string, extra: Partial<Step> = {}): Step {
  const counts = `${name}.json`;
  const reporters = ['--reporter=dot', '--reporter=json', `--outputFile.json=${countsFile(counts)}`];
  return { name, title, folder, counts, command: [bin('vitest/vitest.mjs'), 'run', ...reporters], ...extra };
}

/** Where a step leaves its counts. */
export function countsFile(name: string): string {
  return new URL(`../../.data/test/counts/${name}`, import.meta.url).pathname;
}

export const STEPS: readonly Step[] = [
  {
    name: 'format',
    title: 'formatting',
    command: [bin('prettier/bin/prettier.cjs'), '--check', '.', '--log-level=warn'],
  },
  { name: 'lint', title: 'lint and import walls', command: [bin('eslint/bin/eslint.js'), '.'] },
  { name: 'types-shared', title: 'types of shared', command: tsc('shared') },
  { name: 'types-api', title: 'types of apps/api', command: tsc('apps/api') },
  { name: 'types-web', title: 'types of apps/web', command: tsc('apps/web') },
  { name: 'types-scripts', title: 'types of scripts', command: tsc('scripts') },
  { name: 'dead-code', title: 'dead code and unused packages', command: [bin('knip/bin/knip.js')] },
  { name: 'duplicates', title: 'duplicated code', command: [bin('jscpd/bin/jscpd'), '--config', '.jscpd.json'] },
  vitest('shared', 'tests of shared', 'shared'),
  vitest('scripts', 'tests of the headless command', 'scripts'),
  vitest('web', 'tests of apps/web', 'apps/web'),
  {
    name: 'api',
    title: 'tests of apps/api',
    folder: 'apps/api',
    command: [bin('jest/bin/jest.js'), '--json', `--outputFile=${countsFile('api.json')}`],
    env: { DATABASE_URL: process.env['API_DATABASE_URL'] },
    counts: 'api.json',
  },
  { name: 'build', title: 'build of all three workspaces', command: ['sh', 'scripts/build.sh'] },
  {
    name: 'generated',
    title: 'OpenAPI document is up to date',
    command: [bin('tsx/dist/cli.mjs'), 'scripts/test/generated.ts'],
  },
  vitest('e2e', 'the main job in a browser', 'scripts/e2e', { env: { DATABASE_URL: process.env['E2E_DATABASE_URL'] } }),
];
