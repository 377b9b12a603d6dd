import { Button, PasswordInput, Skeleton, Stack, Text, TextInput } from '@mantine/core';
import { isNotEmpty, useForm } from '@mantine/form';
import { useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { useNavigate, useParams } from 'react-router-dom';
import { client, unwrap } from '../../api/client';
import { keys } from '../../api/queries';
import { FormRefusal } from '../../components/FormRefusal';
import { PageHeader } from '../../components/PageHeader';
import { Refusal } from '../../components/Refusal';
import { useProblem } from '../../lib/forms';
import { checkPassword, PASSWORD_HINT } from '../../lib/password';

/** Where the link of an invitation leads: joins the laboratory, and makes the account if there is none. */
export function InvitationPage() {
  const { token = '' } = useParams();
  const { data, error } = useQuery({
    queryKey: ['invitation', token],
    queryFn: () => unwrap(client.GET('/api/invitations/{token}', { params: { path: { token } } })),
  });
  if (error) {
    return (
      <>
        <PageHeader title="Invitation" lead="This link does not work any more. Ask for a new invitation." />
        <Refusal error={error} />
      </>
    );
  }
  if (!data) return <Skeleton h={240} />;
  return (
    <>
      <PageHeader title={`Join ${data.labName}`} lead={`You are invited as ${data.role}, at ${data.email}.`} />
      <AcceptForm token={token} needsAccount={data.needsAccount} />
    </>
  );
}

function AcceptForm({ token, needsAccount }: { token: string; needsAccount: boolean }) {
  const navigate = useNavigate();
  const queryClient = useQueryClient();
  const form = useForm({
    mode: 'uncontrolled',
    initialValues: { name: '', password: '' },
    validate: needsAccount ? { name: isNotEmpty('Enter your name'), password: checkPassword } : {},
  });
  const problem = useProblem(form);
  const accept = useMutation({
    mutationFn: (body: typeof form.values) =>
      unwrap(
        client.POST('/api/invitations/{token}/accept', { params: { path: { token } }, body: needsAccount ? body : {} }),
      ),
    onSuccess: async () => {
      await queryClient.invalidateQueries({ queryKey: keys.session });
      await navigate('/');
    },
    onError: problem.show,
  });
  return (
    <form noValidate onSubmit={form.onSubmit((values) => accept.mutate(values), problem.clear)}>
      <Stack>
        <FormRefusal message={problem.message} />
        {needsAccount ? (
          <>
            <TextInput
              label="Your name"
              autoComplete="name"
              autoFocus
              key={form.key('name')}
              {...form.getInputProps('name')}
            />
            <PasswordInput
              label="Password"
              description={PASSWORD_HINT}
              autoComplete="new-password"
              key={form.key('password')}
              {...form.getInputProps('password')}
            />
          </>
        ) : (
          <Text>Your account is there already; the laboratory will appear beside the others you work in.</Text>
        )}
        <Button type="submit" loading={accept.isPending}>
          Join
        </Button>
      </Stack>
    </form>
  );
}
