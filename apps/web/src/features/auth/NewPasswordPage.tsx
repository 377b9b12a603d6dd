import { Anchor, Button, PasswordInput, Stack } from '@mantine/core';
import { useForm } from '@mantine/form';
import { useMutation } from '@tanstack/react-query';
import { Link, useNavigate, useParams } from 'react-router-dom';
import { client, unwrap } from '../../api/client';
import { FormRefusal } from '../../components/FormRefusal';
import { PageHeader } from '../../components/PageHeader';
import { notifyDone, useProblem } from '../../lib/forms';
import { checkPassword, PASSWORD_HINT } from '../../lib/password';

/** Where the link of a reset mail leads. */
export function NewPasswordPage() {
  const { token = '' } = useParams();
  const navigate = useNavigate();
  const form = useForm({
    mode: 'uncontrolled',
    initialValues: { password: '' },
    validate: { password: checkPassword },
  });
  const problem = useProblem(form);
  const set = useMutation({
    mutationFn: ({ password }: typeof form.values) =>
      unwrap(client.POST('/api/auth/password-reset/confirm', { body: { token, password } })),
    onSuccess: async () => {
      await navigate('/sign-in');
      notifyDone('The new password is set. Sign in with it.');
    },
    onError: problem.show,
  });
  return (
    <>
      <PageHeader title="Set a new password" lead="All sessions of the account end, also on other machines." />
      <form noValidate onSubmit={form.onSubmit((values) => set.mutate(values), problem.clear)}>
        <Stack>
          <FormRefusal message={problem.message} />
          <PasswordInput
            label="New password"
            description={PASSWORD_HINT}
            autoComplete="new-password"
            autoFocus
            key={form.key('password')}
            {...form.getInputProps('password')}
          />
          <Button type="submit" loading={set.isPending}>
            Set the password
          </Button>
          <Anchor component={Link} to="/reset" size="sm">
            Ask for a new link
          </Anchor>
        </Stack>
      </form>
    </>
  );
}
