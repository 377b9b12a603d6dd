import { infiniteQueryOptions, queryOptions } from '@tanstack/react-query';
import { client, unwrap } from './client';
import { Problem } from './problem';
import type { RunState, Session } from './types';

/**
 * What the client reads, with the key under which it is kept. Everything of a laboratory starts with `['labs', labId]`,
 * so that one call forgets all of it.
 */
export const keys = {
  session: ['session'] as const,
  account: ['account'] as const,
  lab: (labId: string) => ['labs', labId] as const,
  systems: (labId: string) => ['labs', labId, 'systems'] as const,
  system: (labId: string, id: string) => ['labs', labId, 'system', id] as const,
  runs: (labId: string) => ['labs', labId, 'runs'] as const,
  run: (labId: string, id: string) => ['labs', labId, 'run', id] as const,
  today: (labId: string) => ['labs', labId, 'today'] as const,
  members: (labId: string) => ['labs', labId, 'members'] as const,
  invitations: (labId: string) => ['labs', labId, 'invitations'] as const,
  workers: (labId: string) => ['labs', labId, 'workers'] as const,
};

/** Null when nobody is signed in. */
export const sessionQuery = queryOptions({
  queryKey: keys.session,
  queryFn: async (): Promise<Session | null> => {
    try {
      return await unwrap(client.GET('/api/auth/session'));
    } catch (error) {
      if (error instanceof Problem && error.status === 401) return null;
      throw error;
    }
  },
  staleTime: 5 * 60_000,
});

export interface SystemFilters {
  q?: string;
  nuclide?: string;
  owner?: string;
  shared?: boolean;
  archived?: boolean;
  sort?: SystemSort;
}
export type SystemSort = 'name' | '-name' | 'updated' | '-updated' | 'created' | '-created';

export const systemsQuery = (labId: string, filters: SystemFilters) =>
  infiniteQueryOptions({
    queryKey: [...keys.systems(labId), filters],
    queryFn: ({ pageParam }) =>
      unwrap(
        client.GET('/api/labs/{labId}/systems', {
          params: { path: { labId }, query: { ...filters, ...(pageParam ? { cursor: pageParam } : {}) } },
        }),
      ),
    initialPageParam: '',
    getNextPageParam: (page) => page.nextCursor,
  });

export const systemQuery = (labId: string, id: string) =>
  queryOptions({
    queryKey: keys.system(labId, id),
    queryFn: () => unwrap(client.GET('/api/labs/{labId}/systems/{id}', { params: { path: { labId, id } } })),
  });

export interface RunFilters {
  state?: RunState;
  system?: string;
  owner?: string;
}

export const runsQuery = (labId: string, filters: RunFilters) =>
  infiniteQueryOptions({
    queryKey: [...keys.runs(labId), filters],
    queryFn: ({ pageParam }) =>
      unwrap(
        client.GET('/api/labs/{labId}/runs', {
          params: { path: { labId }, query: { ...filters, ...(pageParam ? { cursor: pageParam } : {}) } },
        }),
      ),
    initialPageParam: '',
    getNextPageParam: (page) => page.nextCursor,
  });

export const runQuery = (labId: string, id: string) =>
  queryOptions({
    queryKey: keys.run(labId, id),
    queryFn: () => unwrap(client.GET('/api/labs/{labId}/runs/{id}', { params: { path: { labId, id } } })),
  });

export const todayQuery = (labId: string) =>
  queryOptions({
    queryKey: keys.today(labId),
    queryFn: () => unwrap(client.GET('/api/labs/{labId}/today', { params: { path: { labId } } })),
  });

export const membersQuery = (labId: string) =>
  queryOptions({
    queryKey: keys.members(labId),
    queryFn: () => unwrap(client.GET('/api/labs/{labId}/members', { params: { path: { labId } } })),
  });

export const invitationsQuery = (labId: string) =>
  queryOptions({
    queryKey: keys.invitations(labId),
    queryFn: () => unwrap(client.GET('/api/labs/{labId}/invitations', { params: { path: { labId } } })),
  });

export const workersQuery = (labId: string) =>
  queryOptions({
    queryKey: keys.workers(labId),
    queryFn: () => unwrap(client.GET('/api/labs/{labId}/workers', { params: { path: { labId } } })),
    refetchInterval: 5_000,
  });

export const revisionQuery = (labId: string, id: string, number: number) =>
  queryOptions({
    queryKey: [...keys.system(labId, id), 'revision', number],
    queryFn: () =>
      unwrap(
        client.GET('/api/labs/{labId}/systems/{id}/revisions/{number}', { params: { path: { labId, id, number } } }),
      ),
    staleTime: Infinity,
  });

export const revisionsQuery = (labId: string, id: string) =>
  queryOptions({
    queryKey: [...keys.system(labId, id), 'revisions'],
    queryFn: () =>
      unwrap(
        client.GET('/api/labs/{labId}/systems/{id}/revisions', {
          params: { path: { labId, id }, query: { limit: 100 } },
        }),
      ),
  });

export const seriesListQuery = (labId: string) =>
  queryOptions({
    queryKey: [...keys.lab(labId), 'series'],
    queryFn: () =>
      unwrap(client.GET('/api/labs/{labId}/series', { params: { path: { labId }, query: { limit: 100 } } })),
  });

export const seriesQuery = (labId: string, id: string) =>
  queryOptions({
    queryKey: [...keys.lab(labId), 'series', id],
    queryFn: () => unwrap(client.GET('/api/labs/{labId}/series/{id}', { params: { path: { labId, id } } })),
    // Its runs move on by themselves; the event stream tells of single runs only.
    refetchInterval: ({ state }) =>
      state.data?.runs.some((run) => run.state === 'queued' || run.state === 'running') ? 1500 : false,
  });
