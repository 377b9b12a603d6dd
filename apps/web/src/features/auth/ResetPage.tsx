import { Anchor, Button, Stack, Text, TextInput } from '@mantine/core';
import { isNotEmpty, useForm } from '@mantine/form';
import { useMutation } from '@tanstack/react-query';
import { Link } from 'react-router-dom';
import { client, unwrap } from '../../api/client';
import { FormRefusal } from '../../components/FormRefusal';
import { PageHeader } from '../../components/PageHeader';
import { useProblem } from '../../lib/forms';

/** Asks for a mail with a link that sets a new password. Never says whether the address is known. */
export function ResetPage() {
  const form = useForm({
    mode: 'uncontrolled',
    initialValues: { email: '' },
    validate: { email: isNotEmpty('Enter your e-mail address') },
  });
  const problem = useProblem(form);
  const ask = useMutation({
    mutationFn: (body: typeof form.values) => unwrap(client.POST('/api/auth/password-reset', { body })),
    onError: problem.show,
  });
  const back = (
    <Anchor component={Link} to="/sign-in" size="sm">
      Back to sign-in
    </Anchor>
  );

  if (ask.isSuccess) {
    return (
      <Stack>
        <PageHeader title="Look into your mail" />
        <Text role="status">
          If {ask.variables.email} belongs to an account, a message with a link is on its way. The link works for one
          hour, once.
        </Text>
        {back}
      </Stack>
    );
  }
  return (
    <>
      <PageHeader title="New password" lead="We send a link to your e-mail address; it lets you set a new one." />
      <form noValidate onSubmit={form.onSubmit((values) => ask.mutate(values), problem.clear)}>
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
          <Button type="submit" loading={ask.isPending}>
            Send the link
          </Button>
          {back}
        </Stack>
      </form>
    </>
  );
}
