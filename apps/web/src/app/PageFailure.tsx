import { Button, Container, Group } from '@mantine/core';
import { isRouteErrorResponse, Link, useRouteError } from 'react-router-dom';
import { Problem } from '../api/problem';
import { Refusal } from '../components/Refusal';
import { NotFound } from './NotFound';

/** Stands in for a page that failed: one that is not there, a script that could not be loaded, a fault of ours. */
export function PageFailure() {
  const error = useRouteError();
  const status = error instanceof Problem || isRouteErrorResponse(error) ? error.status : undefined;
  if (status === 404) return <NotFound />;
  return (
    <Container py="xl">
      <Refusal error={error} />
      <Group>
        <Button onClick={() => location.reload()}>Reload the page</Button>
        <Button variant="default" component={Link} to="/">
          Go to Today
        </Button>
      </Group>
    </Container>
  );
}
