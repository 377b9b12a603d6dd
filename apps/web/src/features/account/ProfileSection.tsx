import { Button, Stack, TextInput } from '@mantine/core';
import { isNotEmpty, useForm } from '@mantine/form';
import { useMutation, useQueryClient } from '@tanstack/react-query';
import { client, unwrap } from '../../api/client';
import { keys } from '../../api/queries';
import { FormRefusal } from '../../components/FormRefusal';
import { Section } from '../../components/Section';
import { notifyDone, useProblem } from '../../lib/forms';
import { useSession } from '../../lib/session';

export function ProfileSection() {
  const { user } = useSession();
  const queryClient = useQueryClient();
  const form = useForm({
    mode: 'uncontrolled',
    initialValues: { name: user.name },
    validate: { name: isNotEmpty('Enter your name') },
  });
  const problem = useProblem(form);
  const save = useMutation({
    mutationFn: (body: typeof form.values) => unwrap(client.PATCH('/api/account', { body })),
    onSuccess: async () => {
      await queryClient.invalidateQueries({ queryKey: keys.session });
      form.resetDirty();
      notifyDone('Your name is saved.');
    },
    onError: problem.show,
  });
  return (
    <Section title="Profile" lead="Your name stands beside what you share.">
      <form noValidate onSubmit={form.onSubmit((values) => save.mutate(values), problem.clear)}>
        <Stack maw={420} align="flex-start">
          <FormRefusal message={problem.message} />
          <TextInput label="Name" autoComplete="name" w="100%" key={form.key('name')} {...form.getInputProps('name')} />
          <TextInput
            label="E-mail"
            w="100%"
            value={user.email}
            readOnly
            description="Sign-in and notices go by this address; it stays as invited."
          />
          <Button type="submit" loading={save.isPending}>
            Save
          </Button>
        </Stack>
      </form>
    </Section>
  );
}
