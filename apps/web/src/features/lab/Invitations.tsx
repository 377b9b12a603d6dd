import { Button, Group, Select, Text, TextInput } from '@mantine/core';
import { isEmail, useForm } from '@mantine/form';
import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { client, unwrap } from '../../api/client';
import { invitationsQuery, keys } from '../../api/queries';
import type { Role } from '../../api/types';
import { FormRefusal } from '../../components/FormRefusal';
import { ListTable, Row, type Column } from '../../components/ListTable';
import { Refusal } from '../../components/Refusal';
import { Section } from '../../components/Section';
import { When } from '../../components/When';
import { notifyDone, notifyFailure, useProblem } from '../../lib/forms';
import { ROLES } from '../../lib/roles';
import classes from './Invitations.module.css';

const COLUMNS: readonly Column[] = [
  { label: 'E-mail' },
  { label: 'Role', width: '130px' },
  { label: 'Sent', from: 'md', width: '130px' },
  { label: 'Actions', hidden: true, width: '100px' },
];

export function Invitations({ labId }: { labId: string }) {
  const queryClient = useQueryClient();
  const { data, error, refetch } = useQuery(invitationsQuery(labId));
  const withdraw = useMutation({
    mutationFn: (id: string) =>
      unwrap(client.DELETE('/api/labs/{labId}/invitations/{id}', { params: { path: { labId, id } } })),
    onError: (failure) => notifyFailure('Not withdrawn', failure),
    onSettled: () => queryClient.invalidateQueries({ queryKey: keys.invitations(labId) }),
  });
  return (
    <Section title="Invitations" lead="The link in the mail works once and for one address.">
      <InviteForm labId={labId} />
      {error && <Refusal error={error} retry={() => void refetch()} />}
      {data?.items.length === 0 && <Text c="dimmed">Nobody is expected.</Text>}
      {data && data.items.length > 0 && (
        <ListTable label="Open invitations" columns={COLUMNS}>
          {data.items.map((invitation) => (
            <Row
              key={invitation.id}
              columns={COLUMNS}
              cells={[
                <span title={invitation.email}>{invitation.email}</span>,
                invitation.role,
                <When iso={invitation.createdAt} />,
                <Button
                  variant="subtle"
                  color="madder"
                  size="compact-sm"
                  aria-label={`Withdraw the invitation of ${invitation.email}`}
                  onClick={() => withdraw.mutate(invitation.id)}
                >
                  Withdraw
                </Button>,
              ]}
            />
          ))}
        </ListTable>
      )}
    </Section>
  );
}

function InviteForm({ labId }: { labId: string }) {
  const queryClient = useQueryClient();
  const form = useForm({
    mode: 'uncontrolled',
    initialValues: { email: '', role: 'chemist' as Role },
    validate: { email: isEmail('Enter an e-mail address') },
  });
  const problem = useProblem(form);
  const invite = useMutation({
    mutationFn: (body: typeof form.values) =>
      unwrap(client.POST('/api/labs/{labId}/invitations', { params: { path: { labId } }, body })),
    onSuccess: async ({ email }) => {
      form.reset();
      await queryClient.invalidateQueries({ queryKey: keys.invitations(labId) });
      notifyDone(`An invitation is on its way to ${email}.`);
    },
    onError: problem.show,
  });
  return (
    <form
      noValidate
      className={classes.form}
      onSubmit={form.onSubmit((values) => invite.mutate(values), problem.clear)}
    >
      <FormRefusal message={problem.message} />
      <Group align="flex-start" gap="sm">
        <TextInput
          label="E-mail"
          type="email"
          autoComplete="off"
          className={classes.email}
          key={form.key('email')}
          {...form.getInputProps('email')}
        />
        <Select
          label="Role"
          data={ROLES.map(({ value, label, description }) => ({ value, label: `${label}: ${description}` }))}
          allowDeselect={false}
          w={280}
          key={form.key('role')}
          {...form.getInputProps('role')}
        />
        <Button type="submit" mt={25} loading={invite.isPending}>
          Invite
        </Button>
      </Group>
    </form>
  );
}
