import { Button, Group, Select } from '@mantine/core';
import { keepPreviousData, useInfiniteQuery } from '@tanstack/react-query';
import { Link } from 'react-router-dom';
import { runsQuery, type RunFilters } from '../../api/queries';
import { EmptyState } from '../../components/EmptyState';
import { OwnerSelect } from '../../components/OwnerSelect';
import { PageHeader } from '../../components/PageHeader';
import { Refusal } from '../../components/Refusal';
import { RUN_STATES } from '../../components/RunStateMark';
import { RunTable } from '../../components/RunTable';
import { ShowMore } from '../../components/ShowMore';
import { useSearchFilters } from '../../lib/search';
import { useLab } from '../../lib/session';

const FILTERS = ['state', 'system', 'owner'] as const;
const STATES = Object.entries(RUN_STATES).map(([value, { word }]) => ({ value, label: word }));

/** The runs of a laboratory, newest first, moving on while one looks. */
export function RunsPage() {
  const { labId } = useLab();
  const { filters, set, clear, any } = useSearchFilters(FILTERS);
  const query = useInfiniteQuery({ ...runsQuery(labId, filters as RunFilters), placeholderData: keepPreviousData });
  const runs = query.data?.pages.flatMap((page) => page.items);
  const ofOne = filters.system && runs?.find((run) => run.system.id === filters.system)?.system.name;
  return (
    <>
      <PageHeader
        title="Runs"
        lead={ofOne ? `Of ${ofOne}.` : 'A run is one revision, one experiment and the spectrum they give.'}
      />
      <Group mb="md" gap="sm" role="search" aria-label="Runs">
        <Select
          aria-label="State"
          placeholder="In any state"
          data={STATES}
          clearable
          value={filters.state ?? null}
          onChange={(value) => set('state', value)}
          w={160}
        />
        <OwnerSelect value={filters.owner ?? null} onChange={(value) => set('owner', value)} />
        {any && (
          <Button variant="subtle" size="compact-sm" onClick={clear}>
            Clear
          </Button>
        )}
      </Group>
      {query.error ? (
        <Refusal error={query.error} retry={() => void query.refetch()} />
      ) : runs?.length === 0 ? (
        <NoRuns labId={labId} filtered={any} clear={clear} />
      ) : (
        <RunTable labId={labId} runs={runs} />
      )}
      <ShowMore query={query} />
    </>
  );
}

function NoRuns({ labId, filtered, clear }: { labId: string; filtered: boolean; clear: () => void }) {
  if (filtered) {
    return (
      <EmptyState
        title="No run fits these filters"
        action={
          <Button variant="default" onClick={clear}>
            Clear the filters
          </Button>
        }
      />
    );
  }
  return (
    <EmptyState
      title="Nothing has been run yet"
      action={
        <Button component={Link} to={`/labs/${labId}/systems`}>
          Choose a system
        </Button>
      }
    >
      Open a system, choose a field and a sequence, and run it. The result stays here as it was computed.
    </EmptyState>
  );
}
