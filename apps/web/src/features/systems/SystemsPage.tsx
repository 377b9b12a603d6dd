import { Button } from '@mantine/core';
import { keepPreviousData, useInfiniteQuery } from '@tanstack/react-query';
import { Link } from 'react-router-dom';
import { systemsQuery, type SystemSort } from '../../api/queries';
import { EmptyState } from '../../components/EmptyState';
import { PlusIcon } from '../../components/icons';
import { PageHeader } from '../../components/PageHeader';
import { Refusal } from '../../components/Refusal';
import { ShowMore } from '../../components/ShowMore';
import { useSearchFilters } from '../../lib/search';
import { useLab } from '../../lib/session';
import { SystemFilterBar } from './SystemFilterBar';
import { SystemTable } from './SystemTable';
import { SYSTEM_FILTERS, toQuery } from './system-filters';

/** The spin systems of a laboratory that one may see. */
export function SystemsPage() {
  const { labId } = useLab();
  const search = useSearchFilters(SYSTEM_FILTERS);
  const sort = (search.filters.sort ?? '-updated') as SystemSort;
  const query = useInfiniteQuery({
    ...systemsQuery(labId, { ...toQuery(search.filters), sort }),
    placeholderData: keepPreviousData,
  });
  const systems = query.data?.pages.flatMap((page) => page.items);
  const newSystem = (
    <Button component={Link} to={`/labs/${labId}/systems/new`} leftSection={<PlusIcon />}>
      New system
    </Button>
  );

  return (
    <>
      <PageHeader title="Systems" lead="Nuclei, shifts and couplings, each with its revisions." actions={newSystem} />
      <SystemFilterBar search={search} />
      {query.error ? (
        <Refusal error={query.error} retry={() => void query.refetch()} />
      ) : systems?.length === 0 ? (
        <NoSystems filtered={search.any} clear={search.clear} action={newSystem} />
      ) : (
        <SystemTable labId={labId} systems={systems} sort={sort} onSort={(key) => search.set('sort', key)} />
      )}
      <ShowMore query={query} />
    </>
  );
}

function NoSystems({ filtered, clear, action }: { filtered: boolean; clear: () => void; action: React.ReactNode }) {
  if (filtered) {
    return (
      <EmptyState
        title="No system fits these filters"
        action={
          <Button variant="default" onClick={clear}>
            Clear the filters
          </Button>
        }
      />
    );
  }
  return (
    <EmptyState title="The first thread" action={action}>
      A spin system holds the nuclei of a compound with their shifts and couplings. Type it or paste it from a
      spreadsheet; its spectrum appears while you do.
    </EmptyState>
  );
}
