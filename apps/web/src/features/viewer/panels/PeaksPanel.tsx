import { Button, Group, Slider, Table, Text } from '@mantine/core';
import { notifyDone } from '../../../lib/forms';
import type { Peak } from '../logic/peaks';

/** Picked peaks as a table, above a threshold that can be moved. */
export function PeaksPanel({
  peaks,
  hzPerPpm,
  threshold,
  onThreshold,
}: {
  peaks: readonly Peak[];
  hzPerPpm: number;
  threshold: number;
  onThreshold(share: number): void;
}) {
  const copy = async () => {
    const rows = peaks.map(({ ppm, height }) =>
      [ppm.toFixed(4), (ppm * hzPerPpm).toFixed(2), height.toPrecision(5)].join('\t'),
    );
    await navigator.clipboard.writeText(['ppm\tHz\theight', ...rows].join('\n'));
    notifyDone(`${peaks.length} peaks copied.`);
  };
  return (
    <>
      <Group align="flex-end" gap="lg" mb="sm">
        <div style={{ width: 260 }}>
          <Text size="sm">Above {(100 * threshold).toFixed(1)} % of the highest</Text>
          <Slider
            thumbLabel="Threshold of peaks"
            min={-3}
            max={-0.01}
            step={0.01}
            label={null}
            value={Math.log10(threshold)}
            onChange={(value) => onThreshold(10 ** value)}
          />
        </div>
        <Button size="xs" variant="default" onClick={() => void copy()} disabled={peaks.length === 0}>
          Copy as table
        </Button>
      </Group>
      <Table.ScrollContainer minWidth={320} maw={520} mah={360}>
        <Table verticalSpacing={3} aria-label="Peaks">
          <Table.Thead>
            <Table.Tr>
              <Table.Th ta="right">ppm</Table.Th>
              <Table.Th ta="right">Hz</Table.Th>
              <Table.Th ta="right">Height</Table.Th>
            </Table.Tr>
          </Table.Thead>
          <Table.Tbody>
            {peaks.map(({ ppm, height }, i) => (
              <Table.Tr key={i}>
                <Table.Td ta="right">{ppm.toFixed(4)}</Table.Td>
                <Table.Td ta="right">{(ppm * hzPerPpm).toFixed(2)}</Table.Td>
                <Table.Td ta="right">{height.toPrecision(4)}</Table.Td>
              </Table.Tr>
            ))}
          </Table.Tbody>
        </Table>
      </Table.ScrollContainer>
    </>
  );
}
