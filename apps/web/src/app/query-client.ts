import { QueryClient } from '@tanstack/react-query';
import { Problem } from '../api/problem';
import { keys } from '../api/queries';
import { onSignedOut } from '../api/session-fetch';

export function createQueryClient(): QueryClient {
  const queryClient = new QueryClient({
    defaultOptions: {
      queries: {
        staleTime: 15_000,
        // A refusal stays one; only a server or a network that stumbled is worth asking again.
        retry: (failures, error) => failures < 2 && !(error instanceof Problem && error.status < 500),
      },
    },
  });
  onSignedOut(() => forgetSession(queryClient));
  return queryClient;
}

/** Drops all that was read under the session; pages that need one lead to sign-in. */
export function forgetSession(queryClient: QueryClient): void {
  queryClient.setQueryData(keys.session, null);
  queryClient.removeQueries({ predicate: (query) => query.queryKey[0] !== keys.session[0] });
}
