import { Button, Text } from '@mantine/core';
import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { useNavigate } from 'react-router-dom';
import { client, unwrap } from '../../api/client';
import { keys } from '../../api/queries';
import { ListTable, Row, type Column } from '../../components/ListTable';
import { Refusal } from '../../components/Refusal';
import { Section } from '../../components/Section';
import { When } from '../../components/When';
import { notifyFailure } from '../../lib/forms';
import { describeBrowser } from './browser';
import { accountKeys, sessionsQuery } from './queries';

const COLUMNS: readonly Column[] = [
  { label: 'Browser' },
  { label: 'Signed in', from: 'md', width: '140px' },
  { label: 'Last used', width: '130px' },
  { label: 'Actions', hidden: true, width: '80px' },
];

/** Where one is signed in, and the way to end it. */
export function SessionsSection() {
  const queryClient = useQueryClient();
  const navigate = useNavigate();
  const { data, error, refetch } = useQuery(sessionsQuery);
  const end = useMutation({
    mutationFn: (id: string) => unwrap(client.DELETE('/api/account/sessions/{id}', { params: { path: { id } } })),
    onError: (failure) => notifyFailure('The session goes on', failure),
    onSettled: () => queryClient.invalidateQueries({ queryKey: accountKeys.sessions }),
  });
  const endAll = useMutation({
    mutationFn: () => unwrap(client.POST('/api/auth/sign-out-everywhere')),
    onSuccess: async () => {
      queryClient.setQueryData(keys.session, null);
      await navigate('/sign-in');
    },
    onError: (failure) => notifyFailure('The sessions go on', failure),
  });
  return (
    <Section title="Sessions" lead="End those you do not know, then change your password.">
      {error && <Refusal error={error} retry={() => void refetch()} />}
      <ListTable label="Sessions" columns={COLUMNS} loading={!data}>
        {data?.items.map((session) => (
          <Row
            key={session.id}
            columns={COLUMNS}
            cells={[
              <span title={session.userAgent}>{describeBrowser(session.userAgent)}</span>,
              <When iso={session.createdAt} />,
              <When iso={session.lastUsedAt} />,
              session.current ? (
                <Text span size="sm" c="dimmed">
                  this one
                </Text>
              ) : (
                <Button variant="subtle" color="madder" size="compact-sm" onClick={() => end.mutate(session.id)}>
                  End
                </Button>
              ),
            ]}
          />
        ))}
      </ListTable>
      <Button variant="default" mt="md" loading={endAll.isPending} onClick={() => endAll.mutate()}>
        Sign out everywhere
      </Button>
    </Section>
  );
}
