import { useQuery } from '@tanstack/react-query';
import { Container } from '@mantine/core';
import { Navigate, Outlet, useLocation } from 'react-router-dom';
import { sessionQuery } from '../api/queries';
import { Refusal } from '../components/Refusal';
import { ShellSkeleton } from './ShellSkeleton';

/** Lets nobody pass who is not signed in; sign-in leads back here. */
export function RequireSession() {
  const { data, error, refetch } = useQuery(sessionQuery);
  const location = useLocation();
  if (data) return <Outlet />;
  if (error) {
    return (
      <Container py="xl">
        <Refusal error={error} retry={() => void refetch()} />
      </Container>
    );
  }
  if (data === undefined) return <ShellSkeleton />;
  const here = location.pathname + location.search;
  return <Navigate to={here === '/' ? '/sign-in' : `/sign-in?next=${encodeURIComponent(here)}`} replace />;
}
