import { Anchor } from '@mantine/core';
import { Link } from 'react-router-dom';
import type { SystemSort } from '../../api/queries';
import type { System } from '../../api/types';
import { Isotopes } from '../../components/Isotope';
import { PrivateIcon, SharedIcon } from '../../components/icons';
import { ListTable, Row, type Column } from '../../components/ListTable';
import { When } from '../../components/When';
import { SystemMenu } from './SystemMenu';
import classes from './SystemTable.module.css';

const COLUMNS: readonly Column<'name' | 'updated'>[] = [
  { label: 'Name', sort: 'name' },
  { label: 'Nuclides', width: '16%' },
  { label: 'Nuclei', numeric: true, from: 'lg', width: '90px' },
  { label: 'Owner', from: 'md', width: '17%' },
  { label: 'Seen by', from: 'md', width: '116px' },
  { label: 'Changed', sort: 'updated', width: '132px' },
  { label: 'Actions', hidden: true, width: '44px' },
];

interface Props {
  labId: string;
  /** Undefined while they are asked for. */
  systems: System[] | undefined;
  sort: SystemSort;
  onSort: (sort: SystemSort) => void;
}

export function SystemTable({ labId, systems, sort, onSort }: Props) {
  return (
    <ListTable label="Systems" columns={COLUMNS} sort={sort} onSort={onSort} loading={!systems}>
      {systems?.map((system) => (
        <Row
          key={system.id}
          columns={COLUMNS}
          cells={[
            <Anchor
              component={Link}
              to={`/labs/${labId}/systems/${system.id}`}
              title={system.name}
              className={classes.name}
            >
              {system.name}
            </Anchor>,
            <Isotopes names={system.nuclides} />,
            system.nucleusCount,
            <span title={system.owner.name}>{system.owner.name}</span>,
            <Visibility shared={system.shared} />,
            <When iso={system.updatedAt} />,
            <SystemMenu labId={labId} system={system} />,
          ]}
        />
      ))}
    </ListTable>
  );
}

function Visibility({ shared }: { shared: boolean }) {
  return (
    <span className={classes.visibility}>
      {shared ? <SharedIcon /> : <PrivateIcon />}
      {shared ? 'the lab' : 'owner only'}
    </span>
  );
}
