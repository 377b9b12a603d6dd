import { Group, Text, Title } from '@mantine/core';
import { useDocumentTitle } from '@mantine/hooks';
import type { ReactNode } from 'react';

/** Title of a page, what it is about in a line, and its main actions at the right. Names the browser's tab too. */
export function PageHeader({ title, lead, actions }: { title: string; lead?: ReactNode; actions?: ReactNode }) {
  useDocumentTitle(`${title} · Heddle`);
  return (
    <Group justify="space-between" align="flex-end" mb="lg" gap="md">
      <div style={{ minWidth: 0 }}>
        <Title order={1} fz={32} lh={1.2}>
          {title}
        </Title>
        {lead && (
          <Text c="dimmed" mt={4}>
            {lead}
          </Text>
        )}
      </div>
      {actions && <Group gap="xs">{actions}</Group>}
    </Group>
  );
}
