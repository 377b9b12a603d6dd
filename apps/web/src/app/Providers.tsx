import { MantineProvider } from '@mantine/core';
import { ModalsProvider } from '@mantine/modals';
import { Notifications } from '@mantine/notifications';
import { QueryClientProvider, type QueryClient } from '@tanstack/react-query';
import type { ReactNode } from 'react';
import { CommandsProvider } from '../lib/commands';
import { cssVariables, theme } from '../theme/theme';

/** Everything that screens expect around them. */
export function Providers({ queryClient, children }: { queryClient: QueryClient; children: ReactNode }) {
  return (
    <QueryClientProvider client={queryClient}>
      <MantineProvider theme={theme} cssVariablesResolver={cssVariables} defaultColorScheme="auto">
        <ModalsProvider labels={{ confirm: 'Confirm', cancel: 'Cancel' }}>
          <Notifications position="bottom-right" containerWidth={380} />
          <CommandsProvider>{children}</CommandsProvider>
        </ModalsProvider>
      </MantineProvider>
    </QueryClientProvider>
  );
}
