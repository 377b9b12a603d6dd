import {
  Alert,
  Button,
  Checkbox,
  FileButton,
  Group,
  Modal,
  NativeSelect,
  Stack,
  Table,
  Text,
  Textarea,
  TextInput,
} from '@mantine/core';
import { useMemo, useState, type DragEvent } from 'react';
import { GEOMETRY_LIMITS, systemFromGeometry, type Geometry, type GeometrySystem } from '@heddle/shared';
import { AtomsView } from './AtomsView';
import { elementsOf, isotopesOf, readGeometry } from './logic/read';

/** Pairs listed; the couplings go in all the same. */
const LISTED = 60;

/** Nuclei with positions and dipolar couplings from a structure file. Nothing changes before the last button. */
export function GeometryImport({ onUse, onClose }: { onUse(found: GeometrySystem): void; onClose(): void }) {
  const [text, setText] = useState('');
  const read = useMemo(() => (text.trim() === '' ? null : readGeometry(text)), [text]);
  const open = (file: File | null | undefined) => {
    if (file) void file.text().then(setText);
  };
  const onDrop = (event: DragEvent) => {
    event.preventDefault();
    open(event.dataTransfer.files[0]);
  };
  return (
    <Modal opened onClose={onClose} size="xl" title="Nuclei from a geometry file">
      <Stack gap="sm" onDragOver={(event) => event.preventDefault()} onDrop={onDrop}>
        <Group align="flex-end">
          <FileButton onChange={open} accept=".xyz,.mol,.sdf,.txt">
            {(props) => (
              <Button variant="default" {...props}>
                Choose a file
              </Button>
            )}
          </FileButton>
          <Text size="sm" c="dimmed">
            XYZ or MDL molfile (V2000, V3000), up to {GEOMETRY_LIMITS.atoms.toLocaleString('en')} atoms. Dropping or
            pasting works too.
          </Text>
        </Group>
        <Textarea
          label="Text of the file"
          autosize
          minRows={3}
          maxRows={8}
          styles={{ input: { fontFamily: 'monospace', whiteSpace: 'pre' } }}
          value={text}
          onChange={({ currentTarget: { value } }) => setText(value)}
          error={read && 'refusal' in read ? read.refusal : undefined}
        />
        {read && 'geometry' in read && <Choice key={text} geometry={read.geometry} onUse={onUse} />}
      </Stack>
    </Modal>
  );
}

/** Which elements become nuclei, as which isotopes, and which pairs couple. */
function Choice({ geometry, onUse }: { geometry: Geometry; onUse(found: GeometrySystem): void }) {
  const elements = useMemo(
    () => elementsOf(geometry).filter(({ element }) => isotopesOf(element).length > 0),
    [geometry],
  );
  const [isotopes, setIsotopes] = useState<Record<string, string>>(() =>
    Object.fromEntries(
      elements.filter(({ element }) => element === 'H').map(({ element }) => [element, isotopesOf(element)[0]]),
    ),
  );
  const [cutOff, setCutOff] = useState('3');
  const reach = Number(cutOff);
  const found = useMemo(() => choose(geometry, isotopes, reach), [geometry, isotopes, reach]);
  const problem = typeof found === 'string' ? found : found.nuclei.length === 0 ? 'choose at least one element' : null;
  return (
    <>
      {geometry.warnings.map((warning) => (
        <Alert key={warning} color="weld" variant="outline">
          {warning}
        </Alert>
      ))}
      <Group align="flex-end" gap="lg">
        {elements.map(({ element, count }) => (
          <Group key={element} gap={6} align="center">
            <Checkbox
              label={`${element}, ${count}`}
              checked={element in isotopes}
              onChange={({ currentTarget: { checked } }) =>
                setIsotopes((now) => {
                  const { [element]: _, ...rest } = now;
                  return checked ? { ...rest, [element]: isotopesOf(element)[0] } : rest;
                })
              }
            />
            {element in isotopes && isotopesOf(element).length > 1 && (
              <NativeSelect
                size="xs"
                aria-label={`Isotope of ${element}`}
                data={isotopesOf(element)}
                value={isotopes[element]}
                onChange={({ currentTarget: { value } }) => setIsotopes((now) => ({ ...now, [element]: value }))}
              />
            )}
          </Group>
        ))}
        <TextInput
          label={'Couple pairs up to, \u00c5'}
          w={190}
          value={cutOff}
          error={reach >= 0 ? undefined : 'must be a distance'}
          onChange={({ currentTarget: { value } }) => setCutOff(value)}
        />
      </Group>
      {typeof found !== 'string' && found.nuclei.length > 0 && (
        <Group align="flex-start" gap="lg">
          <AtomsView atoms={found.nuclei} pairs={found.pairs} />
          <PairTable found={found} />
        </Group>
      )}
      {problem && (
        <Text size="sm" c="var(--madder)" role="alert">
          {problem}
        </Text>
      )}
      <Group justify="flex-end">
        <Button disabled={problem !== null} onClick={() => typeof found !== 'string' && onUse(found)}>
          {typeof found === 'string'
            ? 'Use these nuclei'
            : `Use these ${found.nuclei.length} nuclei and ${found.pairs.length} couplings`}
        </Button>
      </Group>
    </>
  );
}

function choose(geometry: Geometry, isotopes: Record<string, string>, cutOff: number): GeometrySystem | string {
  try {
    return systemFromGeometry(geometry, isotopes, cutOff >= 0 ? cutOff : 0);
  } catch (error) {
    return error instanceof RangeError ? error.message : 'the structure could not be used';
  }
}

function PairTable({ found }: { found: GeometrySystem }) {
  const { nuclei, pairs, equivalence } = found;
  const alike = new Map(nuclei.map(({ id }, i) => [id, equivalence[i]]));
  return (
    <Table.ScrollContainer minWidth={320} mah={262} style={{ flex: 1 }}>
      <Table verticalSpacing={2} aria-label="Pairs within reach">
        <Table.Thead>
          <Table.Tr>
            <Table.Th>Pair</Table.Th>
            <Table.Th ta="right">Distance, {'\u00c5'}</Table.Th>
            <Table.Th ta="right">Constant, Hz</Table.Th>
            <Table.Th>By symmetry</Table.Th>
          </Table.Tr>
        </Table.Thead>
        <Table.Tbody>
          {pairs.slice(0, LISTED).map(({ between: [a, b], distance, constant }) => (
            <Table.Tr key={`${a},${b}`}>
              <Table.Td>
                {a} {'\u2013'} {b}
              </Table.Td>
              <Table.Td ta="right">{distance.toFixed(3)}</Table.Td>
              <Table.Td ta="right">{constant.toFixed(1)}</Table.Td>
              <Table.Td>{alike.get(a) === alike.get(b) ? 'alike' : ''}</Table.Td>
            </Table.Tr>
          ))}
        </Table.Tbody>
      </Table>
    </Table.ScrollContainer>
  );
}
