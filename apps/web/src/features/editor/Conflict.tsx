import { Button, Group, Modal, Radio, Table, Text } from '@mantine/core';
import { useMemo, useState } from 'react';
import type { SpinSystemInput } from '@heddle/shared';
import { compareDocuments, mergeDocuments } from './logic/compare';
import type { SaveConflict } from './useSave';

/** Both versions of a system side by side, value by value: the second to save chooses, and nothing is lost. */
export function Conflict({
  conflict,
  onMerge,
  onClose,
}: {
  conflict: SaveConflict;
  onMerge(document: SpinSystemInput): void;
  onClose(): void;
}) {
  const { theirs, mine } = conflict;
  const differences = useMemo(() => compareDocuments(theirs.document, mine), [theirs, mine]);
  const [chosen, setChosen] = useState<ReadonlySet<string>>(() => new Set(differences.map(({ id }) => id)));
  const choose = (id: string, takeMine: boolean) => {
    const next = new Set(chosen);
    if (takeMine) next.add(id);
    else next.delete(id);
    setChosen(next);
  };
  return (
    <Modal opened onClose={onClose} size="xl" title={`${theirs.author.name} saved revision ${theirs.number} meanwhile`}>
      <Text size="sm" mb="md">
        Choose for each value that differs whose is kept. Your edits stay in this browser until you save.
      </Text>
      <Table.ScrollContainer minWidth={480}>
        <Table verticalSpacing={6}>
          <Table.Thead>
            <Table.Tr>
              <Table.Th>Value</Table.Th>
              <Table.Th>Theirs</Table.Th>
              <Table.Th>Mine</Table.Th>
            </Table.Tr>
          </Table.Thead>
          <Table.Tbody>
            {differences.map(({ id, label, theirs: before, mine: after }) => (
              <Table.Tr key={id}>
                <Table.Th scope="row" fw={400}>
                  {label}
                </Table.Th>
                <Table.Td>
                  <Radio name={id} label={before} checked={!chosen.has(id)} onChange={() => choose(id, false)} />
                </Table.Td>
                <Table.Td>
                  <Radio name={id} label={after} checked={chosen.has(id)} onChange={() => choose(id, true)} />
                </Table.Td>
              </Table.Tr>
            ))}
          </Table.Tbody>
        </Table>
      </Table.ScrollContainer>
      <Group justify="flex-end" mt="md">
        <Button variant="default" onClick={onClose}>
          Not now
        </Button>
        <Button onClick={() => onMerge(mergeDocuments(theirs.document, mine, chosen))}>
          Save as revision {theirs.number + 1}
        </Button>
      </Group>
    </Modal>
  );
}
