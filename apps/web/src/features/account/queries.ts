import { queryOptions } from '@tanstack/react-query';
import { client, unwrap } from '../../api/client';
import { keys } from '../../api/queries';

export const accountKeys = {
  tokens: [...keys.account, 'tokens'] as const,
  sessions: [...keys.account, 'sessions'] as const,
};

export const tokensQuery = queryOptions({
  queryKey: accountKeys.tokens,
  queryFn: () => unwrap(client.GET('/api/account/tokens')),
});

export const sessionsQuery = queryOptions({
  queryKey: accountKeys.sessions,
  queryFn: () => unwrap(client.GET('/api/account/sessions')),
});
