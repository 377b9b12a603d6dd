import { Button, Table, Text } from '@mantine/core';
import type { Line } from '@heddle/shared';
import type { Range } from '../logic/axis';

const MOST = 200;

/** Exact lines in the stretch that is shown, with the nuclei that flip. */
export function LinesPanel({
  lines,
  range,
  onShow,
}: {
  lines: readonly Line[] | undefined;
  range: Range;
  onShow(ppm: number): void;
}) {
  if (!lines) {
    return (
      <Text size="sm" c="dimmed">
        This kind of experiment has no separate lines: exchange, relaxation or orientation blends them.
      </Text>
    );
  }
  const seen = lines.filter(({ ppm }) => ppm <= range.high && ppm >= range.low);
  const shown = [...seen]
    .sort((a, b) => Math.abs(b.intensity) - Math.abs(a.intensity))
    .slice(0, MOST)
    .sort((a, b) => b.ppm - a.ppm);
  return (
    <>
      <Text size="sm" c="dimmed" mb="xs">
        {seen.length} of {lines.length} lines are in view{seen.length > MOST && `; the ${MOST} strongest are listed`}.
      </Text>
      <Table.ScrollContainer minWidth={420} maw={680} mah={380}>
        <Table verticalSpacing={3} aria-label="Lines">
          <Table.Thead>
            <Table.Tr>
              <Table.Th ta="right">ppm</Table.Th>
              <Table.Th ta="right">Hz</Table.Th>
              <Table.Th ta="right">Intensity</Table.Th>
              <Table.Th>Nuclei that flip</Table.Th>
              <Table.Th aria-label="Show" />
            </Table.Tr>
          </Table.Thead>
          <Table.Tbody>
            {shown.map(({ ppm, hz, intensity, nuclei }, i) => (
              <Table.Tr key={i}>
                <Table.Td ta="right">{ppm.toFixed(4)}</Table.Td>
                <Table.Td ta="right">{hz.toFixed(2)}</Table.Td>
                <Table.Td ta="right">{intensity.toPrecision(4)}</Table.Td>
                <Table.Td>{nuclei.join(', ') || 'combination'}</Table.Td>
                <Table.Td>
                  <Button
                    size="compact-xs"
                    variant="subtle"
                    onClick={() => onShow(ppm)}
                    aria-label={`Show the line at ${ppm.toFixed(4)} ppm`}
                  >
                    Show
                  </Button>
                </Table.Td>
              </Table.Tr>
            ))}
          </Table.Tbody>
        </Table>
      </Table.ScrollContainer>
    </>
  );
}
