import { Skeleton, Stack } from '@mantine/core';
import { useQuery } from '@tanstack/react-query';
import { useParams, useSearchParams } from 'react-router-dom';
import type { SpinSystemInput } from '@heddle/shared';
import { revisionQuery, systemQuery } from '../../api/queries';
import { Refusal } from '../../components/Refusal';
import { useLab } from '../../lib/session';
import { Bench } from './Bench';
import classes from './Bench.module.css';
import { EMPTY_DRAFT, fromDocument } from './logic/draft';

/** One spin system: a new one, its latest revision, or the revision named in the address (`?revision=3`). */
export function SystemPage() {
  const { labId } = useLab();
  const { systemId } = useParams();
  return systemId ? (
    <SavedSystem key={systemId} labId={labId} systemId={systemId} />
  ) : (
    <Bench labId={labId} system={null} revision={0} start={EMPTY_DRAFT} />
  );
}

function SavedSystem({ labId, systemId }: { labId: string; systemId: string }) {
  const [search] = useSearchParams();
  const asked = Number(search.get('revision'));
  const system = useQuery(systemQuery(labId, systemId));
  const number = asked > 0 ? asked : system.data?.latestRevision;
  const revision = useQuery({ ...revisionQuery(labId, systemId, number ?? 0), enabled: number !== undefined });
  const error = system.error ?? revision.error;
  if (error) {
    return (
      <div className={classes.page}>
        <Refusal error={error} retry={() => void Promise.all([system.refetch(), revision.refetch()])} />
      </div>
    );
  }
  if (!system.data || !revision.data) return <LoadingBench />;
  const start = fromDocument(revision.data.document as unknown as SpinSystemInput);
  return (
    <Bench
      key={revision.data.number}
      labId={labId}
      system={system.data}
      revision={revision.data.number}
      start={start}
    />
  );
}

function LoadingBench() {
  return (
    <Stack className={classes.page} aria-busy="true" aria-label="Loading the system">
      <Skeleton h={40} w={320} />
      <Skeleton h={180} />
      <Skeleton h={280} />
      <Skeleton h={200} />
    </Stack>
  );
}
