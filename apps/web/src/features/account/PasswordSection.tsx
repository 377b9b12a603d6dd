import { Button, PasswordInput, Stack } from '@mantine/core';
import { isNotEmpty, useForm } from '@mantine/form';
import { useMutation, useQueryClient } from '@tanstack/react-query';
import { client, unwrap } from '../../api/client';
import { FormRefusal } from '../../components/FormRefusal';
import { Section } from '../../components/Section';
import { notifyDone, useProblem } from '../../lib/forms';
import { checkPassword, PASSWORD_HINT } from '../../lib/password';
import { accountKeys } from './queries';

export function PasswordSection() {
  const queryClient = useQueryClient();
  const form = useForm({
    mode: 'uncontrolled',
    initialValues: { current: '', next: '' },
    validate: { current: isNotEmpty('Enter the password you use now'), next: checkPassword },
  });
  const problem = useProblem(form);
  const change = useMutation({
    mutationFn: (body: typeof form.values) => unwrap(client.POST('/api/account/password', { body })),
    onSuccess: async () => {
      form.reset();
      await queryClient.invalidateQueries({ queryKey: accountKeys.sessions });
      notifyDone('The password is changed.');
    },
    onError: problem.show,
  });
  return (
    <Section title="Password" lead="A change ends your sessions on other machines.">
      <form noValidate onSubmit={form.onSubmit((values) => change.mutate(values), problem.clear)}>
        <Stack maw={420} align="flex-start">
          <FormRefusal message={problem.message} />
          <PasswordInput
            label="Current password"
            autoComplete="current-password"
            w="100%"
            key={form.key('current')}
            {...form.getInputProps('current')}
          />
          <PasswordInput
            label="New password"
            description={PASSWORD_HINT}
            autoComplete="new-password"
            w="100%"
            key={form.key('next')}
            {...form.getInputProps('next')}
          />
          <Button type="submit" loading={change.isPending}>
            Change the password
          </Button>
        </Stack>
      </form>
    </Section>
  );
}
