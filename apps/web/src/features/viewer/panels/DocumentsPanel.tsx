import { Code, Table, Title } from '@mantine/core';
import type { RunResult } from '../result';

/** How the result was reached, and the two documents it stands on. */
export function DocumentsPanel({ result }: { result: RunResult }) {
  const { report, system, experiment } = result;
  return (
    <>
      <Table maw={680} verticalSpacing={4} aria-label="How it was computed">
        <Table.Tbody>
          <Table.Tr>
            <Table.Th scope="row">Method</Table.Th>
            <Table.Td>{report.method}</Table.Td>
          </Table.Tr>
          <Table.Tr>
            <Table.Th scope="row">Engine</Table.Th>
            <Table.Td>
              {report.engine}, {report.seconds.toFixed(3)} s
            </Table.Td>
          </Table.Tr>
          {Object.entries(report.dimensions).map(([name, value]) => (
            <Table.Tr key={name}>
              <Table.Th scope="row">{name.replace(/([A-Z])/g, ' $1').toLowerCase()}</Table.Th>
              <Table.Td>{value.toLocaleString('en')}</Table.Td>
            </Table.Tr>
          ))}
        </Table.Tbody>
      </Table>
      <Title order={3} fz={15} mt="md" mb={4}>
        Spin system
      </Title>
      <Code block mah={320} tabIndex={0} style={{ overflow: 'auto' }}>
        {JSON.stringify(system, null, 2)}
      </Code>
      <Title order={3} fz={15} mt="md" mb={4}>
        Experiment
      </Title>
      <Code block mah={320} tabIndex={0} style={{ overflow: 'auto' }}>
        {JSON.stringify(experiment, null, 2)}
      </Code>
    </>
  );
}
