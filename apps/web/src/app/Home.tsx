import { Text } from '@mantine/core';
import { Navigate } from 'react-router-dom';
import { EmptyState } from '../components/EmptyState';
import { homeLab, useSession } from '../lib/session';

/** Opens Today of the laboratory visited last. */
export function Home() {
  const lab = homeLab(useSession());
  if (lab) return <Navigate to={`/labs/${lab.labId}/today`} replace />;
  return (
    <EmptyState title="You are in no laboratory yet">
      <Text span>Ask an admin of yours to invite you; the invitation comes by e-mail.</Text>
    </EmptyState>
  );
}
