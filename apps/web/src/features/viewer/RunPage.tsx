import { Anchor, Button, Group, Progress, Skeleton, Stack, Text, Title } from '@mantine/core';
import { useDocumentTitle } from '@mantine/hooks';
import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { Link, useParams } from 'react-router-dom';
import { client, unwrap } from '../../api/client';
import { keys, runQuery } from '../../api/queries';
import type { Run } from '../../api/types';
import { ExperimentSummary } from '../../components/ExperimentSummary';
import { Refusal } from '../../components/Refusal';
import { RunStateMark } from '../../components/RunStateMark';
import { When } from '../../components/When';
import { notifyFailure } from '../../lib/forms';
import { useLab } from '../../lib/session';
import { resultQuery } from './result';
import { Viewer } from './Viewer';
import classes from './Viewer.module.css';

/** One run: what it is and how far, and its spectrum once it is there. */
export function RunPage() {
  const { labId } = useLab();
  const { runId = '' } = useParams();
  const run = useQuery(runQuery(labId, runId));
  useDocumentTitle(`${run.data?.system.name ?? 'Run'} \u00b7 Heddle`);
  if (run.error) {
    return (
      <div className={classes.page}>
        <Refusal error={run.error} retry={() => void run.refetch()} />
      </div>
    );
  }
  if (!run.data) {
    return (
      <Stack className={classes.page} aria-busy="true" aria-label="Loading the run">
        <Skeleton h={40} w={360} />
        <Skeleton h={420} />
      </Stack>
    );
  }
  return (
    <div className={classes.page}>
      <RunHeader labId={labId} run={run.data} />
      {run.data.state === 'done' ? <Done labId={labId} run={run.data} /> : <Underway labId={labId} run={run.data} />}
    </div>
  );
}

function RunHeader({ labId, run }: { labId: string; run: Run }) {
  const base = `/api/labs/${labId}/runs/${run.id}`;
  return (
    <header className={classes.header}>
      <div style={{ minWidth: 0 }}>
        <Title order={1} fz={28} lh={1.2}>
          <Anchor
            component={Link}
            inherit
            c="inherit"
            to={`/labs/${labId}/systems/${run.system.id}?revision=${run.revision}`}
          >
            {run.system.name}
          </Anchor>
        </Title>
        <Text size="sm" c="dimmed" component="div">
          <Group gap={10}>
            <RunStateMark run={run} />
            <ExperimentSummary run={run} />
            <span>
              revision {run.revision}, {run.owner.name}, <When iso={run.createdAt} />
            </span>
          </Group>
        </Text>
      </div>
      {run.state === 'done' && (
        <Group gap="xs">
          <Button component="a" href={`${base}/brief.pdf`} download>
            Brief
          </Button>
          <Button component="a" variant="default" href={`${base}/package.eln`} download>
            Package
          </Button>
          <Button component="a" variant="default" href={`${base}/result.jdx`} download>
            JCAMP-DX
          </Button>
          <Button component="a" variant="default" href={`${base}/result.csv`} download>
            CSV
          </Button>
          <Button component="a" variant="default" href={`${base}/result`} download={`${run.system.name}.json`}>
            JSON
          </Button>
        </Group>
      )}
    </header>
  );
}

function Done({ labId, run }: { labId: string; run: Run }) {
  const result = useQuery(resultQuery(labId, run.id));
  if (result.error) return <Refusal error={result.error} retry={() => void result.refetch()} />;
  if (!result.data) return <Skeleton h={460} aria-label="Loading the spectrum" />;
  return <Viewer labId={labId} run={run} result={result.data} />;
}

/** A run that has no result: how far it is, or why it stopped, and what can be done. */
function Underway({ labId, run }: { labId: string; run: Run }) {
  const queryClient = useQueryClient();
  const act = useMutation({
    mutationFn: (what: 'cancel' | 'requeue') =>
      unwrap(
        what === 'cancel'
          ? client.POST('/api/labs/{labId}/runs/{id}/cancel', { params: { path: { labId, id: run.id } } })
          : client.POST('/api/labs/{labId}/runs/{id}/requeue', { params: { path: { labId, id: run.id } } }),
      ),
    onSuccess: (changed) => queryClient.setQueryData(keys.run(labId, run.id), changed),
    onError: (error) => notifyFailure('Not done', error),
  });
  const open = run.state === 'queued' || run.state === 'running';
  return (
    <Stack className={classes.underway} gap="md" role="status">
      {open && (
        <>
          <Text>
            {run.state === 'queued' ? 'Waiting for a free worker.' : 'Being computed.'} You can leave this page.
          </Text>
          <Progress value={run.progress * 100} aria-label="Progress of the run" maw={420} />
        </>
      )}
      {run.state === 'failed' && (
        <>
          <Text fw={600}>The run stopped.</Text>
          <Text>{run.error ?? 'No reason was given.'}</Text>
        </>
      )}
      {run.state === 'cancelled' && <Text>The run was cancelled.</Text>}
      <Group>
        {open ? (
          <Button variant="default" loading={act.isPending} onClick={() => act.mutate('cancel')}>
            Cancel the run
          </Button>
        ) : (
          <Button loading={act.isPending} onClick={() => act.mutate('requeue')}>
            Run it again
          </Button>
        )}
      </Group>
    </Stack>
  );
}
