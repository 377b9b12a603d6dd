/** Roles in a lab. */
export const ROLES = ['chemist', 'instructor', 'leader', 'admin'] as const;
export type Role = (typeof ROLES)[number];

/** Who may act: everybody with the role, or only on what is their own. */
type Scope = 'any' | 'own';

/**
 * The only place where rights are decided: what each role may do in its lab. What is missing is refused.
 * `own` means things that the person owns; reading a thing that is shared with the lab counts as `system.read` of `any`.
 */
export const POLICY = {
  'lab.read': { chemist: 'any', instructor: 'any', leader: 'any', admin: 'any' },
  'lab.edit': { admin: 'any' },
  'member.list': { chemist: 'any', instructor: 'any', leader: 'any', admin: 'any' },
  'member.edit': { admin: 'any' },
  'invitation.list': { admin: 'any' },
  'invitation.edit': { admin: 'any' },
  'system.list': { chemist: 'any', instructor: 'any', leader: 'any', admin: 'any' },
  'system.create': { chemist: 'any', instructor: 'any', leader: 'any', admin: 'any' },
  'system.read-private': { chemist: 'own', instructor: 'own', leader: 'own', admin: 'own' },
  'system.edit': { chemist: 'own', instructor: 'own', leader: 'any', admin: 'own' },
  'system.give': { chemist: 'own', instructor: 'own', leader: 'any', admin: 'any' },
  'system.delete': { chemist: 'own', instructor: 'own', leader: 'any', admin: 'own' },
  'run.list': { chemist: 'any', instructor: 'any', leader: 'any', admin: 'any' },
  'run.create': { chemist: 'any', instructor: 'any', leader: 'any', admin: 'any' },
  'run.steer': { chemist: 'own', instructor: 'own', leader: 'any', admin: 'any' },
  'worker.list': { leader: 'any', admin: 'any' },
} as const satisfies Record<string, Partial<Record<Role, Scope>>>;

export type Action = keyof typeof POLICY;

/** Whether a member with `role` may do `action`, on a thing that is their own or not. */
export function may(role: Role, action: Action, own = false): boolean {
  const scope = (POLICY[action] as Partial<Record<Role, Scope>>)[role];
  return scope === 'any' || (scope === 'own' && own);
}

/** Whether `role` may do `action` on anything at all; ownership is asked when the thing is known. */
export function mayEver(role: Role, action: Action): boolean {
  return may(role, action, true);
}
