import { useQueryClient } from '@tanstack/react-query';
import { useNavigate } from 'react-router-dom';
import { client, unwrap } from '../api/client';
import { notifyFailure } from '../lib/forms';
import { forgetSession } from './query-client';

/** Ends the session on the server, then here. */
export function useSignOut(): () => void {
  const queryClient = useQueryClient();
  const navigate = useNavigate();
  return () => {
    unwrap(client.POST('/api/auth/sign-out'))
      .then(async () => {
        await navigate('/sign-in');
        forgetSession(queryClient);
      })
      .catch((error: unknown) => notifyFailure('You are still signed in', error));
  };
}
