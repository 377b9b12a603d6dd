import { Anchor } from '@mantine/core';
import type { ReactNode } from 'react';
import { Link } from 'react-router-dom';
import type { Run } from '../api/types';
import { formatSeconds } from '../lib/format';
import { ExperimentSummary } from './ExperimentSummary';
import { ListTable, Row, type Column } from './ListTable';
import { RunStateMark } from './RunStateMark';
import classes from './RunTable.module.css';
import { When } from './When';

interface RunColumn extends Column {
  cell: (run: Run) => ReactNode;
}

const OTHERS: readonly RunColumn[] = [
  { label: 'Experiment', from: 'md', cell: (run) => <ExperimentSummary run={run} /> },
  { label: 'State', width: '190px', cell: (run) => <RunStateMark run={run} /> },
  { label: 'Queued', from: 'md', width: '124px', cell: (run) => <When iso={run.createdAt} /> },
];
const OWNER: RunColumn = {
  label: 'Owner',
  from: 'lg',
  width: '15%',
  cell: (run) => <span title={run.owner.name}>{run.owner.name}</span>,
};
const TOOK: RunColumn = {
  label: 'Took',
  from: 'lg',
  numeric: true,
  width: '116px',
  cell: (run) => run.seconds != null && formatSeconds(run.seconds),
};

interface Props {
  labId: string;
  /** Undefined while they are asked for. */
  runs: Run[] | undefined;
  label?: string;
  /** Leaves out whose runs they are and how long they took. */
  brief?: boolean;
}

/** Runs, each leading to its page. */
export function RunTable({ labId, runs, label = 'Runs', brief = false }: Props) {
  const columns: RunColumn[] = [
    { label: 'System', width: brief ? '38%' : '26%', cell: (run) => <SystemLink labId={labId} run={run} /> },
    ...OTHERS,
    ...(brief ? [] : [OWNER, TOOK]),
  ];
  return (
    <ListTable label={label} columns={columns} loading={!runs}>
      {runs?.map((run) => (
        <Row key={run.id} columns={columns} cells={columns.map(({ cell }) => cell(run))} />
      ))}
    </ListTable>
  );
}

function SystemLink({ labId, run }: { labId: string; run: Run }) {
  return (
    <Anchor component={Link} to={`/labs/${labId}/runs/${run.id}`} title={run.system.name} className={classes.system}>
      {run.system.name}
      <span className={classes.revision}> rev. {run.revision}</span>
    </Anchor>
  );
}
