import { Button, Group, Modal, Stack, TextInput } from '@mantine/core';
import { isNotEmpty, useForm } from '@mantine/form';
import { useDisclosure } from '@mantine/hooks';
import { useMutation, useQueryClient } from '@tanstack/react-query';
import { client, unwrap } from '../../api/client';
import { keys } from '../../api/queries';
import { FormRefusal } from '../../components/FormRefusal';
import { notifyDone, useProblem } from '../../lib/forms';

export function RenameLab({ lab }: { lab: { id: string; name: string; version: number } }) {
  const [opened, { open, close }] = useDisclosure();
  return (
    <>
      <Button variant="default" onClick={open}>
        Rename
      </Button>
      <Modal opened={opened} onClose={close} title="Rename the laboratory">
        <RenameForm lab={lab} close={close} />
      </Modal>
    </>
  );
}

function RenameForm({ lab, close }: { lab: { id: string; name: string; version: number }; close: () => void }) {
  const queryClient = useQueryClient();
  const form = useForm({
    mode: 'uncontrolled',
    initialValues: { name: lab.name },
    validate: { name: isNotEmpty('Enter a name') },
  });
  const problem = useProblem(form);
  const rename = useMutation({
    mutationFn: ({ name }: typeof form.values) =>
      unwrap(
        client.PATCH('/api/labs/{labId}', {
          params: { path: { labId: lab.id } },
          body: { name, version: lab.version },
        }),
      ),
    onSuccess: async ({ name }) => {
      await Promise.all([
        queryClient.invalidateQueries({ queryKey: keys.lab(lab.id) }),
        queryClient.invalidateQueries({ queryKey: keys.session }),
      ]);
      notifyDone(`The laboratory is called ${name} now.`);
      close();
    },
    onError: problem.show,
  });
  return (
    <form noValidate onSubmit={form.onSubmit((values) => rename.mutate(values), problem.clear)}>
      <Stack>
        <FormRefusal message={problem.message} />
        <TextInput label="Name" data-autofocus key={form.key('name')} {...form.getInputProps('name')} />
        <Group justify="flex-end">
          <Button variant="default" onClick={close}>
            Cancel
          </Button>
          <Button type="submit" loading={rename.isPending}>
            Rename
          </Button>
        </Group>
      </Stack>
    </form>
  );
}
