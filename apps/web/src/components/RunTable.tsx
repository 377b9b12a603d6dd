import { Anchor } from '@mantine/core';
import { Link } from 'react-router-dom';
import type { Run } from '../api/types';
import { formatSeconds } from '../lib/format';
import { ExperimentSummary } from './ExperimentSummary';
import { ListTable, Row, type Column } from './ListTable';
import { RunStateMark } from './RunStateMark';
import classes from './RunTable.module.css';
import { When } from './When';

const COLUMNS: readonly Column[] = [
  { label: 'System', width: '30%' },
  { label: 'Experiment', from: 'md' },
  { label: 'State', width: '170px' },
  { label: 'Owner', from: 'lg', width: '15%' },
  { label: 'Took', from: 'lg', numeric: true, width: '110px' },
  { label: 'Queued', from: 'md', width: '124px' },
];

/** Runs, each leading to its page. `runs` is undefined while they are asked for. */
export function RunTable({ labId, runs, label = 'Runs' }: { labId: string; runs: Run[] | undefined; label?: string }) {
  return (
    <ListTable label={label} columns={COLUMNS} loading={!runs}>
      {runs?.map((run) => (
        <Row
          key={run.id}
          columns={COLUMNS}
          cells={[
            <Anchor
              component={Link}
              to={`/labs/${labId}/runs/${run.id}`}
              title={run.system.name}
              className={classes.system}
            >
              {run.system.name}
              <span className={classes.revision}> rev. {run.revision}</span>
            </Anchor>,
            <ExperimentSummary run={run} />,
            <RunStateMark run={run} />,
            <span title={run.owner.name}>{run.owner.name}</span>,
            run.seconds != null && formatSeconds(run.seconds),
            <When iso={run.createdAt} />,
          ]}
        />
      ))}
    </ListTable>
  );
}
