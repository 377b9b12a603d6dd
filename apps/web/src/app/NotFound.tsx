import { Button } from '@mantine/core';
import { Link } from 'react-router-dom';
import { EmptyState } from '../components/EmptyState';

export function NotFound({ what = 'page' }: { what?: string }) {
  return (
    <EmptyState
      title={`There is no such ${what}`}
      action={
        <Button component={Link} to="/">
          Go to Today
        </Button>
      }
    >
      It may have been removed, or it belongs to a laboratory you are not a member of.
    </EmptyState>
  );
}
