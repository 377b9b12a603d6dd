import { Button, Checkbox, Group, Select, TextInput } from '@mantine/core';
import { ISOTOPES } from '@heddle/shared';
import { useDebouncedCallback } from '@mantine/hooks';
import { SearchIcon } from '../../components/icons';
import { OwnerSelect } from '../../components/OwnerSelect';
import type { useSearchFilters } from '../../lib/search';
import type { SystemFilterName } from './system-filters';

/** Time after the last key before the list is asked for again, ms. */
const TYPING_PAUSE = 250;

export function SystemFilterBar({ search }: { search: ReturnType<typeof useSearchFilters<SystemFilterName>> }) {
  const { filters, set, clear, any } = search;
  const setText = useDebouncedCallback((text: string) => set('q', text.trim()), TYPING_PAUSE);
  return (
    <Group mb="md" gap="sm" role="search" aria-label="Systems">
      <TextInput
        key={any ? 'filtered' : 'all'}
        type="search"
        aria-label="Search by name"
        placeholder="Search by name"
        leftSection={<SearchIcon />}
        defaultValue={filters.q ?? ''}
        onChange={(event) => setText(event.currentTarget.value)}
        w={260}
      />
      <Select
        aria-label="Nuclide"
        placeholder="Any nuclide"
        data={ISOTOPES}
        searchable
        clearable
        value={filters.nuclide ?? null}
        onChange={(value) => set('nuclide', value)}
        w={150}
      />
      <OwnerSelect value={filters.owner ?? null} onChange={(value) => set('owner', value)} />
      <Select
        aria-label="Shared or private"
        placeholder="Shared and private"
        data={[
          { value: 'yes', label: 'Shared' },
          { value: 'no', label: 'Private' },
        ]}
        clearable
        value={filters.shared ?? null}
        onChange={(value) => set('shared', value)}
        w={190}
      />
      <Checkbox
        label="Archived"
        checked={filters.archived === 'yes'}
        onChange={(event) => set('archived', event.currentTarget.checked ? 'yes' : null)}
      />
      {any && (
        <Button variant="subtle" size="compact-sm" onClick={clear}>
          Clear
        </Button>
      )}
    </Group>
  );
}
