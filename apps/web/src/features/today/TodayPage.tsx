import { Button, Skeleton, Stack, Text } from '@mantine/core';
import { useQuery } from '@tanstack/react-query';
import { Link } from 'react-router-dom';
import { todayQuery } from '../../api/queries';
import type { Run } from '../../api/types';
import { EmptyState } from '../../components/EmptyState';
import { PlusIcon } from '../../components/icons';
import { PageHeader } from '../../components/PageHeader';
import { Refusal } from '../../components/Refusal';
import { RunTable } from '../../components/RunTable';
import { Section } from '../../components/Section';
import { useLab } from '../../lib/session';
import { RecentSystems } from './RecentSystems';

const DAY = new Intl.DateTimeFormat('en-GB', { weekday: 'long', day: 'numeric', month: 'long' });

/** Where a day begins: what waits, what is running, what was touched last. */
export function TodayPage() {
  const { labId } = useLab();
  const { data, error, refetch } = useQuery(todayQuery(labId));
  const newSystem = (
    <Button component={Link} to={`/labs/${labId}/systems/new`} leftSection={<PlusIcon />}>
      New system
    </Button>
  );
  const untouched = data && [data.waiting, data.running, data.recent].every((list) => list.length === 0);
  return (
    <>
      <PageHeader title="Today" lead={DAY.format(new Date())} actions={untouched ? undefined : newSystem} />
      {error ? (
        <Refusal error={error} retry={() => void refetch()} />
      ) : untouched ? (
        <EmptyState title="The loom is empty" action={newSystem}>
          Begin with the nuclei of a compound and their couplings. What you work on, and what waits for you, will be
          found here.
        </EmptyState>
      ) : (
        <>
          <Section title="Waits for you" lead="Runs of yours that failed or need a look.">
            <Runs labId={labId} label="Waits for you" runs={data?.waiting} none="Nothing waits for you." />
          </Section>
          <Section title="Running" lead="In the queue or being computed.">
            <Runs labId={labId} label="Running" runs={data?.running} none="Nothing is running." />
          </Section>
          <Section title="Touched last">
            {data ? <RecentSystems labId={labId} systems={data.recent} /> : <Lines />}
          </Section>
        </>
      )}
    </>
  );
}

function Runs({ labId, label, runs, none }: { labId: string; label: string; runs: Run[] | undefined; none: string }) {
  if (!runs) return <Lines />;
  if (runs.length === 0) return <Text c="dimmed">{none}</Text>;
  return <RunTable labId={labId} label={label} runs={runs} brief />;
}

function Lines() {
  return (
    <Stack gap="md">
      <Skeleton h={16} w="60%" />
      <Skeleton h={16} w="45%" />
    </Stack>
  );
}
