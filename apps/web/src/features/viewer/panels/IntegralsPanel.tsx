import { Button, CloseButton, Group, NumberInput, Table, Text } from '@mantine/core';
import type { Spectrum } from '@heddle/shared';
import { integrate } from '../logic/integrals';
import type { ViewState } from '../logic/view-state';

/** Regions with their integrals, normalised to a chosen one. */
export function IntegralsPanel({
  spectrum,
  view,
  hzPerPpm,
  marking,
  onMark,
  onChange,
}: {
  spectrum: Spectrum;
  view: ViewState;
  hzPerPpm: number;
  marking: boolean;
  onMark(on: boolean): void;
  onChange(change: Partial<ViewState>): void;
}) {
  const { integrals, reference, range } = view;
  const values = integrals.map((region) => integrate(spectrum, region, hzPerPpm));
  const unit = reference ? values[reference.index] / reference.nuclei : 1;
  const remove = (index: number) => onChange({ integrals: integrals.filter((_, i) => i !== index), reference: null });
  return (
    <>
      <Group mb="sm">
        <Button
          size="xs"
          variant={marking ? 'filled' : 'default'}
          aria-pressed={marking}
          onClick={() => onMark(!marking)}
        >
          Mark a region
        </Button>
        <Button
          size="xs"
          variant="default"
          disabled={!range}
          onClick={() => range && onChange({ integrals: [...integrals, range] })}
        >
          Add what is shown
        </Button>
      </Group>
      {integrals.length === 0 ? (
        <Text size="sm" c="dimmed">
          Without a reference, integrals count nuclei: the whole spectrum holds{' '}
          {integrate(spectrum, { high: spectrum.firstPpm, low: spectrum.lastPpm }, hzPerPpm).toFixed(2)}.
        </Text>
      ) : (
        <Table.ScrollContainer minWidth={420} maw={620}>
          <Table verticalSpacing={3} aria-label="Integrals">
            <Table.Thead>
              <Table.Tr>
                <Table.Th>Region, ppm</Table.Th>
                <Table.Th ta="right">Integral</Table.Th>
                <Table.Th>Set to</Table.Th>
                <Table.Th aria-label="Remove" />
              </Table.Tr>
            </Table.Thead>
            <Table.Tbody>
              {integrals.map((region, i) => (
                <Table.Tr key={`${region.high}-${region.low}`}>
                  <Table.Td>
                    {region.high.toFixed(3)} to {region.low.toFixed(3)}
                  </Table.Td>
                  <Table.Td ta="right">{(values[i] / unit).toFixed(3)}</Table.Td>
                  <Table.Td>
                    <NumberInput
                      size="xs"
                      w={80}
                      min={0.01}
                      aria-label={`Nuclei in region ${i + 1}`}
                      value={reference?.index === i ? reference.nuclei : ''}
                      onChange={(nuclei) =>
                        onChange({ reference: typeof nuclei === 'number' && nuclei > 0 ? { index: i, nuclei } : null })
                      }
                    />
                  </Table.Td>
                  <Table.Td>
                    <CloseButton size="sm" aria-label={`Remove region ${i + 1}`} onClick={() => remove(i)} />
                  </Table.Td>
                </Table.Tr>
              ))}
            </Table.Tbody>
          </Table>
        </Table.ScrollContainer>
      )}
    </>
  );
}
