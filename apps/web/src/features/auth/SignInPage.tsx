import { Anchor, Button, PasswordInput, Stack, TextInput } from '@mantine/core';
import { isNotEmpty, useForm } from '@mantine/form';
import { useMutation, useQueryClient } from '@tanstack/react-query';
import { Link, Navigate, useSearchParams } from 'react-router-dom';
import { client, unwrap } from '../../api/client';
import { keys } from '../../api/queries';
import { PageHeader } from '../../components/PageHeader';
import { FormRefusal } from '../../components/FormRefusal';
import { useMaybeSession } from '../../lib/session';
import { useProblem } from '../../lib/forms';

/** The page to open after sign-in: one of ours, whatever the address says. */
export function safeNext(next: string | null): string {
  return next?.startsWith('/') && !next.startsWith('//') && !next.startsWith('/\\') ? next : '/';
}

export function SignInPage() {
  const [search] = useSearchParams();
  const session = useMaybeSession();
  const queryClient = useQueryClient();
  const form = useForm({
    mode: 'uncontrolled',
    initialValues: { email: '', password: '' },
    validate: { email: isNotEmpty('Enter your e-mail address'), password: isNotEmpty('Enter your password') },
  });
  const problem = useProblem(form);
  const signIn = useMutation({
    mutationFn: (body: typeof form.values) => unwrap(client.POST('/api/auth/sign-in', { body })),
    onSuccess: (signedIn) => queryClient.setQueryData(keys.session, signedIn),
    onError: problem.show,
  });

  if (session) return <Navigate to={safeNext(search.get('next'))} replace />;
  return (
    <>
      <PageHeader title="Sign in" />
      <form noValidate onSubmit={form.onSubmit((values) => signIn.mutate(values), problem.clear)}>
        <Stack>
          <FormRefusal message={problem.message} />
          <TextInput
            label="E-mail"
            type="email"
            autoComplete="username"
            autoFocus
            key={form.key('email')}
            {...form.getInputProps('email')}
          />
          <PasswordInput
            label="Password"
            autoComplete="current-password"
            key={form.key('password')}
            {...form.getInputProps('password')}
          />
          <Button type="submit" loading={signIn.isPending}>
            Sign in
          </Button>
          <Anchor component={Link} to="/reset" size="sm">
            Forgotten your password?
          </Anchor>
        </Stack>
      </form>
    </>
  );
}
