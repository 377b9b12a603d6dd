import { Anchor } from '@mantine/core';
import { useQuery } from '@tanstack/react-query';
import { Link } from 'react-router-dom';
import { VARIED_UNITS } from '@heddle/shared';
import { seriesListQuery } from '../../api/queries';
import { EmptyState } from '../../components/EmptyState';
import { ListTable, Row, type Column } from '../../components/ListTable';
import { PageHeader } from '../../components/PageHeader';
import { Refusal } from '../../components/Refusal';
import { When } from '../../components/When';
import { useLab } from '../../lib/session';
import { QUANTITY_WORDS } from './logic/words';

const COLUMNS: readonly Column[] = [
  { label: 'Series', width: '34%' },
  { label: 'System', from: 'md' },
  { label: 'Along' },
  { label: 'Made', from: 'md', width: '124px' },
];

/** Series of the lab: runs of one system along a varied quantity. */
export function SeriesListPage() {
  const { labId } = useLab();
  const { data, error, refetch } = useQuery(seriesListQuery(labId));
  return (
    <>
      <PageHeader title="Series" lead="One system along a field, a temperature, a rate, a coupling or a delay." />
      {error && <Refusal error={error} retry={() => void refetch()} />}
      {data?.items.length === 0 ? (
        <EmptyState title="No series yet">
          Open a system and choose Series beside its Run button: the runs are made along the values you give.
        </EmptyState>
      ) : (
        <ListTable label="Series" columns={COLUMNS} loading={!data && !error}>
          {data?.items.map(({ id, name, system, vary, createdAt }) => (
            <Row
              key={id}
              columns={COLUMNS}
              cells={[
                <Anchor key="name" component={Link} to={`/labs/${labId}/series/${id}`}>
                  {name}
                </Anchor>,
                system.name,
                `${QUANTITY_WORDS[vary.quantity]}, ${vary.values[0]} to ${vary.values[vary.values.length - 1]} ${VARIED_UNITS[vary.quantity]}`,
                <When key="made" iso={createdAt} />,
              ]}
            />
          ))}
        </ListTable>
      )}
    </>
  );
}
