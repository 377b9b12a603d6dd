import type { components } from './schema';

type Schemas = components['schemas'];

export type Session = Schemas['SessionDto'];
export type Membership = Session['memberships'][number];
export type Role = Membership['role'];
export type System = Schemas['SystemDto'];
export type Run = Schemas['RunDto'];
export type RunState = Run['state'];
export type Member = Schemas['MemberDto'];
export type Token = Schemas['TokenDto'];

/** One page of a list; `nextCursor` fetches the next one. */
export interface Page<T> {
  items: T[];
  nextCursor?: string | null;
}
