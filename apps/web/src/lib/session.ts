import { useQuery, useSuspenseQuery } from '@tanstack/react-query';
import { useParams } from 'react-router-dom';
import { sessionQuery } from '../api/queries';
import type { Membership, Session } from '../api/types';

/** The session of whoever is signed in. Only below `RequireSession`. */
export function useSession(): Session {
  const { data } = useSuspenseQuery(sessionQuery);
  if (!data) throw new Error('useSession is for pages that need a session');
  return data;
}

/** The laboratory in the address, with the role one has in it. Only below the `/labs/:labId` route. */
export function useLab(): Membership {
  const { labId } = useParams();
  const lab = useSession().memberships.find((membership) => membership.labId === labId);
  if (!lab) throw new Error('useLab is for pages of a laboratory one is a member of');
  return lab;
}

const LAST_LAB = 'heddle.lastLab';

export function rememberLab(labId: string): void {
  localStorage.setItem(LAST_LAB, labId);
}

/** The laboratory to open when the address names none: the last one visited, else the first. */
export function homeLab(session: Session): Membership | undefined {
  const last = localStorage.getItem(LAST_LAB);
  return session.memberships.find((lab) => lab.labId === last) ?? session.memberships[0];
}

/** The session where nobody may be signed in: undefined while it is asked for, null when signed out. */
export function useMaybeSession(): Session | null | undefined {
  return useQuery(sessionQuery).data;
}
