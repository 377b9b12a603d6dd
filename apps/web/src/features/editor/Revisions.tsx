import { Anchor, Skeleton, Stack, Text, Title } from '@mantine/core';
import { useQuery } from '@tanstack/react-query';
import { Link } from 'react-router-dom';
import { revisionsQuery } from '../../api/queries';
import type { System } from '../../api/types';
import { Refusal } from '../../components/Refusal';
import { When } from '../../components/When';

/** The history of a system, newest first; each revision can be opened. */
export function Revisions({ labId, system, shown }: { labId: string; system: System; shown: number }) {
  const { data, error, refetch } = useQuery(revisionsQuery(labId, system.id));
  return (
    <section aria-labelledby="revisions-title">
      <Title order={2} id="revisions-title" fz={17} mb={6}>
        Revisions
      </Title>
      {error && <Refusal error={error} retry={() => void refetch()} />}
      {!data && !error && <Skeleton h={60} />}
      <Stack gap={6}>
        {data?.items.map(({ number, note, author, createdAt }) => (
          <Text key={number} size="sm" lineClamp={2}>
            {number === shown ? (
              <b aria-current="true">{number}</b>
            ) : (
              <Anchor
                component={Link}
                size="sm"
                to={number === system.latestRevision ? '.' : `?revision=${number}`}
                aria-label={`Open revision ${number}`}
              >
                {number}
              </Anchor>
            )}{' '}
            {note ?? 'no note'}, {author.name}, <When iso={createdAt} />
          </Text>
        ))}
      </Stack>
    </section>
  );
}
