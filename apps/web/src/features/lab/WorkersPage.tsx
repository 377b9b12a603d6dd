import { Skeleton } from '@mantine/core';
import { useQuery } from '@tanstack/react-query';
import { workersQuery } from '../../api/queries';
import { Refusal } from '../../components/Refusal';
import { Section } from '../../components/Section';
import { useLab } from '../../lib/session';

/** The queue at a glance. */
export function WorkersPage() {
  const { labId } = useLab();
  const { data, error, refetch } = useQuery(workersQuery(labId));
  return (
    <Section title="Queue" lead="Of the whole server, asked for every five seconds.">
      {error ? (
        <Refusal error={error} retry={() => void refetch()} />
      ) : data ? (
        <pre>{JSON.stringify(data)}</pre>
      ) : (
        <Skeleton h={120} />
      )}
    </Section>
  );
}
