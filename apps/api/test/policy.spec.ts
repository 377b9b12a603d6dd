import { may, POLICY, ROLES, type Action } from '../src/policy/policy.js';

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
