import { may, mayEver, POLICY, ROLES, type Action, type Role } from '../src/policy/policy.js';
import { startHarness, type Browser, type Harness } from './harness.js';

/** The table once more, in the words of the product's roles: what each may do, * where only on their own. */
const EXPECTED: Record<Action, string> = {
  'lab.read': 'chemist instructor leader admin',
  'lab.edit': 'admin',
  'member.list': 'chemist instructor leader admin',
  'member.edit': 'admin',
  'invitation.list': 'admin',
  'invitation.edit': 'admin',
  'system.list': 'chemist instructor leader admin',
  'system.create': 'chemist instructor leader admin',
  'system.read-private': 'chemist* instructor* leader* admin*',
  'system.edit': 'chemist* instructor* leader admin*',
  'system.give': 'chemist* instructor* leader admin',
  'system.delete': 'chemist* instructor* leader admin*',
  'run.list': 'chemist instructor leader admin',
  'run.create': 'chemist instructor leader admin',
  'run.steer': 'chemist* instructor* leader admin',
  'worker.list': 'leader admin',
};

describe.each(Object.keys(POLICY) as Action[])('%s', (action) => {
  it.each(ROLES)('for a %s', (role) => {
    const words = EXPECTED[action].split(' ');
    expect(may(role, action, false)).toBe(words.includes(role));
    expect(may(role, action, true)).toBe(words.includes(role) || words.includes(`${role}*`));
  });
});

describe('through HTTP, on every route of a lab', () => {
  let harness: Harness;
  let routes: { method: string; path: string; action: Action }[];
  const browsers = {} as Record<Role, Browser>;
  beforeAll(async () => {
    harness = await startHarness();
    for (const role of ROLES) browsers[role] = await harness.member(role, role);
    const { paths } = (await browsers.admin.get('/docs-json')).body as {
      paths: Record<string, Record<string, { 'x-action'?: Action }>>;
    };
    routes = Object.entries(paths)
      .filter(([path]) => path.includes('{labId}') && !path.endsWith('/events'))
      .flatMap(([path, methods]) =>
        Object.entries(methods).map(([method, operation]) => ({ method, path, action: operation['x-action']! })),
      );
  });
  afterAll(() => harness.close());

  it('names the action of each', () => {
    expect(routes.filter(({ action }) => !(action in POLICY))).toEqual([]);
    expect(routes.length).toBeGreaterThan(30);
  });

  it.each(ROLES)('a %s gets in exactly where the table says', async (role) => {
    const nothing = '00000000-0000-4000-8000-000000000000';
    const wrong: string[] = [];
    for (const { method, path, action } of routes) {
      const filled = path
        .replace('/api', '')
        .replace('{labId}', harness.labId)
        .replace(/\{(id|memberId)\}/, nothing)
        .replace('{number}', '1');
      const browser = browsers[role];
      const call =
        method === 'get'
          ? browser.get(filled)
          : method === 'delete'
            ? browser.delete(filled)
            : method === 'patch'
              ? browser.patch(filled, {})
              : browser.post(filled, {});
      const { status } = await call;
      if ((status === 403) === mayEver(role, action)) wrong.push(`${method} ${path}: ${status}`);
    }
    expect(wrong).toEqual([]);
  });
});
