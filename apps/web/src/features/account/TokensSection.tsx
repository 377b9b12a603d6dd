import { Alert, Button, Code, CopyButton, Group, Stack, Text, TextInput } from '@mantine/core';
import { isNotEmpty, useForm } from '@mantine/form';
import { modals } from '@mantine/modals';
import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { client, unwrap } from '../../api/client';
import type { Token } from '../../api/types';
import { FormRefusal } from '../../components/FormRefusal';
import { ListTable, Row, type Column } from '../../components/ListTable';
import { Refusal } from '../../components/Refusal';
import { Section } from '../../components/Section';
import { When } from '../../components/When';
import { notifyFailure, useProblem } from '../../lib/forms';
import { accountKeys, tokensQuery } from './queries';

const COLUMNS: readonly Column[] = [
  { label: 'Name' },
  { label: 'Made', from: 'md', width: '140px' },
  { label: 'Last used', width: '130px' },
  { label: 'Actions', hidden: true, width: '80px' },
];

/** Personal access tokens, for scripts. */
export function TokensSection() {
  const { data, error, refetch } = useQuery(tokensQuery);
  const revoke = useRevoke();
  return (
    <Section title="Access tokens" lead="For scripts that call the API in your name. Keep them like passwords.">
      <NewToken />
      {error && <Refusal error={error} retry={() => void refetch()} />}
      {data?.items.length === 0 && <Text c="dimmed">You have no token.</Text>}
      {data && data.items.length > 0 && (
        <ListTable label="Access tokens" columns={COLUMNS}>
          {data.items.map((token) => (
            <Row
              key={token.id}
              columns={COLUMNS}
              cells={[
                <span title={token.name}>{token.name}</span>,
                <When iso={token.createdAt} />,
                token.lastUsedAt ? <When iso={token.lastUsedAt} /> : 'never',
                <Button
                  variant="subtle"
                  color="madder"
                  size="compact-sm"
                  aria-label={`Revoke ${token.name}`}
                  onClick={() => revoke(token)}
                >
                  Revoke
                </Button>,
              ]}
            />
          ))}
        </ListTable>
      )}
    </Section>
  );
}

function NewToken() {
  const queryClient = useQueryClient();
  const form = useForm({
    mode: 'uncontrolled',
    initialValues: { name: '' },
    validate: { name: isNotEmpty('Say what the token is for') },
  });
  const problem = useProblem(form);
  const make = useMutation({
    mutationFn: (body: typeof form.values) => unwrap(client.POST('/api/account/tokens', { body })),
    onSuccess: async () => {
      form.reset();
      await queryClient.invalidateQueries({ queryKey: accountKeys.tokens });
    },
    onError: problem.show,
  });
  return (
    <form noValidate onSubmit={form.onSubmit((values) => make.mutate(values), problem.clear)}>
      <Stack mb="lg" gap="sm">
        <FormRefusal message={problem.message} />
        <Group align="flex-start" gap="sm">
          <TextInput label="What it is for" w={300} key={form.key('name')} {...form.getInputProps('name')} />
          <Button type="submit" mt={25} loading={make.isPending}>
            Make a token
          </Button>
        </Group>
        <div role="status">{make.data && <Secret secret={make.data.secret ?? ''} />}</div>
      </Stack>
    </form>
  );
}

/** The one time a token can be seen. */
function Secret({ secret }: { secret: string }) {
  return (
    <Alert color="indigo" variant="outline" title="Copy it now: it is shown this once.">
      <Group gap="sm" wrap="nowrap">
        <Code fz="sm" style={{ overflowWrap: 'anywhere' }}>
          {secret}
        </Code>
        <CopyButton value={secret}>
          {({ copied, copy }) => (
            <Button size="compact-sm" variant="default" onClick={copy}>
              {copied ? 'Copied' : 'Copy'}
            </Button>
          )}
        </CopyButton>
      </Group>
    </Alert>
  );
}

function useRevoke() {
  const queryClient = useQueryClient();
  const revoke = useMutation({
    mutationFn: (id: string) => unwrap(client.DELETE('/api/account/tokens/{id}', { params: { path: { id } } })),
    onError: (error) => notifyFailure('Not revoked', error),
    onSettled: () => queryClient.invalidateQueries({ queryKey: accountKeys.tokens }),
  });
  return (token: Token) =>
    modals.openConfirmModal({
      title: `Revoke ${token.name}?`,
      children: 'Scripts that use it are refused from then on.',
      labels: { confirm: 'Revoke', cancel: 'Cancel' },
      confirmProps: { color: 'madder' },
      onConfirm: () => revoke.mutate(token.id),
    });
}
