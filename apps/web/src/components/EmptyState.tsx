import { Stack, Text, Title } from '@mantine/core';
import type { ReactNode } from 'react';
import { WarpDrawing } from './WarpDrawing';

/** What stands where a list has nothing yet: says so, and offers what to do about it. */
export function EmptyState({ title, children, action }: { title: string; children?: ReactNode; action?: ReactNode }) {
  return (
    <Stack align="center" gap="sm" py={48} ta="center">
      <WarpDrawing />
      <Title order={2} size="h3">
        {title}
      </Title>
      {children && (
        <Text c="dimmed" maw={440}>
          {children}
        </Text>
      )}
      {action}
    </Stack>
  );
}
