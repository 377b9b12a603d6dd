import { Group, NativeSelect, SegmentedControl, Stack, Table, Text } from '@mantine/core';
import { useMemo, useState } from 'react';
import { relaxationNumbers, type Experiment, type NucleusRelaxation, type SpinSystem } from '@heddle/shared';
import { missing, rateCurve, timeWords, type Along } from './logic/curves';
import { RatePlot } from './RatePlot';

/** Relaxation from tumbling as numbers: a table at the experiment's field, and a plot along correlation time or field. */
export function RatesPanel({ system, experiment }: { system: SpinSystem | null; experiment: Experiment | null }) {
  if (!system || !experiment) return <Text c="dimmed">The system or the experiment needs mending first.</Text>;
  const lack = missing(system);
  if (lack) return <Text c="dimmed">{lack}</Text>;
  return <Rates system={system} experiment={experiment} />;
}

function Rates({ system, experiment }: { system: SpinSystem; experiment: Experiment }) {
  const numbers = useMemo(() => relaxationNumbers(system, experiment), [system, experiment]);
  const [along, setAlong] = useState<Along>('tauC');
  const [chosen, setChosen] = useState(system.nuclei[0].id);
  const id = system.nuclei.some((nucleus) => nucleus.id === chosen) ? chosen : system.nuclei[0].id;
  const curve = useMemo(() => rateCurve(system, experiment, id, along), [system, experiment, id, along]);
  return (
    <Stack gap="md">
      <Text size="sm" c="dimmed">
        At {+experiment.protonMHz.toFixed(2)} MHz, correlation time {system.tumbling!.tauC} s; from dipolar couplings,
        shift tensors and quadrupolar couplings.
      </Text>
      <NumbersTable numbers={numbers} />
      <Group gap="sm" align="flex-end">
        <NativeSelect
          size="xs"
          label="Nucleus"
          data={system.nuclei.map((nucleus) => nucleus.id)}
          value={id}
          onChange={({ currentTarget: { value } }) => setChosen(value)}
        />
        <SegmentedControl
          size="xs"
          aria-label="Along what the times are drawn"
          data={[
            { value: 'tauC', label: 'Correlation time' },
            { value: 'field', label: '1H frequency' },
          ]}
          value={along}
          onChange={(value) => setAlong(value)}
        />
      </Group>
      <RatePlot
        curve={curve}
        along={along}
        now={along === 'tauC' ? system.tumbling!.tauC : experiment.protonMHz}
        nucleus={id}
      />
    </Stack>
  );
}

function NumbersTable({ numbers }: { numbers: readonly NucleusRelaxation[] }) {
  return (
    <Table.ScrollContainer minWidth={460}>
      <Table verticalSpacing={3} aria-label="Relaxation of each nucleus">
        <Table.Thead>
          <Table.Tr>
            <Table.Th>Nucleus</Table.Th>
            <Table.Th ta="right">T1</Table.Th>
            <Table.Th ta="right">T1, alone inverted</Table.Th>
            <Table.Th ta="right">T2</Table.Th>
            <Table.Th ta="right">Line width</Table.Th>
            <Table.Th>Steady NOE, saturating</Table.Th>
          </Table.Tr>
        </Table.Thead>
        <Table.Tbody>
          {numbers.map(({ id, t1, t1Selective, t2, lineWidth, noe }) => (
            <Table.Tr key={id}>
              <Table.Th scope="row">{id}</Table.Th>
              <Table.Td ta="right">{timeWords(t1)}</Table.Td>
              <Table.Td ta="right">{timeWords(t1Selective)}</Table.Td>
              <Table.Td ta="right">{timeWords(t2)}</Table.Td>
              <Table.Td ta="right">{lineWidth === null ? '\u2013' : `${+lineWidth.toPrecision(3)} Hz`}</Table.Td>
              <Table.Td>{noeWords(id, noe)}</Table.Td>
            </Table.Tr>
          ))}
        </Table.Tbody>
      </Table>
    </Table.ScrollContainer>
  );
}

/** The largest effects of saturating others, in per cent. */
function noeWords(id: string, noe: Readonly<Record<string, number>>): string {
  const strongest = Object.entries(noe)
    .filter(([other, change]) => other !== id && Math.abs(change) >= 0.005)
    .sort(([, a], [, b]) => Math.abs(b) - Math.abs(a))
    .slice(0, 4);
  return strongest.map(([other, change]) => `${other} ${(100 * change).toFixed(0)} %`).join(', ') || 'none';
}
